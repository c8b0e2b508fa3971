/** Salinity as the cause, the room's air, and the salt that dosing leaves behind. */
import { describe, expect, it } from "vitest";
import { finding, found, system } from "./fixture.ts";

const text = (holds: string, reading: string, more = "") => `
solution ash
  dissolve sodium-carbonate 52.994 g
  make up to 1 L

system vat
  tank main 1000 L
  uptake alkalinity 0.1 meq/L/day
  hold alkalinity 7.6 to 8.4 dKH aim 8
${holds}
  pump one gives ash at 40 mL/min
${more}

log vat
  2026-11-01 08:00 read ${reading}
`;

const asked = "2026-11-01 08:00";
const doses = (assessment: ReturnType<typeof system>) => {
  const [one] = assessment.plan?.answer.sources ?? [];
  return { maintenance: one?.maintenanceLPerDay ?? null, correction: one?.correctionLPerDay ?? null };
};

describe("salinity as the cause", () => {
  it("inside its own band it is none: the value is corrected", () => {
    const assessment = system(text("  hold salinity 32 to 34", "alkalinity 7.5 dKH, salinity 33"), asked);
    expect(found(assessment, "water/salinity")).toEqual([]);
    // 1 meq/mL: 100 mL a day meet the uptake.
    expect(doses(assessment).maintenance).toBeCloseTo(0.1, 3);
    expect(doses(assessment).correction).toBeGreaterThan(0);
  });

  it("outside it, and the value in its band at the salinity aim: maintenance only, and the reason", () => {
    const assessment = system(text("  hold salinity 34 to 35.5", "alkalinity 7.5 dKH, salinity 33"), asked);
    expect(found(assessment, "water/salinity")).toEqual(["water/salinity-is-the-cause: alkalinity 7.5 dKH"]);
    expect(doses(assessment).maintenance).toBeCloseTo(0.1, 3);
    expect(doses(assessment).correction).toBe(0);
    expect(assessment.plan?.answer.corrections).toEqual([]);
    const told = finding(assessment, "water/salinity-is-the-cause");
    expect(told).toMatchObject({ hidden: false, salinity: 33, salinityAim: 34.75 });
    // Per kilogram in proportion: 7.5 × 34.75/33 × 1.02315/1.02183 dKH (EOS-80, 25 °C).
    expect((told.scaled * 56.077) / 20).toBeCloseTo((7.5 * 34.75 * 1.02315) / 33 / 1.02183, 3);
  });

  it("outside it, and the value out of its band at the aim too: corrected", () => {
    const assessment = system(text("  hold salinity 34 to 35.5", "alkalinity 6.9 dKH, salinity 33"), asked);
    expect(found(assessment, "water/salinity")).toEqual([]);
    expect(doses(assessment).correction).toBeGreaterThan(0);
  });

  it("high, with the value in its band only because of it, is told too", () => {
    const assessment = system(text("  hold salinity 32 to 34", "alkalinity 7.7 dKH, salinity 36"), asked);
    expect(finding(assessment, "water/salinity-is-the-cause")).toMatchObject({ hidden: true });
    // The same water where 36 is held.
    const twin = system(text("  hold salinity 35 to 37", "alkalinity 7.7 dKH, salinity 36"), asked);
    expect(found(twin, "water/salinity")).toEqual([]);
  });

  it("isn't found in a salinity of more than a week ago", () => {
    const old =
      text("  hold salinity 34 to 35.5", "alkalinity 7.5 dKH, salinity 33") +
      "  2026-11-10 08:00 read alkalinity 7.5 dKH\n";
    const assessment = system(old.replace("salinity 33\n\n", "salinity 33\n"), "2026-11-10 08:00");
    expect(found(assessment, "water/salinity")).toEqual([]);
    expect(doses(assessment).correction).toBeGreaterThan(0);
  });
});

