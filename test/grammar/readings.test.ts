/** What the grammar must decide where a line could be read in two ways, and the spellings that it tidies. */
import { describe, expect, test } from "vitest";
import type { SectionKind, Statement } from "../../grammar/syntax.ts";
import { reads, tidies } from "./fixture.ts";

/** Each line beside what it is tidied to. */
function tidied(
  section: SectionKind | null,
  pairs: readonly (readonly [written: string, tidy: string])[],
): void {
  for (const [written, tidy] of pairs) {
    expect(tidies(section, written), written).toBe(tidy);
    expect(tidies(section, tidy), tidy).toBe(tidy);
  }
}

type Of<Kind extends Statement["kind"]> = Extract<Statement, { kind: Kind }>;
const fact = <Kind extends Statement["kind"]>(kind: Kind, line: string): Of<Kind> => {
  const statement = reads("system", line);
  expect(statement.kind).toBe(kind);
  return statement as Of<Kind>;
};

test("`x` and `×` between sizes", () => {
  tidied("system", [
    ["tank a 240 cm x 90 cm x 32 cm", "tank a 240 cm x 90 cm x 32 cm"],
    ["tank a 240×90×32cm", "tank a 240 x 90 x 32 cm"],
    ["tank a round 1.2 m×60 cm times 2", "tank a round 1.2 m x 60 cm times 2"],
    ["tank x-1 40 L", "tank x-1 40 L"],
  ]);
});

test("a number without its unit takes the next one written, else the last", () => {
  const { size } = fact("tank", "tank a 240 x 90 cm x 320");
  expect(size).toMatchObject({
    length: { unit: { text: "cm", start: 16 }, borrowedUnit: true },
    width: { unit: { text: "cm" }, borrowedUnit: false },
    depth: { unit: { text: "cm", start: 16 }, borrowedUnit: true },
  });
  const { low, high, aim } = fact("hold", "hold alkalinity 7.6 to 8.4 dKH aim 2.9 meq/L");
  expect([low, high, aim].map((quantity) => quantity?.unit?.text)).toEqual(["dKH", "dKH", "meq/L"]);
  expect([low, high, aim].map((quantity) => quantity?.borrowedUnit)).toEqual([true, false, false]);
});

test("a unit is borrowed with its `as CaCO3`, and so is `total`", () => {
  const { low, aim } = fact("hold", "hold calcium 1050 to 1100 mg/L as CaCO3 aim 1075");
  expect(low).toMatchObject({ unit: { text: "mg/L" }, borrowedUnit: true, asCaCO3: { start: 31, end: 39 } });
  expect(aim).toMatchObject({ unit: { text: "mg/L" }, borrowedUnit: true, asCaCO3: { start: 31, end: 39 } });
  expect(fact("hold", "hold pH 7.9 to 8.3 total").low).toMatchObject({
    unit: { text: "total" },
    borrowedUnit: true,
  });
  tidied("system", [
    ["hold calcium 1050 to 1100 mg/L as CaCO3 aim 1075", "hold calcium 1050 to 1100 mg/L as CaCO3 aim 1075"],
    ["hold pH 7.9 to 8.3 total aim 8.1", "hold pH 7.9 to 8.3 total aim 8.1"],
  ]);
});

test("nothing is borrowed where nothing is written", () => {
  expect(fact("hold", "hold salinity 34 to 36").low).toMatchObject({ unit: null, borrowedUnit: false });
});

test("`min` is a unit after a number and a limit after a parameter", () => {
  tidied("system", [
    ["limit calcium min 380 mg/L", "limit calcium min 380 mg/L"],
    ["pump a gives b at 48 mL/min", "pump a gives b at 48 mL/min"],
  ]);
  tidied("log", [["2026-11-24 calibrated a 480 mL in 10 min", "2026-11-24 calibrated a 480 mL in 10 min"]]);
});

test("`in` is a word, `inch` a unit", () => {
  tidied("system", [["tank a 60 inch x 20 inch x 14 inch", "tank a 60 inch x 20 inch x 14 inch"]]);
});

