/** From a system's state to today's plan: the problem of numbers is put together here and its answer read back. */

import { constantsAt } from "../chemistry/constants-at.ts";
import { largestDose } from "../chemistry/largest-dose.ts";
import { defaults } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { Hold, Source, Strength } from "../culture/model.ts";
import type { Assuming } from "./assumptions.ts";
import type { SystemConstants } from "./constants.ts";
import { afterDelivery, strengthForChemistry, temperatureNow, waterOf } from "./dose-chemistry.ts";
import { ratesAt } from "./fold.ts";
import { limitAt } from "./limits.ts";
import type { PlanAnswer, PlanParameter, PlanProblem, PlanSource } from "./plan/problem.ts";
import { solvePlan } from "./plan/solve.ts";
import { capacityLPerDay, type Flow, hoursOpen, sourcesAt, topOffFlow } from "./rates.ts";
import { judgeSalinity } from "./salinity-cause.ts";
import { broughtPerLitre, type Dosed, dosed } from "./tracked.ts";
import type { Uptake } from "./uptake.ts";
import { isStale, type WaterState } from "./water-state.ts";

export interface SourceInPlan {
  readonly key: string;
  readonly source: Source;
  readonly strength: Strength;
}

export interface Plan {
  readonly problem: PlanProblem;
  readonly answer: PlanAnswer;
  readonly sources: readonly SourceInPlan[];
  /** The highest pH and Ω right after any one planned delivery; null where nothing is dosed or it can't be said. */
  readonly peak: { readonly pHTotal: number; readonly pHNbs: number; readonly omegaAragonite: number } | null;
}

export interface Situation {
  readonly constants: SystemConstants;
  readonly state: WaterState;
  readonly litres: number;
  readonly uptake: Uptake;
  readonly assumed: Assuming;
}

/** The holds in force of what can be dosed, in order of priority. */
export const heldNow = ({ constants, state }: Situation): readonly Hold[] =>
  dosed.flatMap((name) => factAt(constants.facts.holds.get(name), state.minute)?.value ?? []);

/** Ω of aragonite that a delivery may reach, and below which magnesium or above which calcium alkalinity isn't raised. */
const omegaMax = 12;
const magnesiumLow = 1150;
const calciumHigh = 480;

/** Plans, or gives null where nothing is held. Without any source the answer holds only obstacles. */
export function makePlan(situation: Situation): Plan | null {
  const holds = heldNow(situation);
  if (holds.length === 0) return null;
  const sources = sourcesInPlan(situation);
  const problem: PlanProblem = {
    volumeL: situation.litres,
    exchangePerDay: exchangePerDay(situation),
    parameters: holds.map((hold) => planParameter(situation, hold)),
    sources: sources.map((entry) => planSource(situation, entry)),
  };
  const answer = solvePlan(problem);
  return { problem, answer, sources, peak: peakOf(situation, sources, answer) };
}

function exchangePerDay({ constants, state, litres }: Situation): number {
  const through = factAt(constants.facts.flowsThrough, state.minute)?.value;
  return through ? through.litresPerDay / litres : 0;
}

function sourcesInPlan({ constants, state }: Situation): SourceInPlan[] {
  return sourcesAt(constants, state.minute).flatMap(({ key, source }) => {
    const strength = constants.strengthAt(source.solution, state.minute);
    return strength ? [{ key, source, strength }] : [];
  });
}

function planParameter(situation: Situation, hold: Hold): PlanParameter {
  const { constants, state, litres, uptake, assumed } = situation;
  const name = hold.parameter as Dosed;
  const carried = state.carried[name];
  const fresh = carried && !isStale(carried, state.minute) ? carried : null;
  const topOff = topOffFlow(constants, state.minute);
  const rates = ratesAt(state, state.minute, constants, topOff ? [topOff] : []);
  const gain = rates?.gainPerDay[name] ?? 0;
  const exchange = (at: number) => (rates ? rates.exchangePerDay * (rates.incoming[name] - at) : 0);
  const limit = (which: "rise" | "fall" | "max" | "min") =>
    limitAt(constants.facts, name, which, "pump", state.minute, assumed)?.value ?? null;
  if (
    uptake.perDay[name] !== null &&
    !uptake.magnesiumFractionStated &&
    (name === "calcium" || name === "magnesium")
  ) {
    assumed.use(defaults.skeletonMagnesium);
  }
  return {
    name,
    now: fresh?.value ?? (isOver(carried, limit("max")) ? carried!.value : null),
    low: hold.low,
    high: hold.high,
    aim: hold.aim,
    needPerDay: uptake.perDay[name] === null ? null : -(gain + exchange(hold.aim)),
    passivePerDay: gain + exchange(fresh?.value ?? hold.aim),
    risePerDay: limit("rise"),
    fallPerDay: limit("fall"),
    max: limit("max"),
    min: limit("min"),
    heldBack: litres > 0 ? whyHeldBack(situation, hold, fresh?.value ?? null) : null,
  };
}

