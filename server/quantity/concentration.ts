/**
 * Values of parameters as written: alkalinity, dissolved elements, salinity, temperature, pH; their rates and
 * differences; strengths of solutions; uptakes. What needs a molar mass or a density is only sorted here, and
 * turned into one unit in `culture/`.
 */

import type { Parameter } from "../../grammar/parameters.ts";
import type { QuantityText } from "../../grammar/syntax.ts";
import type { Dimension } from "../../grammar/units.ts";
import type { Amount, Ask, Manner, SalinityBase, Written } from "./amount.ts";
import type { Decimal34 } from "./decimal.ts";
import { type Measured, measuredUnit, numberOf, plainNumber, sameDimension, without } from "./dimension.ts";
import { dissolved } from "./dissolved.ts";
import { bad, good, type Reading } from "./finding.ts";
import { inBase } from "./plain.ts";
import { withUnitsMeant } from "./unit-slips.ts";

export const asValue: Manner = { difference: false, rate: false };
export const asDifference: Manner = { difference: true, rate: false };
export const asRate: Manner = { difference: true, rate: true };

const examplesOf = (parameter: Parameter, manner: Manner): readonly string[] => {
  const plain = {
    alkalinity: ["dKH", "meq/L"],
    dissolved: ["mg/L", "mmol/L"],
    salinity: ["no unit", "ppt"],
    temperature: ["degC", "degF"],
    pH: ["no unit", "total"],
  }[parameter.measure];
  return manner.rate
    ? plain.map((unit) => (unit === "no unit" || unit === "total" ? "/day" : `${unit}/day`))
    : plain;
};

/** Reads a value, difference or rate of a parameter in the water. */
export function readConcentration(
  quantity: QuantityText,
  parameter: Parameter,
  manner: Manner,
): Reading<Written> {
  const expected = `${parameter.name}${manner.rate ? " over time" : ""}`;
  const ask: Ask = {
    expected,
    examples: examplesOf(parameter, manner),
    parameter,
    pers: ["litre", "kilogram"],
    manner,
  };
  return readAsked(quantity, ask);
}

/** Reads the strength of a bought solution: an amount in a volume of it. */
export function readStrength(quantity: QuantityText, parameter: Parameter): Reading<Written> {
  const examples = parameter.measure === "alkalinity" ? ["meq/mL", "g/L as CaCO3"] : ["mg/mL", "mmol/mL"];
  return readAsked(quantity, {
    expected: "a strength",
    examples,
    parameter,
    pers: ["litre"],
    manner: asValue,
  });
}

/** Reads what the whole system takes: a change of the water over time, or an amount over time. */
export function readUptake(quantity: QuantityText, parameter: Parameter): Reading<Written> {
  const examples = parameter.measure === "alkalinity" ? ["dKH/day", "meq/day"] : ["mg/L/day", "g/day"];
  return readAsked(quantity, {
    expected: "an uptake",
    examples,
    parameter,
    pers: ["litre", "kilogram", "whole"],
    manner: asRate,
  });
}

/** Reads what a cohort takes: an amount over time, of all, of a piece (`each`), or over an area. Always of alkalinity. */
export function readCohortUptake(quantity: QuantityText, alkalinity: Parameter): Reading<Written> {
  const examples = ["meq/day", "mmol/day as CaCO3"];
  return readAsked(quantity, {
    expected: "an uptake",
    examples,
    parameter: alkalinity,
    pers: ["whole", "area"],
    manner: asRate,
  });
}