test("`total` after a pH, wherever one is written", () => {
  tidied("system", [["limit pH max 8.4 total", "limit pH max 8.4 total"]]);
  tidied("saltwater", [["pH 8.0 total", "pH 8.0 total"]]);
  tidied("kit", [
    [
      "2026-11-02 checked pH 8.05 total against 8.09 total",
      "2026-11-02 checked pH 8.05 total against 8.09 total",
    ],
  ]);
  tidied("log", [["2026-11-24 read pH 8.02 total ± 0.02", "2026-11-24 read pH 8.02 total ± 0.02"]]);
});

test("`as CaCO3` after a unit, a whole rate, or an uncertainty", () => {
  tidied("system", [
    ["cohort a 0.4 m2 uptake 240 mmol/m2/day as CaCO3", "cohort a 0.4 m2 uptake 240 mmol/m2/day as CaCO3"],
    ["uptake calcium 20 mg/L/day as caco3 ± 2", "uptake calcium 20 mg/L/day as CaCO3 ± 2"],
    ["uptake calcium 20 mg/L/day ± 2 mg/L/day as CaCO3", "uptake calcium 20 mg/L/day as CaCO3 ± 2 mg/L/day"],
  ]);
  tidied("solution", [
    ["supplies alkalinity 80 g/L as CaCO3 as carbonate", "supplies alkalinity 80 g/L as CaCO3 as carbonate"],
    ["supplies alkalinity 80 g/L as carbonate", "supplies alkalinity 80 g/L as carbonate"],
  ]);
});

test("a rate of what has no unit", () => {
  tidied("system", [
    ["limit pH rise 0.2 /day", "limit pH rise 0.2 /day"],
    ["limit pH rise 0.2/ day", "limit pH rise 0.2 /day"],
    ["limit salinity fall 0.5/week", "limit salinity fall 0.5 /week"],
  ]);
});

test("an uncertainty in its own unit, in the number's, or as a share", () => {
  tidied("system", [
    ["measured volume 1740 L +- 40 L", "measured volume 1740 L ± 40 L"],
    ["measured volume 1740 L +/-40", "measured volume 1740 L ± 40"],
    ["measured volume 1740 L±2%", "measured volume 1740 L ± 2 %"],
  ]);
});

test("optional parts in any order", () => {
  tidied("system", [
    [
      "pump a gives b at 48 mL/min until 2026-12-01 holding 5 L always 10 mL/day from 2026-11-01 between 8:00 and 20:00 least 0.5 mL",
      "pump a gives b at 48 mL/min least 0.5 mL between 08:00 and 20:00 always 10 mL/day holding 5 L from 2026-11-01 until 2026-12-01",
    ],
    [
      "cohort a 12 pieces uptake 1 meq/day from 2026-11-01 grows 1%/week magnesium 4% each",
      "cohort a 12 pieces uptake 1 meq/day each magnesium 4 % grows 1 %/week from 2026-11-01",
    ],
    ["by-hand a always 5 mL/day times 2", "by-hand a times 2 always 5 mL/day"],
  ]);
  tidied("log", [
    [
      '2026-11-24 read pH 8.1 by mk disregard "spilt" with bench',
      '2026-11-24 read pH 8.1 with bench disregard "spilt" by mk',
    ],
  ]);
  tidied("store", [['2026-11-24 received a 5 kg by mk lot "7"', '2026-11-24 received a 5 kg lot "7" by mk']]);
  tidied(null, [['solution a "A" from 2026-11-01', 'solution a from 2026-11-01 "A"']]);
});

test("names equal to units, parameters and words that only follow others", () => {
  tidied("system", [
    ["pump mL gives day at 5 mL/min", "pump mL gives day at 5 mL/min"],
    ["top-off magnesium 20 L", "top-off magnesium 20 L"],
    ["cohort pieces 12 pieces uptake 3 meq/day", "cohort pieces 12 pieces uptake 3 meq/day"],
  ]);
  tidied("log", [
    [
      "2026-11-24 set calcium 30 mL/day, total 5 mL/day by h",
      "2026-11-24 set calcium 30 mL/day, total 5 mL/day by h",
    ],
  ]);
});