/** An old reading beyond `max` still forbids what raises it: safer than to take it for gone. */
const isOver = (carried: { readonly value: number } | null, max: number | null): boolean =>
  carried !== null && max !== null && carried.value > max;

export const noRecentReading = "no recent reading";
export const salinityFirst = "salinity";

/** Why a parameter isn't corrected, though it may be off its aim. */
function whyHeldBack(situation: Situation, hold: Hold, value: number | null): string | null {
  if (value === null) return noRecentReading;
  const { constants, state } = situation;
  const salinityHold = factAt(constants.facts.holds.get("salinity"), state.minute)?.value;
  const salinity = state.carried.salinity;
  if (salinityHold && salinity && !isStale(salinity, state.minute)) {
    const judgement = judgeSalinity(
      value,
      hold,
      salinity.value,
      salinityHold,
      temperatureNow(state, constants, null),
    );
    if (judgement?.isTheCause) return salinityFirst;
  }
  if (hold.parameter !== "alkalinity") return null;
  const now = (name: "magnesium" | "calcium") => {
    const carried = state.carried[name];
    return carried && !isStale(carried, state.minute) ? carried.value : null;
  };
  const magnesium = now("magnesium");
  const calcium = now("calcium");
  if (magnesium !== null && magnesium < magnesiumLow) return `magnesium under ${magnesiumLow} mg/L`;
  return calcium !== null && calcium > calciumHigh ? `calcium over ${calciumHigh} mg/L` : null;
}

/** The most deliveries of a pump a day: one every five minutes of its hours. */
const minutesBetweenDoses = 5;

function planSource(situation: Situation, { key, source, strength }: SourceInPlan): PlanSource {
  const { assumed } = situation;
  const isPump = source.device === "pump";
  const hours = hoursOpen(source);
  const capacity = capacityLPerDay(source);
  const largest = largestDelivery(situation, source, strength);
  if (isPump && source.leastL === null) assumed.use(defaults.pumpLeast);
  if (!source.hours) assumed.use(isPump ? defaults.pumpHours : defaults.handHours);
  return {
    key,
    strength: Object.fromEntries(dosed.map((name) => [name, broughtPerLitre(strength, name) ?? 0])),
    largestDoseL: largest.litres,
    largestDoseBy: largest.by,
    leastDoseL: isPump ? (source.leastL ?? defaults.pumpLeast.value) : 0,
    capacityLPerDay: capacity,
    deliveries: isPump
      ? { kind: "at-most", count: Math.max(1, Math.floor(hours / minutesBetweenDoses)) }
      : { kind: "fixed", count: source.times },
    alwaysLPerDay: Math.min(source.alwaysLPerDay, capacity ?? source.alwaysLPerDay),
  };
}

/** A delivery never makes up more than this share of the water, whatever it holds. */
const largestShare = 0.1;

