/** What is wrong with the water now, and what soon will be. */
import { writeDate } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import type { DisplayUnit } from "../culture/model.ts";
import type { Files } from "../culture/names.ts";
import {
  bandFigure,
  changeFigure,
  edgeFigure,
  figure,
  plannedFigure,
  unitText,
  valueBeside,
  valueFigure,
} from "./figures.ts";
import { disregarding, mostFixes, writtenNow } from "./mending.ts";
import type { LineFix } from "./problem.ts";
import type { Of, Rule, Rules } from "./rule.ts";
import { aboutWhen, allOf, atStart, nameOf } from "./words.ts";

/** What mends a value outside its band, where that isn't the plan's doses. */
const remedies: Readonly<Partial<Record<ParameterName, { low: string; high: string }>>> = {
  salinity: {
    low: "Check the meter; let less fresh water in, or renew with saltier water, slowly.",
    high: "Check the meter and the top-off; take out some water and fill with fresh water, slowly.",
  },
  temperature: {
    low: "Check the heaters and the thermometer.",
    high: "Check the cooling, the heaters and the thermometer.",
  },
  pH: {
    low: "Check the meter's buffers and the CO2 of the room's air before anything is dosed for it.",
    high: "Check the meter's buffers, and whether an alkaline solution runs in too fast.",
  },
  nitrate: { low: "Feed more or filter less.", high: "Renew water, and look at what is fed." },
  phosphate: { low: "Feed more or filter less.", high: "Renew water, and look at what is fed." },
};

function outsideTodo({ parameter, value, low }: Of<"water/outside-hold">): string {
  const side = value < low ? "low" : "high";
  const remedy = remedies[parameter]?.[side];
  if (remedy) return remedy;
  return side === "low"
    ? "Dose as planned, and no faster; test again if the value surprises you."
    : "Dose less, as planned, until it has come down; test again if the value surprises you.";
}

/** Whether a value isn't the reading itself any more, as people see it. */
const isCarried = (parameter: ParameterName, value: number, read: number, unit: DisplayUnit): boolean =>
  valueFigure(parameter, value, unit) !== valueFigure(parameter, read, unit);

/** The reading itself is where it shouldn't be, whatever doses and corals made of it since. */
function isReadSo(finding: Of<"water/outside-hold" | "water/beyond-limit">): boolean {
  const { value, read } = finding;
  if (finding.code === "water/beyond-limit")
    return finding.which === "max" ? read > finding.limit : read < finding.limit;
  return value < finding.low ? read < finding.low : read > finding.high;
}

/** What to do about a reading that is right, and what about one that is wrong. */
const writtenOrDisregarded = (
  finding: Of<"water/outside-hold" | "water/beyond-limit">,
  files: Files,
): readonly LineFix[] => [
  ...writtenNow(finding, files).slice(0, mostFixes - 1),
  ...(isReadSo(finding) ? disregarding(finding.place, files) : []),
];

type Leaves = Of<"water/leaves-hold-soon" | "water/leaves-hold">;

function leavesBecause({ parameter, unit, takenPerDay, dosedPerDay }: Leaves): string {
  const figure = changeFigure(parameter, dosedPerDay, unit);
  const isNone = !/[1-9]/.test(figure.replace(unitText(unit), ""));
  if (parameter === "salinity")
    return "Salt that doses bring stays in the water, and so does what exchange changes.";
  if (takenPerDay === null)
    return `How much the corals take isn't known; ${isNone ? "nothing" : `${figure} a day`} is dosed.`;
  const dosed = isNone ? "nothing" : figure.replace(` ${unitText(unit)}`, "");
  return `Corals take ${changeFigure(parameter, takenPerDay, unit)} a day, ${dosed} is dosed.`;
}

function leavesTodo({ parameter, planned, takenPerDay, dosedPerDay }: Leaves): string {
  const figure = ({ litresPerDay, isLimited }: Leaves["planned"][number]) =>
    plannedFigure(litresPerDay, isLimited);
  const set = planned.flatMap((each) => (each.set === null ? [] : [`${each.set} to ${figure(each)}/day`]));
  const give = planned.flatMap((each) =>
    each.set === null ? [`${figure(each)} of ${nameOf(each.solution)} a day by hand`] : [],
  );
  const parts = [set.length > 0 ? `Set ${allOf(set)}.` : "", give.length > 0 ? `Give ${allOf(give)}.` : ""];
  const advice = parts.filter((part) => part !== "").join(" ");
  if (advice !== "") return advice;
  if (parameter === "salinity") return "Renew with fresh or salt water before then.";
  return takenPerDay !== null && dosedPerDay > takenPerDay
    ? "Dose less of it, or fill the top-off with fresh water."
    : "Give it a pump or a hand dose, or change what is set.";
}

