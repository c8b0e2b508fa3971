/** What is known of a value of the water at a moment, and how well. */
import { minutesPerDay, writeClock } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import { dayText, nameOf } from "../checks/words.ts";
import type { ReadValue, SystemEvent } from "../culture/model.ts";
import type { Assessment } from "../dosing/assess.ts";
import { onScale, type Scale } from "../dosing/ph-scale.ts";
import { isTracked, type Tracked } from "../dosing/tracked.ts";
import { carriedMinutes } from "../dosing/water-state.ts";

export interface Latest {
  /** In the model's unit; a pH on the scale beside it. */
  readonly value: number;
  readonly scale: Scale;
  /** A test that showed less than the value. */
  readonly below: boolean;
  readonly readAt: number;
  readonly reading: ReadValue;
  readonly how: "carried" | "as read" | "stale";
  /** Why it stands as read, where it would be carried forward otherwise. */
  readonly missing: "volume" | "uptake" | null;
  /** With what came in since, and nothing taken, where that isn't the value; of what stands as read. */
  readonly withoutUptake: number | null;
  /** What is reckoned now from the last number read, where a newer test that only showed less than something gainsays it. */
  readonly reckoned: { readonly value: number; readonly readAt: number } | null;
  /** Of a pH: `before the dose of lye at 09:00`. */
  readonly before: string | null;
}

/** The value now: carried forward where that is done, else as last read; a pH on the scale asked for. */
export function latestOf(
  assessment: Assessment,
  name: ParameterName,
  scale: Scale | undefined = undefined,
): Latest | null {
  const { state, constants, at } = assessment;
  const last = lastRead(assessment, name);
  if (!last) return null;
  const { reading, readAt } = last;
  const carried = isTracked(name) ? state.carried[name] : null;
  // A newer test that only showed less than something ends what was carried, unless both are true.
  const isRecent = carried !== null && at - carried.readAt <= carriedMinutes;
  const tested = last.below && isRecent && carried.value < reading.value ? carried : null;
  const basis = tested ? { ...last, ...tested, below: false } : last;
  const isStale = at - basis.readAt > carriedMinutes;
  const missing = !isStale && !basis.below && isTracked(name) ? whatIsMissing(assessment, name) : null;
  const isCarried = !isStale && !basis.below && isTracked(name) && missing === null && carried !== null;
  const own = basis.reading.scale;
  const wanted = scale ?? own;
  const asRead = onScale(basis.reading.value, own, wanted, state, constants);
  const moved = carried && missing === "uptake" && carried.value !== basis.reading.value;
  return {
    value: isCarried ? carried.value : asRead,
    scale: wanted,
    below: basis.below,
    readAt: basis.readAt,
    reading: basis.below ? reading : basis.reading,
    how: isStale ? "stale" : isCarried ? "carried" : "as read",
    missing,
    withoutUptake: moved ? carried.value : null,
    reckoned: basis.below && isRecent ? { value: carried.value, readAt: carried.readAt } : null,
    before: name === "pH" ? alkalineSince(assessment, readAt) : null,
  };
}

/** The last value read that counts, those that only are below something among them. */
function lastRead({ readings }: Assessment, name: ParameterName) {
  const found = readings.findLast(({ event }) => {
    const value = event.values[name];
    return value && !event.disregarded && !value.impossible;
  });
  const reading = found?.event.values[name];
  return found && reading ? { reading, readAt: found.event.minute, below: reading.below } : null;
}

function whatIsMissing({ volume, uptake }: Assessment, name: Tracked): Latest["missing"] {
  if (volume.litres === null) return "volume";
  const isAsked = name === "alkalinity" || name === "calcium" || name === "magnesium";
  return isAsked && (uptake?.perDay[name] ?? null) === null ? "uptake" : null;
}

/** What came after a pH was read, up to a moment or to an event of the log, and raised it. */
export function alkalineSince(
  { system, constants, at }: Pick<Assessment, "system" | "constants" | "at">,
  readAt: number,
  until: SystemEvent | null = null,
): string | null {
  const end = until ? system.events.indexOf(until) : system.events.length;
  const doses = system.events.slice(0, end).flatMap((event) => {
    if (event.minute < readAt || event.minute > at) return [];
    const solutions =
      event.kind === "gave"
        ? event.doses.map(({ solution }) => solution)
        : event.kind === "topped" && event.solution !== null
          ? [event.solution]
          : [];
    return solutions
      .filter((solution) => (constants.strengthAt(solution, event.minute)?.alkalinityMeq ?? 0) > 0)
      .map((solution) => ({ event, solution }));
  });
  const last = doses.at(-1);
  if (!last) return null;
  const clock = clockOr(last.event.minute, at);
  const when = !last.event.timeKnown
    ? `on ${dayAndMonth(last.event.minute)}`
    : clock.includes(" ")
      ? `on ${clock}`
      : `at ${clock}`;
  const dose = `${last.event.kind === "topped" ? "topping up with" : "the dose of"} ${nameOf(last.solution)} ${when}`;
  return doses.length === 1
    ? `before ${dose}`
    : `before ${doses.length} alkaline doses, the last of ${nameOf(last.solution)} ${when}`;
}

/** `3 Dec`. */
export function dayAndMonth(minute: number): string {
  const [, day = "", month = ""] = dayText(minute).split(" ");
  return `${day} ${month.slice(0, 3)}`;
}

/** `09:00` of the same day, else `3 Dec 09:00`. */
export function clockOr(minute: number, at: number): string {
  const clock = writeClock(((minute % minutesPerDay) + minutesPerDay) % minutesPerDay);
  const isToday = Math.floor(minute / minutesPerDay) === Math.floor(at / minutesPerDay);
  return isToday ? clock : `${dayAndMonth(minute)} ${clock}`;
}

/** Where a value stands in a band; null where a test that only showed less than something can't tell. */
export function standing(
  { value, below = false }: { readonly value: number; readonly below?: boolean },
  { low, high }: { readonly low: number; readonly high: number },
): "below" | "in" | "above" | null {
  const slack = (edge: number) => Math.abs(edge) * 1e-9;
  if (below) {
    if (value <= low + slack(low)) return "below";
    return low <= 0 && value <= high + slack(high) ? "in" : null;
  }
  if (value < low - slack(low)) return "below";
  return value > high + slack(high) ? "above" : "in";
}

const minutesPerHour = 60;

/** How long ago, in the largest unit that says something; days as the calendar counts them. */
export function ago(minute: number, at: number): string {
  const minutes = at - minute;
  if (minutes < minutesPerHour) return `${Math.round(minutes)} min ago`;
  if (minutes < 2 * minutesPerDay) return `${Math.round(minutes / minutesPerHour)} h ago`;
  return `${Math.floor(at / minutesPerDay) - Math.floor(minute / minutesPerDay)} days ago`;
}
