/** A limit: how near to it the water comes. */
import { minutesPerDay } from "../../../grammar/dates.ts";
import { parameterOf } from "../../../grammar/parameters.ts";
import type { LimitKind } from "../../../grammar/syntax.ts";
import {
  changeBeside,
  changeFigure,
  doseFigure,
  edgeFigure,
  figure,
  valueBeside,
} from "../../checks/figures.ts";
import { shownIn } from "../../culture/display.ts";
import type { FarmModel, Limit } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { assuming } from "../../dosing/assumptions.ts";
import { ratesAsSet, ratesAt } from "../../dosing/fold.ts";
import { plannedPhases } from "../../dosing/make-plan.ts";
import type { Rates } from "../../dosing/rates.ts";
import { broughtPerLitre, dosed, isTracked, type Tracked } from "../../dosing/tracked.ts";
import { ago, latestOf } from "../../report/sheet-water.ts";
import { carriedAssumptions } from "./hold.ts";
import { entryHere, led, notNow, papers, solutionName, type Told } from "./parts.ts";
import type { Tells } from "./spot.ts";

interface Asked {
  readonly model: FarmModel;
  readonly assessment: Assessment;
  readonly limit: Limit;
}

export const limitTold: Tells = ({ model, assessment, statement, place, at }) => {
  if (!assessment || statement.kind !== "limit") return null;
  const parameter = parameterOf(statement.parameter.text)?.name;
  const key = `${parameter} ${statement.which}`;
  const history = assessment.constants.facts.limits.get(key);
  const entry = history && entryHere(history, place, at);
  if (!parameter || !entry) return null;
  const late = notNow(entry, history, at);
  if (late.length > 0)
    return { answer: limitText({ model, assessment, limit: entry.value }), blocks: [late] };
  return byKind[statement.which]({ model, assessment, limit: entry.value });
};

const unitOf = ({ assessment, limit }: Asked) =>
  shownIn(assessment.constants.facts, limit.parameter, assessment.at);

function edge(asked: Asked): string {
  const { parameter, which, value, scale } = asked.limit;
  const text = edgeFigure(parameter, value, unitOf(asked));
  const rate = which === "rise" || which === "fall" ? " a day" : "";
  return `${text}${rate}${scale === "total" ? " (total scale)" : ""}`;
}

/** A change beside the limit; a plan stands on it to the last bits, and that is no difference. */
function besideLimit(asked: Asked, change: number): string {
  const { parameter, value } = asked.limit;
  const isOnIt = Math.abs(change - value) < 1e-6 * Math.abs(value);
  return changeBeside(parameter, isOnIt ? value : change, value, unitOf(asked));
}

const limitText = (asked: Asked): string => `${asked.limit.parameter} ${asked.limit.which} ${edge(asked)}`;

/** How far the value now is from a limit on it. */
function beyond(asked: Asked): Told {
  const { parameter, which, value } = asked.limit;
  const { assessment } = asked;
  const unit = unitOf(asked);
  const latest = latestOf(assessment, parameter);
  if (!latest) return { answer: `${parameter} was never read; the ${which} is ${edge(asked)}.`, blocks: [] };
  const off = latest.value - value;
  const is =
    off === 0 ? "right at" : `${changeFigure(parameter, Math.abs(off), unit)} ${off > 0 ? "above" : "below"}`;
  const broken = which === "max" ? off > 0 : off < 0;
  const peak = parameter === "pH" && which === "max" ? peakLine(asked) : [];
  return {
    answer: led(
      `${parameter} ${valueBeside(parameter, latest.value, [value], unit)}`,
      `now, ${is} the ${which} of ${edge(asked)}${broken ? ": beyond it" : ""}.`,
    ),
    blocks: [[`Read ${ago(assessment.at - latest.readAt)}.`], peak],
    assumptions: isTracked(parameter) ? carriedAssumptions(assessment, parameter) : [],
    sources: peak.length > 0 ? [papers.carbonate, papers.nbs] : [],
  };
}

function peakLine({ assessment, limit }: Asked): string[] {
  const peak = assessment.plan?.peak;
  if (!peak) return [];
  const [pH, scale] = limit.scale === "total" ? [peak.pHTotal, "total"] : [peak.pHNbs, "NBS"];
  return [`Right after the largest planned dose: pH ${figure(pH, "pH")} (${scale}).`];
}