const leaves = (severity: "warning" | "info", within: number, example: Rule["example"]) =>
  ({
    severity,
    title: `A parameter that leaves its band within ${within} days`,
    says: ({ parameter, unit, at, edge }: Leaves) =>
      `${atStart(parameter)} leaves its band on ${aboutWhen(at)} (${edgeFigure(parameter, edge, unit)}).`,
    why: "With what is set now the water drifts out of the band that it is kept in.",
    whyHere: leavesBecause,
    todo: "Set or give what the plan says, which the message names.",
    todoHere: leavesTodo,
    fixes: writtenNow,
    background:
      "Judged on the mean of 24 hours, with pumps as they are set and uptake as it is known. A warning up to 3 days ahead, a note up to 7: common practice, no source.",
    example,
  }) as const;

const held = (log: string, dosing = "") =>
  `system vat\n  tank main 500 L\n  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0.2 dKH/day\n  pump head-1 gives ash-part at 40 mL/min\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n\nlog vat\n${log}${dosing}`;

const salty = (log: string) =>
  `system vat\n  tank main 500 L\n  hold alkalinity 7.5 to 8.5 dKH\n  hold salinity 34 to 36\n  uptake alkalinity 0.2 dKH/day\n  pump head-1 gives ash-part at 40 mL/min\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n\nlog vat\n  2026-12-01 07:00 set head-1 22 mL/day\n${log}`;

export const waterRules: Rules<
  | "water/outside-hold"
  | "water/leaves-hold-soon"
  | "water/leaves-hold"
  | "water/beyond-limit"
  | "water/salinity-is-the-cause"
  | "water/room-air"
  | "water/stale"