describe("the room's air", () => {
  const air = (reading: string, holds = "  hold pH 8.0 to 8.4") =>
    system(
      text(`${holds}\n  air CO2 1200 ppm`, `alkalinity 8 dKH, salinity 35, temperature 25 degC, ${reading}`),
      asked,
    );

  it("is told of where pH is below its band with too much CO2 in the water", () => {
    const told = finding(air("pH 7.8"), "water/room-air");
    expect(told.pH).toBeCloseTo(7.8, 10);
    expect(told.roomPpm).toBe(1200);
    expect(told.pCO2Uatm).toBeGreaterThan(1000);
    expect(told.pHWithRoom).toBeLessThan(told.pHWithOutdoor);
    // TA 2788 µmol/kg with 425 ppm of outdoor air: pH near 8.1 on the total scale (CALC: 2648 with 400 µatm is 8.094),
    // 0.134 more on the NBS scale.
    expect(told.pHWithOutdoor).toBeCloseTo(8.1 + 0.134, 1);
  });

  it("isn't where pH is in its band, or nobody states the air", () => {
    expect(found(air("pH 8.1"), "water/room")).toEqual([]);
    const silent = text("  hold pH 8.0 to 8.4", "alkalinity 8 dKH, salinity 35, temperature 25 degC, pH 7.8");
    expect(found(system(silent, asked), "water/room")).toEqual([]);
  });

  it("is judged on the scale of the band", () => {
    // 7.97 total is 8.10 NBS.
    expect(found(air("pH 7.97 total"), "water/room")).toEqual([]);
    expect(found(air("pH 8.1", "  hold pH 8.0 to 8.4 total"), "water/room")).toEqual([
      "water/room-air: pH 8.1",
    ]);
  });
});

describe("salt left behind", () => {
  const reading = "alkalinity 8 dKH, salinity 35";
  // Maintenance of 100 mL a day of 52.994 g/L: 5.2994 g in 1000 L; the skeleton takes 100 meq × 0.050043 g.
  const toSalinity = 35 / 35.16504 / 1.0233;
  const gain = (0.0052994 - 0.0050043) * toSalinity;

  it("is what maintenance adds less what the skeleton takes", () => {
    const { salt } = system(text("", reading), asked);
    expect(salt!.salinityGainPerMonth).toBeCloseTo(30 * gain, 6);
    // Litres a week = salt gained ÷ salinity.
    expect(salt!.freshWaterSwapLPerWeek).toBeCloseTo((7 * gain * 1000) / 35, 4);
  });

  it("with calcium chloride beside it is sodium chloride: 58.44 g a meq pair", () => {
    const chloride = `${text("  hold calcium 400 to 440 mg/L", `${reading}, calcium 420 mg/L`, "  pump two gives chloride at 40 mL/min\n  skeleton magnesium 0 %")}
solution chloride
  dissolve calcium-chloride-dihydrate 73.504 g
  make up to 1 L
`;
    const { salt, plan } = system(chloride, asked);
    expect(plan!.answer.sources.map(({ maintenanceLPerDay }) => maintenanceLPerDay?.toFixed(4))).toEqual([
      "0.1000",
      "0.1000",
    ]);
    // What is left of Na2CO3 + CaCl2 without its CaCO3: 2 NaCl, 58.44 mg a meq; 100 meq a day are 5.844 g.
    expect(salt!.salinityGainPerMonth).toBeCloseTo(30 * 0.005844 * toSalinity, 4);
  });

  it("flow-through and logged exchanges carry it off", () => {
    const mix = "saltwater mix\n  salinity 35\n  alkalinity 8 dKH\n";
    const fresh = "saltwater weak\n  salinity 30\n";
    const through = system(text("", reading, "  flows-through 50 L/day with mix") + mix, asked).salt!;
    // At 35 into 35 nothing is carried off.
    expect(through.salinityGainPerMonth).toBeCloseTo(30 * gain, 5);
    const lighter = system(text("", reading, "  flows-through 50 L/day with weak") + fresh, asked);
    expect(lighter.salt!.salinityGainPerMonth).toBeLessThan(-30 * 0.05 * 4.9);
    expect(lighter.salt!.freshWaterSwapLPerWeek).toBe(0);
    const exchanged =
      text("", reading).replace("log vat\n", `log vat\n  2026-10-20 08:00 renewed 100 L with weak\n`) + fresh;
    // A tenth of the water at 30 for 35, once in 30 days: −0.5 a month.
    expect(system(exchanged, asked).salt!.salinityGainPerMonth).toBeCloseTo(30 * gain - 0.5, 5);
  });
});
