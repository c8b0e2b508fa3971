/**
 * Values of parameters as written: alkalinity, dissolved elements, salinity, temperature, pH; their rates and
 * differences; strengths of solutions; uptakes. What needs a molar mass or a density is only sorted here, and
 * turned into one unit in `culture/`.
 */

import type { Parameter } from "../../grammar/parameters.ts";
import type { QuantityText } from "../../grammar/syntax.ts";
import { type Base, type Dimension, unitTable } from "../../grammar/units.ts";
import type { Decimal34 } from "./decimal.ts";
import { type Measured, measuredUnit, numberOf, plainNumber, sameDimension, without } from "./dimension.ts";
import { bad, good, type QuantityFinding, type Reading } from "./finding.ts";
import { inBase } from "./plain.ts";

/** In mg, mmol, meq; `as CaCO3` is mg or mmol of CaCO3. */
export type Substance = "mass" | "moles" | "equivalents" | "mass as CaCO3" | "moles as CaCO3";

/** A value with the sort of thing it counts. */
export type Amount =
  | {
      readonly sort: "dissolved";
      readonly substance: Substance;
      readonly per: "litre" | "kilogram" | "area" | "whole";
      readonly value: Decimal34;
    }
  | {
      readonly sort: "salinity";
      readonly by: "PSS-78" | SalinityBase;
      readonly value: Decimal34;
      /** A change, not a value: what it is in salinity depends on where it is taken. */
      readonly difference: boolean;
    }
  | { readonly sort: "temperature"; readonly value: Decimal34 }
  | { readonly sort: "pH"; readonly scale: "NBS" | "total"; readonly value: Decimal34 };

type SalinityBase = Extract<Base, `specific gravity ${string}` | "conductivity">;

/** An amount with what stands after `±`, as a difference of the same sort. */
export interface Written {
  readonly amount: Amount;
  readonly uncertainty: Amount | null;
}

/** How the number is to be read. */
export interface Manner {
  /** A change, spread or step: no zero point is taken off a temperature. */
  readonly difference: boolean;
  /** Over a time: the value is per day. */
  readonly rate: boolean;
}

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

interface Ask {
  readonly expected: string;
  readonly examples: readonly string[];
  readonly parameter: Parameter;
  readonly pers: readonly ("litre" | "kilogram" | "area" | "whole")[];
  readonly manner: Manner;
}

