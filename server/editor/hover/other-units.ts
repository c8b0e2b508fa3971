/** A quantity in the other units of its kind, by what it is of. */
import type { QuantityText } from "../../../grammar/syntax.ts";
import { densityOf } from "../../culture/binder.ts";
import { inModelUnit } from "../../culture/convert.ts";
import type { WaterState } from "../../dosing/water-state.ts";
import type { Amount } from "../../quantity/amount.ts";
import { toDouble } from "../../quantity/decimal.ts";
import { measuredUnit, numberOf, sameDimension } from "../../quantity/dimension.ts";
import { inBase } from "../../quantity/plain.ts";
import { oneOf } from "../../report/explain/units.ts";
import { type Measured, quantitiesOf } from "../quantities.ts";
import { digits, papers } from "./parts.ts";
import type { Spot } from "./spot.ts";
import {
  carbonDioxide,
  digitsOf,
  type InWater,
  type OtherUnits,
  otherScale,
  salinityUnits,
  temperatureChange,
  waterHere,
} from "./water-units.ts";

/** A quantity in the other units of its kind; null where it can't be read. */
export function otherUnits(
  spot: Spot,
  quantity: QuantityText,
  state: WaterState | null = null,
): OtherUnits | null {
  const { statement } = spot;
  if (statement.kind === "air") return carbonDioxide({ ...spot, state }, quantity);
  const measured = quantitiesOf(statement).find((each) => each.quantity === quantity)?.measured;
  const isShare = quantity.unit?.text === "%";
  if (measured?.of !== "parameter" || isShare) return plainUnits(quantity);
  return concentration({ ...spot, state }, quantity, measured);
}

type OfParameter = Extract<Measured, { readonly of: "parameter" }>;

/** What its units are per, where a quantity is over time. */
const overTime: Readonly<Record<OfParameter["manner"], string>> = {
  value: "",
  difference: "",
  strength: "",
  rate: "/day",
  uptake: "/day",
  "cohort uptake": "/day",
};

/** Units that a parameter is told in, by what its amounts are per. */
const spellings = {
  alkalinity: {
    litre: ["dKH", "meq/L", "umol/kg", "mg/L as CaCO3"],
    strength: ["meq/mL", "g/L as CaCO3"],
    whole: ["meq", "mmol as CaCO3", "g as CaCO3"],
    area: ["meq/m2", "mmol/m2 as CaCO3", "g/m2 as CaCO3"],
  },
  dissolved: {
    litre: ["mg/L", "mg/L as CaCO3", "mg/kg", "mmol/L", "umol/L"],
    strength: ["mg/mL", "mmol/mL", "g/L"],
    whole: ["mg", "g", "mmol"],
    area: [],
  },
} as const;

function concentration(
  spot: InWater,
  quantity: QuantityText,
  { parameter, manner, read }: OfParameter,
): OtherUnits | null {
  const over = overTime[manner];
  const isValue = manner !== "difference" && over === "";
  const reading = read(quantity);
  if (!reading.ok) return plainUnits(quantity);
  const { amount } = reading.value;
  if (amount.sort === "salinity") return salinityUnits(quantity, amount, parameter);
  if (amount.sort === "temperature")
    return isValue ? plainUnits(quantity) : temperatureChange(quantity, over);
  if (amount.sort === "pH") return isValue ? otherScale(spot, quantity, amount) : null;
  const water = waterHere(spot);
  const inModel = (of: Amount) => inModelUnit(of, parameter, () => densityOf(water));
  const value = inModel(amount);
  if (
    value === null ||
    parameter.measure === "salinity" ||
    parameter.measure === "temperature" ||
    parameter.measure === "pH"
  )
    return null;
  const per = manner === "strength" ? "strength" : amount.per === "kilogram" ? "litre" : amount.per;
  let perKilogram = amount.per === "kilogram";
  const texts = spellings[parameter.measure][per].flatMap((spelling) => {
    const unit = withTime(spelling, over);
    if (unit === `${quantity.unit?.text}${quantity.asCaCO3 ? " as CaCO3" : ""}`) return [];
    const one = read(oneOf(unit));
    const size = one.ok ? inModel(one.value.amount) : null;
    if (!size) return [];
    if (!isShownIn(unit, value / size)) return [];
    if (unit.includes("/kg")) perKilogram = true;
    return [`${digits(value / size, digitsOf(quantity))} ${unit}`];
  });
  return {
    texts,
    assumptions: perKilogram ? [water.assumption] : [],
    sources: perKilogram ? [papers.density] : [],
  };
}

/** Of moles in a litre one unit is enough: the one whose numbers are easy to read. */
function isShownIn(unit: string, value: number): boolean {
  if (unit.startsWith("mmol/L")) return Math.abs(value) >= 0.1;
  return !unit.startsWith("umol/L") || Math.abs(value) < 100;
}

/** `mmol as CaCO3` over a day is `mmol/day as CaCO3`. */
const withTime = (spelling: string, over: string): string => {
  const [unit = "", calcite] = spelling.split(" as ");
  return `${unit}${over}${calcite ? ` as ${calcite}` : ""}`;
};

/** Units of what has no parameter, by what they measure; first ones first. */
const plainSpellings: readonly (readonly string[])[] = [
  ["mL", "L", "gal"],
  ["mm", "cm", "m", "inch", "ft"],
  ["cm2", "m2"],
  ["g", "kg", "oz", "lb"],
  ["min", "h", "day", "week"],
  ["kg/L", "g/mL"],
  ["mL/min", "mL/h", "mL/day", "L/day", "gal/day"],
  ["g/day", "g/week", "kg/week"],
  ["%/day", "%/week"],
];

/** Numbers that a person would rather not read are left out. */
const readable = (value: number): boolean =>
  value === 0 || (Math.abs(value) >= 0.01 && Math.abs(value) < 1e5);

function plainUnits(quantity: QuantityText): OtherUnits | null {
  const measured = measuredUnit(quantity.unit);
  if (!measured.ok || !measured.value || quantity.asCaCO3) return null;
  const { value: own } = measured;
  const number = Number(quantity.number.text);
  if (!Number.isFinite(number)) return null;
  const plain = (texts: readonly string[]): OtherUnits => ({ texts, assumptions: [], sources: [] });
  if (own.zero !== null || own.spelling === "degC") {
    const other =
      own.spelling === "degC"
        ? `${digits(number * 1.8 + 32, digitsOf(quantity))} degF`
        : `${digits((number - 32) / 1.8, digitsOf(quantity))} degC`;
    return plain([other]);
  }
  if (own.spelling === "%") return plain([`a share of ${digits(number / 100, digitsOf(quantity))}`]);
  const read = numberOf(quantity);
  const base = read.ok ? toDouble(inBase(read.value, own)) : null;
  if (base === null) return null;
  const group = plainSpellings.find((units) => {
    const first = measuredUnit(oneOf(units[0] ?? null).unit);
    return first.ok && first.value !== null && sameDimension(first.value.dimension, own.dimension);
  });
  const texts = (group ?? []).flatMap((spelling) => {
    const other = measuredUnit(oneOf(spelling).unit);
    if (!other.ok || !other.value || spelling === own.spelling) return [];
    const value = base / other.value.factor.toNumber();
    return readable(value) ? [`${digits(value, digitsOf(quantity))} ${spelling}`] : [];
  });
  return plain(texts);
}
