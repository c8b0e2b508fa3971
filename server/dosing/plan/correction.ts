/** The way up from below the aim, one parameter after the other, beside maintenance and within what it leaves free. */
import { burdenRows, type Task, wholeLengthRows } from "./correction-rows.ts";
import type { CutPlan } from "./cuts.ts";
import { enter, type Ledger, openAmount, openLedger, wishedPerDay } from "./ledger.ts";
import { ceilingRows, fullRow, type LimitRow, limitRows, scaledEffects } from "./limits.ts";
import {
  forbiddenBy,
  givable,
  leastOfTheLater,
  type Maintenance,
  type ParameterState,
} from "./maintenance.ts";
import { daysToClose, negligible, type PlanNumbers, rounding, supplyOf } from "./numbers.ts";
import { lexicographicMinimum } from "./simplex.ts";

/** A limit that leaves so little room that it would take longer than this leaves none. */
const longestDays = 180;

export interface Correction {
  readonly parameter: number;
  /** How far it stands below; doses bring `amount` of it. */
  readonly distance: number;
  readonly amount: number;
  readonly wishedPerDay: number;
  /** 0 where none can be given. */
  readonly perDay: number;
  readonly days: number;
  readonly limitedBy: string | null;
  /** Litres a day by source. */
  readonly litres: readonly number[];
}

/** One for each parameter that stands below its aim and may be corrected, also where nothing can be given. */
export function corrections(numbers: PlanNumbers, cuts: CutPlan): Correction[] {
  const ledger = openLedger(numbers, cuts);
  const states = cuts.states(cuts.wished);
  const current = cuts.during(cuts.wished);
  return numbers.parameters.flatMap((_, parameter) => {
    const wished = wishedPerDay(numbers, ledger, parameter);
    if (wished === 0) return [];
    const candidates = numbers.sources
      .map((__, j) => j)
      .filter(
        (j) =>
          numbers.raises[parameter]![j] && !ledger.serving[j] && forbiddenBy(numbers, states, j) === null,
      );
    const open = openAmount(numbers, ledger, parameter);
    const surplus = ledger.surplus[parameter]!;
    const correction = correct(numbers, ledger, states, current, {
      parameter,
      open,
      surplus,
      amount: wished * daysToClose(numbers, open, wished + surplus),
      wishedPerDay: wished,
      candidates,
    });
    enter(numbers, ledger, correction);
    // The part that closes by itself isn't open for what lighter corrections bring beside.
    if (correction.perDay > 0) ledger.broughtUp[parameter]! += open - correction.amount;
    return [correction];
  });
}

function correct(
  numbers: PlanNumbers,
  ledger: Ledger,
  states: readonly ParameterState[],
  current: Maintenance,
  task: Task,
): Correction {
  const { parameter, open, surplus, candidates } = task;
  const free = [...ledger.freeLitres];
  const freeBy = [...numbers.ceilingBy];
  let solved = solve(numbers, ledger, task, free, freeBy);
  // A volume between what n doses and n + 1 doses can give is cut to what n can, and the rest planned anew.
  for (let round = 0; round < 3 * candidates.length + 3; round += 1) {
    const j = candidates.find(
      (k) => givableBeside(numbers, current, k, solved.litres[k]!) < solved.litres[k]!,
    );
    if (j === undefined) break;
    free[j] = givableBeside(numbers, current, j, solved.litres[j]!);
    freeBy[j] = numbers.sources[j]!.largestDoseBy ?? `${numbers.sources[j]!.key} dose`;
    solved = solve(numbers, ledger, task, free, freeBy);
  }
  const reached = supplyOf(numbers, parameter, solved.litres);
  const closing = reached + surplus;
  const allDays = closing > 0 ? daysToClose(numbers, open, closing) : Number.POSITIVE_INFINITY;
  const none = reached <= 1e-6 * task.wishedPerDay || !(allDays <= longestDays);
  const slowed = reached < task.wishedPerDay * (1 - rounding);
  const days = none ? 0 : allDays;
  return {
    parameter,
    distance: open,
    amount: none ? open : reached * days,
    wishedPerDay: task.wishedPerDay,
    perDay: none ? 0 : reached,
    days,
    limitedBy: slowed ? whatHolds(numbers, ledger, states, task, solved) : outOfReach(numbers, parameter),
    litres: none ? solved.litres.map(() => 0) : solved.litres,
  };
}

/** The greatest value, where it lies below the aim. */
function outOfReach(numbers: PlanNumbers, p: number): string | null {
  const { name, aim, max } = numbers.parameters[p]!;
  return max !== null && aim - max > negligible(numbers, p) ? `${name} max` : null;
}

/** Litres a day that a source can add to what it gives now, in doses that it can give. */
function givableBeside(numbers: PlanNumbers, current: Maintenance, j: number, litres: number): number {
  const before = current.litres[j]!;
  const given = givable(numbers, j, before + litres) - before;
  return given >= litres * (1 - 1e-6) ? litres : Math.max(0, given);
}

interface Solved {
  readonly litres: readonly number[];
  readonly rows: readonly LimitRow[];
  readonly values: readonly number[];
}

function solve(
  numbers: PlanNumbers,
  ledger: Ledger,
  task: Task,
  free: readonly number[],
  freeBy: readonly string[],
): Solved {
  const { parameter, candidates } = task;
  const rows = [
    ...limitRows(numbers, ledger.rooms, candidates),
    ...ceilingRows(
      numbers,
      candidates,
      candidates.map((j) => Math.max(0, free[j]!)),
      candidates.map((j) => freeBy[j]!),
    ),
    ...wholeLengthRows(numbers, ledger, task),
  ];
  const own = scaledEffects(numbers, parameter, candidates);
  const burdens = burdenRows(numbers, ledger, task);
  const burden = (index: number): number[] => [
    ...candidates.map(() => 0),
    ...burdens.map((_, other) => (other === index ? 1 : 0)),
  ];
  const values = lexicographicMinimum({
    variables: candidates.length + burdens.length,
    rows: [
      ...rows,
      { coefficients: own, atMost: task.wishedPerDay / numbers.dayScale[parameter]! },
      ...burdens,
    ],
    objectives: [
      own.map((value) => -value),
      ...burdens.map((_, index) => burden(index)),
      ...leastOfTheLater(numbers, candidates),
    ],
  });
  const litres = numbers.sources.map(() => 0);
  candidates.forEach((j, column) => {
    litres[j] = values[column]! > 1e-13 ? values[column]! * numbers.litreScale[j]! : 0;
  });
  return { litres, rows, values };
}

/** Why it isn't faster: its own limit first, else the first reason of the first source that could raise it. */
function whatHolds(
  numbers: PlanNumbers,
  ledger: Ledger,
  states: readonly ParameterState[],
  { parameter: p, candidates }: Task,
  solved: Solved,
): string {
  const { parameters, raises, ceilingBy } = numbers;
  const full = (j: number): string | undefined =>
    fullRow(solved.rows, solved.values, candidates.indexOf(j))?.by;
  const own = candidates.map(full).find((by) => by?.startsWith(`${parameters[p]!.name} `));
  if (own) return own;
  const reasons = numbers.preference
    .filter((j) => raises[p]![j])
    .map((j) => {
      if (candidates.includes(j)) return full(j);
      const forbidden = forbiddenBy(numbers, states, j);
      if (forbidden) return forbidden;
      // It serves a weightier parameter already.
      return parameters.find((_, q) => q < p && ledger.serving[j] && raises[q]![j])?.name ?? ceilingBy[j]!;
    });
  return reasons.find((by) => by !== undefined) ?? parameters[p]!.name;
}
