/** How much of a reagent dissolves in water, and how strong the clear part of a saturated solution is. */
import { atomicWeight } from "./elements.ts";
import { molarMass } from "./formula.ts";
import { type ReagentName, reagentElements } from "./reagents.ts";
import { densityKgPerL } from "./sea-water.ts";

/** Salts with a solubility here, by their anhydrous formula; every hydrate of a reagent counts as its salt. */
export type Salt =
  | "NaHCO3"
  | "Na2CO3"
  | "NaOH"
  | "CaCl2"
  | "MgCl2"
  | "MgSO4"
  | "NaCl"
  | "KCl"
  | "SrCl2"
  | "Ca(OH)2";

/** Temperatures of the table below, °C. */
const tableDegC = [0, 10, 20, 25, 30, 40] as const;

/**
 * Grams of anhydrous salt that saturate 100 g of water at each of `tableDegC`.
 *
 * CRC Handbook of Chemistry and Physics, 98th ed., "Aqueous solubility of inorganic compounds at various
 * temperatures" (mass % w as 100 w/(100 − w)). Where another compilation gives less, the lower figure stands:
 * sodium bicarbonate at 0 and 10 °C and sodium carbonate at 25 and 30 °C from Seidell's compilation,
 * magnesium chloride at 20 °C from an encyclopaedia table.
 */
const handbook: Readonly<Record<Exclude<Salt, "Ca(OH)2">, readonly number[]>> = {
  NaHCO3: [6.9, 8.2, 9.57, 10.28, 11.0, 12.52],
  Na2CO3: [6.88, 12.11, 21.8, 29.4, 39.7, 48.8],
  NaOH: [42.9, 63.9, 85.2, 100, 113, 138],
  CaCl2: [57.98, 64.45, 72.8, 81.26, 96.5, 112.1],
  MgCl2: [51.42, 53.49, 54.3, 56.01, 56.74, 58.15],
  MgSO4: [22.2, 27.7, 33.5, 35.7, 39.3, 44.7],
  NaCl: [35.65, 35.72, 35.89, 35.96, 36.09, 36.37],
  KCl: [27.78, 30.91, 34.03, 35.54, 37.06, 40.04],
  SrCl2: [46.93, 49.1, 52.51, 54.73, 57.31, 63.75],
};

/** Grams of Ca(OH)2 per 100 g of water at 0, 10, 20, 30, 40 °C: an older handbook table, used for its shape. */
const limeDegC = [0, 10, 20, 30, 40] as const;
const limeShape = [0.185, 0.176, 0.165, 0.153, 0.141] as const;

/** Saturated limewater of well-formed solid at 25 °C, mol/L. Bates, Bower & Smith 1956, J. Res. NBS 56, 305–312. */
export const limewaterMolPerLAt25DegC = 0.0203;

/** Where the tables hold, °C; nothing is said outside. */
export const solubilityRangeDegC = [0, 40] as const;

/** The salt as which each reagent dissolves; those without a figure here are left out. */
const saltOf: Partial<Record<ReagentName, Salt>> = {
  "sodium-carbonate": "Na2CO3",
  "sodium-carbonate-monohydrate": "Na2CO3",
  "sodium-carbonate-decahydrate": "Na2CO3",
  "sodium-bicarbonate": "NaHCO3",
  "sodium-hydroxide": "NaOH",
  "sodium-chloride": "NaCl",
  "potassium-chloride": "KCl",
  "calcium-hydroxide": "Ca(OH)2",
  "calcium-oxide": "Ca(OH)2",
  "calcium-chloride-anhydrous": "CaCl2",
  "calcium-chloride-dihydrate": "CaCl2",
  "calcium-chloride-hexahydrate": "CaCl2",
  "magnesium-chloride-anhydrous": "MgCl2",
  "magnesium-chloride-hexahydrate": "MgCl2",
  "magnesium-sulfate-anhydrous": "MgSO4",
  "magnesium-sulfate-heptahydrate": "MgSO4",
  "strontium-chloride-anhydrous": "SrCl2",
  "strontium-chloride-hexahydrate": "SrCl2",
};

