/** What a unit is: what it measures, how else it is spelt, and what one of it is in another. */
import { type ParameterName, parameterOf, parameterTable } from "../../../grammar/parameters.ts";
import type { QuantityText } from "../../../grammar/syntax.ts";
import { type Base, readUnit, type UnitProduct, type UnitRow } from "../../../grammar/units.ts";
import {
  conductivityFromSalinity,
  type SpecificGravityScale,
  specificGravity,
  specificGravityScales,
} from "../../chemistry/salinity.ts";
import { densityKgPerL } from "../../chemistry/sea-water.ts";
import { alkalinity, inModelUnit } from "../../culture/convert.ts";
import { defaults } from "../../culture/defaults.ts";
import { readCarbonDioxide } from "../../quantity/carbon-dioxide.ts";
import {
  asRate,
  asValue,
  readCohortUptake,
  readConcentration,
  readStrength,
} from "../../quantity/concentration.ts";
import { Decimal34 } from "../../quantity/decimal.ts";
import { type Measured, measuredUnit, sameDimension } from "../../quantity/dimension.ts";
import { calledOf, plainKinds, readPlain } from "../../quantity/plain.ts";

export interface UnitTopic {
  readonly kind: "unit";
  readonly unit: string;
  /** Spellings that are read too and tidied. */
  readonly also: readonly string[];
  /** What it is, in words or in another unit; of each parameter in the unit of its ranges. */
  readonly is: readonly string[];
  /** What may be written in it. */
  readonly measures: readonly string[];
  /** The kind of thing that it counts, where nothing is written in it alone. */
  readonly counts: string;
}

const nowhere = { start: 0, end: 0 };
const caco3 = " as CaCO3";

/** One of a unit; `null` is a bare number. */
export function oneOf(unit: string | null): QuantityText {
  const asCaCO3 = unit?.endsWith(caco3) ?? false;
  const text = asCaCO3 ? unit!.slice(0, -caco3.length) : unit;
  return {
    ...nowhere,
    number: { ...nowhere, text: "1" },
    unit: text === null ? null : { ...nowhere, text },
    borrowedUnit: false,
    asCaCO3: asCaCO3 ? nowhere : null,
    uncertainty: null,
  };
}

/** Digits of a number that isn't exact. */
const digits = 5;
const mostDigits = 12;

const exact = (value: Decimal34): string =>
  (value.precision() <= mostDigits ? value : value.toSignificantDigits(digits)).toFixed();
const figure = (value: number): string => new Decimal34(value).toSignificantDigits(digits).toFixed();

/** The units that others are told in, first ones first. */
const references = [
  ...[
    "meq/L",
    "mmol/L",
    "mg/L",
    "L",
    "mL",
    "cm",
    "m",
    "m2",
    "cm2",
    "g",
    "kg",
    "mmol",
    "mol",
    "meq",
    "min",
    "h",
  ],
  ...["kg/L", "mL/min", "L/day", "g/day", "%/week", "mmol/kg", "meq/kg", "meq/day", "mmol/day", "meq/L/day"],
];

const measured = (unit: string): Measured | null => {
  const reading = measuredUnit(oneOf(unit).unit);
  return reading.ok ? reading.value : null;
};

/** `1 dKH = 0.35665 meq/L`; null where no other unit says more. */
function inOthers(unit: Measured): string | null {
  if (sameDimension(unit.dimension, {}) || unit.zero) return null;
  for (const spelling of references) {
    const other = measured(spelling);
    if (!other || spelling === unit.spelling || !sameDimension(other.dimension, unit.dimension)) continue;
    return `1 ${unit.spelling} = ${exact(unit.factor.div(other.factor))} ${spelling}`;
  }
  return null;
}

/** Water as it is where nothing says what it is. */
const salinity = defaults.salinity.value;
const degC = defaults.temperature.value;
const density = (): number => densityKgPerL(salinity, degC);

/** `1 dKH = 0.35665 meq/L`: of a parameter, in the unit of its ranges. Null where a factor doesn't tell it. */
export function inOwnUnit(parameter: ParameterName, unit: string): string | null {
  const row = parameterOf(parameter);
  if (!row || unit === row.unit || (row.measure !== "alkalinity" && row.measure !== "dissolved")) return null;
  const reading = readConcentration(oneOf(unit), row, asValue);
  if (!reading.ok) return null;
  const value = inModelUnit(reading.value.amount, row, density);
  if (value === null) return null;
  const perKilogram = reading.value.amount.sort === "dissolved" && reading.value.amount.per === "kilogram";
  const where = perKilogram ? `, at salinity ${defaults.salinity.text} and ${defaults.temperature.text}` : "";
  return `1 ${unit} = ${figure(value)} ${row.unit}${where}`;
}

