import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { afterDose, carbonateOf, type SolutionStrength } from "../../server/chemistry/after-dose.ts";
import { carbonBefore, pco2OfAir } from "../../server/chemistry/carbon-before.ts";
import { constantsAt } from "../../server/chemistry/constants-at.ts";
import { largestDose } from "../../server/chemistry/largest-dose.ts";
import { composition, type ReagentName, reagentElements } from "../../server/chemistry/reagents.ts";
import { densityKgPerL } from "../../server/chemistry/sea-water.ts";
import { answer, near, within } from "./reference.ts";

/** A solution of one dry reagent. */
function solutionOf(reagent: ReagentName, gramsPerL: number): SolutionStrength {
  const gram = composition(reagentElements(reagent));
  return {
    alkalinityMeqPerL: gramsPerL * gram.alkalinityMeqPerG!,
    dicMmolPerL: gramsPerL * gram.carbonMmolPerG,
    calciumMgPerL: gramsPerL * gram.calciumMmolPerG * 40.078,
    saltGPerL: gramsPerL,
  };
}

const density = densityKgPerL(35, 25);
/** Alkalinity 2300 and DIC 2000 µmol/kg, natural calcium. */
const water = {
  alkalinityMeqPerL: 2.3 * density,
  dicMmolPerL: 2 * density,
  calciumMgPerL: 10.28457 * 40.078 * density,
  salinity: 35,
  temperatureDegC: 25,
  volumeL: 100,
};

describe("after a dose", () => {
  // One dKH for 100 L by four routes, and what it does closed; computed from the handbook of Dickson et al. 2007.
  test.each([
    ["sodium-bicarbonate", 2.996, 7.996, 3.58],
    ["sodium-carbonate", 1.89, 8.242, 5.46],
    ["sodium-hydroxide", 1.427, 8.446, 7.35],
  ] as const)("%s, %d g for 100 L", (reagent, grams, pH, omega) => {
    const after = answer(afterDose(water, solutionOf(reagent, grams * 100), 0.01));
    // The 10 mL dilute by 1 in 10 000.
    within((after.alkalinityMeqPerL - water.alkalinityMeqPerL) * 2.80385, 1, 0.0012, "rise, dKH");
    within(after.carbonate.pHTotal, pH, 0.0015, "pH");
    within(after.carbonate.omegaAragonite, omega, 0.015, "Ω");
  });

  test("limewater brings calcium with alkalinity: 7.147 mg/L with a dKH", () => {
    const after = answer(afterDose({ ...water, volumeL: 100 }, solutionOf("calcium-hydroxide", 132.1), 0.01));
    within(after.calciumMgPerL - water.calciumMgPerL, 7.147, 0.05, "calcium");
    expect(after.carbonate.omegaAragonite).toBeGreaterThan(7.35);
  });

  test("amounts are kept: of water and dose together as much as before", () => {
    const solution = solutionOf("sodium-carbonate", 84);
    const after = answer(afterDose(water, solution, 7));
    expect(after.volumeL).toBe(107);
    near(
      after.alkalinityMeqPerL * 107,
      water.alkalinityMeqPerL * 100 + solution.alkalinityMeqPerL * 7,
      1e-14,
      "meq",
    );
    near(after.dicMmolPerL * 107, water.dicMmolPerL * 100 + solution.dicMmolPerL * 7, 1e-14, "carbon");
  });

  test("no dose is the water as it is", () => {
    const { carbonate } = answer(afterDose(water, solutionOf("sodium-carbonate", 84), 0));
    const as = answer(carbonateOf(water));
    near(carbonate.pHTotal, as.pHTotal, 1e-12, "pH");
    near(carbonate.omegaAragonite, as.omegaAragonite, 1e-12, "Ω");
  });

  test("fresh water dilutes salinity by mass", () => {
    const fresh = { alkalinityMeqPerL: 0, dicMmolPerL: 0, calciumMgPerL: 0, saltGPerL: 0 };
    const after = answer(afterDose(water, fresh, 100));
    const kgOfSea = 100 * density;
    near(after.salinity, (35 * kgOfSea) / (kgOfSea + 100 * densityKgPerL(0, 25)), 1e-12, "salinity");
  });

  test("what can't be mixed is told", () => {
    const solution = solutionOf("sodium-carbonate", 84);
    for (const [volumeL, doseL] of [
      [0, 1],
      [100, -1],
      [100, Number.NaN],
      [Number.POSITIVE_INFINITY, 1],
    ] as const) {
      expect(afterDose({ ...water, volumeL }, solution, doseL)).toEqual({
        ok: false,
        reason: "impossible-figure",
      });
    }
    const acid = { ...solution, dicMmolPerL: -1000 };
    expect(afterDose(water, acid, 10)).toEqual({ ok: false, reason: "impossible-figure" });
  });
});

