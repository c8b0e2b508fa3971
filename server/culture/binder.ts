/** What binding a line needs: where it stands, what it may name, and where its findings go. */

import { nearestWords } from "../../grammar/nearest.ts";
import { type Parameter, parameterOf, parameterTable } from "../../grammar/parameters.ts";
import type { NumberWord, QuantityText, Span, Word } from "../../grammar/syntax.ts";
import { answeredRange } from "../chemistry/constants-at.ts";
import { densityKgPerL } from "../chemistry/sea-water.ts";
import type { Amount, Written } from "../quantity/amount.ts";
import { asDifference, readConcentration } from "../quantity/concentration.ts";
import { toDouble } from "../quantity/decimal.ts";
import type { QuantityFinding, Reading } from "../quantity/finding.ts";
import { type PlainKind, readPlain } from "../quantity/plain.ts";
import { inModelUnit } from "./convert.ts";
import { defaults } from "./defaults.ts";
import { plainUnit } from "./display.ts";
import type { CultureFinding, NamedKind } from "./finding.ts";
import type { DisplayUnit } from "./model.ts";
import { type Declaration, type Names, resolve } from "./names.ts";
import type { Place } from "./place.ts";

/** The water that a value for a kilogram is turned into a litre with. */
export interface ReferenceWater {
  readonly salinity: number;
  readonly temperatureDegC: number;
}

export const defaultWater: ReferenceWater = {
  salinity: defaults.salinity.value,
  temperatureDegC: defaults.temperature.value,
};

/** Everything that binding lines of one section shares. */
export interface Binder {
  readonly file: string;
  readonly system: string | null;
  readonly names: Names;
  /** References of what was named. */
  readonly used: Set<string>;
  readonly report: (finding: CultureFinding) => void;
}

/** A line of a section, ready to be bound. */
export interface Line extends Binder {
  readonly line: number;
}

export const lineOf = (binder: Binder, line: number): Line => ({ ...binder, line });

export const placeOf = (line: Line, span: Span | null): Place => ({
  file: line.file,
  line: line.line,
  span: span && { start: span.start, end: span.end },
});

/** Puts a finding of a quantity or line into its file. */
export function reportSpan(line: Line, { span, ...finding }: QuantityFinding): void {
  line.report({ ...finding, place: placeOf(line, span), system: line.system } as CultureFinding);
}

/** The value read, or null after reporting what is wrong with it. */
export function take<T>(line: Line, reading: Reading<T>): T | null {
  if (!reading.ok) {
    reportSpan(line, reading.finding);
    return null;
  }
  for (const note of reading.notes) reportSpan(line, note);
  return reading.value;
}

/** A quantity of one dimension in base units (L, g, day …), or null. */
export function plain(line: Line, quantity: QuantityText, kind: PlainKind): number | null {
  const read = take(line, readPlain(quantity, kind));
  return read && (toDouble(read.value) ?? refuseNumber(line, quantity.number));
}

/** A quantity that can't be below zero: says so and gives null where it is. */
export function positive(line: Line, quantity: QuantityText, kind: PlainKind): number | null {
  const value = plain(line, quantity, kind);
  if (value === null || value >= 0) return value;
  const text = quantity.number.text;
  return refuseNumber(line, quantity.number, [text.replace("-", "")]);
}

/** Reports a number that the place can't hold, whatever its unit. */
export function refuseNumber(line: Line, number: NumberWord, readings: readonly string[] = []): null {
  reportSpan(line, { code: "syntax/number-form", span: number, word: number.text, readings });
  return null;
}

/** The same where it can't be zero either. */
export function aboveZero(line: Line, quantity: QuantityText, kind: PlainKind): number | null {
  const value = positive(line, quantity, kind);
  if (value !== 0) return value;
  return refuseNumber(line, quantity.number);
}

/** How many times something is there or done: 1, 2, 3 … */
export function wholeNumber(line: Line, number: NumberWord): number | null {
  const value = Number(number.text);
  if (Number.isSafeInteger(value) && value > 0) return value;
  return refuseNumber(line, number);
}

/** A share from 0 to 1. */
export function shareQuantity(line: Line, quantity: QuantityText): number | null {
  const share = positive(line, quantity, "share");
  if (share === null || share <= 1) return share;
  return refuseNumber(line, quantity.number);
}

/** Density in kg/L; a water beyond any sea water counts as the default one, what is wrong with it is told elsewhere. */
export function densityOf({ salinity, temperatureDegC }: ReferenceWater): number {
  const within = (value: number, [low, high]: readonly [number, number]) => value >= low && value <= high;
  const known = within(salinity, answeredRange.salinity) && within(temperatureDegC, answeredRange.celsius);
  return known
    ? densityKgPerL(salinity, temperatureDegC)
    : densityKgPerL(defaultWater.salinity, defaultWater.temperatureDegC);
}

/** The parameter that a word names, or null after reporting that there is none. */
export function parameterNamed(
  line: Line,
  word: Word,
  allowed?: (parameter: Parameter) => boolean,
): Parameter | null {
  const parameter = parameterOf(word.text);
  if (parameter && (!allowed || allowed(parameter))) return parameter;
  const names = parameterTable.filter((row) => !allowed || allowed(row)).map(({ name }) => name);
  line.report({
    code: "syntax/unknown-word",
    place: placeOf(line, word),
    system: line.system,
    word: word.text,
    expected: names,
    nearest: nearestWords(word.text, names),
  });
  return null;
}

/** A written amount in the model's unit, with its deviation; null after reporting. */
export function amountOf(
  line: Line,
  quantity: QuantityText,
  parameter: Parameter,
  reading: Reading<Written>,
  water: ReferenceWater,
): { readonly value: number; readonly deviation: number | null; readonly amount: Amount } | null {
  const written = take(line, reading);
  if (!written) return null;
  const density = () => densityOf(water);
  const value = inModelUnit(written.amount, parameter, density);
  if (value === null || !Number.isFinite(value)) {
    return refuseNumber(line, quantity.number);
  }
  const deviation = written.uncertainty && inModelUnit(written.uncertainty, parameter, density);
  return { value, deviation, amount: written.amount };
}

/** How the person wrote this parameter, so that messages can answer in the same unit. */
export function displayUnit(
  quantity: QuantityText,
  parameter: Parameter,
  water: ReferenceWater,
): DisplayUnit {
  if (parameter.measure === "pH" && quantity.unit?.text === "total")
    return { spelling: "total", perModelUnit: 1 };
  const unitless =
    parameter.measure === "salinity" || parameter.measure === "pH" || parameter.measure === "temperature";
  if (unitless || !quantity.unit) return plainUnit(parameter.name);
  const one: QuantityText = { ...quantity, number: { ...quantity.number, text: "1" }, uncertainty: null };
  const read = readConcentration(one, parameter, asDifference);
  const size = read.ok ? inModelUnit(read.value.amount, parameter, () => densityOf(water)) : null;
  if (!size) return plainUnit(parameter.name);
  return { spelling: `${quantity.unit.text}${quantity.asCaCO3 ? " as CaCO3" : ""}`, perModelUnit: 1 / size };
}

/** What a name stands for; marks it used, or reports and gives null. */
export function named(line: Line, word: Word, wanted: readonly NamedKind[]): Declaration | null {
  const result = resolve(line.names, line.file, line.line, word, wanted, line.system);
  if ("finding" in result) {
    line.report(result.finding);
    return null;
  }
  line.used.add(result.found.ref);
  return result.found;
}
