/** The sheet's table of the water now and where it goes, and what the corals take. */

import { minutesPerDay, writeClock } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import { bandFigure, changeFigure, edgeFigure, figure, valueBeside, valueFigure } from "../checks/figures.ts";
import { allOf, dayText } from "../checks/words.ts";
import { shownIn } from "../culture/display.ts";
import { factAt } from "../culture/history.ts";
import type { DisplayUnit } from "../culture/model.ts";
import type { Assessment } from "../dosing/assess.ts";
import { driftCases } from "../dosing/projection.ts";
import { ago, type Latest, latestOf } from "./latest.ts";
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

export function waterSection(assessment: Assessment): Section {
  const { constants, at } = assessment;
  const rows = rowsInOrder.flatMap((name) => {
    const hold = factAt(constants.facts.holds.get(name), at)?.value;
    const latest = latestOf(assessment, name, hold?.scale);
    if (!hold && !latest) return [];
    const unit = shownIn(constants.facts, name, at, latest?.reading);
    // The unit stands beside the value: a column of it again would make the table too wide.
    const bare = { ...unit, spelling: "" };
    // The scale of a pH stands beside its name.
    const shown = name === "pH" ? bare : unit;
    const scale = (hold?.scale ?? latest?.scale) === "total" ? " total" : "";
    return [
      [
        name + scale,
        valueText(name, latest, hold ? [hold.low, hold.high] : [], shown),
        hold ? bandFigure(name, hold.low, hold.high, bare) : "",
        hold ? edgeFigure(name, hold.aim, bare) : "",
        readText(name, latest, shown, at),
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
  const lines = [
    "The last columns: when the day's mean leaves its hold, looking 14 days ahead.",
    ...notes(assessment),
  ];
  return section("The water, and when it leaves its hold", { table: { columns, rows }, lines });
}

/** How a value is told in the table: what is stale is no value of now. */
function valueText(name: ParameterName, latest: Latest | null, edges: readonly number[], unit: DisplayUnit) {
  if (!latest) return "never read";
  if (latest.how === "stale") return "stale";
  return `${latest.below ? "below " : ""}${valueBeside(name, latest.value, edges, unit)}`;
}

function readText(name: ParameterName, latest: Latest | null, unit: DisplayUnit, at: number): string {
  if (!latest) return "";
  const asRead =
    latest.how === "stale" ? `${latest.below ? "below " : ""}${valueFigure(name, latest.value, unit)}, ` : "";
  return `${asRead}${ago(latest.readAt, at)}`;
}

/** What the table's numbers need said of them. */
function notes(assessment: Assessment): string[] {
  const { constants, at } = assessment;
  const known = rowsInOrder.flatMap((name) => {
    const hold = factAt(constants.facts.holds.get(name), at)?.value;
    const latest = latestOf(assessment, name, hold?.scale);
    return latest ? [{ name, latest }] : [];
  });
  const named = (of: (latest: Latest) => boolean) =>
    allOf(known.flatMap(({ name, latest }) => (of(latest) ? [name] : [])));
  const stale = named(({ how }) => how === "stale");
  const volume = named(({ missing }) => missing === "volume");
  const uptake = named(({ missing }) => missing === "uptake");
  const pH = known.find(({ latest }) => latest.before !== null && latest.how !== "stale");
  return [
    ...(stale ? [`Stale, test again: ${stale}.`] : []),
    ...(volume
      ? [`As read, not carried forward, since the volume of the water isn't known: ${volume}.`]
      : []),
    ...(uptake
      ? [`As read, not carried forward, since what the corals take of it isn't known: ${uptake}.`]
      : []),
    ...(pH ? [`pH was read ${pH.latest.before}.`] : []),
  ];
}

const minutesPerHour = 60;

/** When the mean of a day leaves its hold: a day and hour, `stays`, `outside`; empty where nothing can be said. */
export function leavingText(
  assessment: Assessment,
  name: ParameterName,
  each: (typeof driftCases)[number],
): string {
  const { drifts, at } = assessment;
  // Where it goes can't be said of what isn't known now.
  if (latestOf(assessment, name)?.how !== "carried") return "";
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
  if (volume.litres === null)
    return section(title, { lines: ["Not known: the volume of the water isn't known."] });
  if (!uptake || uptake.basis === "none") {
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
