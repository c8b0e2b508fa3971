/**
 * The one unit table. A unit that people write is a row, or rows joined by `/`: `mg/L`, `meq/m2/day`.
 * Adding a unit is adding a row. Factors are exact decimals, or a fraction where no decimal is exact.
 */

/** What can be measured; a composed unit is a product of powers of these. */
export type Base =
  | "length"
  | "mass"
  | "amount"
  | "equivalents"
  | "time"
  | "temperature"
  | "share"
  | "salinity"
  | "specific gravity 25/25 °C"
  | "specific gravity 20/20 °C"
  | "specific gravity 60/60 °F"
  | "conductivity"
  | "parts per million"
  | "partial pressure"
  | "pH on the total scale";

export type Dimension = Readonly<Partial<Record<Base, number>>>;

export interface UnitRow {
  /** The tidy spelling. */
  readonly spelling: string;
  /** Spellings that are read too and tidied. */
  readonly also: readonly string[];
  readonly measures: Dimension;
  /**
   * How many base units one of these is, as a decimal or a fraction of two. Base units: dm (so that L is dm³),
   * g, mmol, meq, day, kelvin, 1 for shares.
   */
  readonly factor: string | readonly [numerator: string, denominator: string];
  /** Taken off the number before the factor, for a temperature that isn't a difference. */
  readonly zero?: string;
  /** For the list of units in the documentation. */
  readonly kind: string;
}

const row = (
  kind: string,
  measures: Dimension,
  spelling: string,
  factor: UnitRow["factor"],
  also: readonly string[] = [],
): UnitRow => ({ kind, measures, spelling, factor, also });

const volume = { length: 3 } as const;

/** Gram and litre factors of the customary units: exact by definition (international yard and pound, 1959). */
export const unitTable: readonly UnitRow[] = [
  // 1 dKH is 10 mg/L of CaO: 20 / M(CaO) meq/L, M(CaO) = 40.078 + 15.999 (IUPAC abridged weights).
  row("alkalinity", { equivalents: 1, length: -3 }, "dKH", ["20", "56.077"]),
  row("amount", { equivalents: 1 }, "meq", "1"),
  row("amount", { amount: 1 }, "mol", "1000"),
  row("amount", { amount: 1 }, "mmol", "1"),
  row("amount", { amount: 1 }, "umol", "0.001", ["µmol", "μmol"]),
  row("volume", volume, "mL", "0.001"),
  row("volume", volume, "L", "1"),
  row("volume", volume, "m3", "1000", ["m³"]),
  row("volume", volume, "gal", "3.785411784"),
  row("volume", volume, "impgal", "4.54609"),
  row("volume", volume, "floz", "0.0295735295625"),
  row("length", { length: 1 }, "mm", "0.01"),
  row("length", { length: 1 }, "cm", "0.1"),
  row("length", { length: 1 }, "m", "10"),
  row("length", { length: 1 }, "inch", "0.254"),
  row("length", { length: 1 }, "ft", "3.048"),
  row("area", { length: 2 }, "cm2", "0.01", ["cm²"]),
  row("area", { length: 2 }, "m2", "100", ["m²"]),
  row("mass", { mass: 1 }, "mg", "0.001"),
  row("mass", { mass: 1 }, "g", "1"),
  row("mass", { mass: 1 }, "kg", "1000"),
  row("mass", { mass: 1 }, "lb", "453.59237"),
  row("mass", { mass: 1 }, "oz", "28.349523125"),
  row("temperature", { temperature: 1 }, "degC", "1", ["°C", "℃"]),
  { ...row("temperature", { temperature: 1 }, "degF", ["5", "9"], ["°F", "℉"]), zero: "32" },
  row("salinity", { salinity: 1 }, "ppt", "1"),
  row("salinity", { "specific gravity 25/25 °C": 1 }, "SG", "1"),
  row("salinity", { "specific gravity 20/20 °C": 1 }, "SG20", "1"),
  row("salinity", { "specific gravity 60/60 °F": 1 }, "SG60F", "1"),
  row("salinity", { conductivity: 1 }, "mS/cm", "1"),
  row("pH", { "pH on the total scale": 1 }, "total", "1"),
  row("parts per million", { "parts per million": 1 }, "ppm", "1"),
  row("CO2", { "partial pressure": 1 }, "uatm", "1", ["µatm", "μatm"]),
  row("time", { time: 1 }, "s", ["1", "86400"], ["second", "seconds"]),
  row("time", { time: 1 }, "min", ["1", "1440"], ["minute", "minutes", "mins"]),
  row("time", { time: 1 }, "h", ["1", "24"], ["hour", "hours"]),
  row("time", { time: 1 }, "day", "1", ["days"]),
  row("time", { time: 1 }, "week", "7", ["weeks"]),
  row("share", { share: 1 }, "%", "0.01"),
];

const rowBySpelling = new Map(
  unitTable.flatMap((unit) => [unit.spelling, ...unit.also].map((word) => [word, unit])),
);

/** A unit as a product: rows with their powers, in the order written. */
export interface UnitProduct {
  readonly spelling: string;
  readonly parts: readonly { readonly row: UnitRow; readonly power: 1 | -1 }[];
}

export type UnitReading =
  | { readonly known: true; readonly unit: UnitProduct }
  | { readonly known: false; readonly part: string };

/**
 * Reads a unit written without spaces: one row, or rows joined by `/`. An empty first part (`/day`) is a bare
 * rate, for parameters whose unit is nothing.
 */
export function readUnit(text: string): UnitReading {
  const whole = rowBySpelling.get(text);
  if (whole) return { known: true, unit: { spelling: whole.spelling, parts: [{ row: whole, power: 1 }] } };
  const words = text.split("/");
  const parts: { row: UnitRow; power: 1 | -1 }[] = [];
  // `mS/cm` is one row with a stroke in it; what follows it is over that.
  let next = 0;
  const pair = rowBySpelling.get(words.slice(0, 2).join("/"));
  if (pair) {
    parts.push({ row: pair, power: 1 });
    next = 2;
  } else if (words[0] === "" && words.length > 1) {
    next = 1;
  }
  for (const [index, word] of words.entries()) {
    if (index < next) continue;
    const found = rowBySpelling.get(word);
    if (!found) return { known: false, part: word };
    parts.push({ row: found, power: index === 0 ? 1 : -1 });
  }
  const spelling = parts
    .map(({ row: { spelling: word }, power }) => (power === 1 ? word : `/${word}`))
    .join("");
  return { known: true, unit: { spelling, parts } };
}
