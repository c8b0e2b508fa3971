/** A quantity as a technician writes it, read for a parameter or a kind of measure. */
import { expect } from "vitest";
import { readLine } from "../../grammar/line.ts";
import { type ParameterName, parameterOf } from "../../grammar/parameters.ts";
import type { QuantityText } from "../../grammar/syntax.ts";
import type { Amount } from "../../server/quantity/amount.ts";
import { readCarbonDioxide } from "../../server/quantity/carbon-dioxide.ts";
import {
  asDifference,
  asRate,
  asValue,
  readCohortUptake,
  readConcentration,
  readStrength,
  readUptake,
} from "../../server/quantity/concentration.ts";
import type { Decimal34 } from "../../server/quantity/decimal.ts";
import type { QuantityFinding, Reading } from "../../server/quantity/finding.ts";
import { type PlainKind, readPlain } from "../../server/quantity/plain.ts";

/** The quantity as the grammar reads it. */
export function written(text: string): QuantityText {
  const { statement, findings } = readLine("system", `  uptake calcium ${text}`);
  expect(findings, text).toEqual([]);
  if (statement?.kind !== "uptake") throw new Error(`${text} is no quantity`);
  return statement.value;
}

const findingInWords = (text: string, finding: QuantityFinding): string => {
  const offset = "  uptake calcium ".length;
  const under = text.slice(finding.span.start - offset, finding.span.end - offset);
  const asked = "expected" in finding ? ` for ${finding.expected}: ${finding.examples.join(", ")}` : "";
  const nearest = "nearest" in finding ? ` → ${finding.nearest.join(", ")}` : "";
  return `${finding.code} "${under}"${asked}${nearest}`;
};

const notes = <T>(text: string, reading: Reading<T>): string =>
  reading.ok && reading.notes.length > 0
    ? ` (${reading.notes.map((note) => findingInWords(text, note)).join("; ")})`
    : "";

const number = (value: Decimal34): string => value.toSignificantDigits(20).toString();

/** `14.5 mg per litre`, `8.1 NBS`, `35 PSS-78`. */
function amountInWords(amount: Amount): string {
  if (amount.sort === "dissolved") {
    const unit = {
      mass: "mg",
      moles: "mmol",
      equivalents: "meq",
      "mass as CaCO3": "mg as CaCO3",
      "moles as CaCO3": "mmol as CaCO3",
    }[amount.substance];
    return `${number(amount.value)} ${unit} ${amount.per === "whole" ? "in all" : `per ${amount.per}`}`;
  }
  const { value } = amount;
  if (amount.sort === "salinity") return `${number(value)} ${amount.by}`;
  return amount.sort === "pH" ? `${number(value)} ${amount.scale}` : `${number(value)} °C`;
}

const parameter = (name: ParameterName) => parameterOf(name)!;
const manners = { value: asValue, difference: asDifference, rate: asRate };

/** What a quantity is where one of this use is asked for; what is wrong with it otherwise. */
export function amount(
  text: string,
  name: ParameterName,
  use: keyof typeof manners | "strength" | "uptake" | "cohort uptake" = "value",
): string {
  const quantity = written(text);
  const reading =
    use === "strength"
      ? readStrength(quantity, parameter(name))
      : use === "uptake"
        ? readUptake(quantity, parameter(name))
        : use === "cohort uptake"
          ? readCohortUptake(quantity, parameter(name))
          : readConcentration(quantity, parameter(name), manners[use]);
  if (!reading.ok) return findingInWords(text, reading.finding);
  const { amount: value, uncertainty } = reading.value;
  const spread = uncertainty ? ` ± ${amountInWords(uncertainty)}` : "";
  return `${amountInWords(value)}${spread}${notes(text, reading)}`;
}

/** A quantity of one dimension in base units: L, dm, dm², g, g/L, days, °C, a share. */
export function plain(text: string, kind: PlainKind): string {
  const reading = readPlain(written(text), kind);
  if (!reading.ok) return findingInWords(text, reading.finding);
  const { value, uncertainty } = reading.value;
  return `${number(value)}${uncertainty ? ` ± ${number(uncertainty)}` : ""}${notes(text, reading)}`;
}

export function carbonDioxide(text: string): string {
  const reading = readCarbonDioxide(written(text));
  return reading.ok
    ? `${number(reading.value.value)} ${reading.value.unit}`
    : findingInWords(text, reading.finding);
}
