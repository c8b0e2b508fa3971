/** Units whose numbers depend on the water: salinity, pH, CO2, what is counted in a kilogram. */
import type { Parameter } from "../../../grammar/parameters.ts";
import type { QuantityText } from "../../../grammar/syntax.ts";
import { figure } from "../../checks/figures.ts";
import { pco2OfAir } from "../../chemistry/carbon-before.ts";
import { nbsFromTotal, totalFromNbs } from "../../chemistry/carbonate-system.ts";
import { constantsAt } from "../../chemistry/constants-at.ts";
import {
  conductivityFromSalinity,
  type SpecificGravityScale,
  specificGravity,
  specificGravityScales,
} from "../../chemistry/salinity.ts";
import { densityOf } from "../../culture/binder.ts";
import { inModelUnit } from "../../culture/convert.ts";
import { defaults } from "../../culture/defaults.ts";
import { factAt } from "../../culture/history.ts";
import type { Assumption } from "../../culture/model.ts";
import { salinityNow, temperatureNow } from "../../dosing/dose-chemistry.ts";
import type { WaterState } from "../../dosing/water-state.ts";
import type { Amount } from "../../quantity/amount.ts";
import { readCarbonDioxide } from "../../quantity/carbon-dioxide.ts";
import { toDouble } from "../../quantity/decimal.ts";
import { digits, papers } from "./parts.ts";
import type { Spot } from "./spot.ts";

export interface OtherUnits {
  /** `2.82 meq/L`. */
  readonly texts: readonly string[];
  readonly assumptions: readonly Assumption[];
  readonly sources: readonly string[];
}

/** Digits that a number has, and no more than tell something. */
const leastDigits = 3;
const mostDigits = 6;

export const digitsOf = ({ number }: QuantityText): number => {
  const written = number.text.replace(/^-?[0.]*|\./g, "").length;
  return Math.min(Math.max(written, leastDigits), mostDigits);
};

/** A change of temperature has no zero point. */
export function temperatureChange(quantity: QuantityText, over: string): OtherUnits | null {
  const { number, unit } = quantity;
  const size = Number(number.text);
  const isCelsius = unit?.text === `degC${over}`;
  if (!Number.isFinite(size) || (!isCelsius && unit?.text !== `degF${over}`)) return null;
  const other = isCelsius
    ? `${digits(size * 1.8, digitsOf(quantity))} degF`
    : `${digits(size / 1.8, digitsOf(quantity))} degC`;
  return { texts: [`${other}${over}`], assumptions: [], sources: [] };
}

/** A spot with the water of another moment than now, where that is meant. */
export interface InWater extends Spot {
  readonly state: WaterState | null;
}

/** The water that a kilogram is taken of: the system's as it is carried, the salt water's own, else the usual one. */
export function waterHere(spot: InWater) {
  const { assessment, state } = spot;
  const stated = assessment ? null : statedSalinity(spot);
  const salinity = assessment
    ? salinityNow(state ?? assessment.state, assessment.constants, null)
    : (stated?.salinity ?? defaults.salinity.value);
  const temperatureDegC = assessment
    ? temperatureNow(state ?? assessment.state, assessment.constants, null)
    : defaults.temperature.value;
  const value = `${digits(densityOf({ salinity, temperatureDegC }), 5)} kg/L, of salinity ${figure(salinity, "salinity")} at ${figure(temperatureDegC, "°C")}`;
  const basis = assessment
    ? `the water of ${assessment.system.name} ${state ? "then" : "now"}`
    : stated
      ? `salinity of ${stated.name}, temperature by common practice`
      : defaults.salinity.basis;
  return { salinity, temperatureDegC, assumption: { what: "density of the water", value, basis } };
}

/** The salinity of the salt water whose section the spot is in. */
function statedSalinity({
  farm,
  model,
  under,
  at,
}: Spot): { readonly name: string; readonly salinity: number } | null {
  const { section } = under.line;
  if (section?.kind !== "saltwater" || !section.name) return null;
  const seen = farm.bound.names.visible.get(under.cursor.file)?.get(section.name.text);
  const salinity = factAt(model.waters.get(seen?.ref ?? "")?.values.get("salinity"), at)?.value;
  return seen && salinity !== undefined ? { name: seen.name, salinity } : null;
}

/** What the other instruments would show. */
export function salinityUnits(
  quantity: QuantityText,
  amount: Extract<Amount, { sort: "salinity" }>,
  parameter: Parameter,
): OtherUnits | null {
  if (amount.difference) return null;
  const salinity = inModelUnit(amount, parameter, () => 1);
  if (salinity === null || !(salinity >= 0) || salinity > 60) return null;
  const gravity = (scale: SpecificGravityScale) =>
    specificGravity(salinity, specificGravityScales[scale], specificGravityScales[scale]).toFixed(4);
  const conductivity = conductivityFromSalinity(salinity, 25);
  const all: readonly (readonly [unit: string, text: string])[] = [
    ["", `salinity ${digits(salinity, 3)}`],
    ["SG", `${gravity("25/25 °C")} SG`],
    ["SG20", `${gravity("20/20 °C")} SG20`],
    ["mS/cm", conductivity === undefined ? "" : `${digits(conductivity, 3)} mS/cm at 25 °C`],
  ];
  const own = quantity.unit?.text === "ppt" ? "" : (quantity.unit?.text ?? "");
  return {
    texts: all.flatMap(([unit, text]) => (unit === own || text === "" ? [] : [text])),
    assumptions: [],
    sources: [papers.salinity, papers.density],
  };
}

/** A pH on the other scale. */
export function otherScale(
  spot: InWater,
  { number }: QuantityText,
  { scale }: Extract<Amount, { sort: "pH" }>,
): OtherUnits | null {
  const water = waterHere(spot);
  const constants = constantsAt(water.salinity, water.temperatureDegC);
  const value = Number(number.text);
  if (!constants.ok || !Number.isFinite(value) || value < 0 || value > 14) return null;
  const text =
    scale === "total"
      ? `${figure(nbsFromTotal(value, constants), "pH")} on the NBS scale`
      : `${figure(totalFromNbs(value, constants), "pH")} on the total scale`;
  const { salinity, temperatureDegC } = water;
  const basis = water.assumption.basis;
  const at = `salinity ${figure(salinity, "salinity")}, ${figure(temperatureDegC, "°C")}`;
  return { texts: [text], assumptions: [{ what: "water", value: at, basis }], sources: [papers.nbs] };
}

export function carbonDioxide(spot: InWater, quantity: QuantityText): OtherUnits | null {
  const read = readCarbonDioxide(quantity);
  const value = read.ok ? toDouble(read.value.value) : null;
  const water = waterHere(spot);
  const constants = constantsAt(water.salinity, water.temperatureDegC);
  if (!read.ok || value === null || !constants.ok) return null;
  const one = pco2OfAir(1, constants);
  const text =
    read.value.unit === "ppm"
      ? `${digits(value * one, 3)} uatm over water`
      : `${digits(value / one, 3)} ppm of dry air`;
  const { basis } = water.assumption;
  const at = figure(water.temperatureDegC, "°C");
  return {
    texts: [text],
    assumptions: [
      { what: "temperature of the water", value: at, basis },
      { what: "air over the water", value: "moist, at one atmosphere", basis: "common practice" },
    ],
    sources: [papers.air],
  };
}
