/** The sheet's table of the water now and where it goes, and what the corals take. */

import { minutesPerDay, writeClock } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import { bandFigure, changeFigure, edgeFigure, figure, valueBeside } from "../checks/figures.ts";
import { dayText } from "../checks/words.ts";
import { shownIn } from "../culture/display.ts";
import { factAt } from "../culture/history.ts";
import type { ReadValue } from "../culture/model.ts";
import type { Assessment } from "../dosing/assess.ts";
import { driftCases } from "../dosing/projection.ts";
import { isTracked } from "../dosing/tracked.ts";

import { type Section, section } from "./sheet-model.ts";

export const rowsInOrder: readonly ParameterName[] = [
  "alkalinity",
  "calcium",
  "magnesium",
  "potassium",
  "strontium",
  "salinity",
  "temperature",
  "pH",
  "nitrate",
  "phosphate",
];

export interface Latest {
  readonly value: number;
  readonly readAt: number;
  readonly reading: ReadValue | null;
}

export function waterSection(assessment: Assessment): Section {
  const { constants, at } = assessment;
  const rows = rowsInOrder.flatMap((name) => {
    const hold = factAt(constants.facts.holds.get(name), at)?.value;
    const latest = latestOf(assessment, name);
    if (!hold && !latest) return [];
    const unit = shownIn(constants.facts, name, at, latest?.reading);
    // The unit stands beside the value: a column of it again would make the table too wide.
    const bare = { ...unit, spelling: "" };
    const scale =
      name === "pH" && (latest?.reading?.scale === "total" || hold?.scale === "total") ? " total" : "";
    return [
      [
        name + scale,
        latest ? valueBeside(name, latest.value, hold ? [hold.low, hold.high] : [], unit) : "never read",
        hold ? bandFigure(name, hold.low, hold.high, bare) : "",
        hold ? edgeFigure(name, hold.aim, bare) : "",
        latest ? ago(at - latest.readAt) : "",
        ...driftCases.map((each) => leavingText(assessment, name, each)),
      ],
    ];
  });
  const columns = [
    { title: "", align: "left" },
    { title: "now", align: "right" },
    { title: "hold", align: "left" },
    { title: "aim", align: "left", whenNarrow: "leave out" },
    { title: "read", align: "left" },
    { title: "undosed", align: "left", whenNarrow: "leave out" },
    { title: "as set", align: "left" },
    { title: "as planned", align: "left" },
  ] as const;
  const lines = ["The last columns: when the day's mean leaves its hold, looking 14 days ahead."];
  return section("The water, and when it leaves its hold", { table: { columns, rows }, lines });
}

/** The value now: carried forward where that is done, else as last read. */
export function latestOf({ state, readings }: Assessment, name: ParameterName): Latest | null {
  if (isTracked(name)) return state.carried[name];
  const found = readings.findLast(({ event }) => {
    const value = event.values[name];
    return value && !event.disregarded && !value.impossible && !value.below;
  });
  const reading = found?.event.values[name];
  return found && reading ? { value: reading.value, readAt: found.event.minute, reading } : null;
}

const minutesPerHour = 60;

/** How long ago, in the largest unit that says something. */
export function ago(minutes: number): string {
  if (minutes < minutesPerHour) return `${Math.round(minutes)} min ago`;
  if (minutes < 2 * minutesPerDay) return `${Math.round(minutes / minutesPerHour)} h ago`;
  return `${Math.floor(minutes / minutesPerDay)} days ago`;
}

/** When the mean of a day leaves its hold: a day and hour, `stays`, `outside`; empty where nothing can be said. */
export function leavingText(
  { drifts, at }: Assessment,
  name: ParameterName,
  each: (typeof driftCases)[number],
): string {
  const drift = drifts.find(({ parameter, case: which }) => parameter === name && which === each);
  if (!drift || drift.points.length === 0) return "";
  if (drift.leavesAt === null) return "stays";
  if (drift.leavesAt <= at) return "outside";
  // Foreseen to the hour: more would pretend to more than is known.
  const hour = Math.round(drift.leavesAt / minutesPerHour) * minutesPerHour;
  const [, day = "", month = ""] = dayText(hour).split(" ");
  return `${day} ${month.slice(0, 3)} ${writeClock(hour % minutesPerDay)}`;
}

export function uptakeSection(assessment: Assessment): Section {
  const title = "What the corals take";
  const { uptake, volume, constants, at } = assessment;
  if (!uptake || uptake.basis === "none" || volume.litres === null) {
    return section(title, { lines: ["Not known: neither `uptake` nor a `cohort` is written down."] });
  }
  const litres = volume.litres;
  const unit = (name: ParameterName) => shownIn(constants.facts, name, at);
  const taken = (["alkalinity", "calcium", "magnesium", "potassium", "strontium"] as const).flatMap(
    (name) => {
      const perDay = uptake.perDay[name];
      return perDay === null ? [] : [`${name} ${changeFigure(name, perDay / litres, unit(name))}`];
    },
  );
  const basis = uptake.basis === "stated" ? "as `uptake` says" : "by the cohorts";
  const skeleton =
    uptake.calcificationGPerDay === null
      ? ""
      : ` That lays down ${figure(uptake.calcificationGPerDay, "g")} of skeleton (as CaCO3) a day.`;
  const lines = [`A day, ${basis}: ${taken.join(", ")}.${skeleton}`];
  if (uptake.otherLossMeqPerDay > 0) {
    const loss = changeFigure("alkalinity", uptake.otherLossMeqPerDay / litres, unit("alkalinity"));
    lines.push(`Of the alkalinity, ${loss} a day goes into turning the food's nitrogen to nitrate.`);
  }
  return section(title, { lines });
}
