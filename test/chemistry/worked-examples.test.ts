/** Examples printed in texts on water treatment and sea water, against exact chemistry; wrong ones named so. */
import { describe, expect, test } from "vitest";
import { calciumCarbonateGPerMeq } from "../../server/chemistry/calcification.ts";
import { atomicWeight } from "../../server/chemistry/elements.ts";
import { parseFormula } from "../../server/chemistry/formula.ts";
import { composition } from "../../server/chemistry/reagents.ts";
import { answer, within } from "./reference.ts";

const gramOf = (formula: string) => composition(answer(parseFormula(formula)).elements);
const mgCaCO3PerMeq = 1000 * calciumCarbonateGPerMeq;
/** 1 dKH is 10 mg/L of CaO: 20 / M(CaO) meq/L. */
const meqPerDegree = 20 / gramOf("CaO").molarMassGPerMol;
const litresPerUsGallon = 3.785411784;
const gramsPerPound = 453.59237;

// A water-treatment trade article: alkalinity gained, ppm as CaCO3, per ppm of alkali.
test.each([
  ["CaO", 1.785],
  ["Ca(OH)2", 1.351],
  ["NaOH", 1.251],
  ["Na2CO3", 0.944],
  ["NaHCO3", 0.596],
])("1 ppm of %s is %d ppm of alkalinity", (formula, gained) => {
  within((gramOf(formula).alkalinityMeqPerG! * mgCaCO3PerMeq) / 1000, gained, 5e-4, formula);
});

test("printed wrongly: 1.28 for caustic, and lime 1 to 1", () => {
  const caustic = (gramOf("NaOH").alkalinityMeqPerG! * mgCaCO3PerMeq) / 1000;
  expect(Math.abs(caustic - 1.28)).toBeGreaterThan(0.02);
  within(30 + 10 * caustic, 42.5, 0.05, "10 ppm of caustic in water of 30 ppm, not 42.8");
  const lime = (gramOf("Ca(OH)2").alkalinityMeqPerG! * mgCaCO3PerMeq) / 1000;
  expect(Math.abs(lime - 1)).toBeGreaterThan(0.3);
});

describe("pools and treatment works", () => {
  const poundsFor = (formula: string, usGallons: number, ppmAsCaCO3: number) => {
    const meq = (usGallons * litresPerUsGallon * ppmAsCaCO3) / mgCaCO3PerMeq;
    return meq / gramOf(formula).alkalinityMeqPerG! / gramsPerPound;
  };
  const poundsForHardness = (formula: string, usGallons: number, ppmAsCaCO3: number) => {
    const mmol = (usGallons * litresPerUsGallon * ppmAsCaCO3) / mgCaCO3PerMeq / 2;
    return mmol / gramOf(formula).calciumMmolPerG / gramsPerPound;
  };

  test("1.4 lb of sodium bicarbonate raise 10 000 US gal by 10 ppm (swimming-pool instructions)", () => {
    within(poundsFor("NaHCO3", 10_000, 10), 1.4009, 5e-5, "lb");
  });

  test("90 000 gal from 50 to 100 ppm: 63.0 lb (pool operation course)", () => {
    within(poundsFor("NaHCO3", 90_000, 50), 63.0, 0.05, "lb");
  });

  test("25 000 gal of calcium hardness 120 to 300 ppm: 41.6 lb of CaCl2 (pool operation course)", () => {
    within(poundsForHardness("CaCl2", 25_000, 180), 41.6, 0.05, "lb");
    within(poundsForHardness("CaCl2", 10_000, 10), 0.9254, 5e-5, "lb");
    within(poundsForHardness("CaCl2·2H2O", 10_000, 10), 1.226, 5e-4, "lb of dihydrate");
  });

  test("bisulfate lowers: 2.002 lb pure, 2.1 as sold (95 %)", () => {
    within(poundsFor("NaHSO4", 10_000, -10), 2.002, 5e-4, "lb");
    within(poundsFor("NaHSO4", 60_000, -50), 60.1, 0.05, "lb");
  });

  test("nitrification takes 7.145 mg of CaCO3 per mg of nitrogen (wastewater training booklet)", () => {
    const perNitrogen = (2 * mgCaCO3PerMeq) / atomicWeight.N;
    within(perNitrogen, 7.1454, 5e-4, "mg/mg");
    within(2.35 * 30 * 8.34 * perNitrogen, 4201, 0.7, "lb a day, printed as 4198 with 7.14");
    within((2 / atomicWeight.N) * 84.006, 12.0, 0.01, "mg of NaHCO3");
  });

  test("25 mg/L of nitrogen, 125 mg/L at hand, 75 wanted left, 2.22 MGD: 35.2 bags of lime a day", () => {
    const needed = (25 * 2 * mgCaCO3PerMeq) / atomicWeight.N + 75 - 125;
    within(needed, 128.63, 0.01, "mg/L, 128.5 with the 7.14 of such texts");
    const lime = poundsFor("Ca(OH)2", 2.22e6, 25 * 7.14 + 75 - 125);
    within(lime, 1761, 2, "lb a day, which rests on 8.34 lb for a gallon");
    within(lime / 50, 35.2, 0.05, "bags");
  });

  test("4 MGD, 50 mg/L more, soda ash 90 % pure: 1963 lb a day (university assignment)", () => {
    within(poundsFor("Na2CO3", 4e6, 50) / 0.9, 1963, 1, "lb a day");
  });

  test("11.1 mg/L of CaCl2 are 10 mg/L of calcium hardness (hydrotechnical page)", () => {
    within((10 / (gramOf("CaCl2").calciumMmolPerG * 2 * mgCaCO3PerMeq)) * 1000, 11.088, 5e-3, "mg");
  });
});

