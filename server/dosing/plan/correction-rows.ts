/** What a correction does to the other parameters, as rows of its linear problem. */
import { type Ledger, openAmount, wishedPerDay } from "./ledger.ts";
import { type LimitRow, scaledEffects } from "./limits.ts";
import type { PlanNumbers } from "./numbers.ts";
import type { LinearRow } from "./simplex.ts";

/** A correction to be planned. */
export interface Task {
  readonly parameter: number;
  /** How far it stands below, and what comes in a day beyond the need. */
  readonly open: number;
  readonly surplus: number;
  /** What doses bring of that at the wished rate. */
  readonly amount: number;
  readonly wishedPerDay: number;
  /** Indices of the sources that may serve it. */
  readonly candidates: readonly number[];
}

/**
 * What a correction brings of parameter q over its whole length is at most `open`. The length is
 * amount ÷ rate, so that divided by it this too is linear in litres a day:
 * Σ (effect on q − open ÷ amount × effect on p) × litres ≤ 0.
 */
function overWholeLength(numbers: PlanNumbers, task: Task, q: number, open: number): number[] {
  const { parameter: p, amount, candidates } = task;
  const own = scaledEffects(numbers, p, candidates);
  const ratio = (Math.max(0, open) / amount) * (numbers.dayScale[p]! / numbers.dayScale[q]!);
  const scale = Math.max(1, ratio);
  return scaledEffects(numbers, q, candidates).map((value, column) => (value - ratio * own[column]!) / scale);
}

/** Weightier parameters aren't pushed above what is open of them, and none above its greatest value. */
export function wholeLengthRows(numbers: PlanNumbers, ledger: Ledger, task: Task): LimitRow[] {
  const { parameter: p, candidates } = task;
  return numbers.parameters.flatMap(({ name, now, max, heldBack }, q) => {
    if (q === p || !candidates.some((j) => numbers.effect[q]![j]! > 0)) return [];
    const rows: LimitRow[] = [];
    const row = (open: number, by: string): LimitRow => ({
      coefficients: overWholeLength(numbers, task, q, open),
      atMost: 0,
      by,
    });
    if (now !== null && max !== null) {
      rows.push(row(max - now - ledger.rising[q]! - ledger.broughtUp[q]!, `${name} max`));
    }
    if (q < p) rows.push(row(heldBack === null ? openAmount(numbers, ledger, q) : 0, name));
    return rows;
  });
}

/**
 * What is to be made small though it isn't forbidden, one more variable a row: first what lighter parameters
 * are brought above their aim, then what is taken of the room under `rise` that their own corrections need.
 */
export function burdenRows(numbers: PlanNumbers, ledger: Ledger, task: Task): LinearRow[] {
  const { parameter: p, candidates } = task;
  const lighter = numbers.parameters
    .map((_, q) => q)
    .filter((q) => q > p && numbers.parameters[q]!.now !== null);
  const overshoots = lighter.map((q) => ({
    coefficients: overWholeLength(numbers, task, q, openAmount(numbers, ledger, q)),
    atMost: 0,
  }));
  const hindrances = lighter
    .filter((q) => Number.isFinite(ledger.rooms[q]!.up) && wishedPerDay(numbers, ledger, q) > 0)
    .map((q) => ({
      coefficients: scaledEffects(numbers, q, candidates),
      atMost: Math.max(0, ledger.rooms[q]!.up - wishedPerDay(numbers, ledger, q)) / numbers.dayScale[q]!,
    }));
  const rows = [...overshoots, ...hindrances];
  return rows.map(({ coefficients, atMost }, index) => ({
    coefficients: [...coefficients, ...rows.map((_, other) => (other === index ? -1 : 0))],
    atMost,
  }));
}
