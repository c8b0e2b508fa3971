/** Everything that is said of one system at a moment: the water now, where it goes, what to dose, what is wrong. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { defaults } from "../culture/defaults.ts";
import { countUpTo } from "../culture/event-order.ts";
import { factAt } from "../culture/history.ts";
import { inOneGo } from "../culture/keep.ts";
import type { Assumption, FarmModel, Hold, System } from "../culture/model.ts";
import { eventsSeenAt } from "../culture/readings.ts";
import { assumeDensity, assuming } from "./assumptions.ts";
import { type KeptReadings, type ReadingWithCarbonate, readingsUpTo } from "./carbonate-of-reading.ts";
import { constantsOf, type SystemConstants } from "./constants.ts";
import type { DosingFinding } from "./finding.ts";
import { uptakeOfLastDay } from "./fold.ts";
import { type FoldedLog, foldedAt, foldLog, foundIn } from "./fold-log.ts";
import { makePlan, type Plan, plannedPhases, type Situation } from "./make-plan.ts";
import { planFindings } from "./plan-findings.ts";
import {
  type Drift,
  type DriftCase,
  driftCases,
  driftDays,
  driftStepHours,
  leavesBandAfterDays,
  type Projection,
  project,
} from "./projection.ts";
import { flowsSet, topOffFlow } from "./rates.ts";
import { type SaltBalance, saltBalance } from "./salt-balance.ts";
import { dosed, type Tracked, tracked } from "./tracked.ts";
import { type Uptake, uptakeAt } from "./uptake.ts";
import { type Volume, volumeAt } from "./volume.ts";
import { waterFindings } from "./water-findings.ts";
import { carriedMinutes, isStale, type WaterState } from "./water-state.ts";

export interface Assessment {
  readonly system: System;
  readonly at: number;
  readonly constants: SystemConstants;
  readonly volume: Volume;
  readonly readings: readonly ReadingWithCarbonate[];
  readonly state: WaterState;
  /** Held parameters without a reading of the last seven days. */
  readonly staleParameters: readonly Tracked[];
  /** What is taken now: plan and projection go on with it. */
  readonly uptake: Uptake | null;
  /** The mean of the 24 hours before the moment. */
  readonly uptakeOfLastDay: Uptake | null;
  readonly drifts: readonly Drift[];
  readonly plan: Plan | null;
  /** Day's means when the last correction ends. */
  readonly afterPlan: Readonly<Partial<Record<Tracked, number>>> | null;
  readonly salt: SaltBalance | null;
  readonly findings: readonly DosingFinding[];
  readonly assumptions: readonly Assumption[];
}

/** An assessment with what the next one of the system may start from. */
export interface KeptAssessment {
  readonly assessment: Assessment;
  readonly log: FoldedLog;
  readonly readings: KeptReadings;
}

/** Assesses a system at a minute. `clock`: the real time, for lines that lie past both. */
export function assess(model: FarmModel, declared: System, at: number, clock: number): Assessment {
  return inOneGo(assessInSteps(model, declared, at, clock, null)).assessment;
}

/** The same, pausing now and then; what its last assessment worked out and is still so is taken as it is. */
export function* assessInSteps(
  model: FarmModel,
  declared: System,
  at: number,
  clock: number,
  before: KeptAssessment | null,
): Generator<void, KeptAssessment> {
  const system: System = { ...declared, events: eventsSeenAt(declared.events, at) };
  const constants = constantsOf(model, system);
  const log = yield* foldLog(model, system, constants, at, before?.log ?? null);
  const readings = yield* readingsUpTo(system.events, at, before?.readings ?? null);
  return { assessment: assessFolded(model, system, constants, log, readings, at, clock), log, readings };
}

