/** The hard limits on one day's change, as bounds on what may still be planned. */
import type { PlanNumbers } from "./numbers.ts";
import type { LinearRow } from "./simplex.ts";

/** A row of the linear problem with the limit that it stands for, in words of the report. */
export interface LimitRow extends LinearRow {
  readonly by: string;
}

/** Room for what is planned to raise and to lower a parameter within a day, ≥ 0, and what bounds it. */
export interface Room {
  readonly up: number;
  readonly upBy: string;
  readonly down: number;
  readonly downBy: string;
}

/**
 * Room beside a change that happens anyway. Where that change breaks a limit by itself the room is 0: what
 * is planned must not add to the breach. `now` null: only `rise` and `fall` hold.
 */
export function roomBeside(numbers: PlanNumbers, p: number, now: number | null, changePerDay: number): Room {
  const { name, risePerDay, fallPerDay, max, min } = numbers.parameters[p]!;
  const rise = risePerDay ?? Number.POSITIVE_INFINITY;
  const fall = fallPerDay ?? Number.POSITIVE_INFINITY;
  const toMax = now === null || max === null ? Number.POSITIVE_INFINITY : max - now;
  const toMin = now === null || min === null ? Number.POSITIVE_INFINITY : now - min;
  return {
    up: Math.max(0, Math.min(rise, toMax) - changePerDay),
    upBy: toMax < rise ? `${name} max` : `${name} rise`,
    down: Math.max(0, Math.min(fall, toMin) + changePerDay),
    downBy: toMin < fall ? `${name} min` : `${name} fall`,
  };
}

/** Rows in scaled variables: column j is litres a day of `sources[j]` ÷ its `litreScale`. */
export function limitRows(
  numbers: PlanNumbers,
  rooms: readonly Room[],
  sources: readonly number[],
): LimitRow[] {
  return rooms.flatMap(({ up, upBy, down, downBy }, p) => {
    const coefficients = scaledEffects(numbers, p, sources);
    const rows: LimitRow[] = [];
    if (Number.isFinite(up) && coefficients.some((value) => value > 0)) {
      rows.push({ coefficients, atMost: up / numbers.dayScale[p]!, by: upBy });
    }
    if (Number.isFinite(down) && coefficients.some((value) => value < 0)) {
      rows.push({
        coefficients: coefficients.map((value) => -value),
        atMost: down / numbers.dayScale[p]!,
        by: downBy,
      });
    }
    return rows;
  });
}

/** What one unit of each scaled variable does to a parameter, in its `dayScale`: between −1 and 1. */
export const scaledEffects = (numbers: PlanNumbers, p: number, sources: readonly number[]): number[] =>
  sources.map((j) => (numbers.effect[p]![j]! * numbers.litreScale[j]!) / numbers.dayScale[p]!);

/** One row a source: at most so many litres a day. */
export function ceilingRows(
  numbers: PlanNumbers,
  sources: readonly number[],
  litres: readonly number[],
  by: readonly string[],
): LimitRow[] {
  return sources.flatMap((j, column) =>
    Number.isFinite(litres[column]!)
      ? [
          {
            coefficients: sources.map((_, other) => (other === column ? 1 : 0)),
            atMost: litres[column]! / numbers.litreScale[j]!,
            by: by[column]!,
          },
        ]
      : [],
  );
}

/** The first row that is full and that more of a source (by column) would break. */
export function fullRow(
  rows: readonly LimitRow[],
  values: readonly number[],
  column: number,
): LimitRow | undefined {
  return rows.find(({ coefficients, atMost }) => {
    const used = coefficients.reduce(
      (sum, coefficient, index) => sum + coefficient * (values[index] ?? 0),
      0,
    );
    return coefficients[column]! > 1e-9 && atMost - used <= 1e-7 * Math.max(1, atMost);
  });
}
