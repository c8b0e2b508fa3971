/** A reading: its values, what was expected, the carbonate system, each value at the salinity aim. */
import { type ParameterName, parameterOf } from "../../../grammar/parameters.ts";
import type { ReadItem } from "../../../grammar/syntax.ts";
import {
  bandFigure,
  changeFigure,
  decimalsOf,
  edgeFigure,
  figure,
  valueFigure,
} from "../../checks/figures.ts";
import { shownIn } from "../../culture/display.ts";
import { factAt } from "../../culture/history.ts";
import type { DisplayUnit, Kit, ReadEvent, ReadValue } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { afterMinute } from "../../dosing/at-event.ts";
import { temperatureNow } from "../../dosing/dose-chemistry.ts";
import type { ReadingAlone } from "../../dosing/reading-alone.ts";
import { judgeSalinity } from "../../dosing/salinity-cause.ts";
import { isTracked } from "../../dosing/tracked.ts";
import { isStale, type WaterState } from "../../dosing/water-state.ts";
import { carriedAssumptions } from "./hold.ts";
import { otherUnits } from "./other-units.ts";
import { led, papers, shortMoment, type Told } from "./parts.ts";
import { aheadLines, around, carbonateHere, eventHere, logHere, type Spot, type Tells } from "./spot.ts";
import { standing } from "./system.ts";

/** The value that the cursor is in, else the whole line. */
export const readTold: Tells = (spot) => {
  const { statement, under } = spot;
  if (statement.kind !== "read") return null;
  const { assessment } = spot;
  const event = eventHere(spot, "read");
  if (!assessment || !event) return null;
  const column = under.word?.start ?? 0;
  const item = statement.items.find(({ start, end }) => start <= column && column < end);
  return item && column > statement.at.end
    ? valueTold(spot, assessment, event, item)
    : lineTold(spot, assessment, event);
};

/** One of several numbers that were read. */
interface Read {
  readonly name: ParameterName;
  readonly value: ReadValue;
  readonly unit: DisplayUnit;
}

function readsOf({ constants }: Assessment, { values, minute }: ReadEvent): Read[] {
  return Object.entries(values as Record<string, ReadValue>).map(([name, value]) => ({
    name: name as ParameterName,
    value,
    unit: shownIn(constants.facts, name as ParameterName, minute, value),
  }));
}

/** A line of the log in whole. */
function lineTold(spot: Spot, assessment: Assessment, event: ReadEvent): Told {
  const reads = readsOf(assessment, event);
  const water = around(spot, event);
  const { carbonate, assumptions, with: other } = carbonateHere(spot, assessment, event);
  const values = reads.map((read) => {
    const expected = water && expectedText(water.before, read);
    return `${read.name} ${readText(read)}${expected ? `; expected ${expected}` : ""}`;
  });
  const solved = carbonate ? carbonateText(carbonate, other) : null;
  const carried = reads.flatMap(({ name }) =>
    water && isTracked(name) && water.before.carried[name] ? [name] : [],
  );
  return {
    answer: solved ? led("Carbonate system:", solved) : (values[0] ?? "Nothing was read."),
    blocks: [
      solved ? values : values.slice(1),
      [...countsLines(spot, event, reads), ...aheadLines(spot, event.minute)],
      solved ? [] : missingLines(reads),
    ],
    assumptions: [...assumptions, ...carried.flatMap((name) => carriedAssumptions(assessment, name))],
    sources: solved ? sourcesOf(other ?? event) : [],
  };
}

/** One value of a line. */
function valueTold(spot: Spot, assessment: Assessment, event: ReadEvent, item: ReadItem): Told | null {
  const name = parameterOf(item.parameter.text)?.name;
  const value = name && event.values[name];
  if (!name || !value) return null;
  const read: Read = { name, value, unit: shownIn(assessment.constants.facts, name, event.minute, value) };
  const water = around(spot, event);
  const expected = water && expectedText(water.before, read);
  const then = afterMinute(logHere(spot, assessment), event.minute);
  const scaled = salinityText(assessment, then, read);
  const solves = name === "alkalinity" || name === "pH";
  const {
    carbonate,
    assumptions,
    with: other,
  } = solves ? carbonateHere(spot, assessment, event) : noCarbonate;
  const others = otherUnits(spot, item.value, item, then);
  const kit = kitText(spot, event, read);
  const hold = factAt(assessment.constants.facts.holds.get(name), event.minute)?.value;
  const inHold = hold
    ? `${standing(value.value, hold)} its hold of ${bandFigure(name, hold.low, hold.high, hold.unit)}`
    : null;
  const equal = others && others.texts.length > 0 ? ` = ${others.texts.join(" = ")}` : "";
  return {
    answer: led(
      `${name} ${value.below ? "below " : ""}${writtenText(read)}`,
      `${equal}${inHold ? `${equal ? "; " : ""}${inHold}` : ""}.`.replace(/^ /, ""),
    ),
    blocks: [
      [
        ...(expected ? [led("Expected:", `${expected}.`)] : []),
        ...(scaled ? [scaled] : []),
        ...(kit ? [kit] : []),
      ],
      carbonate
        ? [led("Carbonate system:", `${carbonateText(carbonate, other)}.`)]
        : solves
          ? missingLines([read])
          : [],
      [...countsLines(spot, event, [read]), ...aheadLines(spot, event.minute)],
    ],
    assumptions: [
      ...assumptions,
      ...(others?.assumptions ?? []),
      ...(expected && isTracked(name) ? carriedAssumptions(assessment, name) : []),
    ],
    sources: [
      ...(carbonate ? sourcesOf(other ?? event) : []),
      ...(others?.sources ?? []),
      ...(scaled ? [papers.density] : []),
    ],
  };
}

