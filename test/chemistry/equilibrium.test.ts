import { describe, expect, test } from "vitest";
import { constantsAt, type SeaWaterConstants } from "../../server/chemistry/constants-at.ts";
import { waterOnSeawaterScale } from "../../server/chemistry/equilibrium.ts";
import { seaWaterPoint } from "../../server/chemistry/in-seawater.ts";
import { answer, near, reference, within } from "./reference.ts";

type Row = { salinity: number; temperature_degC: number } & Record<string, number>;

describe("equilibrium constants", () => {
  const figures: Record<string, (k: SeaWaterConstants) => number> = {
    k_CO2: (k) => k.K0,
    k_carbonic_1: (k) => k.K1,
    k_carbonic_2: (k) => k.K2,
    k_borate: (k) => k.KB,
    k_water: (k) => k.KW,
    k_bisulfate: (k) => k.KSO4,
    k_fluoride: (k) => k.KF,
    k_aragonite: (k) => k.aragonite,
    k_calcite: (k) => k.calcite,
    total_borate: (k) => 1e6 * k.boron,
    total_sulfate: (k) => 1e6 * k.sulfate,
    total_fluoride: (k) => 1e6 * k.fluoride,
    fH: (k) => k.fH,
    fugacity_factor: (k) => k.fugacityFactor,
    vp_factor: (k) => k.dryAirShare,
  };

  test("agree with the reference library at every point", () => {
    const { rows } = reference<{ rows: Row[] }>("equilibrium-constants.json");
    expect(rows.length).toBe(6);
    for (const row of rows) {
      const constants = answer(constantsAt(row.salinity, row.temperature_degC));
      for (const [name, figure] of Object.entries(figures)) {
        near(figure(constants), row[name]!, 1e-8, `${name} at ${row.salinity}, ${row.temperature_degC}`);
      }
    }
  });

  // Target values of Dickson, Sabine & Christian 2007, PICES Spec. Publ. 3, ch. 5, at 35 and 25 °C.
  test("agree with the printed targets of the handbook", () => {
    const k = answer(constantsAt(35, 25));
    expect(Math.log(k.K0).toFixed(4)).toBe("-3.5617");
    // The handbook prints −8.9660 for −8.96595: half a digit.
    within(Math.log10(k.K1), -5.8472, 0.6e-4, "K1");
    within(Math.log10(k.K2), -8.966, 0.6e-4, "K2");
    expect(Math.log(k.KB).toFixed(4)).toBe("-19.7964");
    expect(Math.log(k.KSO4).toFixed(2)).toBe("-2.30");
    expect(Math.log(k.KF).toFixed(2)).toBe("-6.09");
    expect(Math.log10(k.calcite).toFixed(3)).toBe("-6.369");
    expect(Math.log10(k.aragonite).toFixed(3)).toBe("-6.188");
  });

  test("KW: the handbook's fixed 0.015, and the exact way to the total scale", () => {
    const onSeawaterScale = waterOnSeawaterScale(seaWaterPoint(35, 25)).value;
    expect((Math.log(onSeawaterScale) - 0.015).toFixed(3)).toBe("-30.434");
    const exact = answer(constantsAt(35, 25)).KW;
    near(exact, 6.01370352e-14, 1e-8, "exact KW");
    within(Math.log(6.063864e-14 / exact), 0.0083, 1e-4, "between the two");
  });

  test("scales of pH at 35 and 25 °C", () => {
    const k = answer(constantsAt(35, 25));
    // Check value of the method of Takahashi et al. 1982: NBS 8.0 is 7.853336 on the seawater scale.
    expect((8 - k.nbsLessTotal + k.seawaterScaleLessTotal).toFixed(5)).toBe("7.85334");
    within(Math.log10(k.totalOverFree), 0.1077, 5e-5, "free less total");
    within(k.nbsLessTotal, 0.1365, 5e-5, "NBS less total");
  });
});

describe("range", () => {
  test("inside, nothing is found", () => {
    expect(answer(constantsAt(35, 25)).outsideRange).toEqual([]);
  });

  test("outside, the quantity, what is wrong and its range are told, and the value isn't clipped", () => {
    const at44 = answer(constantsAt(44, 25));
    expect(at44.outsideRange).toContainEqual({
      quantity: "K1",
      variable: "salinity",
      value: 44,
      range: [19, 43],
    });
    expect(at44.outsideRange.map((finding) => finding.quantity)).not.toContain("KB");
    expect(at44.K1).toBeGreaterThan(answer(constantsAt(43, 25)).K1);
    expect(answer(constantsAt(35, 36)).outsideRange).toContainEqual({
      quantity: "K2",
      variable: "celsius",
      value: 36,
      range: [2, 35],
    });
  });

  test("beyond sea water there is no answer", () => {
    const none = { ok: false, reason: "impossible-water" };
    for (const [salinity, celsius] of [
      [-1, 25],
      [61, 25],
      [35, -3],
      [35, 46],
      [Number.NaN, 25],
      [35, Number.POSITIVE_INFINITY],
    ] as const) {
      expect(constantsAt(salinity, celsius)).toEqual(none);
    }
  });

  test("every constant is finite and positive over all that is answered", () => {
    for (let salinity = 0; salinity <= 60; salinity += 5) {
      for (let celsius = -2; celsius <= 45; celsius += 1) {
        const k = answer(constantsAt(salinity, celsius));
        const { K0, K1, K2, KB, KW, KSO4, KF, aragonite, calcite, fH, fugacityFactor, dryAirShare } = k;
        for (const value of [
          K0,
          K1,
          K2,
          KB,
          KW,
          KSO4,
          KF,
          aragonite,
          calcite,
          fH,
          fugacityFactor,
          dryAirShare,
        ]) {
          expect(value > 0 && Number.isFinite(value), `${salinity}, ${celsius}`).toBe(true);
        }
        expect(Number.isFinite(k.nbsLessTotal)).toBe(true);
      }
    }
  });
});