describe("degrees of hardness (10 mg/L CaO)", () => {
  test("1 meq/L is 2.80385 dKH", () => {
    expect((1 / meqPerDegree).toFixed(5)).toBe("2.80385");
  });

  test("1 dKH in other units; an Austrian agency prints 7.14 mg/L Ca, 4.33 Mg, 21.8 HCO3", () => {
    expect(meqPerDegree.toFixed(6)).toBe("0.356652");
    expect((meqPerDegree * mgCaCO3PerMeq).toFixed(4)).toBe("17.8480");
    within((meqPerDegree / 2) * atomicWeight.Ca, 7.14695, 1e-5, "Ca");
    within((meqPerDegree / 2) * atomicWeight.Mg, 4.334, 5e-4, "Mg");
    within(meqPerDegree * gramOf("HCO3").molarMassGPerMol, 21.7615, 5e-4, "HCO3");
  });
});

describe("doses for 100 L", () => {
  const gramsForDegree = (formula: string) => (100 * meqPerDegree) / gramOf(formula).alkalinityMeqPerG!;

  test.each([
    ["NaHCO3", "2.996"],
    ["Na2CO3", "1.890"],
    ["NaOH", "1.427"],
    ["Ca(OH)2", "1.321"],
  ])("+1 dKH by %s: %s g", (formula, grams) => {
    expect(gramsForDegree(formula).toFixed(3)).toBe(grams);
  });

  test("lime's dKH brings 7.147 mg/L of calcium", () => {
    const calciumMg = gramsForDegree("Ca(OH)2") * gramOf("Ca(OH)2").calciumMmolPerG * atomicWeight.Ca;
    expect((calciumMg / 100).toFixed(3)).toBe("7.147");
  });

  test("+1 meq/L: 8.401 g of NaHCO3", () => {
    expect((100 / gramOf("NaHCO3").alkalinityMeqPerG!).toFixed(3)).toBe("8.401");
  });

  test("+20 mg/L of calcium", () => {
    const grams = (formula: string) => 2000 / (gramOf(formula).calciumMmolPerG * atomicWeight.Ca);
    expect(grams("CaCl2·2H2O").toFixed(3)).toBe("7.336");
    expect(grams("CaCl2").toFixed(3)).toBe("5.538");
  });

  test("+50 mg/L of magnesium", () => {
    const grams = (formula: string) => 5000 / (gramOf(formula).magnesiumMmolPerG * atomicWeight.Mg);
    expect(grams("MgCl2·6H2O").toFixed(2)).toBe("41.82");
    expect(grams("MgSO4·7H2O").toFixed(2)).toBe("50.70");
  });
});