function readAsked(quantity: QuantityText, ask: Ask): Reading<Written> {
  const number = numberOf(quantity);
  if (!number.ok) return number;
  const unit = measuredUnit(quantity.unit);
  if (!unit.ok) return unit;
  const sorted = sortAmount(quantity, ask, number.value, unit.value, ask.manner.difference);
  if (!sorted.ok) return sorted;
  if (!quantity.uncertainty) return good({ amount: sorted.value, uncertainty: null }, sorted.notes);
  const deviation = plainNumber(quantity.uncertainty.number);
  if (!deviation.ok) return deviation;
  const own = measuredUnit(quantity.uncertainty.unit);
  if (!own.ok) return own;
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

const milli = 1000;

/** A number of mass, moles or equivalents in a litre, a kilogram, on an area, or in all. */
function dissolved(
  quantity: QuantityText,
  ask: Ask,
  number: Decimal34,
  unit: Measured,
  still: Dimension,
  wrong: () => Reading<never>,
): Reading<Amount> {
  const isAlkalinity = ask.parameter.measure === "alkalinity";
  const asCaCO3 = quantity.asCaCO3 !== null;
  // Read as mg/L wherever kits print it; alkalinity in it means CaCO3 or nothing.
  const ppm = sameDimension(still, { "parts per million": 1 });
  const notes: QuantityFinding[] = [];
  let kind: { readonly base: "mass" | "amount" | "equivalents"; readonly per: Ask["pers"][number] } | null =
    null;
  let value = number.mul(unit.factor);
  if (ppm) {
    kind = { base: "mass", per: "litre" };
    if (!asCaCO3)
      notes.push({ code: "unit/ppm", span: quantity.unit ?? quantity, number: quantity.number.text });
  } else {
    // A bare rate (`/day`) and volumes in a volume (`mL/L`) count nothing; without this they would pass for
    // grams in a gram.
    kind = countsMass(unit) || !sameDimension(still, {}) ? kindOf(still) : null;
    if (!kind) return wrong();
    // Masses are in g, so per litre they become mg; a kilogram is 1000 g.
    if (kind.base === "mass") value = value.mul(milli);
    if (kind.per === "kilogram") value = value.mul(milli);
  }
  if (!ask.pers.includes(kind.per)) return wrong();
  if (isAlkalinity) {
    if (asCaCO3) {
      if (kind.base === "equivalents") return wrong();
      return good(
        {
          sort: "dissolved",
          substance: kind.base === "mass" ? "mass as CaCO3" : "moles as CaCO3",
          per: kind.per,
          value,
        },
        notes,
      );
    }
    const ofUptake = kind.per === "whole" || kind.per === "area";
    if (kind.base === "mass" || (kind.base === "amount" && ofUptake)) {
      return bad({
        code: "unit/as-caco3",
        span: quantity.unit ?? quantity,
        unit: unit.spelling,
        written: false,
      });
    }
    // Moles of alkalinity are equivalents everywhere.
    return good({ sort: "dissolved", substance: "equivalents", per: kind.per, value }, notes);
  }
  if (kind.base === "equivalents") return wrong();
  if (asCaCO3) {
    const allowed =
      kind.base === "mass" && (ask.parameter.name === "calcium" || ask.parameter.name === "magnesium");
    if (!allowed)
      return bad({
        code: "unit/as-caco3",
        span: quantity.asCaCO3 ?? quantity,
        unit: unit.spelling,
        written: true,
      });
    return good({ sort: "dissolved", substance: "mass as CaCO3", per: kind.per, value }, notes);
  }
  return good(
    { sort: "dissolved", substance: kind.base === "mass" ? "mass" : "moles", per: kind.per, value },
    notes,
  );
}

const countsMass = ({ spelling }: Measured): boolean => {
  const row = unitTable.find((entry) => entry.spelling === spelling.split("/")[0]);
  return row !== undefined && sameDimension(row.measures, { mass: 1 });
};

/** Sorts a timeless dimension: what is counted, in what. */
function kindOf(
  still: Dimension,
): { base: "mass" | "amount" | "equivalents"; per: Ask["pers"][number] } | null {
  for (const base of ["amount", "equivalents"] as const) {
    const rest = without(still, base, 1);
    if (!rest) continue;
    if (sameDimension(rest, { length: -3 })) return { base, per: "litre" };
    if (sameDimension(rest, { mass: -1 })) return { base, per: "kilogram" };
    if (sameDimension(rest, { length: -2 })) return { base, per: "area" };
    if (sameDimension(rest, {})) return { base, per: "whole" };
  }
  if (sameDimension(still, { mass: 1, length: -3 })) return { base: "mass", per: "litre" };
  // Grams in a kilogram: the masses cancel.
  if (sameDimension(still, {})) return { base: "mass", per: "kilogram" };
  if (sameDimension(still, { mass: 1, length: -2 })) return { base: "mass", per: "area" };
  return sameDimension(still, { mass: 1 }) ? { base: "mass", per: "whole" } : null;
}

/** Reads CO2 in air or water, µatm; a share of dry air in ppm comes out as such. */
export function readCarbonDioxide(
  quantity: QuantityText,
): Reading<{ readonly value: Decimal34; readonly unit: "ppm" | "uatm" }> {
  const number = numberOf(quantity);
  if (!number.ok) return number;
  const unit = measuredUnit(quantity.unit);
  if (!unit.ok) return unit;
  const asked = { expected: "CO2", examples: ["ppm", "uatm"] };
  if (!unit.value)
    return bad({ code: "unit/missing", span: quantity.number, number: quantity.number.text, ...asked });
  const value = number.value.mul(unit.value.factor);
  if (!quantity.asCaCO3 && sameDimension(unit.value.dimension, { "parts per million": 1 }))
    return good({ value, unit: "ppm" });
  if (!quantity.asCaCO3 && sameDimension(unit.value.dimension, { "partial pressure": 1 }))
    return good({ value, unit: "uatm" });
  return bad({
    code: "unit/dimension",
    span: quantity.unit ?? quantity,
    unit: unit.value.spelling,
    ...asked,
  });
}
