/** What the corals take a day, against arithmetic written out. */
import { describe, expect, it } from "vitest";
import { system } from "./fixture.ts";

const uptake = (facts: string, moment = "2026-11-02 08:00") => {
  const { uptake: found } = system(
    `system vat\n  tank main 1000 L\n${facts}\n\nlog vat\n  2026-11-01 08:00 note "First."\n`,
    moment,
  );
  expect(found).not.toBeNull();
  return found!;
};

describe("stated", () => {
  it.each([
    ["uptake alkalinity 0.3 meq/L/day", 300],
    ["uptake alkalinity 2.80385 dKH/day", 1000],
    ["uptake alkalinity 300 meq/day", 300],
    ["uptake alkalinity 150 mmol/day as CaCO3", 300],
    // 15.0129 g of CaCO3, M = 100.086, are 0.15 mol.
    ["uptake alkalinity 15.0129 g/day as CaCO3", 300],
    ["uptake alkalinity 15.0129 mg/L/day as CaCO3", 300],
    ["uptake alkalinity 2.1 meq/L/week", 300],
  ])("%s", (line, meq) => {
    const found = uptake(`  ${line}`);
    expect(found.basis).toBe("stated");
    expect(found.perDay.alkalinity).toBeCloseTo(meq, 9);
    // Half a mole of mineral an equivalent; x = 0.5 % of magnesium where nothing is said.
    expect(found.perDay.calcium).toBeCloseTo(meq * 0.4975 * 40.078, 6);
    expect(found.perDay.magnesium).toBeCloseTo(meq * 0.0025 * 24.305, 6);
    expect(found.calcificationGPerDay).toBeCloseTo(meq * 0.050043, 6);
    expect(found.magnesiumFractionStated).toBe(false);
  });

  it("per kilogram takes the density of the water held", () => {
    // 300 µmol/kg at 35 and 25 °C: 1.02334 kg/L.
    expect(uptake("  uptake alkalinity 300 umol/kg/day").perDay.alkalinity).toBeCloseTo(300 * 1.02334, 2);
  });

  it("calcium and magnesium win over what follows from alkalinity", () => {
    const found = uptake(
      "  uptake alkalinity 300 meq/day\n  uptake calcium 5 g/day\n  uptake magnesium 10 mmol/day",
    );
    expect(found.perDay.calcium).toBeCloseTo(5000, 9);
    expect(found.perDay.magnesium).toBeCloseTo(243.05, 9);
  });

  it("strontium alone leaves the rest unknown", () => {
    const found = uptake("  uptake strontium 0.1 mg/L/day");
    expect(found.perDay).toMatchObject({ strontium: 100, alkalinity: null, calcium: null, potassium: null });
    expect(found.calcificationGPerDay).toBeNull();
  });

  it("nothing said is nothing known", () => {
    expect(uptake("").perDay).toEqual({
      alkalinity: null,
      calcium: null,
      magnesium: null,
      potassium: null,
      strontium: null,
    });
    expect(uptake("").basis).toBe("none");
  });
});

describe("from cohorts", () => {
  it.each([
    ["cohort plugs 420 pieces uptake 0.9 meq/day each", 378],
    ["cohort plugs 420 pieces uptake 378 meq/day", 378],
    ["cohort plugs 420 pieces uptake 0.45 mmol/day as CaCO3 each", 378],
    // 0.4 m² × 240 mmol × 2.
    ["cohort crust 0.4 m2 uptake 240 mmol/m2/day as CaCO3", 192],
    ["cohort crust 4000 cm2 uptake 24 umol/cm2/day as CaCO3", 192],
    ["cohort crust 0.4 m2 uptake 480 meq/m2/day", 192],
    // 24.02064 g of CaCO3 are 0.24 mol.
    ["cohort crust 0.4 m2 uptake 24.02064 g/m2/day as CaCO3", 192],
  ])("%s", (line, meq) => {
    const found = uptake(`  ${line}`);
    expect(found.basis).toBe("cohorts");
    expect(found.perDay.alkalinity).toBeCloseTo(meq, 6);
  });

  it("adds them, each with its own mineral", () => {
    const found = uptake(`  cohort plugs 100 pieces uptake 1 meq/day each magnesium 1 %
  cohort crust 0.5 m2 uptake 600 meq/m2/day magnesium 15 %`);
    // 100 and 300 meq: x = (100 × 0.01 + 300 × 0.15)/400 = 0.115.
    expect(found.perDay.alkalinity).toBeCloseTo(400, 9);
    expect(found.magnesiumFraction).toBeCloseTo(0.115, 12);
    expect(found.perDay.magnesium).toBeCloseTo(400 * 0.0575 * 24.305, 6);
    expect(found.perDay.calcium).toBeCloseTo(400 * 0.4425 * 40.078, 6);
    expect(found.magnesiumFractionStated).toBe(true);
  });

  it("`skeleton` speaks for those that say nothing", () => {
    const found = uptake(`  skeleton magnesium 4 %
  cohort plugs 100 pieces uptake 1 meq/day each
  cohort crust 0.5 m2 uptake 600 meq/m2/day magnesium 12 %`);
    expect(found.magnesiumFraction).toBeCloseTo((100 * 0.04 + 300 * 0.12) / 400, 12);
  });

  it("is beaten by what was found for the whole system, which has its mineral", () => {
    const found = uptake(`  uptake alkalinity 500 meq/day
  cohort plugs 100 pieces uptake 1 meq/day each magnesium 10 %`);
    expect(found.basis).toBe("stated");
    expect(found.perDay.alkalinity).toBe(500);
    expect(found.magnesiumFraction).toBeCloseTo(0.1, 12);
  });

  it("before its `from` a cohort isn't there", () => {
    const later = "  cohort plugs 100 pieces uptake 1 meq/day each from 2026-11-10";
    expect(uptake(later).basis).toBe("none");
    expect(uptake(later, "2026-11-10").perDay.alkalinity).toBe(100);
  });
});

describe("what is fed", () => {
  // 20 g a day of 45 % protein: 9 g × 0.16 = 1.44 g of nitrogen, 14.007 g/mol, one equivalent a mole to nitrate.
  const loss = 1440 / 14.007;

  it("takes alkalinity beside the corals", () => {
    const found = uptake("  cohort plugs 100 pieces uptake 1 meq/day each\n  feeds 20 g/day protein 45 %");
    expect(found.otherLossMeqPerDay).toBeCloseTo(loss, 9);
    expect(found.perDay.alkalinity).toBeCloseTo(100 + loss, 9);
    // The corals' calcium is what their own 100 meq take.
    expect(found.perDay.calcium).toBeCloseTo(100 * 0.4975 * 40.078, 6);
  });

  it("is part of what was found for the whole system", () => {
    const found = uptake("  uptake alkalinity 300 meq/day\n  feeds 140 g/week protein 45 %");
    expect(found.perDay.alkalinity).toBe(300);
    expect(found.perDay.calcium).toBeCloseTo((300 - loss) * 0.4975 * 40.078, 6);
  });

  it("alone says nothing of the corals", () => {
    expect(uptake("  feeds 20 g/day protein 45 %").perDay.alkalinity).toBeNull();
  });
});
