/** A quantity in the other units of its kind, with the digits that are known of it. */
import { parameterOf } from "../../../grammar/parameters.ts";
import type { QuantityText } from "../../../grammar/syntax.ts";
import { unitTable } from "../../../grammar/units.ts";
import {
  conductivityFromSalinity,
  specificGravity,
  specificGravityScales,
} from "../../chemistry/salinity.ts";
import { inModelUnit } from "../../culture/convert.ts";
import type { Amount } from "../../quantity/amount.ts";
import { Decimal34 } from "../../quantity/decimal.ts";
import { measuredUnit, plainNumber } from "../../quantity/dimension.ts";
import { type PlainKind, readPlain } from "../../quantity/plain.ts";
import type { Measured } from "../quantities.ts";

/** As it is written behind a number; empty for none. */
export interface UnitText {
  readonly unit: string;
  readonly asCaCO3: boolean;
}

export const textOf = ({ unit, asCaCO3 }: UnitText): string => `${unit}${asCaCO3 ? " as CaCO3" : ""}`;

const bare = (units: readonly string[]): readonly UnitText[] =>
  units.map((unit) => ({ unit, asCaCO3: false }));
const calcite = (units: readonly string[]): readonly UnitText[] =>
  units.map((unit) => ({ unit, asCaCO3: true }));
const over = (units: readonly UnitText[], times: readonly string[]): readonly UnitText[] =>
  times.flatMap((time) => units.map(({ unit, asCaCO3 }) => ({ unit: `${unit}/${time}`, asCaCO3 })));
const ofKind = (kind: string): readonly string[] =>
  unitTable.filter((row) => row.kind === kind).map(({ spelling }) => spelling);

const times = ofKind("time");
/** What changes over a day is told by these. */
const longTimes = ["h", "day", "week"];

const plainUnits: Readonly<Record<PlainKind, readonly UnitText[]>> = {
  volume: bare(ofKind("volume")),
  length: bare(ofKind("length")),
  area: bare(ofKind("area")),
  mass: bare(ofKind("mass")),
  time: bare(times),
  temperature: bare(ofKind("temperature")),
  density: bare(["kg/L", "g/mL"]),
  share: [],
  growth: over(bare(["%"]), ["day", "week"]),
  flow: over(bare(ofKind("volume")), times),
  food: over(bare(ofKind("mass")), longTimes),
};

/** The reader of the place refuses what doesn't fit it, so these lists may be generous. */
function unitsFor(measured: Measured): readonly UnitText[] {
  if (measured.of === "plain") return plainUnits[measured.kind];
  const { measure } = measured.parameter;
  if (measure === "pH") return [];
  if (measure === "temperature") return forManner(measured, bare(["degC", "degF"]));
  if (measure === "salinity") return forManner(measured, bare(["", "ppt", "SG", "SG20", "SG60F", "mS/cm"]));
  if (measured.manner === "strength")
    return [
      ...bare(["meq/mL", "meq/L", "mg/mL", "g/L", "mmol/mL", "mmol/L", "mol/L"]),
      ...calcite(["g/L", "mg/mL"]),
    ];
  const inWater = [
    ...bare(measure === "alkalinity" ? ["dKH", "meq/L", "mmol/L", "umol/kg"] : []),
    ...bare(measure === "dissolved" ? ["mg/L", "mmol/L", "umol/L", "mg/kg", "mmol/kg", "umol/kg"] : []),
    ...calcite(["mg/L"]),
  ];
  const amounts = [...bare(["meq", "mmol", "mol", "mg", "g"]), ...calcite(["mmol", "mol", "mg", "g"])];
  if (measured.manner === "cohort uptake")
    return over([...amounts, ...over(amounts, ["m2", "cm2"])], longTimes);
  return measured.manner === "uptake"
    ? over([...inWater, ...amounts], longTimes)
    : forManner(measured, inWater);
}

const forManner = (measured: Measured, units: readonly UnitText[]): readonly UnitText[] =>
  measured.of === "parameter" && measured.manner === "rate" ? over(units, longTimes) : units;

export interface InOtherUnit extends UnitText {
  readonly number: string;
  /** What stands behind `±`, where that changes too. */
  readonly uncertainty: string | null;
  /** kg/L, where a value for a litre became one for a kilogram or the reverse. */
  readonly densityKgPerL: number | null;
}

