/** A hold: where the water stands in it, and when it leaves it. */
import { type ParameterName, parameterOf } from "../../../grammar/parameters.ts";
import { bandFigure, edgeFigure, valueBeside, valueFigure } from "../../checks/figures.ts";
import { defaults } from "../../culture/defaults.ts";
import { factAt } from "../../culture/history.ts";
import type { Assumption, DisplayUnit, Hold } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { temperatureNow } from "../../dosing/dose-chemistry.ts";
import { judgeSalinity } from "../../dosing/salinity-cause.ts";
import { isTracked } from "../../dosing/tracked.ts";
import { isStale } from "../../dosing/water-state.ts";
import { ago, type Latest, latestOf } from "../../report/latest.ts";
import { correctionLines } from "../../report/sheet-doses.ts";
import { holdIn, type Instrument, instrumentAt, latestIn } from "./instrument.ts";
import { distanceFigure, entryHere, led, notNow, papers, shortMoment, type Told, unitOn } from "./parts.ts";
import type { Tells } from "./spot.ts";
import { leaving } from "./system.ts";
import { isTurned, notCarriedLines, reckonedLines, staleText, standingText, whenText } from "./value.ts";

export const holdTold: Tells = ({ farm, assessment, statement, place, at }) => {
  if (!assessment || statement.kind !== "hold") return null;
  const parameter = parameterOf(statement.parameter.text)?.name;
  const history = parameter && assessment.constants.facts.holds.get(parameter);
  const entry = history && entryHere(history, place, at);
  if (!parameter || !entry) return null;
  const late = notNow(entry, history, at);
  const instrument = instrumentAt(farm, entry.place, parameter);
  if (late.length > 0) return { answer: bandText(holdIn(instrument, entry.value)), blocks: [late] };
  return toldOf(assessment, entry.value, instrument);
};

const bandText = ({ parameter, low, high, aim, unit }: Hold): string =>
  `${parameter} ${bandFigure(parameter, low, high, unit)}, aim ${edgeFigure(parameter, aim, unit)}`;

function toldOf(assessment: Assessment, own: Hold, instrument: Instrument | null): Told {
  const { at, plan } = assessment;
  const hold = holdIn(instrument, own);
  const { parameter, low, high, unit } = hold;
  const latest = latestIn(instrument, latestOf(assessment, parameter, hold.scale));
  const band = bandFigure(parameter, low, high, unit);
  if (!latest) {
    return {
      answer: `${parameter} was never read; it is to be held at ${band}.`,
      blocks: [["Read it once, and what is reckoned from there stands here."]],
    };
  }
  if (latest.how === "stale") {
    return {
      answer: led(parameter, staleText(parameter, latest, unit, at)),
      blocks: [[`It is to be held at ${band}.`]],
      assumptions: scaleAssumption(hold, latest),
    };
  }
  const isCarried = latest.how === "carried";
  const leaves = (["undosed", "as-set", "as-planned"] as const).flatMap((each) =>
    leaving(assessment, parameter, each, instrument !== null),
  );
  const scaled = latest.below ? null : salinityLine(assessment, own, latest.value);
  return {
    answer: led(
      `${parameter} ${latest.below ? "below " : ""}${valueBeside(parameter, latest.value, [low, high], unit)}`,
      `${whenText(latest, at)}, ${standingText(latest, hold)}${latest.below ? "" : `, ${fromAimText(latest.value, hold)}`}.`,
    ),
    blocks: [
      [
        readLine(latest, parameter, unit, at),
        ...belowLines(assessment, hold, latest),
        ...notCarriedLines(assessment, parameter, latest),
      ],
      leaves.map((text) => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`),
      plan && isCarried ? correctionLines(assessment, plan, parameter) : [],
      scaled ? [scaled] : [],
    ],
    assumptions: isTracked(parameter)
      ? isCarried
        ? carriedAssumptions(assessment, parameter)
        : []
      : scaleAssumption(hold, latest),
    sources: [...(scaled ? [papers.density] : []), ...(isTurned(latest) ? [papers.nbs] : [])],
  };
}

function fromAimText(value: number, { parameter, aim, unit }: Hold): string {
  const off = value - aim;
  const distance = distanceFigure(parameter, off, unit);
  return distance === null
    ? "at its aim"
    : `${distance} ${off > 0 ? "above" : "below"} its aim of ${edgeFigure(parameter, aim, unit)}`;
}

/** `Read 7.5 dKH 1 h ago (1 Dec 07:00), carried forward from there.` */
function readLine(latest: Latest, parameter: ParameterName, unit: DisplayUnit, at: number): string {
  const { reading, readAt, how } = latest;
  const own = unitOn(reading.scale, unit);
  const scale = isTurned(latest) && reading.scale === "NBS" ? " (NBS)" : "";
  const value = `${latest.below ? "below " : ""}${valueFigure(parameter, reading.value, own)}${scale}`;
  return `Read ${value} ${ago(readAt, at)} (${shortMoment(readAt)})${how === "carried" ? ", carried forward from there" : ""}.`;
}

/** A newer test that only showed less than something, where the value stands all the same. */
function belowLines({ readings }: Assessment, { parameter, unit }: Hold, latest: Latest): string[] {
  const newer = readings.findLast(({ event }) => {
    const value = event.values[parameter];
    return event.minute > latest.readAt && value?.below && !value.impossible && !event.disregarded;
  });
  const value = newer?.event.values[parameter];
  if (latest.reckoned) return reckonedLines(parameter, latest, unit);
  return newer && value
    ? [`Below ${valueFigure(parameter, value.value, unit)} was read ${shortMoment(newer.event.minute)}.`]
    : [];
}

/** A pH without a scale is on NBS. */
const scaleAssumption = ({ parameter, scale }: Hold, { reading }: Latest): Assumption[] =>
  parameter === "pH" && (scale !== "total" || reading.scale === "NBS")
    ? [{ what: defaults.pHScale.what, value: defaults.pHScale.text, basis: defaults.pHScale.basis }]
    : [];

/** Of what a system's results rest on, what touches a value that is carried forward. */
export function carriedAssumptions({ assumptions, uptake }: Assessment, parameter: string): Assumption[] {
  const mineral = (parameter === "calcium" || parameter === "magnesium") && uptake !== null;
  return assumptions.filter(
    ({ what }) =>
      what === "the day's course" ||
      what.startsWith(`${parameter} of `) ||
      (mineral && what === defaults.skeletonMagnesium.what),
  );
}

function salinityLine(assessment: Assessment, hold: Hold, value: number): string | null {
  const { constants, state, at } = assessment;
  const { parameter, unit } = hold;
  const salinityHold = constants.facts.holds.get("salinity");
  const salinity = state.carried.salinity;
  const band = factAt(salinityHold, at)?.value;
  if (!salinity || !band || parameter === "salinity" || !isTracked(parameter)) return null;
  if (isStale(salinity, at)) return null;
  const judged = judgeSalinity(value, hold, salinity.value, band, temperatureNow(state, constants, null));
  if (!judged) return null;
  return `At the salinity aim (${edgeFigure("salinity", band.aim, band.unit)}) it would be ${valueFigure(parameter, judged.scaled, unit)}; salinity is ${valueFigure("salinity", salinity.value, band.unit)} now.`;
}
