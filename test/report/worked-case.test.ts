/** Cases worked by hand, through the whole walk. */
import { describe, expect, test } from "vitest";
import { reportOf } from "./walk.ts";

describe("1 000 L, alkalinity 1 dKH below its aim", () => {
  /*
   * Atomic weights: IUPAC abridged. M(CaO) = 40.078 + 15.999 = 56.077; 1 dKH = 10 mg/L CaO = 20/56.077 = 0.3566525 meq/L.
   * M(Na2CO3) = 2 × 22.990 + 12.011 + 3 × 15.999 = 105.988; 84.79 g/L = 2 × 84.79/105.988 = 1.59999 eq/L.
   * M(CaCl2·2H2O) = 40.078 + 2 × 35.45 + 2 × 18.015 = 147.008; 117.6 g/L = 117.6/147.008 = 0.79996 mol/L.
   * Uptake 0.5 dKH/day = 0.1783262 meq/L/day; calcium (no magnesium in the skeleton) half of it, 0.0891631 mmol/L/day.
   * Maintenance: 178.3262 meq ÷ 1.6 = 111.454 mL; 89.1631 mmol ÷ 0.8 = 111.454 mL.
   * Correction: 1 dKH = 356.6525 meq ÷ 1.6 = 222.908 mL. Wished 1/7 + (7.6 − 7.0)/1 = 0.743 dKH/day, limit 0.5: 2 days.
   */
  const report = reportOf(`system vat
  tank main 1000 L
  skeleton magnesium 0 %
  hold alkalinity 7.6 to 8.4 dKH aim 8.0
  hold calcium 400 to 440 mg/L aim 420
  hold magnesium 1280 to 1360 mg/L aim 1320
  limit alkalinity rise 0.5 dKH/day
  uptake alkalinity 0.5 dKH/day
  by-hand soda-ash-part times 12
  by-hand chloride-part times 12

solution soda-ash-part
  dissolve sodium-carbonate 84.79 g
  make up to 1 L

solution chloride-part
  dissolve calcium-chloride-dihydrate 117.6 g
  make up to 1 L

log vat
  2026-12-01 08:00 read alkalinity 7.0 dKH, calcium 420 mg/L, magnesium 1320 mg/L
`);
  const plan = report.systems[0]!.plan!;
  const [ash, chloride] = plan.doses;

  test("strengths are 1.6000 meq/mL and 0.8000 mmol/mL", () => {
    const [first, second] = report.solutions;
    expect(first?.per_mL.alkalinity_meq?.toFixed(4)).toBe("1.6000");
    expect(((second?.per_mL.calcium_mg ?? 0) / 40.078).toFixed(4)).toBe("0.8000");
  });

  test("maintenance is 111.5 mL a day of each", () => {
    expect(Math.abs(ash!.maintenance_mL_per_day! - 111.5)).toBeLessThan(0.1);
    expect(Math.abs(chloride!.maintenance_mL_per_day! - 111.5)).toBeLessThan(0.1);
    expect(ash?.maintenance_mL_per_day).toBeCloseTo(178.326 / ((2 * 84.79) / 105.988), 2);
  });

  test("correction is 222.9 mL of the soda-ash part over 2 days, none of the other", () => {
    expect(Math.abs(ash!.correction_total_mL! - 222.9)).toBeLessThan(0.1);
    expect(ash!.correction_mL_per_day! * 2).toBeCloseTo(ash!.correction_total_mL!, 9);
    expect(chloride).toMatchObject({ correction_mL_per_day: 0, correction_total_mL: 0 });
    expect(plan.corrections).toHaveLength(1);
    expect(plan.corrections[0]).toMatchObject({ parameter: "alkalinity", unit: "meq/L" });
    expect(plan.corrections[0]?.amount).toBeCloseTo(20 / 56.077, 12);
    expect(plan.correction_days).toBeCloseTo(2, 9);
    expect(plan.limited_by).toBe("alkalinity rise");
    expect(plan.after.alkalinity_meq_per_L).toBeCloseTo((8 * 20) / 56.077, 9);
    expect(ash).toMatchObject({ by: "hand", doses_per_day: 12, every_days: 1 });
  });
});

describe("salinity 33 with alkalinity just under its band", () => {
  const farm = (hold: string) =>
    reportOf(`system vat
  tank main 1000 L
  hold alkalinity 7.6 to 8.4 dKH
  hold salinity ${hold}
  uptake alkalinity 0.5 dKH/day
  by-hand ash times 4

solution ash
  dissolve sodium-carbonate 84.79 g
  make up to 1 L

log vat
  2026-12-01 08:00 read alkalinity 7.5 dKH, salinity 33
`);

  test("a farm that holds 32 to 34 gets its correction", () => {
    const report = farm("32 to 34");
    expect(report.systems[0]!.plan!.corrections).toMatchObject([{ parameter: "alkalinity" }]);
    expect(report.problems.map(({ code }) => code)).not.toContain("water/salinity-is-the-cause");
  });

  test("one that holds 34 to 35.5 gets maintenance and the reason", () => {
    const report = farm("34 to 35.5");
    const plan = report.systems[0]!.plan!;
    expect(plan.corrections).toEqual([]);
    expect(plan.limited_by).toBe("salinity");
    expect(plan.doses[0]?.maintenance_mL_per_day).toBeCloseTo(178.326 / ((2 * 84.79) / 105.988), 2);
    expect(plan.doses[0]?.correction_mL_per_day).toBe(0);
    // 7.5 dKH × 34.75/33 × ρ(34.75)/ρ(33) = 7.91 dKH: inside the band at the salinity aim.
    const [problem] = report.problems.filter(({ code }) => code === "water/salinity-is-the-cause");
    expect(problem).toMatchObject({ severity: "warning", system: "vat" });
    expect(problem?.message).toContain("7.9");
  });
});
