/** A hold: where the water stands in it, and when it leaves it. */
import { parameterOf } from "../../../grammar/parameters.ts";
import { bandFigure, changeFigure, edgeFigure, valueBeside, valueFigure } from "../../checks/figures.ts";
import { defaults } from "../../culture/defaults.ts";
import { factAt } from "../../culture/history.ts";
import type { Assumption, Hold } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { temperatureNow } from "../../dosing/dose-chemistry.ts";
import { judgeSalinity } from "../../dosing/salinity-cause.ts";
import { isTracked } from "../../dosing/tracked.ts";
import { isStale } from "../../dosing/water-state.ts";
import { correctionLines } from "../../report/sheet-doses.ts";
import { ago, latestOf } from "../../report/sheet-water.ts";
import { entryHere, led, notNow, papers, shortMoment, type Told } from "./parts.ts";
import type { Tells } from "./spot.ts";
import { leaving, standing } from "./system.ts";

export const holdTold: Tells = ({ assessment, statement, place, at }) => {
  if (!assessment || statement.kind !== "hold") return null;
  const parameter = parameterOf(statement.parameter.text)?.name;
  const history = parameter && assessment.constants.facts.holds.get(parameter);
  const entry = history && entryHere(history, place, at);
  if (!parameter || !entry) return null;
  const late = notNow(entry, history, at);
  if (late.length > 0) return { answer: bandText(entry.value), blocks: [late] };
  return toldOf(assessment, entry.value);
};

const bandText = ({ parameter, low, high, aim, unit }: Hold): string =>
  `${parameter} ${bandFigure(parameter, low, high, unit)}, aim ${edgeFigure(parameter, aim, unit)}`;

function toldOf(assessment: Assessment, hold: Hold): Told {
  const { at, plan } = assessment;
  const { parameter, low, high, aim, unit } = hold;
  const latest = latestOf(assessment, parameter);
  if (!latest) {
    return {
      answer: `${parameter} was never read; it is to be held at ${bandFigure(parameter, low, high, unit)}.`,
      blocks: [["Read it once, and what is reckoned from there stands here."]],
    };
  }
  const value = valueBeside(parameter, latest.value, [low, high], unit);
  const off = latest.value - aim;
  const fromAim =
    Math.abs(off) < 1e-9 * Math.abs(aim)
      ? "at its aim"
      : `${changeFigure(parameter, Math.abs(off), unit)} ${off > 0 ? "above" : "below"} its aim of ${edgeFigure(parameter, aim, unit)}`;
  const where = `${standing(latest.value, hold)} its hold of ${bandFigure(parameter, low, high, unit)}`;
  const read = latest.reading
    ? `Read ${valueFigure(parameter, latest.reading.value, unit)} ${ago(at - latest.readAt)} (${shortMoment(latest.readAt)})${isTracked(parameter) ? ", carried forward from there" : ""}.`
    : `Read ${ago(at - latest.readAt)}.`;
  const leaves = (["undosed", "as-set", "as-planned"] as const).flatMap((each) =>
    leaving(assessment, parameter, each),
  );
  const stale = isTracked(parameter) && isStale(assessment.state.carried[parameter], at);
  const scaled = salinityLine(assessment, hold, latest.value);
  return {
    answer: led(`${parameter} ${value}`, `now, ${where}, ${fromAim}.`),
    blocks: [
      [read, ...(stale ? ["That is more than 7 days old: read it again."] : [])],
      leaves.map((text) => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`),
      plan ? correctionLines(assessment, plan, parameter) : [],
      scaled ? [scaled] : [],
    ],
    assumptions: isTracked(parameter) ? carriedAssumptions(assessment, parameter) : scaleAssumption(hold),
    sources: scaled ? [papers.density] : [],
  };
}

/** A pH without a scale is on NBS. */
const scaleAssumption = ({ parameter, scale }: Hold): Assumption[] =>
  parameter === "pH" && scale !== "total"
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
