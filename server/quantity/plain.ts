/** Quantities of one dimension: volumes, lengths, masses, times, flows. Values come out in base units. */
import type { QuantityText } from "../../grammar/syntax.ts";
import type { Dimension } from "../../grammar/units.ts";
import type { Decimal34 } from "./decimal.ts";
import { type Measured, measuredUnit, numberOf, plainNumber, sameDimension } from "./dimension.ts";
import { bad, good, type Reading } from "./finding.ts";
import { withUnitsMeant } from "./unit-slips.ts";

/** What a place in a statement asks for. */
interface Asked {
  readonly called: string;
  readonly dimension: Dimension;
  readonly examples: readonly [string, string];
}

/** Base units: L, dm, dm², g, day, °C, 1, g/L; a rate is a day. */
const asked = {
  volume: { called: "a volume", dimension: { length: 3 }, examples: ["L", "mL"] },
  length: { called: "a length", dimension: { length: 1 }, examples: ["cm", "m"] },
  area: { called: "an area", dimension: { length: 2 }, examples: ["m2", "cm2"] },
  mass: { called: "a mass", dimension: { mass: 1 }, examples: ["g", "kg"] },
  time: { called: "a time", dimension: { time: 1 }, examples: ["day", "h"] },
  temperature: { called: "a temperature", dimension: { temperature: 1 }, examples: ["degC", "degF"] },
  density: { called: "a density", dimension: { mass: 1, length: -3 }, examples: ["kg/L", "g/mL"] },
  share: { called: "a share", dimension: { share: 1 }, examples: ["%", "%"] },
  growth: { called: "a share over time", dimension: { share: 1, time: -1 }, examples: ["%/week", "%/day"] },
  flow: { called: "a volume over time", dimension: { length: 3, time: -1 }, examples: ["mL/min", "L/day"] },
  food: { called: "a mass over time", dimension: { mass: 1, time: -1 }, examples: ["g/day", "g/week"] },
} as const satisfies Record<string, Asked>;

export type PlainKind = keyof typeof asked;
export const plainKinds = Object.keys(asked) as readonly PlainKind[];
/** What a kind is called: `a volume`. */
export const calledOf = (kind: PlainKind): string => asked[kind].called;

/** A value in base units, with what stands after `±` in the same units. */
export interface PlainValue {
  readonly value: Decimal34;
  readonly uncertainty: Decimal34 | null;
}

/** Reads a quantity of one kind. A difference (`±`) has no zero point: 2 degF of it is 1.11 K. */
export function readPlain(quantity: QuantityText, kind: PlainKind): Reading<PlainValue> {
  const wanted = asked[kind];
  const number = numberOf(quantity);
  if (!number.ok) return number;
  const unit = measuredUnit(quantity.unit);
  if (!unit.ok) return withUnitsMeant(unit.finding, quantity.unit?.text ?? "", fitsIn(wanted.dimension));
  if (!unit.value) {
    return bad({
      code: "unit/missing",
      span: quantity.number,
      number: quantity.number.text,
      expected: wanted.called,
      examples: wanted.examples,
    });
  }
  if (quantity.asCaCO3 || !sameDimension(unit.value.dimension, wanted.dimension)) {
    return bad(wrongDimension(quantity, unit.value, wanted));
  }
  const uncertainty = readUncertainty(quantity, number.value, unit.value, wanted);
  if (!uncertainty.ok) return uncertainty;
  return good({ value: inBase(number.value, unit.value), uncertainty: uncertainty.value });
}

const fitsIn =
  (dimension: Dimension) =>
  (text: string): boolean => {
    const unit = measuredUnit({ text, start: 0, end: 0 });
    return unit.ok && unit.value !== null && sameDimension(unit.value.dimension, dimension);
  };

export function inBase(number: Decimal34, unit: Measured): Decimal34 {
  return (unit.zero ? number.sub(unit.zero) : number).mul(unit.factor);
}

function wrongDimension(
  quantity: QuantityText,
  unit: Measured,
  wanted: { called: string; examples: readonly string[] },
) {
  return {
    code: "unit/dimension",
    span: quantity.unit ?? quantity,
    unit: quantity.asCaCO3 ? `${unit.spelling} as CaCO3` : unit.spelling,
    expected: wanted.called,
    examples: wanted.examples,
  } as const;
}

/** What stands after `±`, in the base units of the quantity; a share is one of the number itself. */
function readUncertainty(
  quantity: QuantityText,
  number: Decimal34,
  unit: Measured,
  wanted: { called: string; dimension: Dimension; examples: readonly string[] },
): Reading<Decimal34 | null> {
  if (!quantity.uncertainty) return good(null);
  const amount = plainNumber(quantity.uncertainty.number);
  if (!amount.ok) return amount;
  const own = measuredUnit(quantity.uncertainty.unit);
  if (!own.ok) {
    const fits = fitsIn(wanted.dimension);
    return withUnitsMeant(
      own.finding,
      quantity.uncertainty.unit?.text ?? "",
      (text) => text === "%" || fits(text),
    );
  }
  if (!own.value) return good(amount.value.mul(unit.factor));
  if (own.value.spelling === "%")
    return good(amount.value.mul(own.value.factor).mul(inBase(number, unit)).abs());
  if (!sameDimension(own.value.dimension, wanted.dimension)) {
    return bad({ ...wrongDimension(quantity, own.value, wanted), span: quantity.uncertainty });
  }
  return good(amount.value.mul(own.value.factor));
}
