/** The carbonate system of readings: where alkalinity and pH were read within an hour of each other. */
import type { ParameterName } from "../../grammar/parameters.ts";
import { type CarbonateState, fromAlkalinityAndPh, totalFromNbs } from "../chemistry/carbonate-system.ts";
import { constantsAt } from "../chemistry/constants-at.ts";
import { atomicWeight } from "../chemistry/elements.ts";
import { densityKgPerL, seaWaterComposition } from "../chemistry/sea-water.ts";
import { defaults } from "../culture/defaults.ts";
import { countUpTo } from "../culture/event-order.ts";
import { isAlike, linesAtOnce, sameAtStart } from "../culture/keep.ts";
import type { Assumption, ReadEvent, ReadValue, SystemEvent } from "../culture/model.ts";
import { isRead, type Known, nearestKnown, type Seen, sameDay, seenIn } from "../culture/readings.ts";
import { type Assuming, assuming } from "./assumptions.ts";

export interface ReadingWithCarbonate {
  readonly event: ReadEvent;
  /** Null where the entry has no partner, or no sea water is like it. */
  readonly carbonate: { readonly state: CarbonateState; readonly densityKgPerL: number } | null;
}

/** Minutes within which alkalinity and pH count as read of one water. */
const together = 60;

/** All readings, and what the next look at them may take from it. Lists in order of time. */
export interface KeptReadings {
  readonly events: readonly SystemEvent[];
  readonly reads: readonly ReadEvent[];
  readonly readings: readonly ReadingWithCarbonate[];
  /** By reading, what its carbonate system was worked out from, and what was taken for granted in that. */
  readonly bases: readonly Basis[];
  readonly seen: AllSeen;
  /** Each where it came first. */
  readonly assumptions: readonly { readonly minute: number; readonly assumption: Assumption }[];
}

interface Basis {
  readonly from: ReadingSeen | null;
  readonly assumptions: readonly Assumption[];
}

type AllSeen = Readonly<Record<"salinity" | "temperature" | "calcium", readonly Seen[]>>;

/**
 * All readings up to a minute, with their carbonate system in the later of two entries. What was worked out before an
 * edit stays to a day before it: no reading knows of one that is later than that.
 */
export function* readingsUpTo(
  all: readonly SystemEvent[],
  at: number,
  last: KeptReadings | null,
): Generator<void, KeptReadings> {
  const events = all.slice(0, countUpTo(all, at));
  const same = sameAtStart(last?.events ?? [], events);
  const changed = Math.min(...[events[same], last?.events[same]].map((event) => event?.minute ?? Infinity));
  const until = changed - sameDay - 1;
  const before = <T extends { readonly minute: number }>(list: readonly T[] | undefined): T[] =>
    list?.slice(0, countUpTo(list, until)) ?? [];
  const reads = before(last?.reads);
  const first = reads.length;
  const later = events.slice(countUpTo(events, until)).filter(isRead);
  const seenOf = (parameter: keyof AllSeen) => [
    ...before(last?.seen[parameter]),
    ...seenIn(later, parameter),
  ];
  const seen = {
    salinity: seenOf("salinity"),
    temperature: seenOf("temperature"),
    calcium: seenOf("calcium"),
  };
  for (const read of later) reads.push(read);
  const readings = last?.readings.slice(0, first) ?? [];
  const bases = last?.bases.slice(0, first) ?? [];
  const assumptions = before(last?.assumptions);
  const assumed = assuming();
  for (const { assumption } of assumptions) assumed.add(assumption);
  let next = first;
  for (let index = first; index < reads.length; index += 1) {
    if (index % linesAtOnce === 0) yield;
    const event = reads[index]!;
    while (last && next < last.reads.length && last.reads[next]!.minute < event.minute) next += 1;
    const from = seenBy(reads, index, seen);
    const alike = indexOfAlike(last?.reads ?? [], next, event);
    const kept = alike !== null && last && isAlike(last.bases[alike]!.from, from) ? alike : null;
    let basis: Basis;
    if (kept !== null && last) {
      const { carbonate } = last.readings[kept]!;
      basis = last.bases[kept]!;
      readings.push({ event, carbonate });
    } else {
      const own = assuming();
      readings.push({ event, carbonate: from && solve(from, own) });
      basis = { from, assumptions: own.all() };
    }
    bases.push(basis);
    for (const assumption of basis.assumptions)
      if (assumed.add(assumption)) assumptions.push({ minute: event.minute, assumption });
  }
  return { events, reads, readings, bases, seen, assumptions };
}

