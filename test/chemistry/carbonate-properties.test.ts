import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  fromAlkalinityAndDic,
  fromAlkalinityAndPco2,
  fromAlkalinityAndPh,
  fromDicAndPh,
} from "../../server/chemistry/carbonate-system.ts";
import { constantsAt } from "../../server/chemistry/constants-at.ts";
import { answer, near } from "./reference.ts";

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
type Six = [number, number, number, number, number, number];
const water = fc.record({
  salinity: number(0, 60),
  temperatureDegC: number(-2, 45),
  calciumUmolPerKg: number(0, 40_000),
});

/** Every figure of a state is finite, and no concentration negative; or it is said why there is no answer. */
function answersOrSaysWhy(state: ReturnType<typeof fromAlkalinityAndPh>): void {
  if (!state.ok) {
    expect(["needs-negative-carbon", "impossible-figure", "impossible-water", "impossible-ph"]).toContain(
      state.reason,
    );
    return;
  }
  const { ok: _ok, outsideRange: _outside, pHTotal, pHNbs, alkalinityUmolPerKg, ...amounts } = state;
  for (const value of [pHTotal, pHNbs, alkalinityUmolPerKg]) expect(Number.isFinite(value)).toBe(true);
  for (const [name, value] of Object.entries(amounts)) {
    expect(Number.isFinite(value) && value >= 0, `${name} ${value}`).toBe(true);
  }
}

describe("every pair", () => {
  test("answers, or says why not, over all water that may be asked about", () => {
    fc.assert(
      fc.property(
        water,
        number(0, 50_000),
        number(2, 12),
        number(0, 50_000),
        number(0, 1e6),
        (w, ta, pH, dic, p) => {
          const fromPh = fromAlkalinityAndPh({ alkalinityUmolPerKg: ta, pHTotal: pH }, w);
          answersOrSaysWhy(fromPh);
          if (!fromPh.ok) expect(fromPh.reason).toBe("needs-negative-carbon");
          for (const state of [
            fromAlkalinityAndDic({ alkalinityUmolPerKg: ta, dicUmolPerKg: dic }, w),
            fromAlkalinityAndPco2({ alkalinityUmolPerKg: ta, pCO2Uatm: p }, w),
            fromDicAndPh({ dicUmolPerKg: dic, pHTotal: pH }, w),
          ]) {
            expect(state.ok).toBe(true);
            answersOrSaysWhy(state);
          }
        },
      ),
      { numRuns: 2000 },
    );
  });

  test("lets no number through that isn't one", () => {
    const any = fc.oneof(fc.double(), fc.constantFrom(Number.NaN, Number.NEGATIVE_INFINITY, 0, -1, 1e300));
    fc.assert(
      fc.property(fc.array(any, { minLength: 6, maxLength: 6 }), (numbers) => {
        const [salinity, temperatureDegC, calciumUmolPerKg, alkalinityUmolPerKg, pHTotal, x] = numbers as Six;
        for (const asked of [
          { salinity, temperatureDegC, calciumUmolPerKg },
          { salinity: 35, temperatureDegC: 25, calciumUmolPerKg },
          { salinity: 35, temperatureDegC: 25, calciumUmolPerKg: 10_000 },
        ]) {
          answersOrSaysWhy(fromAlkalinityAndPh({ alkalinityUmolPerKg, pHTotal }, asked));
          answersOrSaysWhy(fromAlkalinityAndPh({ alkalinityUmolPerKg: 2300, pHTotal: 8 }, asked));
          answersOrSaysWhy(fromAlkalinityAndDic({ alkalinityUmolPerKg, dicUmolPerKg: x }, asked));
          answersOrSaysWhy(fromAlkalinityAndPco2({ alkalinityUmolPerKg, pCO2Uatm: x }, asked));
          answersOrSaysWhy(fromDicAndPh({ dicUmolPerKg: x, pHTotal }, asked));
        }
      }),
      { numRuns: 1000 },
    );
  });

  test("leads back to the same state", () => {
    fc.assert(
      fc.property(water, number(100, 20_000), number(6, 10), (w, dicUmolPerKg, pHTotal) => {
        const first = answer(fromDicAndPh({ dicUmolPerKg, pHTotal }, w));
        const { alkalinityUmolPerKg, pCO2Uatm } = first;
        for (const again of [
          fromAlkalinityAndPh({ alkalinityUmolPerKg, pHTotal }, w),
          fromAlkalinityAndDic({ alkalinityUmolPerKg, dicUmolPerKg }, w),
          fromAlkalinityAndPco2({ alkalinityUmolPerKg, pCO2Uatm }, w),
        ]) {
          const state = answer(again);
          near(state.pHTotal, pHTotal, 1e-9, "pH");
          near(state.dicUmolPerKg, dicUmolPerKg, 1e-9, "DIC");
          near(state.pCO2Uatm, pCO2Uatm, 1e-9, "pCO2");
          near(state.carbonateUmolPerKg, first.carbonateUmolPerKg, 1e-9, "CO3");
          near(state.bicarbonateUmolPerKg, first.bicarbonateUmolPerKg, 1e-9, "HCO3");
        }
      }),
      { numRuns: 2000 },
    );
  });

  test("more alkalinity at the same carbon is a higher pH; more carbon at the same alkalinity a lower", () => {
    fc.assert(
      fc.property(water, number(10, 20_000), number(10, 20_000), (w, ta, dic) => {
        const at = (alkalinityUmolPerKg: number, dicUmolPerKg: number) =>
          answer(fromAlkalinityAndDic({ alkalinityUmolPerKg, dicUmolPerKg }, w)).pHTotal;
        expect(at(ta * 1.01, dic)).toBeGreaterThan(at(ta, dic));
        expect(at(ta, dic * 1.01)).toBeLessThan(at(ta, dic));
      }),
    );
  });
});

describe("kept constants", () => {
  const water = { salinity: 33, temperatureDegC: 24, calciumUmolPerKg: 10_000 };
  const known = { alkalinityUmolPerKg: 2300, pHTotal: 8.1 };

  test("give the same answer", () => {
    const kept = answer(constantsAt(33, 24));
    expect(fromAlkalinityAndPh(known, water, kept)).toEqual(fromAlkalinityAndPh(known, water));
  });

  test("of another water aren't used", () => {
    const kept = answer(constantsAt(20, 10));
    expect(fromAlkalinityAndPh(known, water, kept)).toEqual(fromAlkalinityAndPh(known, water));
  });
});

test("alkalinity lower than the hydroxide of that pH needs negative carbon", () => {
  const water = { salinity: 35, temperatureDegC: 25, calciumUmolPerKg: 10_280 };
  const state = fromAlkalinityAndPh({ alkalinityUmolPerKg: 500, pHTotal: 11 }, water);
  expect(state).toEqual({ ok: false, reason: "needs-negative-carbon" });
});