/** A straight line between the points of a table; undefined outside it. */
function between(xs: readonly number[], ys: readonly number[], x: number): number | undefined {
  const above = xs.findIndex((point) => x <= point);
  if (above < 0 || !(x >= xs[0]!)) return undefined;
  if (above === 0) return ys[0];
  const [x0, x1, y0, y1] = [xs[above - 1]!, xs[above]!, ys[above - 1]!, ys[above]!];
  return y0 + ((y1 - y0) * (x - x0)) / (x1 - x0);
}

/**
 * Volume that a gram of dissolved salt adds is taken so that the solution's density is that of water plus
 * this much per unit of dry salt per volume. From memory; on the safe side for the salts above.
 */
const densityGainPerDrySalt = 0.64;

/** Density of a stock solution with this much dry (anhydrous) salt, g/L: that of water + 0.64 × salt. */
export function solutionDensityGPerL(drySaltGPerL: number, temperatureDegC: number): number {
  return 1000 * densityKgPerL(0, temperatureDegC) + densityGainPerDrySalt * drySaltGPerL;
}

/** Grams of water in a litre of solution that holds this much dry (anhydrous) salt in all. */
export function waterGPerL(drySaltGPerL: number, temperatureDegC: number): number {
  return solutionDensityGPerL(drySaltGPerL, temperatureDegC) - drySaltGPerL;
}

/** The salt as which a reagent dissolves, and grams of it (dry) that a gram of the reagent gives; or null. */
export function drySalt(reagent: ReagentName): { readonly salt: Salt; readonly gramsPerGram: number } | null {
  const salt = saltOf[reagent];
  if (salt === undefined) return null;
  const elements = new Map(reagentElements(reagent));
  const reagentGPerMol = molarMass(elements);
  const waterGPerMol = 2 * atomicWeight.H + atomicWeight.O;
  if (reagent === "calcium-oxide") {
    return { salt, gramsPerGram: (reagentGPerMol + waterGPerMol) / reagentGPerMol };
  }
  // The only hydrogen of a hydrate is that of its water, unless its salt holds some itself.
  const saltHoldsHydrogen = salt === "NaHCO3" || salt === "NaOH" || salt === "Ca(OH)2";
  const waters = saltHoldsHydrogen ? 0 : (elements.get("H") ?? 0) / 2;
  return { salt, gramsPerGram: 1 - (waters * waterGPerMol) / reagentGPerMol };
}

/** Grams of dry (anhydrous) salt that saturate 100 g of water; null outside `solubilityRangeDegC`. */
export function solubilityGPer100GWater(salt: Salt, temperatureDegC: number): number | null {
  if (salt !== "Ca(OH)2") return between(tableDegC, handbook[salt], temperatureDegC) ?? null;
  const shape = between(limeDegC, limeShape, temperatureDegC);
  const shapeAt25 = between(limeDegC, limeShape, 25);
  if (shape === undefined || shapeAt25 === undefined) return null;
  const limeGPerMol = atomicWeight.Ca + 2 * (atomicWeight.O + atomicWeight.H);
  const limeGPerL = limewaterMolPerLAt25DegC * limeGPerMol;
  const at25 = (100 * limeGPerL) / waterGPerL(limeGPerL, 25);
  return (at25 * shape) / shapeAt25;
}

/** Grams of dry salt per litre of clear saturated solution; null outside `solubilityRangeDegC`. */
export function saturatedDrySaltGPerL(salt: Salt, temperatureDegC: number): number | null {
  const per100G = solubilityGPer100GWater(salt, temperatureDegC);
  if (per100G === null) return null;
  const perGram = per100G / 100;
  const pureWaterGPerL = 1000 * densityKgPerL(0, temperatureDegC);
  // dry = perGram × (pureWater − (1 − 0.64) dry), solved for dry.
  return (perGram * pureWaterGPerL) / (1 + perGram * (1 - densityGainPerDrySalt));
}

/**
 * Grams of a reagent, as weighed with its water of crystallization, per litre of clear saturated solution;
 * null where no solubility is known for it or at this temperature.
 */
export function saturatedStrength(reagent: ReagentName, temperatureDegC: number): number | null {
  const dry = drySalt(reagent);
  if (dry === null) return null;
  const drySaltGPerL = saturatedDrySaltGPerL(dry.salt, temperatureDegC);
  return drySaltGPerL === null ? null : drySaltGPerL / dry.gramsPerGram;
}
