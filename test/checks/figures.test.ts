import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { parameterTable } from "../../grammar/parameters.ts";
import {
  bandFigure,
  changeBeside,
  changeFigure,
  doseFigure,
  edgeFigure,
  figure,
  rounded,
  valueBeside,
  valueFigure,
} from "../../server/checks/figures.ts";

/** 1 dKH is 10 mg/L of CaO, 20 / 56.077 meq/L. */
const dKH = { spelling: "dKH", perModelUnit: 56.077 / 20 };
const meq = { spelling: "meq/L", perModelUnit: 1 };
const mgL = { spelling: "mg/L", perModelUnit: 1 };
const bare = { spelling: "", perModelUnit: 1 };
const degC = { spelling: "degC", perModelUnit: 1 };

describe("plain figures", () => {
  test.each([
    [0.048, "mL", "0.048 mL"],
    [0.52, "mL", "0.52 mL"],
    [5.04, "mL", "5.0 mL"],
    [9.96, "mL", "10 mL"],
    [358.4, "mL", "358 mL"],
    [1.46, "L", "1.5 L"],
    [1740.3, "L", "1740 L"],
    [6.07, "days", "6.1 days"],
    [25.44, "°C", "25.4 °C"],
    [34.84, "salinity", "34.8"],
    [8.056, "pH", "8.06"],
    [3.68, "Ω", "3.7"],
    [21.4, "Ω", "21"],
    [520.4, "ppm", "520 ppm"],
  ] as const)("%d %s is told as %s", (value, unit, text) => expect(figure(value, unit)).toBe(text));

  test("a dose is told in millilitres up to 10 L", () => {
    expect(doseFigure(0.358)).toBe("358 mL");
    expect(doseFigure(1.24)).toBe("1240 mL");
    expect(doseFigure(0.0095)).toBe("9.5 mL");
    expect(doseFigure(14)).toBe("14 L");
  });
});

describe("figures of a parameter, in the unit of the file", () => {
  test.each([
    ["alkalinity", 2.7105, dKH, "7.6 dKH"],
    ["alkalinity", 2.7105, meq, "2.71 meq/L"],
    ["alkalinity", 2.7105, { spelling: "umol/kg", perModelUnit: 977.2 }, "2649 umol/kg"],
    ["alkalinity", 2.7105, { spelling: "mg/L as CaCO3", perModelUnit: 50.04 }, "136 mg/L as CaCO3"],
    ["calcium", 421.4, mgL, "421 mg/L"],
    ["calcium", 421.4, { spelling: "mmol/L", perModelUnit: 1 / 40.078 }, "10.51 mmol/L"],
    ["magnesium", 1309.6, mgL, "1310 mg/L"],
    ["strontium", 8.04, mgL, "8.0 mg/L"],
    ["salinity", 34.84, bare, "34.8"],
    ["temperature", 25.44, degC, "25.4 °C"],
    ["pH", 8.119, bare, "8.12"],
    ["phosphate", 0.034, mgL, "0.03 mg/L"],
  ] as const)("%s %d", (parameter, value, unit, text) =>
    expect(valueFigure(parameter, value, unit)).toBe(text),
  );

  test("a change is told one digit finer", () => {
    expect(changeFigure("alkalinity", 0.31, dKH)).toBe("0.87 dKH");
    expect(changeFigure("calcium", 6.23, mgL)).toBe("6.2 mg/L");
    expect(changeFigure("pH", 0.213, bare)).toBe("0.21");
  });

  test("edges as a person would write them", () => {
    expect(edgeFigure("alkalinity", 7.6 / dKH.perModelUnit, dKH)).toBe("7.6 dKH");
    expect(edgeFigure("alkalinity", 12 / dKH.perModelUnit, dKH)).toBe("12 dKH");
    expect(bandFigure("alkalinity", 7.6 / dKH.perModelUnit, 8 / dKH.perModelUnit, dKH)).toBe("7.6 to 8 dKH");
    expect(bandFigure("calcium", 410, 440, mgL)).toBe("410 to 440 mg/L");
    expect(bandFigure("pH", 7.9, 8.4, bare)).toBe("7.9 to 8.4");
  });

  test("a value beside an edge shows on which side it is", () => {
    const edge = 7.6 / dKH.perModelUnit;
    expect(valueBeside("alkalinity", 7.58 / dKH.perModelUnit, [edge], dKH)).toBe("7.58 dKH");
    expect(valueBeside("alkalinity", 7.52 / dKH.perModelUnit, [edge], dKH)).toBe("7.5 dKH");
    expect(valueBeside("calcium", 440.3, [410, 440], mgL)).toBe("440.3 mg/L");
    expect(valueBeside("calcium", 440, [440], mgL)).toBe("440 mg/L");
    expect(changeBeside("pH", 0.1008, 0.1, bare)).toBe("0.101");
  });
});

describe("numbers that aren't ordinary", () => {
  test("nothing is told as -0", () => {
    expect(rounded(-0.0001, 2)).toBe("0.00");
    expect(rounded(-0, 0)).toBe("0");
    expect(changeFigure("alkalinity", -0.0001, dKH)).toBe("0.00 dKH");
    expect(figure(-0.04, "L")).toBe("0.0 L");
  });

  test("what is no number is called unknown", () => {
    expect(rounded(Number.NaN, 2)).toBe("unknown");
    expect(figure(Number.POSITIVE_INFINITY, "L")).toBe("unknown L");
  });

  test("any number of any parameter in any unit gives plain digits", () => {
    const unit = fc.record({
      spelling: fc.constant("x"),
      perModelUnit: fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
    });
    const number = fc.double({ min: -1e12, max: 1e12, noNaN: true });
    fc.assert(
      fc.property(
        fc.constantFrom(...parameterTable),
        number,
        number,
        unit,
        ({ name }, value, edge, written) => {
          for (const text of [
            valueFigure(name, value, written),
            changeFigure(name, value, written),
            edgeFigure(name, value, written),
            valueBeside(name, value, [edge], written),
          ]) {
            expect(text).toMatch(/^-?\d+(\.\d+)?(e\+\d+)? x$/);
            expect(text).not.toMatch(/^-[0.]+ /);
          }
        },
      ),
      { numRuns: 300 },
    );
  });
});