function assessFolded(
  model: FarmModel,
  system: System,
  constants: SystemConstants,
  log: FoldedLog,
  kept: KeptReadings,
  at: number,
  clock: number,
): Assessment {
  const { state, lastDay } = foldedAt(log, constants, at);
  const assumed = assuming();
  for (const { assumption } of kept.assumptions) assumed.add(assumption);
  const { readings } = kept;
  const volume = volumeAt(constants.facts, at);
  const shared = { system, at, constants, volume, readings, state };
  const staleParameters = dosed.filter(
    (name) => factAt(constants.facts.holds.get(name), at) && isStale(state.carried[name], at),
  );
  const findings: DosingFinding[] = [
    ...volumeFindings(system, volume),
    ...futureLines(system, at, clock),
    ...foundIn(log),
  ];
  if (volume.litres === null) {
    findings.push(...waterFindings({ ...shared, staleParameters, drifts: [], plan: null, uptake: null }));
    return {
      ...shared,
      staleParameters,
      uptake: null,
      uptakeOfLastDay: null,
      drifts: [],
      plan: null,
      afterPlan: null,
      salt: null,
      findings,
      assumptions: assumed.all(),
    };
  }
  const uptake = uptakeAt(constants.facts, state, at, volume.litres, constants.firstEvent);
  const situation: Situation = { constants, state, litres: volume.litres, uptake, assumed };
  const solved = makePlan(situation);
  const plan = solved && solved.sources.length > 0 ? solved : null;
  if (solved) findings.push(...planFindings(situation, system, solved));
  listAssumptions(situation, model, system);
  const projections = projectCases(situation, plan);
  const drifts = driftsOf(situation, projections);
  findings.push(...waterFindings({ ...shared, staleParameters, drifts, plan, uptake }));
  const planned = projections.get("as-planned");
  const afterPlan = plan && planned ? valuesAfter(planned, plan.answer.correctionDays) : null;
  const salt = plan ? saltBalance(situation, system, plan) : null;
  return {
    ...shared,
    staleParameters,
    uptake,
    uptakeOfLastDay: uptakeOfLastDay(constants, lastDay, uptake),
    drifts,
    plan,
    afterPlan,
    salt,
    findings,
    assumptions: assumed.all(),
  };
}

function valuesAfter(projection: Projection, days: number): Partial<Record<Tracked, number>> {
  return Object.fromEntries(
    tracked.flatMap((name) => {
      const value = projection.valueAt(name, days);
      return value === null ? [] : [[name, value]];
    }),
  );
}

/** What the results rest on beside the defaults that were used on the way. */
function listAssumptions(
  { constants, state, uptake, assumed }: Situation,
  model: FarmModel,
  system: System,
): void {
  assumeDensity(system, state.minute, assumed);
  if (uptake.basis !== "none" || tracked.some((name) => state.carried[name])) {
    assumed.add({
      what: "the day's course",
      value: "uptake and doses even through the day",
      basis: "no estimate from the log yet",
    });
  }
  for (const name of dosed) {
    if (uptake.perDay[name] !== null || !state.carried[name]) continue;
    // Of potassium and strontium nobody states it; what is dosed of them counts.
    const isRare = name === "potassium" || name === "strontium";
    assumed.add({
      what: `what the corals take of ${name}`,
      value: isRare ? "none" : "unknown, so its last reading stands until the next, with doses by hand",
      basis: "not stated",
    });
  }
  if (uptake.foodTakesMore) {
    assumed.add({
      what: "alkalinity that the food takes",
      value: "no more than `uptake alkalinity` says for all",
      basis: "what is stated goes before what is worked out",
    });
  }
  const evaporates = factAt(constants.facts.evaporatesLPerDay, state.minute);
  const topOff = factAt(constants.facts.topOff, state.minute)?.value;
  if (evaporates && !topOff) {
    assumed.add({
      what: "evaporated water",
      value: "made up as it goes, with fresh water",
      basis: defaults.salinity.basis,
    });
  }
  if (topOff?.solution && !evaporates) {
    assumed.add({
      what: "evaporation",
      value: "unknown, so the top-off counts as none",
      basis: "not stated",
    });
  }
  const addWater = (water: string, minute: number) => {
    for (const { parameter, ...assumption } of constants.waterAt(water, minute).assumptions)
      if (state.carried[parameter]) assumed.add(assumption);
  };
  const addSolution = (solution: string) => {
    for (const assumption of model.solutions.get(solution)?.assumptions ?? []) assumed.add(assumption);
  };
  const through = factAt(constants.facts.flowsThrough, state.minute)?.value;
  if (through) addWater(through.water, state.minute);
  if (topOff?.solution) addSolution(topOff.solution);
  for (const history of constants.facts.sources.values()) {
    const source = factAt(history, state.minute)?.value;
    if (source) addSolution(source.solution);
  }
  // What was given or exchanged while the values carried now were on their way.
  const carriedSince = countUpTo(system.events, state.minute - carriedMinutes - 1);
  for (const event of system.events.slice(carriedSince, countUpTo(system.events, state.minute))) {
    if (event.kind === "renewed") addWater(event.water, event.minute);
    if (event.kind === "topped" && event.solution) addSolution(event.solution);
    if (event.kind === "gave") for (const { solution } of event.doses) addSolution(solution);
  }
}

