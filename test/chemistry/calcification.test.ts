import { expect, test } from "vitest";
import { calcificationPerMeq, calciumCarbonateGPerMeq } from "../../server/chemistry/calcification.ts";

const meqPerDegree = 20 / 56.077;

test("one mole of carbonate takes two equivalents (Smith & Key 1975)", () => {
  const pure = calcificationPerMeq(0);
  expect(pure.calciumMmol).toBe(0.5);
  expect(pure.magnesiumMmol).toBe(0);
  expect(calciumCarbonateGPerMeq).toBeCloseTo(0.050043, 9);
});

test("a dKH taken up by corals: 7.147 mg/L calcium, 17.85 mg/L CaCO3", () => {
  expect(calcificationPerMeq(0).calciumMg * meqPerDegree).toBeCloseTo(7.147, 3);
  expect(calciumCarbonateGPerMeq * 1000 * meqPerDegree).toBeCloseTo(17.848, 3);
});

test("magnesium takes calcium's place mole for mole", () => {
  // Mg/Ca 4.5 mmol/mol of coral aragonite; 16 mol % of a coralline crust.
  const coral = calcificationPerMeq(4.5e-3 / (1 + 4.5e-3));
  expect(coral.magnesiumMg * meqPerDegree).toBeCloseTo(0.0194, 3);
  const crust = calcificationPerMeq(0.16);
  expect(crust.magnesiumMg * meqPerDegree).toBeCloseTo(0.69, 2);
  expect(crust.calciumMg * meqPerDegree).toBeCloseTo(6.0, 1);
  expect(crust.calciumMmol + crust.magnesiumMmol).toBeCloseTo(0.5, 12);
  expect(crust.mineralG).toBeLessThan(calciumCarbonateGPerMeq);
});

test("1000 cm² at 20 µmol CaCO3 per cm² and day in 100 L: 1.12 dKH and 8.0 mg/L calcium a day", () => {
  const meqPerL = (1000 * 20 * 2) / 1000 / 100;
  expect(meqPerL / meqPerDegree).toBeCloseTo(1.12, 2);
  expect(meqPerL * calcificationPerMeq(0).calciumMg).toBeCloseTo(8.0, 1);
});
