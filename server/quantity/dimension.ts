/** Products of units: their factor and what they measure. */

import { nearestWords } from "../../grammar/nearest.ts";
import type { QuantityText, UnitWord } from "../../grammar/syntax.ts";
import { type Base, type Dimension, readUnit, unitTable } from "../../grammar/units.ts";
import { Decimal34, factorOf } from "./decimal.ts";
import { bad, good, type Reading } from "./finding.ts";

/** A unit worked out: how many base units one is, and of what. */
export interface Measured {
  readonly spelling: string;
  readonly factor: Decimal34;
  readonly dimension: Dimension;
  /** Taken off first where the number is no difference (degF). */
  readonly zero: Decimal34 | null;
}

/** The unit of a quantity worked out; null for a bare number. */
export function measuredUnit(unit: UnitWord | null): Reading<Measured | null> {
  if (!unit) return good(null);
  const reading = readUnit(unit.text);
  if (!reading.known) {
    const spellings = unitTable.map((row) => row.spelling);
    return bad({
      code: "unit/unknown",
      span: unit,
      word: reading.part,
      nearest: nearestWords(reading.part, spellings),
    });
  }
  let factor = new Decimal34(1);
  const powers = new Map<Base, number>();
  for (const { row, power } of reading.unit.parts) {
    const own = factorOf(row.factor);
    factor = power === 1 ? factor.mul(own) : factor.div(own);
    for (const [base, exponent] of Object.entries(row.measures) as [Base, number][]) {
      powers.set(base, (powers.get(base) ?? 0) + power * exponent);
    }
  }
  const dimension = Object.fromEntries([...powers].filter(([, exponent]) => exponent !== 0)) as Dimension;
  const first = reading.unit.parts[0]?.row;
  // A zero point means something for a temperature alone, not for a rate of one.
  const zero = first?.zero && reading.unit.parts.length === 1 ? new Decimal34(first.zero) : null;
  return good({ spelling: reading.unit.spelling, factor, dimension, zero });
}

export function sameDimension(left: Dimension, right: Dimension): boolean {
  const bases = new Set([...Object.keys(left), ...Object.keys(right)]) as Set<Base>;
  return [...bases].every((base) => (left[base] ?? 0) === (right[base] ?? 0));
}

/** The dimension with a power of one base taken off, or null where it doesn't hold just that power. */
export function without(dimension: Dimension, base: Base, power: number): Dimension | null {
  if ((dimension[base] ?? 0) !== power) return null;
  const { [base]: _, ...rest } = dimension;
  return rest;
}

/** The number of a quantity, exactly. Absurd lengths are refused rather than carried along. */
export function numberOf(quantity: QuantityText): Reading<Decimal34> {
  return plainNumber(quantity.number);
}

export function plainNumber(number: QuantityText["number"]): Reading<Decimal34> {
  if (!/^-?\d{1,15}(\.\d{1,30})?$/.test(number.text)) {
    return bad({ code: "syntax/number-form", span: number, word: number.text, readings: [] });
  }
  return good(new Decimal34(number.text));
}