describe("the largest delivery", () => {
  const limits = { pHNbsMax: 8.6, pHJumpMax: 0.1, omegaAragoniteMax: 12 };
  const none = {
    pHNbsMax: Number.POSITIVE_INFINITY,
    pHJumpMax: Number.POSITIVE_INFINITY,
    omegaAragoniteMax: Number.POSITIVE_INFINITY,
  };
  const carbonate = solutionOf("sodium-carbonate", 84);
  const hydroxide = solutionOf("sodium-hydroxide", 40);
  const bicarbonate = solutionOf("sodium-bicarbonate", 60);
  const state = (doseL: number, solution = carbonate) => answer(afterDose(water, solution, doseL)).carbonate;
  const before = state(0);

  test("stops at the jump of pH", () => {
    const found = answer(largestDose(water, carbonate, limits, 5));
    expect(found.bindingLimit).toBe("pH jump");
    within(state(found.volumeL).pHNbs - before.pHNbs, 0.1, 1e-6, "jump");
    expect(state(found.volumeL).pHNbs - before.pHNbs).toBeLessThanOrEqual(0.1 + 1e-9);
    expect(state(found.volumeL * 1.001).pHNbs - before.pHNbs).toBeGreaterThan(0.1);
  });

  test("stops at the highest pH", () => {
    const found = answer(largestDose(water, hydroxide, { ...none, pHNbsMax: 8.6 }, 5));
    expect(found.bindingLimit).toBe("pH max");
    within(state(found.volumeL, hydroxide).pHNbs, 8.6, 1e-6, "pH");
  });

  test("stops at Ω", () => {
    const found = answer(largestDose(water, carbonate, { ...none, omegaAragoniteMax: 12 }, 5));
    expect(found.bindingLimit).toBe("omega aragonite");
    within(state(found.volumeL).omegaAragonite, 12, 1e-5, "Ω");
  });

  test("gives all where nothing binds", () => {
    expect(largestDose(water, carbonate, limits, 0.001)).toEqual({
      ok: true,
      volumeL: 0.001,
      bindingLimit: null,
    });
    expect(largestDose(water, carbonate, limits, 0)).toEqual({ ok: true, volumeL: 0, bindingLimit: null });
  });

  test("a limit already broken admits no dose that adds to it, and one that doesn't", () => {
    const high = answer(afterDose(water, hydroxide, 0.1));
    expect(high.carbonate.pHNbs).toBeGreaterThan(8.6);
    const highWater = {
      ...water,
      alkalinityMeqPerL: high.alkalinityMeqPerL,
      dicMmolPerL: high.dicMmolPerL,
    };
    const more = answer(largestDose(highWater, hydroxide, { ...none, pHNbsMax: 8.6 }, 5));
    expect(more.bindingLimit).toBe("pH max");
    within(more.volumeL, 0, 1e-7, "dose");
    const mild = answer(largestDose(highWater, bicarbonate, { ...none, pHNbsMax: 8.6 }, 0.1));
    expect(mild).toEqual({ ok: true, volumeL: 0.1, bindingLimit: null });
  });

  test("a fall of pH is a jump too", () => {
    const acid = { alkalinityMeqPerL: -1000, dicMmolPerL: 0, calciumMgPerL: 0, saltGPerL: 0 };
    const found = answer(largestDose(water, acid, limits, 5));
    expect(found.bindingLimit).toBe("pH jump");
    within(state(found.volumeL, acid).pHNbs - before.pHNbs, -0.1, 1e-6, "jump");
  });

  test("a dose that would leave no sea water is told", () => {
    const brine = { alkalinityMeqPerL: 0, dicMmolPerL: 0, calciumMgPerL: 0, saltGPerL: 300 };
    const found = answer(largestDose(water, brine, none, 100));
    expect(found.bindingLimit).toBe("sea water");
    within(answer(afterDose(water, brine, found.volumeL)).salinity, 60, 1e-4, "salinity");
  });

  test("whatever the solution, the delivery keeps every limit that the water keeps", () => {
    const strength = fc.record({
      alkalinityMeqPerL: fc.double({ min: -500, max: 3000, noNaN: true }),
      dicMmolPerL: fc.double({ min: 0, max: 1500, noNaN: true }),
      calciumMgPerL: fc.double({ min: 0, max: 100_000, noNaN: true }),
      saltGPerL: fc.double({ min: 0, max: 300, noNaN: true }),
    });
    fc.assert(
      fc.property(strength, fc.double({ min: 1e-6, max: 100, noNaN: true }), (solution, mostL) => {
        const found = answer(largestDose(water, solution, limits, mostL));
        expect(found.volumeL).toBeGreaterThanOrEqual(0);
        expect(found.volumeL).toBeLessThanOrEqual(mostL);
        expect(found.bindingLimit === null).toBe(found.volumeL === mostL);
        const { pHNbs, omegaAragonite } = state(found.volumeL, solution);
        expect(pHNbs).toBeLessThanOrEqual(8.6 + 1e-8);
        expect(Math.abs(pHNbs - before.pHNbs)).toBeLessThanOrEqual(0.1 + 1e-8);
        expect(omegaAragonite).toBeLessThanOrEqual(12 + 1e-8);
      }),
    );
  });

  test("figures that aren't any are told", () => {
    const wrong = { ok: false, reason: "impossible-figure" };
    expect(largestDose(water, carbonate, limits, Number.NaN)).toEqual(wrong);
    expect(largestDose(water, carbonate, { ...limits, pHNbsMax: Number.NaN }, 1)).toEqual(wrong);
  });
});

