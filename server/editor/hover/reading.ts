/** A reading: its values, what was expected, the carbonate system, each value at the salinity aim. */
import { type ParameterName, parameterOf } from "../../../grammar/parameters.ts";
import type { ReadItem } from "../../../grammar/syntax.ts";
import { figure } from "../../checks/figures.ts";
import { shownIn } from "../../culture/display.ts";
import { factAt } from "../../culture/history.ts";
import type { ReadEvent, ReadValue } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { afterMinute } from "../../dosing/at-event.ts";
import { onScale } from "../../dosing/ph-scale.ts";
import type { ReadingAlone } from "../../dosing/reading-alone.ts";
import { isTracked } from "../../dosing/tracked.ts";
import { carriedAssumptions } from "./hold.ts";
import { holdIn, instrumentAt } from "./instrument.ts";
import { otherUnits } from "./other-units.ts";
import { led, notNow, papers, shortMoment, type Told } from "./parts.ts";
import { writtenOf } from "./quantity.ts";
import {
  biasLines,
  expectedText,
  kitLines,
  type Read,
  readText,
  salinityText,
  writtenText,
} from "./reading-texts.ts";
import { aheadLines, around, carbonateHere, eventHere, logHere, type Spot, type Tells } from "./spot.ts";
import { standingText } from "./value.ts";

/** The value that the cursor is in, else the whole line. */
export const readTold: Tells = (spot) => {
  const { statement, under } = spot;
  if (statement.kind !== "read") return null;
  const { assessment } = spot;
  if (under.line.section?.kind === "saltwater" && isBeforeItems(spot)) return batchTold(spot);
  const event = eventHere(spot, "read");
  if (!assessment || !event) return null;
  const column = under.word?.start ?? 0;
  const item = statement.items.find(({ start, end }) => start <= column && column < end);
  return item && column > statement.at.end
    ? valueTold(spot, assessment, event, item)
    : lineTold(spot, assessment, event);
};

/** True outside the values of the line, each of which tells itself in other units. */
const isBeforeItems = ({ statement, under }: Spot): boolean =>
  statement.kind === "read" && !(under.word?.role === "number" || under.word?.role === "unit");

/** A batch of salt water that was tested: its values from then on. */
function batchTold({ farm, model, statement, under, place, at }: Spot): Told | null {
  if (statement.kind !== "read") return null;
  const name = under.line.section?.name?.text ?? "";
  const seen = farm.bound.names.visible.get(place.file)?.get(name);
  const water = seen && model.waters.get(seen.ref);
  if (!water) return null;
  if (statement.disregard) return { answer: "Disregarded: it doesn't count.", blocks: [] };
  const values = statement.items.flatMap((item) => {
    const parameter = parameterOf(item.parameter.text)?.name;
    const history = parameter && water.values.get(parameter);
    const entry = history?.find((each) => each.place.file === place.file && each.place.line === place.line);
    return entry && history
      ? [{ text: `${parameter} ${writtenOf(item.value)}`, late: notNow(entry, history, at) }]
      : [];
  });
  if (values.length === 0) return null;
  const late = [...new Set(values.flatMap((value) => value.late))];
  return {
    answer: `${water.name} from ${shortMoment(statement.at.minute)} on: ${values.map(({ text }) => text).join(", ")}.`,
    blocks: [late.length > 0 ? late : ["It counts instead of what is stated."]],
  };
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
  const then = afterMinute(logHere(spot, assessment), event.minute);
  const scales = reads.map((read) => salinityText(assessment, then, read));
  const values = reads.map((read, index) => {
    const expected = water && expectedText(assessment, water.before, read);
    const scaled = scales[index];
    return [
      `${read.name} ${readText(assessment, then, read, itemOf(spot, read.name))}`,
      ...(expected ? [expected] : []),
      ...(scaled ? [scaled] : []),
    ].join("; ");
  });
  const solved = carbonate ? carbonateText(carbonate, other) : null;
  const carried = reads.flatMap(({ name }) =>
    water && isTracked(name) && water.before.carried[name] ? [name] : [],
  );
  return {
    answer: solved ? led("Carbonate system:", solved) : (values[0] ?? "Nothing was read."),
    blocks: [
      solved ? values : values.slice(1),
      [
        ...reads.flatMap((read) => biasLines(spot, event, read)),
        ...countsLines(spot, event, reads),
        ...aheadLines(spot, event.minute),
      ],
      solved ? [] : missingLines(reads),
    ],
    assumptions: [...assumptions, ...carried.flatMap((name) => carriedAssumptions(assessment, name))],
    sources: [
      ...(solved ? sourcesOf(other ?? event) : []),
      ...(scales.some((each) => each !== null) ? [papers.density] : []),
    ],
  };
}

const itemOf = ({ statement }: Spot, name: ParameterName): ReadItem | null =>
  (statement.kind === "read"
    ? statement.items.find(({ parameter }) => parameterOf(parameter.text)?.name === name)
    : null) ?? null;

/** One value of a line. */
function valueTold(spot: Spot, assessment: Assessment, event: ReadEvent, item: ReadItem): Told | null {
  const name = parameterOf(item.parameter.text)?.name;
  const value = name && event.values[name];
  if (!name || !value) return null;
  const read: Read = { name, value, unit: shownIn(assessment.constants.facts, name, event.minute, value) };
  const water = around(spot, event);
  const expected = water && expectedText(assessment, water.before, read);
  const then = afterMinute(logHere(spot, assessment), event.minute);
  const scaled = salinityText(assessment, then, read);
  const solves = name === "alkalinity" || name === "pH";
  const {
    carbonate,
    assumptions,
    with: other,
  } = solves ? carbonateHere(spot, assessment, event) : noCarbonate;
  const others = otherUnits(spot, item.value, then);
  const kit = kitLines(spot, event, read);
  const held = factAt(assessment.constants.facts.holds.get(name), event.minute);
  const hold = held?.value;
  const instrument = held && instrumentAt(spot.farm, held.place, name);
  const onHold = hold ? onScale(value.value, value.scale, hold.scale, then, assessment.constants) : null;
  const inHold =
    hold && onHold !== null && !value.impossible
      ? standingText(
          { value: instrument ? instrument.of(onHold) : onHold, below: value.below },
          holdIn(instrument, hold),
        )
      : null;
  const equal = others && others.texts.length > 0 ? ` = ${others.texts.join(" = ")}` : "";
  return {
    answer: led(
      `${name} ${value.below ? "below " : ""}${writtenText(name, value, item)}`,
      `${equal}${inHold ? `${equal ? "; " : ""}${inHold}` : ""}.`.replace(/^ /, ""),
    ),
    blocks: [
      [
        ...(expected ? [`${expected.charAt(0).toUpperCase()}${expected.slice(1)}.`] : []),
        ...(scaled ? [`${scaled.charAt(0).toUpperCase()}${scaled.slice(1)}.`] : []),
        ...kit,
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