const noCarbonate: ReadingAlone = { carbonate: null, assumptions: [], with: null };

/** As the technician wrote it, else in the unit that the parameter is told in. */
const writtenText = ({ name, value }: Read): string =>
  valueFigure(name, value.value, value.unit) + (name === "pH" && value.scale !== "total" ? " (NBS)" : "");

const readText = (read: Read): string => {
  const { name, value, unit } = read;
  const shown = value.unit.spelling === unit.spelling ? "" : ` (${valueFigure(name, value.value, unit)})`;
  return `${value.below ? "below " : ""}${writtenText(read)}${shown}`;
};

/** `7.6 dKH, 0.3 dKH less than was read`: the water carried forward to this moment, just before it was read. */
function expectedText(before: WaterState, { name, value, unit }: Read): string | null {
  const carried = isTracked(name) ? before.carried[name] : null;
  if (!carried || value.impossible) return null;
  if (isStale(carried, before.minute))
    return `the reading before (${shortMoment(carried.readAt)}) is too old to tell`;
  const expected = valueFigure(name, carried.value, unit);
  if (value.below) return expected;
  const off = value.value - carried.value;
  // Less than a test tells apart is no difference.
  const isSame = Math.abs(off * unit.perModelUnit) < 0.5 * 10 ** -decimalsOf(name, unit);
  return isSame
    ? `${expected}, as was read`
    : `${expected}, ${changeFigure(name, Math.abs(off), unit)} ${off > 0 ? "less" : "more"} than was read`;
}

/** The value at the salinity aim, where salinity is off its hold. */
function salinityText(
  { constants }: Assessment,
  after: WaterState,
  { name, value, unit }: Read,
): string | null {
  const { minute } = after;
  const band = factAt(constants.facts.holds.get("salinity"), minute)?.value;
  const salinity = after.carried.salinity;
  if (!band || !salinity || isStale(salinity, minute) || name === "salinity" || !isTracked(name)) return null;
  const hold = factAt(constants.facts.holds.get(name), minute)?.value ?? { low: 0, high: Infinity, aim: 0 };
  const judged = judgeSalinity(
    value.value,
    hold,
    salinity.value,
    band,
    temperatureNow(after, constants, null),
  );
  return judged
    ? `At the salinity aim (${edgeFigure("salinity", band.aim, band.unit)}) it would be ${valueFigure(name, judged.scaled, unit)}; salinity was ${valueFigure("salinity", salinity.value, band.unit)}.`
    : null;
}

function kitText({ model }: Spot, event: ReadEvent, { name, unit }: Read): string | null {
  const kit: Kit | undefined = event.kit === null ? undefined : model.kits.get(event.kit);
  const deviation = factAt(kit?.deviations.get(name), event.minute)?.value;
  if (!kit || !deviation) return null;
  const size = deviation.relative
    ? `${figure(100 * deviation.value, "%")}`
    : changeFigure(name, deviation.value, unit);
  return `Tests with ${kit.name} scatter by ${size} (one standard deviation).`;
}

/** `pH 7.98 (total), pCO2 521 µatm, DIC 2050 µmol/kg, Ω 3.3 of aragonite`. */
function carbonateText({ state }: NonNullable<ReadingAlone["carbonate"]>, other: ReadEvent | null): string {
  const half = other
    ? ` (with ${other.values.pH ? "pH" : "alkalinity"} read ${shortMoment(other.minute)})`
    : "";
  const figures = [
    `pH ${figure(state.pHTotal, "pH")} (total)`,
    `pCO2 ${figure(state.pCO2Uatm, "µatm")}`,
    `DIC ${tens(state.dicUmolPerKg)} µmol/kg`,
    `Ω ${figure(state.omegaAragonite, "Ω")} of aragonite`,
  ];
  return figures.join(", ") + half;
}

/** To ten: a pH that is good to 0.02 leaves no more. */
const tens = (value: number): string => (Math.round(value / 10) * 10).toFixed(0);

const sourcesOf = ({ values }: ReadEvent): string[] => [
  papers.carbonate,
  ...(values.pH?.scale === "total" ? [] : [papers.nbs]),
];

/** Why there is no carbonate system, where half of it is there. */
function missingLines(reads: readonly Read[]): string[] {
  const has = (name: ParameterName) => reads.some((read) => read.name === name);
  if (has("alkalinity") === has("pH")) return [];
  return [`Without ${has("pH") ? "alkalinity" : "pH"} read within the hour, pCO2, DIC and Ω can't be told.`];
}

function countsLines({ model }: Spot, event: ReadEvent, reads: readonly Read[]): string[] {
  const kit = event.kit === null ? undefined : model.kits.get(event.kit);
  const with_ = kit && reads.length > 1 ? [`With ${kit.name}.`] : [];
  if (event.disregarded) return [...with_, "Disregarded: it counts in no estimate."];
  const out = reads.filter(({ value }) => value.impossible).map(({ name }) => name);
  return [...with_, ...(out.length > 0 ? [`Left out of every estimate: ${out.join(", ")}.`] : [])];
}
