/** The way down from above the aim: how much lower maintenance runs, how long, and maintenance at each stage of it. */
import { type Maintenance, maintenance, type ParameterState } from "./maintenance.ts";
import {
  aboveMax,
  daysToClose,
  leftAfter,
  negligible,
  type PlanNumbers,
  rounding,
  supplyOf,
} from "./numbers.ts";

/** Parameters (by index) whose cut still runs. */
export type Running = ReadonlySet<number>;

export interface CutPlan {
  /** Parameters above their aim that are being brought down. */
  readonly wished: Running;
  /** Maintenance while the given cuts run; solved once for each set. */
  readonly during: (running: Running) => Maintenance;
  /** The water while the given cuts run; the others of `wished` stand at their aim. */
  readonly states: (running: Running) => readonly ParameterState[];
}

/** The rate towards the aim: 7 days for the distance to it, one day for what lies outside the band. */
export const wishedRate = (toAim: number, toBand: number): number => toAim / 7 + Math.max(0, toBand);

export function cutPlan(numbers: PlanNumbers): CutPlan {
  const wished = new Set(numbers.parameters.map((_, p) => p).filter((p) => isCut(numbers, p)));
  const states = (running: Running): ParameterState[] =>
    numbers.parameters.map(({ now, aim, needPerDay, passivePerDay }, p) => {
      const need = needPerDay === null ? null : Math.max(0, needPerDay);
      if (running.has(p))
        return { now, passivePerDay, targetPerDay: Math.max(0, (need ?? 0) - cutRate(numbers, p)) };
      if (wished.has(p)) return { now: aim, passivePerDay: -(needPerDay ?? 0), targetPerDay: need };
      return { now, passivePerDay, targetPerDay: need };
    });
  const solved = new Map<string, Maintenance>();
  const during = (running: Running): Maintenance => {
    const key = [...running].sort((a, b) => a - b).join(" ");
    const known = solved.get(key) ?? maintenance(numbers, states(running));
    solved.set(key, known);
    return known;
  };
  return { wished, during, states };
}

/** Every set of cuts that may run together at some time. */
export function subsetsOf(running: Running): Running[] {
  let sets: Running[] = [new Set()];
  for (const p of running) sets = sets.concat(sets.map((set) => new Set(set).add(p)));
  return sets;
}

export interface CutStage {
  readonly fromDays: number;
  readonly running: Running;
}

/**
 * When the cuts end, given what corrections bring of each parameter in all. A cut that doesn't bring its
 * parameter down (what always runs is more than the need) has no end and stays in the last stage.
 */
export function cutStages(
  numbers: PlanNumbers,
  plan: CutPlan,
  broughtByCorrections: readonly number[],
): { stages: CutStage[]; endDays: ReadonlyMap<number, number> } {
  const left = new Map(
    [...plan.wished].map((p) => {
      const { now, aim } = numbers.parameters[p]!;
      return [p, now! - aim + Math.max(0, broughtByCorrections[p]!)] as const;
    }),
  );
  const endDays = new Map<number, number>();
  const stages: CutStage[] = [{ fromDays: 0, running: plan.wished }];
  for (;;) {
    const { fromDays, running } = stages.at(-1)!;
    const { litres } = plan.during(running);
    const rates = new Map([...running].map((p) => [p, fallRate(numbers, p, litres)] as const));
    const durations = [...running].flatMap((p) =>
      rates.get(p)! > 0 ? [daysToClose(numbers, left.get(p)!, rates.get(p)!)] : [],
    );
    const step = Math.min(...durations);
    if (!Number.isFinite(fromDays + step)) return { stages, endDays };
    const still = new Set<number>();
    for (const p of running) {
      const rate = rates.get(p)!;
      const ends = rate > 0 && daysToClose(numbers, left.get(p)!, rate) <= step * (1 + rounding);
      left.set(p, leftAfter(numbers, left.get(p)!, rate, step));
      if (ends) endDays.set(p, fromDays + step);
      else still.add(p);
    }
    stages.push({ fromDays: fromDays + step, running: still });
  }
}

/** How much less than the need is given: what brings it down. Under a millionth of the day's scale it is none. */
function fallRate(numbers: PlanNumbers, p: number, litres: readonly number[]): number {
  const rate = numbers.parameters[p]!.needPerDay! - supplyOf(numbers, p, litres);
  return rate > 1e-6 * numbers.dayScale[p]! ? rate : 0;
}

function isCut(numbers: PlanNumbers, p: number): boolean {
  const parameter = numbers.parameters[p]!;
  const { now, aim, needPerDay, heldBack } = parameter;
  if (now === null || needPerDay === null || now - aim <= negligible(numbers, p)) return false;
  // Beyond `max` a reading acts at once, whatever holds a correction back.
  return heldBack === null || aboveMax(parameter);
}

/** At most `fall`, and not so much that the water, which falls by itself too, would fall faster or under `min`. */
function cutRate(numbers: PlanNumbers, p: number): number {
  const { now, aim, high, min, needPerDay, passivePerDay, fallPerDay } = numbers.parameters[p]!;
  const anyway = passivePerDay + needPerDay!;
  const fall = fallPerDay ?? Number.POSITIVE_INFINITY;
  const toMin = min === null ? Number.POSITIVE_INFINITY : now! - min;
  return Math.max(0, Math.min(wishedRate(now! - aim, now! - high), fall, fall + anyway, toMin + anyway));
}
