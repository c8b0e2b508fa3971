/** From amounts as written to one unit a parameter: meq/L, mg/L, PSS-78, °C, pH. Decimal in, a double out. */
import { type Parameter, parameterOf } from "../../grammar/parameters.ts";
import { molarMassText, parseFormula } from "../chemistry/formula.ts";
import {
  conductivityFromSalinity,
  salinityFromConductivity,
  salinityFromSpecificGravity,
  specificGravity,
  specificGravityScales,
} from "../chemistry/salinity.ts";
import type { Amount } from "../quantity/amount.ts";
import { Decimal34, toDouble } from "../quantity/decimal.ts";
import { defaults } from "./defaults.ts";

/** Molar mass of a formula in decimal, g/mol, equal to mg/mmol. */
const molarMass = (formula: string): Decimal34 => {
  const parsed = parseFormula(formula);
  return new Decimal34(parsed.ok ? molarMassText(parsed.elements) : "0");
};

const calciumCarbonate = molarMass("CaCO3");
const massOf = new Map<string, Decimal34>();

function molarMassOf(parameter: Parameter): Decimal34 | null {
  if (!parameter.formula) return null;
  const known = massOf.get(parameter.formula) ?? molarMass(parameter.formula);
  massOf.set(parameter.formula, known);
  return known;
}

/** The alkalinity row of the parameter table. */
export const alkalinity: Parameter = parameterOf("alkalinity")!;

/**
 * An amount in the model's unit of its parameter. What is written for a kilogram is turned into a litre with
 * the water's density, kg/L; what is for an area or in all stays so. Null where no sea water answers.
 */
export function inModelUnit(
  amount: Amount,
  parameter: Parameter,
  densityKgPerL: () => number,
): number | null {
  switch (amount.sort) {
    case "temperature":
    case "pH":
      return toDouble(amount.value);
    case "salinity":
      return amount.difference
        ? salinityChange(amount.by, amount.value)
        : salinityOf(amount.by, amount.value);
    case "dissolved": {
      const decimal = dissolvedAmount(amount, parameter);
      const value = decimal && toDouble(decimal);
      if (value === null) return null;
      return amount.per === "kilogram" ? value * densityKgPerL() : value;
    }
  }
}

/** Meters of conductivity show it as at this temperature. */
const conductivityDegC = 25;

function salinityOf(by: Extract<Amount, { sort: "salinity" }>["by"], value: Decimal34): number | null {
  const number = toDouble(value);
  if (number === null || by === "PSS-78") return number;
  const reading =
    by === "conductivity"
      ? salinityFromConductivity(number, conductivityDegC)
      : salinityFromSpecificGravity(number, by.slice("specific gravity ".length) as "25/25 °C");
  return reading.ok ? reading.salinity : null;
}

/**
 * A change of specific gravity or conductivity as one of salinity, by the slope at the default salinity: from
 * 25 to 42 it differs from that by less than 5 % (computed).
 */
function salinityChange(by: Extract<Amount, { sort: "salinity" }>["by"], value: Decimal34): number | null {
  const number = toDouble(value);
  if (number === null || by === "PSS-78") return number;
  const shown = (salinity: number): number => {
    if (by === "conductivity") return conductivityFromSalinity(salinity, conductivityDegC) ?? Number.NaN;
    const degC = specificGravityScales[by.slice("specific gravity ".length) as "25/25 °C"];
    return specificGravity(salinity, degC, degC);
  };
  const slope = shown(defaults.salinity.value + 0.5) - shown(defaults.salinity.value - 0.5);
  return slope > 0 ? number / slope : null;
}

/** In meq for alkalinity, in mg for the rest; per whatever it is per. */
function dissolvedAmount(
  amount: Extract<Amount, { sort: "dissolved" }>,
  parameter: Parameter,
): Decimal34 | null {
  const { substance, value } = amount;
  if (parameter.measure === "alkalinity") {
    if (substance === "mass as CaCO3") return value.mul(2).div(calciumCarbonate);
    if (substance === "moles as CaCO3") return value.mul(2);
    return substance === "equivalents" ? value : null;
  }
  const mass = molarMassOf(parameter);
  if (substance === "mass") return value;
  if (!mass) return null;
  if (substance === "moles") return value.mul(mass);
  return substance === "mass as CaCO3" ? value.mul(mass).div(calciumCarbonate) : null;
}