/** The reading of the same minute and words as an event's, from an index on. */
function indexOfAlike(reads: readonly ReadEvent[], from: number, { minute, text }: ReadEvent): number | null {
  for (let index = from; reads[index]?.minute === minute; index += 1)
    if (reads[index]!.text === text) return index;
  return null;
}

/** All that the carbonate system of a reading is worked out from. */
interface ReadingSeen {
  readonly alkalinityMeqPerL: number;
  readonly pH: number;
  readonly pHScale: ReadValue["scale"];
  readonly salinity: Known;
  readonly temperature: Known;
  /** Null where it was never read. */
  readonly calciumMgPerL: number | null;
}

/** Null where an entry has no partner. */
function seenBy(reads: readonly ReadEvent[], index: number, seen: AllSeen): ReadingSeen | null {
  const event = reads[index]!;
  if (event.disregarded || !(usable(event, "alkalinity") || usable(event, "pH"))) return null;
  const alkalinity = partner(reads, index, "alkalinity");
  const pH = alkalinity && partner(reads, index, "pH");
  if (!alkalinity || !pH) return null;
  const known = (parameter: "salinity" | "temperature"): Known => {
    const own = usable(event, parameter);
    return own
      ? { value: own.value, from: "reading" }
      : nearestKnown(seen[parameter], event.minute, defaults[parameter].value);
  };
  const calcium = nearestKnown(seen.calcium, event.minute, Number.NaN).value;
  return {
    alkalinityMeqPerL: alkalinity.value,
    pH: pH.value,
    pHScale: pH.scale,
    salinity: known("salinity"),
    temperature: known("temperature"),
    calciumMgPerL: usable(event, "calcium")?.value ?? (Number.isFinite(calcium) ? calcium : null),
  };
}

function usable(event: ReadEvent, parameter: ParameterName): ReadValue | null {
  const value = event.values[parameter];
  return value && !event.disregarded && !value.impossible && !value.below ? value : null;
}

/** The value of this entry, else of the nearest one before it within the hour. */
function partner(reads: readonly ReadEvent[], index: number, parameter: ParameterName): ReadValue | null {
  const minute = reads[index]!.minute;
  for (let before = index; before >= 0; before--) {
    const event = reads[before]!;
    if (minute - event.minute > together) return null;
    const value = usable(event, parameter);
    if (value) return value;
  }
  return null;
}

function solve(
  { alkalinityMeqPerL, pH, pHScale, calciumMgPerL: calcium, ...water }: ReadingSeen,
  assumed: Assuming,
): ReadingWithCarbonate["carbonate"] {
  for (const parameter of ["salinity", "temperature"] as const)
    if (water[parameter].from === "default") assumed.use(defaults[parameter]);
  const salinity = water.salinity.value;
  const temperatureDegC = water.temperature.value;
  const constants = constantsAt(salinity, temperatureDegC);
  if (!constants.ok) return null;
  const density = densityKgPerL(salinity, temperatureDegC);
  const seaCalcium = seaWaterComposition(salinity).calciumMgPerKg * density;
  if (calcium === null) {
    assumed.add({
      what: "calcium, for Ω",
      value: `${seaCalcium.toFixed(0)} mg/L, as in sea water`,
      basis: "Millero et al. 2008",
    });
  }
  if (pHScale !== "total") assumed.use(defaults.pHScale);
  const state = fromAlkalinityAndPh(
    {
      alkalinityUmolPerKg: (1000 * alkalinityMeqPerL) / density,
      pHTotal: pHScale === "total" ? pH : totalFromNbs(pH, constants),
    },
    {
      salinity,
      temperatureDegC,
      calciumUmolPerKg: (1000 * (calcium ?? seaCalcium)) / atomicWeight.Ca / density,
    },
    constants,
  );
  return state.ok ? { state, densityKgPerL: density } : null;
}
