/** Volumes, lengths, masses, times, rates and shares: every unit, what a `±` means, and properties of all. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { unitTable } from "../../grammar/units.ts";
import { factorOf } from "../../server/quantity/decimal.ts";
import { amount, plain } from "./fixture.ts";

describe("base units", () => {
  it.each([
    ["1000 mL", "volume", "1"],
    ["1 L", "volume", "1"],
    ["1 m3", "volume", "1000"],
    ["1 m³", "volume", "1000"],
    // Legal definitions: US gallon 231 in³ = 3.785411784 L, imperial gallon 4.54609 L, US fluid ounce 1/128 US gallon.
    ["1 gal", "volume", "3.785411784"],
    ["1 impgal", "volume", "4.54609"],
    ["128 floz", "volume", "3.785411784"],
    // International yard and pound, 1959: an inch is 25.4 mm, a foot 12 of them. Lengths come out in dm.
    ["100 mm", "length", "1"],
    ["10 cm", "length", "1"],
    ["1 m", "length", "10"],
    ["1 inch", "length", "0.254"],
    ["1 ft", "length", "3.048"],
    ["100 cm2", "area", "1"],
    ["1 m2", "area", "100"],
    ["1 m²", "area", "100"],
    ["1000 mg", "mass", "1"],
    ["1 g", "mass", "1"],
    ["1 kg", "mass", "1000"],
    // The same agreement: a pound is 453.59237 g, an ounce a sixteenth of it.
    ["1 lb", "mass", "453.59237"],
    ["16 oz", "mass", "453.59237"],
    ["86400 s", "time", "1"],
    ["1440 min", "time", "1"],
    ["24 h", "time", "1"],
    ["6 day", "time", "6"],
    ["6 days", "time", "6"],
    ["2 weeks", "time", "14"],
    ["18 degC", "temperature", "18"],
    ["64.4 degF", "temperature", "18"],
    ["2.4 kg/L", "density", "2400"],
    ["2.4 g/mL", "density", "2400"],
    ["45 %", "share", "0.45"],
    ["7 %/week", "growth", "0.01"],
    ["1 %/day", "growth", "0.01"],
    ["1 mL/min", "flow", "1.44"],
    ["14 L/day", "flow", "14"],
    ["1 mL/s", "flow", "86.4"],
    ["1 gal/day", "flow", "3.785411784"],
    ["70 L/week", "flow", "10"],
    ["20 g/day", "food", "20"],
    ["0.14 kg/week", "food", "20"],
  ] as const)("%s", (text, kind, expected) => {
    const figure = plain(text, kind);
    expect(Number(figure)).toBeCloseTo(Number(expected), 12);
    // All of these are exact but those over a time that isn't a decimal part of a day.
    if (!/\/(s|min|week)|[0-9] (s|min|h)$/.test(text)) expect(figure).toBe(expected);
  });
});

describe("what is wrong", () => {
  it.each([
    ["5", "volume", 'unit/missing "5" for a volume: L, mL'],
    ["5 g", "volume", 'unit/dimension "g" for a volume: L, mL'],
    ["5 L/day", "volume", 'unit/dimension "L/day" for a volume: L, mL'],
    ["5 L", "flow", 'unit/dimension "L" for a volume over time: mL/min, L/day'],
    ["5 L as CaCO3", "volume", 'unit/dimension "L" for a volume: L, mL'],
    ["5 dKH", "length", 'unit/dimension "dKH" for a length: cm, m'],
    ["5 cm", "area", 'unit/dimension "cm" for an area: m2, cm2'],
    ["5 m3", "area", 'unit/dimension "m3" for an area: m2, cm2'],
    ["5 mmol", "mass", 'unit/dimension "mmol" for a mass: g, kg'],
    ["5 g/kg", "share", 'unit/dimension "g/kg" for a share: %, %'],
    ["5 %", "growth", 'unit/dimension "%" for a share over time: %/week, %/day'],
    ["5 kg", "density", 'unit/dimension "kg" for a density: kg/L, g/mL'],
    ["5 lbs", "mass", 'unit/unknown "lbs" → lb'],
  ] as const)("%s as %s", (text, kind, expected) => {
    expect(plain(text, kind)).toBe(expected);
  });
});

describe("±", () => {
  it.each([
    ["1740 L ± 40 L", "volume", "1740 ± 40"],
    ["1740 L ± 40", "volume", "1740 ± 40"],
    ["1740 L ± 2 %", "volume", "1740 ± 34.8"],
    ["1740 L ± 0.04 m3", "volume", "1740 ± 40"],
    // 2 degF of difference are 2 × 5/9 K; no 32 is taken off.
    ["25 degC ± 2 degF", "temperature", "25 ± 1.1111111111111111111"],
    ["77 degF ± 1.8", "temperature", "25 ± 1"],
    ["1740 L ± 40 g", "volume", 'unit/dimension "± 40 g" for a volume: L, mL'],
  ] as const)("%s", (text, kind, expected) => {
    expect(plain(text, kind)).toBe(expected);
  });
});

/** A decimal as people write it, and the same with the point moved. */
const decimal = fc
  .tuple(fc.integer({ min: 1, max: 99_999_999 }), fc.integer({ min: 0, max: 6 }))
  .map(([digits, places]) => {
    const padded = String(digits).padStart(places + 1, "0");
    return places === 0 ? padded : `${padded.slice(0, -places)}.${padded.slice(-places)}`;
  });

const kinds = { volume: "volume", length: "length", area: "area", mass: "mass", time: "time" } as const;

describe("any number", () => {
  it("comes back from base units by the unit's own factor", () => {
    fc.assert(
      fc.property(
        decimal,
        fc.constantFrom(...unitTable.filter(({ kind }) => kind in kinds)),
        (number, row) => {
          const base = plain(`${number} ${row.spelling}`, kinds[row.kind as keyof typeof kinds]);
          const back = Number(base) / factorOf(row.factor).toNumber();
          expect(Math.abs(back - Number(number))).toBeLessThanOrEqual(1e-13 * Number(number));
        },
      ),
    );
  });

  it("is the same in thousands of a thousandth", () => {
    const thousandths = [
      ["L", "mL"],
      ["kg", "g"],
      ["g", "mg"],
      ["m", "mm"],
    ] as const;
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 999_999 }),
        fc.constantFrom(...thousandths),
        (whole, [large, small]) => {
          const kind = large.endsWith("g") ? "mass" : large === "m" ? "length" : "volume";
          expect(plain(`${whole}000 ${small}`, kind)).toBe(plain(`${whole} ${large}`, kind));
        },
      ),
    );
  });

  it("gives one amount in whatever unit a parameter is written", () => {
    fc.assert(
      fc.property(decimal, (number) => {
        expect(amount(`${number} meq/L`, "alkalinity")).toBe(amount(`${number} mmol/L`, "alkalinity"));
        expect(amount(`${number} mg/L`, "calcium")).toBe(amount(`${number} g/m3`, "calcium"));
        const inMoles = Number.parseFloat(amount(`${number} mmol/kg`, "calcium"));
        const inMicromoles = Number.parseFloat(amount(`${number} umol/kg`, "calcium"));
        expect(Math.abs(1000 * inMicromoles - inMoles)).toBeLessThanOrEqual(1e-13 * inMoles);
      }),
    );
  });
});