function readAsked(quantity: QuantityText, ask: Ask): Reading<Written> {
  const number = numberOf(quantity);
  if (!number.ok) return number;
  const fits = (text: string, difference: boolean): boolean => {
    const other = measuredUnit(text === "" ? null : { text, start: 0, end: 0 });
    return other.ok && sortAmount(quantity, ask, number.value, other.value, difference).ok;
  };
  const unit = measuredUnit(quantity.unit);
  if (!unit.ok)
    return withUnitsMeant(unit.finding, quantity.unit?.text ?? "", (text) =>
      fits(text, ask.manner.difference),
    );
  const sorted = sortAmount(quantity, ask, number.value, unit.value, ask.manner.difference);
  if (!sorted.ok) return sorted;
  if (!quantity.uncertainty) return good({ amount: sorted.value, uncertainty: null }, sorted.notes);
  const deviation = plainNumber(quantity.uncertainty.number);
  if (!deviation.ok) return deviation;
  const own = measuredUnit(quantity.uncertainty.unit);
  if (!own.ok)
    return withUnitsMeant(
      own.finding,
      quantity.uncertainty.unit?.text ?? "",
      (text) => text === "%" || fits(text, true),
    );
  if (own.value?.spelling === "%") {
    const share = deviation.value.mul(own.value.factor).mul(sorted.value.value).abs();
    return good({ amount: sorted.value, uncertainty: { ...sorted.value, value: share } }, sorted.notes);
  }
  const difference = sortAmount(quantity, ask, deviation.value, own.value ?? unit.value, true);
  if (!difference.ok) return difference;
  return good({ amount: sorted.value, uncertainty: difference.value }, [
    ...sorted.notes,
    ...difference.notes,
  ]);
}

/** Finds out what sort of amount a number with this unit is, or what is wrong with it. */
function sortAmount(
  quantity: QuantityText,
  ask: Ask,
  number: Decimal34,
  unit: Measured | null,
  difference: boolean,
): Reading<Amount> {
  const { measure } = ask.parameter;
  const asCaCO3 = quantity.asCaCO3 !== null;
  const wrong = (): Reading<never> =>
    bad({
      code: "unit/dimension",
      span: quantity.unit ?? quantity.number,
      unit: `${unit?.spelling ?? ""}${asCaCO3 ? " as CaCO3" : ""}`,
      expected: ask.expected,
      examples: ask.examples,
    });
  if (!unit) {
    if (asCaCO3) return missing(quantity, ask);
    if (measure === "salinity") return good({ sort: "salinity", by: "PSS-78", value: number, difference });
    if (measure === "pH") return good({ sort: "pH", scale: "NBS", value: number });
    return missing(quantity, ask);
  }
  // A bare rate (`0.5 /day`) and a rate without its time are told apart here.
  const still = ask.manner.rate ? timeless(unit, measure) : unit.dimension;
  if (!still) return wrong();
  const value = difference ? number.mul(unit.factor) : inBase(number, unit);
  if (measure === "alkalinity" || measure === "dissolved")
    return dissolved(quantity, ask, number, unit, still, wrong);
  if (asCaCO3) return wrong();
  if (measure === "temperature")
    return sameDimension(still, { temperature: 1 }) ? good({ sort: "temperature", value }) : wrong();
  // What cancels out (`mL/L`) is no bare number, though it has no dimension; a bare rate (`/day`) is.
  const bare = sameDimension(still, {}) && unit.spelling.startsWith("/");
  if (measure === "pH") {
    if (bare) return good({ sort: "pH", scale: "NBS", value });
    return sameDimension(still, { "pH on the total scale": 1 })
      ? good({ sort: "pH", scale: "total", value })
      : wrong();
  }
  if (bare || sameDimension(still, { salinity: 1 }))
    return good({ sort: "salinity", by: "PSS-78", value, difference });
  for (const by of salinityBases) {
    if (sameDimension(still, { [by]: 1 })) return good({ sort: "salinity", by, value, difference });
  }
  return wrong();
}

const salinityBases: readonly SalinityBase[] = [
  "specific gravity 25/25 °C",
  "specific gravity 20/20 °C",
  "specific gravity 60/60 °F",
  "conductivity",
];

/** The dimension with its `/time` taken off; null where it is no rate. */
function timeless(unit: Measured, measure: Parameter["measure"]): Dimension | null {
  const taken = without(unit.dimension, "time", -1);
  if (taken) return taken;
  return measure === "salinity" && (unit.dimension.time ?? 0) === 0 ? unit.dimension : null;
}

function missing(quantity: QuantityText, ask: Ask): Reading<never> {
  const { number } = quantity;
  return bad({
    code: "unit/missing",
    span: number,
    number: number.text,
    expected: ask.expected,
    examples: ask.examples,
  });
}