/** A quantity in every other unit that it can be written in. */
export function inOtherUnits(
  quantity: QuantityText,
  measured: Measured,
  densityKgPerL: () => number,
): readonly InOtherUnit[] {
  const own = unitOf(quantity);
  return unitsFor(measured).flatMap((unit) => {
    if (textOf(unit) === textOf(own)) return [];
    const found = inUnit(quantity, measured, unit, densityKgPerL);
    return found ? [found] : [];
  });
}

export const unitOf = ({ unit, asCaCO3 }: QuantityText): UnitText => ({
  unit: unit?.text ?? "",
  asCaCO3: asCaCO3 !== null,
});

/** A number of the old unit → one of the new. */
type Convert = (number: Decimal34) => Decimal34 | null;

/** The same in one other unit; null where that can't be, or would be a number that nobody reads with ease. */
export function inUnit(
  quantity: QuantityText,
  measured: Measured,
  unit: UnitText,
  densityKgPerL: () => number,
): InOtherUnit | null {
  const found =
    measured.of === "plain"
      ? plainWay(quantity, measured.kind, unit)
      : parameterWay(quantity, measured, unit, densityKgPerL);
  const isRate = times.some((time) => unit.unit.endsWith(`/${time}`));
  const number = found && written(quantity.number.text, found.value, isRate ? readableRate : readable);
  if (!found || number === null) return null;
  const { uncertainty } = quantity;
  if (!uncertainty || !isOwnUnit(quantity))
    return { ...unit, number, uncertainty: null, densityKgPerL: found.density };
  const deviation = written(uncertainty.number.text, found.difference, anySize);
  return deviation === null
    ? null
    : { ...unit, number, uncertainty: deviation, densityKgPerL: found.density };
}

/** True where what stands behind `±` is in the unit of the number. */
const isOwnUnit = ({ uncertainty, unit }: QuantityText): boolean =>
  uncertainty !== null && (uncertainty.unit === null || uncertainty.unit.text === unit?.text);

interface Way {
  readonly value: Convert;
  readonly difference: Convert;
  readonly density: number | null;
}

/** The same quantity with another number and unit, and nothing behind. */
const withUnit = (quantity: QuantityText, number: string, { unit, asCaCO3 }: UnitText): QuantityText => ({
  ...quantity,
  number: { ...quantity.number, text: number },
  unit: unit === "" ? null : { start: 0, end: 0, text: unit },
  asCaCO3: asCaCO3 ? { start: 0, end: 0 } : null,
  uncertainty: null,
});

function plainWay(quantity: QuantityText, kind: PlainKind, unit: UnitText): Way | null {
  const from = measuredUnit(quantity.unit);
  const to = measuredUnit({ start: 0, end: 0, text: unit.unit });
  if (!from.ok || !to.ok || !from.value || !to.value) return null;
  if (![quantity, withUnit(quantity, "1", unit)].every((each) => readPlain(each, kind).ok)) return null;
  const [old, next] = [from.value, to.value];
  const ratio = old.factor.div(next.factor);
  return {
    value: (number) =>
      number
        .sub(old.zero ?? 0)
        .mul(ratio)
        .add(next.zero ?? 0),
    difference: (number) => number.mul(ratio),
    density: null,
  };
}

function parameterWay(
  quantity: QuantityText,
  measured: Extract<Measured, { readonly of: "parameter" }>,
  unit: UnitText,
  densityKgPerL: () => number,
): Way | null {
  const { parameter, manner, read } = measured;
  if (parameter.measure === "temperature" && manner === "value")
    return plainWay(quantity, "temperature", unit);
  const amountOf = (number: string, as: UnitText): Amount | null => {
    const reading = read(withUnit(quantity, number, as));
    return reading.ok ? reading.value.amount : null;
  };
  const from = amountOf("1", unitOf(quantity));
  const to = amountOf("1", unit);
  if (!from || !to || from.sort !== to.sort || from.sort === "pH") return null;
  if (from.sort === "salinity" && to.sort === "salinity") return salinityWay(from, to);
  if (from.sort === "temperature" && to.sort === "temperature") return linear(from.value.div(to.value), null);
  if (from.sort !== "dissolved" || to.sort !== "dissolved") return null;
  const isSame = from.substance === to.substance;
  const ratio = isSame
    ? from.value.div(to.value)
    : ratioOf(
        inModelUnit(from, parameter, () => 1),
        inModelUnit(to, parameter, () => 1),
      );
  if (!ratio) return null;
  if (from.per === to.per) return linear(ratio, null);
  const pair = `${from.per} ${to.per}`;
  if (pair !== "kilogram litre" && pair !== "litre kilogram") return null;
  const density = densityKgPerL();
  return linear(pair === "kilogram litre" ? ratio.mul(density) : ratio.div(density), density);
}

