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
import type { DisplayUnit, FarmModel, Limit } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { assuming } from "../../dosing/assumptions.ts";
import { ratesAsSet, ratesAt } from "../../dosing/fold.ts";
import { plannedPhases } from "../../dosing/make-plan.ts";
import type { Rates } from "../../dosing/rates.ts";
import { broughtPerLitre, dosed, isTracked, type Tracked } from "../../dosing/tracked.ts";
import { ago, latestOf } from "../../report/latest.ts";
import { carriedAssumptions } from "./hold.ts";
import { differenceUnit, type Instrument, instrumentAt, latestIn } from "./instrument.ts";
import { distanceFigure, entryHere, led, notNow, papers, solutionName, type Told, unitOn } from "./parts.ts";
import type { Tells } from "./spot.ts";
import { isTurned, notCarriedLines, reckonedLines, staleText, whenText } from "./value.ts";

interface Asked {
  readonly model: FarmModel;
  readonly assessment: Assessment;
  /** In the unit of the line, like the values beside it. */
  readonly limit: Limit;
  readonly instrument: Instrument | null;
  readonly unit: DisplayUnit;
}

export const limitTold: Tells = ({ farm, model, assessment, statement, place, at }) => {
  if (!assessment || statement.kind !== "limit") return null;
  const parameter = parameterOf(statement.parameter.text)?.name;
  const key = `${parameter} ${statement.which}`;
  const history = assessment.constants.facts.limits.get(key);
  const entry = history && entryHere(history, place, at);
  if (!parameter || !entry) return null;
  const late = notNow(entry, history, at);
  const limit = entry.value;
  const usual = unitOn(
    parameter === "pH" ? (limit.scale ?? "NBS") : null,
    shownIn(assessment.constants.facts, parameter, at),
  );
  const isValue = statement.which === "max" || statement.which === "min";
  const instrument = isValue ? instrumentAt(farm, entry.place, parameter) : null;
  const unit = isValue ? (instrument?.unit ?? usual) : differenceUnit(farm, entry.place, parameter, usual);
  const value = instrument ? instrument.of(limit.value) : limit.value;
  const asked = { model, assessment, limit: { ...limit, value }, instrument, unit };
  return late.length > 0 ? { answer: limitText(asked), blocks: [late] } : byKind[statement.which](asked);
};

function edge(asked: Asked): string {
  const { parameter, which, value } = asked.limit;
  const text = edgeFigure(parameter, value, asked.unit);
  const rate = which === "rise" || which === "fall" ? " a day" : "";
  return `${text}${rate}`;
}

/** A change beside the limit; a plan stands on it to the last bits, and that is no difference. */
function besideLimit(asked: Asked, change: number): string {
  const { parameter, value } = asked.limit;
  const isBeyond = change > value + 1e-6 * Math.abs(value);
  // Only what is beyond it needs the digits that show that.
  return isBeyond
    ? changeBeside(parameter, change, value, asked.unit)
    : changeFigure(parameter, change, asked.unit);
}

const limitText = (asked: Asked): string => `${asked.limit.parameter} ${asked.limit.which} ${edge(asked)}`;

/** How far the value now is from a limit on it. */
function beyond(asked: Asked): Told {
  const { parameter, which, value } = asked.limit;
  const { assessment } = asked;
  const { unit } = asked;
  const { at } = assessment;
  const latest = latestIn(asked.instrument, latestOf(assessment, parameter, asked.limit.scale));
  const peak = parameter === "pH" && which === "max" ? peakLine(asked) : [];
  const sources = peak.length > 0 ? [papers.carbonate, papers.nbs] : [];
  if (!latest)
    return {
      answer: `${parameter} was never read; the ${which} is ${edge(asked)}.`,
      blocks: [peak],
      sources,
    };
  const { value: now, below, how } = latest;
  const off = now - value;
  const distance = distanceFigure(parameter, off, unit);
  const broken = which === "max" ? off > 0 && !below : off < 0 || (below && off === 0);
  // An old reading above `max` still counts until another says that it has come down.
  const limit = `the ${which} is ${edge(asked)}`;
  const most = Math.max(latest.withoutUptake ?? now, latest.reckoned?.value ?? now);
  const raises =
    which === "max" && (broken || (most > value && most > now)) && dosed.some((name) => name === parameter);
  const care = raises ? ["Give nothing that raises it until a test shows it below."] : [];
  if (how === "stale") {
    return {
      answer: led(parameter, `${staleText(parameter, latest, unit, at)}`),
      blocks: [
        [`${limit.charAt(0).toUpperCase()}${limit.slice(1)}${broken ? ": it was beyond it" : ""}.`, ...care],
        peak,
      ],
      sources,
    };
  }
  const is = below
    ? which === "max" && off <= 0
      ? `below the max of ${edge(asked)}`
      : which === "min" && off <= 0
        ? `below the min of ${edge(asked)}`
        : `whether that keeps the ${which} of ${edge(asked)} can't be told`
    : `${distance === null ? "right at" : `${distance} ${off > 0 ? "above" : "below"}`} the ${which} of ${edge(asked)}`;
  return {
    answer: led(
      `${parameter} ${below ? "below " : ""}${valueBeside(parameter, now, [value], unit)}`,
      `${whenText(latest, at)}, ${is}${broken ? ": beyond it" : ""}.`,
    ),
    blocks: [
      [
        `Read ${ago(latest.readAt, at)}.`,
        ...reckonedLines(parameter, latest, unit),
        ...notCarriedLines(assessment, parameter, latest),
        ...care,
      ],
      peak,
    ],
    assumptions: how === "carried" ? carriedAssumptions(assessment, parameter) : [],
    sources: [...sources, ...(isTurned(latest) ? [papers.nbs] : [])],
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
  const limitIs = `The limit is ${which === "fall" ? "a fall" : "a rise"} of ${edge(asked)}.`;
  if (!isTracked(parameter)) return { answer: limitIs, blocks: [[`How ${parameter} moves isn't reckoned.`]] };
  if (volume.litres === null || uptake === null)
    return {
      answer: limitIs,
      blocks: [[`How ${parameter} moves isn't known: the volume of the water isn't.`]],
    };
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
    said === "" ? "how it moves isn't known, since its uptake isn't" : `${said}, by the mean of the day`;
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
