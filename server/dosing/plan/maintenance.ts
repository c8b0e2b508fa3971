/** Litres a day that meet the needs, the weightier parameter first, around what always runs and within the limits. */
import { deliverableL } from "./deliveries.ts";
import { ceilingRows, fullRow, type LimitRow, limitRows, roomBeside, scaledEffects } from "./limits.ts";
import { aboveMax, type PlanNumbers, rounding, supplyOf } from "./numbers.ts";
import { type LinearRow, lexicographicMinimum } from "./simplex.ts";

/** One parameter as maintenance sees it at some stage of the plan. */
export interface ParameterState {
  readonly now: number | null;
  /** What happens a day without any source. */
  readonly passivePerDay: number;
  /** What sources should bring a day, ≥ 0; null where it is unknown. */
  readonly targetPerDay: number | null;
}

export interface Shortfall {
  readonly parameter: number;
  readonly by: string;
  readonly perDay: number;
}

export interface Maintenance {
  /** By source, what always runs included. */
  readonly litres: readonly number[];
  readonly shortfalls: readonly Shortfall[];
}

/** Whether a source serves only parameters whose uptake is unknown. */
export function servesUnknownOnly(numbers: PlanNumbers, j: number): boolean {
  const served = numbers.parameters.filter((_, p) => numbers.raises[p]![j]);
  return served.length > 0 && served.every(({ needPerDay }) => needPerDay === null);
}

/** The greatest parameter limit that forbids a source altogether, in words of the report. */
export function forbiddenBy(
  numbers: PlanNumbers,
  states: readonly ParameterState[],
  j: number,
): string | null {
  const over = numbers.parameters.find(
    ({ max }, p) => numbers.effect[p]![j]! > 0 && aboveMax({ now: states[p]!.now, max }),
  );
  return over ? `${over.name} max` : null;
}

export function maintenance(numbers: PlanNumbers, states: readonly ParameterState[]): Maintenance {
  const { sources, ceilingL, ceilingBy, raises } = numbers;
  const usable = sources.map(
    (source, j) =>
      !servesUnknownOnly(numbers, j) &&
      raises.some((row) => row[j]) &&
      forbiddenBy(numbers, states, j) === null &&
      ceilingL[j]! > source.alwaysLPerDay,
  );
  const most = [...ceilingL];
  const mostBy = [...ceilingBy];
  let problem = solve(numbers, states, usable, most, mostBy);
  // A volume between what n doses and n + 1 doses can give is cut to what n can, and the rest planned anew.
  for (let round = 0; round < 3 * sources.length + 3; round += 1) {
    const j = problem.litres.findIndex((litres, k) => usable[k] && givable(numbers, k, litres) < litres);
    if (j === -1) break;
    most[j] = givable(numbers, j, problem.litres[j]!);
    mostBy[j] = sources[j]!.largestDoseBy ?? `${sources[j]!.key} dose`;
    problem = solve(numbers, states, usable, most, mostBy);
  }
  const litres = problem.litres.map((value, j) => (usable[j] ? givable(numbers, j, value) : value));
  const shortfalls = states.flatMap(({ targetPerDay }, p) => {
    const missing = targetPerDay === null ? 0 : targetPerDay - supplyOf(numbers, p, litres);
    const matters = missing > rounding * Math.max(numbers.dayScale[p]!, targetPerDay ?? 0);
    if (!matters || !raises[p]!.includes(true)) return [];
    return [{ parameter: p, perDay: missing, by: whatHolds(numbers, states, p, problem) }];
  });
  return { litres, shortfalls };
}

/** At most the litres wished, in doses that the source can give; what always runs is never touched. */
export function givable(numbers: PlanNumbers, j: number, litres: number): number {
  const source = numbers.sources[j]!;
  if (litres <= source.alwaysLPerDay * (1 + rounding)) return source.alwaysLPerDay;
  const given = deliverableL(source, litres);
  return given >= litres * (1 - rounding) ? litres : Math.max(source.alwaysLPerDay, given);
}