/** Whether values of a parameter may be written so. */
export const mayBeWritten = (parameter: ParameterName, unit: string | null): boolean => {
  const row = parameterOf(parameter);
  return row !== undefined && readConcentration(oneOf(unit), row, asValue).ok;
};

/** What a salinity shows as on the instrument whose unit this is. */
function atStandardSalinity({ measures, spelling }: UnitRow): string | null {
  const shows = (value: number): string =>
    `${figure(value)} ${spelling} is a salinity of ${defaults.salinity.text}`;
  for (const base of Object.keys(measures) as Base[]) {
    if (base === "conductivity") {
      const value = conductivityFromSalinity(salinity, degC);
      return value === undefined ? null : `${shows(value)}, measured at ${defaults.temperature.text}`;
    }
    if (base.startsWith("specific gravity")) {
      const scale = base.slice("specific gravity ".length) as SpecificGravityScale;
      const at = specificGravityScales[scale];
      return `${shows(specificGravity(salinity, at, at))}, both waters at ${scale.split("/")[1]} (${scale})`;
    }
  }
  return null;
}

/** What no factor says. */
const inWords: Readonly<Record<string, string>> = {
  ppt: "Read as practical salinity (PSS-78), as is a bare number",
  degC: "A temperature in degrees Celsius; a difference of 1 degC is 1 K",
  degF: "32 degF is 0 degC and 212 degF is 100 degC; a difference of 1 degF is 0.55556 K",
  total: "After a pH: it is on the total scale. Without it a pH is on the NBS scale",
  ppm: "Of what is dissolved in water, read as mg/L; kits differ, so mg/L or mg/kg is better. Of CO2, its share of dry air in millionths",
  uatm: "A partial pressure: a millionth of a standard atmosphere",
  "%": "1 % = 0.01",
};

function meaningOf(unit: UnitProduct, whole: Measured, asCaCO3: boolean): string[] {
  const first = unit.parts.length === 1 ? unit.parts[0]?.row : undefined;
  const said = first ? [inWords[first.spelling] ?? null, atStandardSalinity(first)] : [];
  if (!asCaCO3) said.push(inOthers(whole));
  return said.filter((text) => text !== null);
}

/** In the units of their ranges, parameters whose values may be written so. */
function ofParameters(unit: string): string[] {
  const told = parameterTable.flatMap(({ name }) => {
    const text = inOwnUnit(name, unit);
    return text === null ? [] : [`${name}: ${text}`];
  });
  return told;
}

/** What may be written in a unit, found by asking those who read it. */
function measuredIn(unit: string): string[] {
  const one = oneOf(unit);
  const names = (parameters: readonly ParameterName[], tail: string) =>
    parameters.map((name) => `${name}${tail}`);
  const parametersWith = (reads: (row: (typeof parameterTable)[number]) => boolean) =>
    parameterTable.filter(reads).map(({ name }) => name);
  const values = parametersWith((row) => readConcentration(one, row, asValue).ok);
  return [
    ...plainKinds
      .filter((kind) => readPlain(one, kind).ok && !(values as readonly string[]).includes(kind))
      .map(calledOf),
    ...names(values, ""),
    ...names(
      parametersWith((row) => !values.includes(row.name) && readConcentration(one, row, asRate).ok),
      " over time",
    ),
    ...(parametersWith(
      (row) => row.measure !== "salinity" && row.measure !== "pH" && readStrength(one, row).ok,
    ).some((name) => name === "alkalinity" || name === "calcium")
      ? ["the strength of a bought solution"]
      : []),
    ...(readCohortUptake(one, alkalinity).ok ? ["the uptake of corals"] : []),
    ...(readCarbonDioxide(one).ok ? ["CO2"] : []),
  ];
}

/** A unit by any of its spellings, also a composed one; null where it is none. */
export function unitTopic(word: string): UnitTopic | null {
  const asCaCO3 = word.endsWith(caco3);
  const reading = readUnit(asCaCO3 ? word.slice(0, -caco3.length) : word);
  if (!reading.known) return null;
  const { unit: product } = reading;
  const whole = measured(product.spelling);
  if (!whole) return null;
  const unit = `${product.spelling}${asCaCO3 ? caco3 : ""}`;
  const measures = measuredIn(unit);
  // `as CaCO3` after what can't be counted so, and products of nothing that is measured, are no units.
  if (measures.length === 0 && (asCaCO3 || product.parts.length > 1)) return null;
  const is = meaningOf(product, whole, asCaCO3);
  const single = product.parts.length === 1 ? product.parts[0]?.row : undefined;
  const own = ofParameters(unit).filter((text) => !is.some((other) => text.endsWith(`: ${other}`)));
  return {
    kind: "unit",
    unit,
    also: single?.also ?? [],
    is: [...is, ...own],
    measures,
    counts: single?.kind ?? "",
  };
}