/** How fast the mean of a day goes that way, as set and as planned. */
function pace(asked: Asked): Told {
  const { assessment, limit } = asked;
  const { parameter, which } = limit;
  const { state, constants, at, plan, volume, uptake } = assessment;
  if (!isTracked(parameter) || volume.litres === null || uptake === null)
    return { answer: `The limit is ${edge(asked)}.`, blocks: [[`How ${parameter} moves isn't reckoned.`]] };
  const asSet = change(ratesAsSet(state, at, constants), assessment, parameter);
  const situation = { constants, state, litres: volume.litres, uptake, assumed: assuming() };
  const flows = plan ? (plannedPhases(situation, plan)[0]?.flows ?? []) : null;
  const asPlanned = flows && change(ratesAt(state, at, constants, flows), assessment, parameter);
  const text = (perDay: number | null): string | null => {
    if (perDay === null) return null;
    const size = besideLimit(asked, Math.abs(perDay));
    if (!/[1-9]/.test(size)) return "stays level";
    return `${perDay > 0 ? "rises" : "falls"} ${size} a day`;
  };
  const [planned, set] = [text(asPlanned), text(asSet)];
  const said = [planned && `${planned} as planned`, set && `${set} as set`].filter(Boolean).join(", ");
  const first =
    said === "" ? "not known: neither its uptake nor a recent reading is" : `${said}, by the mean of the day`;
  return {
    answer: led(
      `${parameter}:`,
      `${first}; the limit is ${which === "fall" ? "a fall" : "a rise"} of ${edge(asked)}.`,
    ),
    blocks: [],
    assumptions: carriedAssumptions(assessment, parameter),
  };
}

function change(rates: Rates | null, { state }: Assessment, name: Tracked): number | null {
  const gain = rates?.gainPerDay[name];
  const value = state.carried[name]?.value;
  if (!rates || gain === null || gain === undefined) return null;
  if (rates.exchangePerDay === 0) return gain;
  return value === undefined ? null : gain + rates.exchangePerDay * (rates.incoming[name] - value);
}

/** What the largest planned deliveries do at once, and how much of each source the limit allows. */
function atOnce(asked: Asked): Told {
  const { model, assessment, limit } = asked;
  const { parameter, value } = limit;
  const { plan, volume } = assessment;
  const name = dosed.find((each) => each === parameter);
  if (parameter === "pH") {
    const peak = peakLine(asked);
    return {
      answer: `One dose may raise pH by ${edge(asked)}.`,
      blocks: [peak],
      sources: peak.length > 0 ? [papers.carbonate, papers.nbs] : [],
    };
  }
  const { litres } = volume;
  const lines = (plan?.sources ?? []).flatMap(({ source, strength }, index) => {
    const brought = name ? (broughtPerLitre(strength, name) ?? 0) : 0;
    if (!(brought > 0) || litres === null) return [];
    const dose = plan?.answer.sources[index]?.litresPerDose ?? 0;
    const rise = besideLimit(asked, (dose * brought) / litres);
    const most = doseFigure((value * litres) / brought);
    const called = solutionName(model, source.solution);
    return [
      `${called}: ${dose > 0 ? `${doseFigure(dose)} as planned raise it by ${rise}; ` : ""}${most} are the most at once.`,
    ];
  });
  return {
    answer: `One dose may raise ${parameter} by ${edge(asked)}.`,
    blocks: [lines.length > 0 ? lines : ["No source of this system brings it."]],
  };
}

/** Highest less lowest of the readings of the last 24 hours. */
function swing(asked: Asked): Told {
  const { parameter } = asked.limit;
  const { readings, at } = asked.assessment;
  const values = readings.flatMap(({ event }) => {
    const read = event.values[parameter];
    const counts = read && !event.disregarded && !read.impossible && !read.below;
    return counts && event.minute > at - minutesPerDay ? [read.value] : [];
  });
  const spread = values.length > 1 ? Math.max(...values) - Math.min(...values) : null;
  return {
    answer:
      spread === null
        ? `The limit is ${edge(asked)} within a day; fewer than two readings of the last 24 h tell nothing of it.`
        : led(
            `${parameter}`,
            `swung ${besideLimit(asked, spread)} in the ${values.length} readings of the last 24 h; the limit is ${edge(asked)}.`,
          ),
    blocks: [],
  };
}

const byKind: Readonly<Record<LimitKind, (asked: Asked) => Told>> = {
  rise: pace,
  fall: pace,
  max: beyond,
  min: beyond,
  dose: atOnce,
  swing,
};