interface Solved {
  readonly litres: readonly number[];
  readonly planned: readonly number[];
  readonly rows: readonly LimitRow[];
  readonly values: readonly number[];
}

function solve(
  numbers: PlanNumbers,
  states: readonly ParameterState[],
  usable: readonly boolean[],
  most: readonly number[],
  mostBy: readonly string[],
): Solved {
  const always = numbers.sources.map(({ alwaysLPerDay }) => alwaysLPerDay);
  const planned = numbers.sources.map((_, j) => j).filter((j) => usable[j]);
  const rooms = states.map(({ now, passivePerDay }, p) =>
    roomBeside(numbers, p, now, passivePerDay + supplyOf(numbers, p, always)),
  );
  const rows = [
    ...limitRows(numbers, rooms, planned),
    ...ceilingRows(
      numbers,
      planned,
      planned.map((j) => Math.max(0, most[j]! - always[j]!)),
      planned.map((j) => mostBy[j]!),
    ),
  ];
  const deviations = deviationRows(numbers, states, planned, always);
  const values = lexicographicMinimum({
    variables: planned.length + deviations.length,
    rows: [...rows, ...deviations.map(({ row }) => row)],
    objectives: [...deviations.map(({ objective }) => objective), ...leastOfTheLater(numbers, planned)],
  });
  const litres = [...always];
  planned.forEach((j, column) => {
    const beyond = values[column]! > 1e-13 ? values[column]! * numbers.litreScale[j]! : 0;
    litres[j] = Math.min(most[j]!, always[j]! + beyond);
  });
  return { litres, planned, rows, values };
}

/**
 * |supply − target| of each known parameter. The row's own slack is the shortage (where the target is still
 * above what always runs), one more variable the excess; or the other way round.
 */
function deviationRows(
  numbers: PlanNumbers,
  states: readonly ParameterState[],
  planned: readonly number[],
  always: readonly number[],
): { row: LinearRow; objective: number[] }[] {
  const known = states.map((_, p) => p).filter((p) => states[p]!.targetPerDay !== null);
  return known.map((p, index) => {
    const open = (states[p]!.targetPerDay! - supplyOf(numbers, p, always)) / numbers.dayScale[p]!;
    const sign = open >= 0 ? 1 : -1;
    const effects = scaledEffects(numbers, p, planned).map((value, column) =>
      value > 0 && !numbers.raises[p]![planned[column]!] ? 0 : sign * value,
    );
    const extra = (value: number): number[] => known.map((_, other) => (other === index ? value : 0));
    return {
      row: { coefficients: [...effects, ...extra(-1)], atMost: Math.abs(open) },
      objective: [...effects.map((value) => -value), ...extra(2)],
    };
  });
}

/** Objectives that make a plan prefer earlier sources: the least of the last, then of the one before it, … */
export const leastOfTheLater = (numbers: PlanNumbers, planned: readonly number[]): number[][] =>
  numbers.preference
    .filter((j) => planned.includes(j))
    .reverse()
    .map((j) => planned.map((other) => (other === j ? 1 : 0)));

/** Why a parameter doesn't get what it should: the first reason of the first source that could raise it. */
function whatHolds(
  numbers: PlanNumbers,
  states: readonly ParameterState[],
  p: number,
  solved: Solved,
): string {
  const { parameters, raises, effect, ceilingBy } = numbers;
  const own = solved.planned
    .map((j, column) => (raises[p]![j] ? fullRow(solved.rows, solved.values, column)?.by : undefined))
    .find((by) => by?.startsWith(`${parameters[p]!.name} `));
  if (own) return own;
  const reasons = numbers.preference
    .filter((j) => raises[p]![j])
    .map((j) => {
      const column = solved.planned.indexOf(j);
      if (column === -1) return forbiddenBy(numbers, states, j) ?? ceilingBy[j]!;
      return fullRow(solved.rows, solved.values, column)?.by;
    });
  const crowded = parameters.find(
    (_, q) => q < p && solved.planned.some((j) => raises[p]![j] && effect[q]![j]! > 0),
  );
  return reasons.find((by) => by !== undefined) ?? crowded?.name ?? parameters[p]!.name;
}