describe("carbon before a dose", () => {
  const litre = {
    alkalinityMeqPerL: water.alkalinityMeqPerL,
    calciumMgPerL: water.calciumMgPerL,
    salinity: 35,
    temperatureDegC: 25,
  };

  test("from the pH of the water, on either scale", () => {
    const { pHTotal, pHNbs } = answer(carbonateOf(water));
    near(answer(carbonBefore(litre, { pHTotal })).dicMmolPerL, water.dicMmolPerL, 1e-10, "total");
    near(answer(carbonBefore(litre, { pHNbs })).dicMmolPerL, water.dicMmolPerL, 1e-10, "NBS");
  });

  test("in balance with air: dry air is thinned by water vapour", () => {
    const constants = answer(constantsAt(35, 25));
    within(pco2OfAir(425, constants), 425 * 0.9693447, 1e-4, "µatm");
    const air = answer(carbonBefore(litre, { co2PpmDryAir: 425 }, constants));
    const pressure = answer(carbonBefore(litre, { pCO2Uatm: 425 * constants.dryAirShare }));
    near(air.dicMmolPerL, pressure.dicMmolPerL, 1e-12, "DIC");
    within(air.carbonate.pCO2Uatm, 411.97, 0.01, "pCO2");
  });

  test("stale room air lowers pH", () => {
    const outdoors = answer(carbonBefore(litre, { co2PpmDryAir: 425 }));
    const room = answer(carbonBefore(litre, { co2PpmDryAir: 900 }));
    expect(room.carbonate.pHNbs).toBeLessThan(outdoors.carbonate.pHNbs - 0.2);
  });

  test("water of 10 dKH in balance with outdoor air stands near Ω 7 by itself", () => {
    const tenDegrees = { ...litre, alkalinityMeqPerL: 10 / 2.80385 };
    within(answer(carbonBefore(tenDegrees, { co2PpmDryAir: 425 })).carbonate.omegaAragonite, 7, 0.4, "Ω");
  });

  test("no answer says why", () => {
    expect(carbonBefore({ ...litre, salinity: 70 }, { pHNbs: 8 })).toEqual({
      ok: false,
      reason: "impossible-water",
    });
    expect(carbonBefore({ ...litre, alkalinityMeqPerL: 0.1 }, { pHNbs: 11 })).toEqual({
      ok: false,
      reason: "needs-negative-carbon",
    });
  });
});