function linear(ratio: Decimal34, density: number | null): Way | null {
  if (!ratio.isFinite() || ratio.isZero()) return null;
  return { value: (number) => number.mul(ratio), difference: (number) => number.mul(ratio), density };
}

/** Doubles hold some 15 digits; the last of them are of the computer's making. */
const doubleDigits = 14;

const ratioOf = (from: number | null, to: number | null): Decimal34 | null =>
  from !== null && to ? new Decimal34((from / to).toPrecision(doubleDigits)) : null;

type SalinityAmount = Extract<Amount, { readonly sort: "salinity" }>;

/** By the instrument's own scale; what stands behind `±` goes with it only where both count salinity. */
function salinityWay(from: SalinityAmount, to: SalinityAmount): Way | null {
  if (from.by === to.by) return linear(from.value.div(to.value), null);
  if (from.difference || to.difference) return null;
  const value: Convert = (number) => {
    const salinity = inModelUnit({ ...from, value: number }, salinityParameter, () => 1);
    if (salinity === null) return null;
    const shown = shownBy(to.by, salinity);
    return Number.isFinite(shown) ? new Decimal34(shown.toPrecision(doubleDigits)) : null;
  };
  return { value, difference: () => null, density: null };
}

const salinityParameter = parameterOf("salinity")!;
/** Meters of conductivity show it as at this temperature. */
const conductivityDegC = 25;

function shownBy(by: SalinityAmount["by"], salinity: number): number {
  if (by === "PSS-78") return salinity;
  if (by === "conductivity") return conductivityFromSalinity(salinity, conductivityDegC) ?? Number.NaN;
  const degC = specificGravityScales[by.slice("specific gravity ".length) as "25/25 °C"];
  return specificGravity(salinity, degC, degC);
}

/** Numbers that are read with ease; fewer of rates, whose units are many. Common practice, no source. */
const readable = { least: 0.01, most: 100_000 } as const;
type Size = { readonly least: number; readonly most: number };
const anySize = { least: 0, most: Number.POSITIVE_INFINITY } as const;
const readableRate = { least: 0.1, most: 10_000 } as const;

/**
 * The converted number: exact where that takes at most one digit more than the old one had, else to the first place
 * that is finer than the old number's last.
 */
function written(text: string, convert: Convert, { least, most }: Size): string | null {
  const number = plainNumber({ start: 0, end: 0, text });
  if (!number.ok) return null;
  const value = number.value;
  const result = convert(value);
  const decimals = text.split(".")[1]?.length ?? 0;
  const step = convert(value.add(new Decimal34(10).pow(-decimals)));
  if (!result || !step) return null;
  if (result.eq(value)) return text;
  const width = step.sub(result).abs();
  if (width.isZero() || !width.isFinite()) return null;
  const places = Math.ceil(-Math.log10(width.toNumber()) - 1e-9);
  const digits = text.replace(/^-?0*\.?0*|\./g, "").length;
  const isExact = result.sd() <= digits + 1;
  const rounded = isExact ? result : toPlaces(result, places);
  const size = rounded.abs().toNumber();
  if (size !== 0 && (size < least || size >= most)) return null;
  if (size === 0 && !result.isZero()) return null;
  const shown = Math.max(0, text.includes(".") || !isExact ? places : 0, rounded.dp());
  return rounded.toFixed(shown);
}

function toPlaces(value: Decimal34, places: number): Decimal34 {
  const scale = new Decimal34(10).pow(places);
  return value.mul(scale).round().div(scale);
}