> = {
  "water/outside-hold": {
    severity: "warning",
    title: "A parameter outside its band",
    says: ({ parameter, value, read, low, high, unit }) => {
      const now = valueBeside(parameter, value, [low, high], unit);
      return `${atStart(parameter)} is ${now}${isCarried(parameter, value, read, unit) ? " by now" : ""}; its band is ${bandFigure(parameter, low, high, unit)}.`;
    },
    why: "The band is what these corals are kept in.",
    todo: "Follow the plan, no faster than it says, and test again if the value surprises you. Salinity is mended with fresh or saltier water; a low pH with the room's air.",
    todoHere: outsideTodo,
    fixes: writtenOrDisregarded,
    example: {
      fires:
        "system vat\n  tank main 500 L\n  hold temperature 24.5 to 26.5 degC\n\nlog vat\n  2026-12-01 07:00 read temperature 27.4 degC\n",
      silent:
        "system vat\n  tank main 500 L\n  hold temperature 24.5 to 26.5 degC\n\nlog vat\n  2026-12-01 07:00 read temperature 25.4 degC\n",
    },
  },
  "water/leaves-hold-soon": leaves("warning", 3, {
    fires: held("  2026-12-01 07:00 read alkalinity 7.8 dKH\n"),
    silent: held("  2026-12-01 07:00 read alkalinity 7.8 dKH\n", "  2026-12-01 07:00 set head-1 22 mL/day\n"),
  }),
  "water/leaves-hold": leaves("info", 7, {
    fires: held("  2026-12-01 07:00 read alkalinity 8.4 dKH\n"),
    silent: held("  2026-12-01 07:00 read alkalinity 8.4 dKH\n", "  2026-12-01 07:00 set head-1 22 mL/day\n"),
  }),
  "water/beyond-limit": {
    severity: "error",
    title: "A parameter beyond its limit",
    says: ({ parameter, which, value, read, limit, unit }) =>
      `${atStart(parameter)} is ${valueBeside(parameter, value, [limit], unit)}${isCarried(parameter, value, read, unit) ? " by now, reckoned from this reading" : ""}, ${which === "max" ? "above" : "below"} its limit of ${edgeFigure(parameter, limit, unit)}.`,
    why: "Beyond a limit not growth but lives are at risk.",
    todo: "Test again with another kit. If it is confirmed, stop what drives it, and renew water where it is too high.",
    todoHere: ({ which }) =>
      which === "max"
        ? "Stop what raises it, test again with another kit, and renew water if it is confirmed."
        : "Test again with another kit; if it is confirmed, raise it as planned, not all at once.",
    fixes: writtenOrDisregarded,
    background:
      "Limits come from the system's `limit … max` and `min` lines, else from the defaults: alkalinity 6 to 12 dKH, calcium up to 500 mg/L, magnesium up to 1600, potassium up to 480, strontium up to 14, pH up to 8.6 (NBS). All of these are common practice without a source.",
    example: {
      fires: "system vat\n  tank main 500 L\n\nlog vat\n  2026-12-01 07:00 read alkalinity 12.6 dKH\n",
      silent: "system vat\n  tank main 500 L\n\nlog vat\n  2026-12-01 07:00 read alkalinity 8.6 dKH\n",
    },
  },
  "water/salinity-is-the-cause": {
    severity: "warning",
    title: "A parameter that is off only because salinity is",
    says: ({ parameter, value, scaled, salinity, salinityAim, hidden, unit }) => {
      const now = valueFigure(parameter, value, unit);
      const then = valueFigure(parameter, scaled, unit);
      const at = figure(salinity, "salinity");
      const aim = figure(salinityAim, "salinity");
      return hidden
        ? `${atStart(parameter)} (${now}) is in its band only because salinity is ${at}; at the aim of ${aim} it would be ${then}.`
        : `${atStart(parameter)} (${now}) is outside its band because salinity is ${at}; at the aim of ${aim} it would be ${then}.`;
    },
    why: "Salinity raises and lowers everything dissolved, and dosing for one of it would mend the wrong thing.",
    todo: "Mend salinity first, slowly, and test again on the way.",
    todoHere: ({ parameter, hidden }) =>
      hidden
        ? `Mend salinity first, slowly, and test ${parameter} again on the way.`
        : `Mend salinity first, slowly; until then ${parameter} is kept up and not corrected.`,
    background:
      "A dissolved parameter is scaled in proportion to salinity, per kilogram of water, and only where salinity itself is outside its band.",
    example: {
      also: "water/outside-hold",
      fires: salty("  2026-12-01 07:00 read alkalinity 7.7 dKH, salinity 37.2\n"),
      silent: salty("  2026-12-01 07:00 read alkalinity 8 dKH, salinity 35\n"),
    },
  },
  "water/room-air": {
    severity: "warning",
    title: "A low pH that comes from the room's air",
    says: ({ pH, pCO2Uatm, roomPpm, pHWithRoom, pHWithOutdoor }) =>
      `pH is ${figure(pH, "pH")} with ${figure(pCO2Uatm, "µatm")} of CO2 in the water. In balance with the room's air (${figure(roomPpm, "ppm")}) it would be ${figure(pHWithRoom, "pH")}, with outdoor air ${figure(pHWithOutdoor, "pH")}.`,
    why: "A low pH with much CO2 is a matter of ventilation and no reason to dose.",
    todo: "Let outdoor air into the room, or feed it to the skimmer and the air pumps.",
    background:
      "CO2 in the water follows from alkalinity and pH (constants of Lueker et al. 2000 and Weiss 1974). Told where the pH is under its band, the water holds over 1.15 times the CO2 of outdoor air (about 425 ppm, from memory), and the room's air is stated with `air CO2`. The factor is common practice without a source.",
    example: {
      also: "water/outside-hold",
      fires:
        "system vat\n  tank main 500 L\n  hold pH 8 to 8.4\n  air CO2 1100 ppm\n\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH, salinity 35, temperature 25 degC, pH 7.82\n",
      silent:
        "system vat\n  tank main 500 L\n  hold pH 8 to 8.4\n  air CO2 1100 ppm\n\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH, salinity 35, temperature 25 degC, pH 8.2\n",
    },
  },
  "water/stale": {
    severity: "warning",
    title: "No recent reading",
    says: ({ parameters }) => {
      const names = allOf(parameters.map(({ name }) => name));
      const last = parameters.map(({ name, readAt }) =>
        readAt === null ? `${name} never` : `${name} on ${writeDate(readAt)}`,
      );
      return `No reading of ${names} in the last 7 days (${allOf(last)}).`;
    },
    why: "A value is carried forward 7 days at most; after that doses are kept up and nothing is corrected.",
    todo: "Test what the message names.",
    todoHere: ({ parameters }) => `Test ${allOf(parameters.map(({ name }) => name))}.`,
    background: "Seven days: common practice, no source.",
    example: {
      fires: held("  2026-11-20 07:00 read alkalinity 8 dKH\n", "  2026-11-20 07:00 set head-1 22 mL/day\n"),
      silent: held("  2026-11-30 07:00 read alkalinity 8 dKH\n", "  2026-11-30 07:00 set head-1 22 mL/day\n"),
    },
  },
};