function projectCases(situation: Situation, plan: Plan | null): ReadonlyMap<DriftCase, Projection> {
  const { constants, state } = situation;
  const topOff = topOffFlow(constants, state.minute);
  const set = flowsSet(constants, state, state.minute);
  const phases = {
    undosed: [{ untilDays: null, flows: [] }],
    "as-set": [{ untilDays: null, flows: topOff ? [...set, topOff] : set }],
    "as-planned": plan ? plannedPhases(situation, plan) : null,
  };
  const projections = driftCases.flatMap((name) => {
    const of = phases[name];
    const projection = of && project(state, constants, of);
    return projection ? [[name, projection] as const] : [];
  });
  return new Map(projections);
}

function driftsOf({ constants, state }: Situation, projections: ReadonlyMap<DriftCase, Projection>): Drift[] {
  return tracked.flatMap((parameter) => {
    const hold = factAt(constants.facts.holds.get(parameter), state.minute)?.value;
    if (!hold || !state.carried[parameter]) return [];
    return [...projections].map(([name, projection]) => driftOf(state, parameter, hold, name, projection));
  });
}

function driftOf(
  state: WaterState,
  parameter: Tracked,
  hold: Hold,
  name: DriftCase,
  projection: Projection,
): Drift {
  const valueAt = (days: number) => projection.valueAt(parameter, days);
  const points: { minute: number; value: number }[] = [];
  for (let hours = 0; hours <= driftDays * 24; hours += driftStepHours) {
    const value = valueAt(hours / 24);
    if (value !== null) points.push({ minute: state.minute + hours * 60, value });
  }
  const days = leavesBandAfterDays(valueAt, hold.low, hold.high);
  const leavesAt = days === null ? null : state.minute + Math.floor(days * minutesPerDay);
  return { parameter, hold, case: name, leavesAt, points };
}

function whyNoVolume({ measuredL, geometricL, largestDisplacement }: Volume) {
  if (measuredL !== null) return "measured-nothing";
  if (geometricL === null) return "no-tank";
  return largestDisplacement ? "displaced" : "empty-tanks";
}

function volumeFindings(system: System, volume: Volume): DosingFinding[] {
  const shared = { system: system.name };
  if (volume.litres === null) {
    const place = volume.measuredPlace ?? volume.largestDisplacement ?? system.place;
    const volumeL = volume.measuredL ?? volume.geometricL ?? 0;
    return [{ ...shared, code: "system/no-volume", place, reason: whyNoVolume(volume), volumeL }];
  }
  const { measuredL, geometricL, measuredPlace } = volume;
  if (measuredL === null || geometricL === null || !measuredPlace) return [];
  if (Math.abs(geometricL - measuredL) <= volumeDifference * measuredL) return [];
  return [{ ...shared, code: "system/volume-differs", place: measuredPlace, measuredL, geometricL }];
}

/** A measured volume further off the tanks' measures than this is asked about. Common practice, no source. */
const volumeDifference = 0.1;

/** Lines more than a day past both the moment asked and the real clock. */
function futureLines(system: System, at: number, clock: number): DosingFinding[] {
  const latest = Math.max(at, clock) + minutesPerDay;
  return system.events
    .slice(countUpTo(system.events, latest))
    .map(({ minute, place }) => ({ code: "log/future", place, system: system.name, minute }));
}