test("quotes of every kind, and what stands in them", () => {
  tidied("system", [
    ["note “Lid cracked”", 'note "Lid cracked"'],
    ["note „Deckel #3“", 'note "Deckel #3"'],
    ['note "She said “now”"', 'note "She said “now”"'],
    ['note ""', 'note ""'],
  ]);
});

test("spaces of every kind, and spaces round a stroke", () => {
  tidied("system", [
    ["\tevaporates\u00a014\u202fL / day", "evaporates 14 L/day"],
    ["limit alkalinity rise 0.6 dKH /day", "limit alkalinity rise 0.6 dKH/day"],
  ]);
});

test("spellings of units that are tidied", () => {
  tidied("system", [
    ["cohort a 0.4 m² uptake 3 mmol/m²/days as CaCO3", "cohort a 0.4 m2 uptake 3 mmol/m2/day as CaCO3"],
    ["hold temperature 24 to 26 °C", "hold temperature 24 to 26 degC"],
    ["limit alkalinity max 4000 µmol/kg", "limit alkalinity max 4000 umol/kg"],
    ["limit alkalinity max 4000 μmol/kg", "limit alkalinity max 4000 umol/kg"],
    ["hold temperature −1.5 to +3 degC", "hold temperature -1.5 to 3 degC"],
    ["cohort a 1 piece uptake 3 meq/day", "cohort a 1 pieces uptake 3 meq/day"],
  ]);
  tidied("reagent", [["lead 6 days", "lead 6 day"]]);
});

test("a formula's dot", () => {
  tidied("reagent", [
    ["formula SrCl2.6H2O", "formula SrCl2·6H2O"],
    ["formula SrCl₂ • 6H₂O purity 98 %", "formula SrCl2·6H2O purity 98 %"],
    ["formula Ca(OH)2", "formula Ca(OH)2"],
  ]);
});

test("an unknown unit still makes a statement, with its spaces gone", () => {
  tidied("system", [["limit alkalinity max 11 dkh / Tag", "limit alkalinity max 11 dkh/Tag"]]);
});

describe("moments", () => {
  const utc = (text: string): number => Date.parse(`${text}Z`) / 60_000;
  const at = (line: string) => (reads("log", line) as { at: unknown }).at;

  test("an event's bare date means noon, its hour unknown", () => {
    expect(at("2026-11-24 stopped a")).toEqual({
      start: 0,
      end: 10,
      minute: utc("2026-11-24T12:00"),
      timeKnown: false,
    });
  });

  test("date and time", () => {
    const minute = utc("2026-11-24T08:10");
    expect(at("2026-11-24 08:10 stopped a")).toEqual({ start: 0, end: 16, minute, timeKnown: true });
    expect(at("2026-11-24T08:10 stopped a")).toEqual({ start: 0, end: 16, minute, timeKnown: true });
    expect(at("  2026-11-24   8:10 stopped a")).toEqual({ start: 2, end: 19, minute, timeKnown: true });
    expect(at("2026-11-24 24:00 stopped a")).toMatchObject({ minute: utc("2026-11-25T00:00") });
  });

  test("a fact's bare date means its first minute", () => {
    const { from, until } = fact("evaporates", "evaporates 14 L/day from 2026-11-24 until 2026-12-01 06:30");
    expect(from).toMatchObject({ minute: utc("2026-11-24T00:00"), timeKnown: false });
    expect(until).toMatchObject({ minute: utc("2026-12-01T06:30"), timeKnown: true });
  });

  test("are written back as they were", () => {
    tidied("log", [
      ["2026-11-24T8:10 stopped a", "2026-11-24 08:10 stopped a"],
      ["2026-11-24 12:00 stopped a", "2026-11-24 12:00 stopped a"],
      ["2026-11-24 stopped a", "2026-11-24 stopped a"],
    ]);
    tidied("system", [["light between 6:00 and 24:00", "light between 06:00 and 24:00"]]);
  });
});
