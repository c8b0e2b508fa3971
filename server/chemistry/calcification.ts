/** What laying down skeleton takes from the water. */
import { atomicWeight } from "./elements.ts";

/**
 * What calcification takes for each milliequivalent of alkalinity, where x is the mole fraction of magnesium
 * in the mineral: (1 − x)/2 mmol calcium and x/2 mmol magnesium. One mole of carbonate mineral takes two
 * equivalents.
 *
 * Smith & Key 1975, Limnol. Oceanogr. 20, 493–495; Chisholm & Gattuso 1991, Limnol. Oceanogr. 36, 1232–1239.
 */
export type CalcificationPerMeq = {
  readonly calciumMmol: number;
  readonly magnesiumMmol: number;
  readonly calciumMg: number;
  readonly magnesiumMg: number;
  /** Mineral laid down, (Ca,Mg)CO3. */
  readonly mineralG: number;
};

/** Mole fraction 0 to 1; a fraction beyond it is taken as the nearer end. */
export function calcificationPerMeq(magnesiumMoleFraction: number): CalcificationPerMeq {
  const x = Math.min(1, Math.max(0, magnesiumMoleFraction));
  const calciumMmol = (1 - x) / 2;
  const magnesiumMmol = x / 2;
  const calciumMg = calciumMmol * atomicWeight.Ca;
  const magnesiumMg = magnesiumMmol * atomicWeight.Mg;
  const carbonateMg = 0.5 * (atomicWeight.C + 3 * atomicWeight.O);
  return {
    calciumMmol,
    magnesiumMmol,
    calciumMg,
    magnesiumMg,
    mineralG: (calciumMg + magnesiumMg + carbonateMg) / 1000,
  };
}

/** Grams of pure CaCO3 per milliequivalent of alkalinity. */
export const calciumCarbonateGPerMeq = calcificationPerMeq(0).mineralG;