/** The largest single delivery, and the limit that holds it down. */
function largestDelivery(
  situation: Situation,
  source: Source,
  strength: Strength,
): { readonly litres: number; readonly by: string | null } {
  const { constants, state, litres, assumed } = situation;
  let most: { litres: number; by: string | null } = { litres: litres * largestShare, by: null };
  for (const name of dosed) {
    const brought = broughtPerLitre(strength, name) ?? 0;
    const limit = limitAt(
      constants.facts,
      name,
      "dose",
      source.device,
      state.minute,
      brought > 0 ? assumed : null,
    );
    if (!limit || brought <= 0) continue;
    const allowed = (Math.max(0, limit.value) * litres) / brought;
    if (allowed < most.litres) most = { litres: allowed, by: `${name} dose` };
  }
  const solution = strengthForChemistry(strength);
  const changesCarbon = solution && (solution.alkalinityMeqPerL !== 0 || solution.calciumMgPerL !== 0);
  if (!changesCarbon) return most;
  const water = waterOf(assumedState(situation), constants, assumed);
  if (!water) return most;
  const nbs = (scale: "NBS" | "total" | null, value: number) => {
    const at = scale === "total" ? constantsAt(water.salinity, water.temperatureDegC) : null;
    return at?.ok ? value + at.nbsLessTotal : value;
  };
  const max = limitAt(constants.facts, "pH", "max", source.device, state.minute, assumed);
  const jump = limitAt(constants.facts, "pH", "dose", source.device, state.minute, assumed);
  const found = largestDose(
    water,
    solution,
    {
      pHNbsMax: max ? nbs(max.scale, max.value) : Number.POSITIVE_INFINITY,
      pHJumpMax: jump?.value ?? Number.POSITIVE_INFINITY,
      omegaAragoniteMax: omegaMax,
    },
    most.litres,
  );
  if (!found.ok || found.bindingLimit === null || found.volumeL >= most.litres) return most;
  const words = {
    "pH max": "pH max",
    "pH jump": "pH dose",
    "omega aragonite": `Ω ${omegaMax}`,
    "sea water": "sea water",
  };
  return { litres: found.volumeL, by: words[found.bindingLimit] };
}

/**
 * The state for chemistry. Without a recent reading alkalinity stands at its aim; reckoned down below its least
 * value, it stands there: what was reckoned so far is no water to judge a dose by.
 */
function assumedState({ state, constants, assumed }: Situation): WaterState {
  const hold = factAt(constants.facts.holds.get("alkalinity"), state.minute)?.value;
  const { alkalinity } = state.carried;
  const least = limitAt(constants.facts, "alkalinity", "min", "hand", state.minute, null)?.value ?? 0;
  const isOld = isStale(alkalinity, state.minute);
  const instead = isOld
    ? hold?.aim
    : alkalinity && alkalinity.value < least && alkalinity.reading.value >= least
      ? least
      : undefined;
  if (instead === undefined) return state;
  const [value, basis] = isOld
    ? ["at its aim", "no recent reading"]
    : ["not below its limit", "only reckoned to be below, never read so low"];
  assumed.add({ what: "alkalinity, for pH and Ω", value, basis });
  const place = { file: "", line: 0, span: null };
  const unit = hold?.unit ?? alkalinity!.reading.unit;
  const reading = {
    place,
    value: instead,
    perKilogram: null,
    below: false,
    impossible: false,
    scale: null,
    unit,
  };
  const carried = { ...state.carried, alkalinity: { value: instead, readAt: state.minute, reading } };
  return { ...state, carried };
}

function peakOf(situation: Situation, sources: readonly SourceInPlan[], answer: PlanAnswer): Plan["peak"] {
  const water = waterOf(assumedState(situation), situation.constants, situation.assumed);
  if (!water) return null;
  const peaks = sources.flatMap(({ strength }, index) => {
    const litres = answer.sources[index]?.litresPerDose ?? 0;
    const after = litres > 0 ? afterDelivery(water, strength, litres) : null;
    return after ? [after.carbonate] : [];
  });
  if (peaks.length === 0) return null;
  return {
    pHTotal: Math.max(...peaks.map(({ pHTotal }) => pHTotal)),
    pHNbs: Math.max(...peaks.map(({ pHNbs }) => pHNbs)),
    omegaAragonite: Math.max(...peaks.map(({ omegaAragonite }) => omegaAragonite)),
  };
}

/** The planned flows as phases for the projection, with the top-off beside them. */
export function plannedPhases({ constants, state }: Situation, plan: Plan) {
  const topOff = topOffFlow(constants, state.minute);
  return plan.answer.phases.map(({ untilDays, litresPerDay }) => {
    const flows: Flow[] = plan.sources.map(({ source }, index) => ({
      solution: source.solution,
      litresPerDay: litresPerDay[index] ?? 0,
    }));
    return { untilDays, flows: topOff ? [...flows, topOff] : flows };
  });
}
