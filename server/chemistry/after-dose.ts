/** The water of a system right after a dose has mixed in, before any carbon dioxide is exchanged with the air. */
import { type CarbonateState, fromAlkalinityAndDic } from "./carbonate-system.ts";
import type { NoAnswer, SeaWaterConstants } from "./constants-at.ts";
import { atomicWeight } from "./elements.ts";
import { densityKgPerL, gramsPerKgPerSalinity } from "./sea-water.ts";
import { solutionDensityGPerL } from "./solubility.ts";

/** A system's water. */
export type SystemWater = {
  readonly alkalinityMeqPerL: number;
  readonly dicMmolPerL: number;
  readonly calciumMgPerL: number;
  readonly salinity: number;
  readonly temperatureDegC: number;
  readonly volumeL: number;
};

/** What a litre of a dosed solution brings. */
export type SolutionStrength = {
  readonly alkalinityMeqPerL: number;
  /** Carbonate 2 : 1 to alkalinity, bicarbonate 1 : 1, hydroxide 0 : 1. */
  readonly dicMmolPerL: number;
  readonly calciumMgPerL: number;
  /** Dry salt in all, for the salinity after. */
  readonly saltGPerL: number;
};

export type WaterAfterDose = SystemWater & { readonly ok: true; readonly carbonate: CarbonateState };

/**
 * The water right after `doseL` litres of a solution have mixed into it: volumes add, alkalinity, carbon and
 * calcium mix, carbon is closed (no exchange with the air), temperature stays.
 *
 * The salt of the dose counts towards salinity as sea salt does (35.16504 g/kg at 35, Millero et al. 2008).
 */
export function afterDose(
  water: SystemWater,
  solution: SolutionStrength,
  doseL: number,
  kept?: SeaWaterConstants,
): WaterAfterDose | NoAnswer {
  if (!(doseL >= 0) || !(water.volumeL > 0) || !Number.isFinite(doseL + water.volumeL)) {
    return { ok: false, reason: "impossible-figure" };
  }
  const volumeL = water.volumeL + doseL;
  const mixed = (ofWater: number, ofSolution: number) =>
    (ofWater * water.volumeL + ofSolution * doseL) / volumeL;
  const salinity = doseL === 0 ? water.salinity : salinityAfter(water, solution, doseL);
  const litres = {
    alkalinityMeqPerL: mixed(water.alkalinityMeqPerL, solution.alkalinityMeqPerL),
    dicMmolPerL: mixed(water.dicMmolPerL, solution.dicMmolPerL),
    calciumMgPerL: mixed(water.calciumMgPerL, solution.calciumMgPerL),
    salinity,
    temperatureDegC: water.temperatureDegC,
    volumeL,
  };
  const carbonate = carbonateOf(litres, kept);
  return carbonate.ok ? { ...litres, ok: true, carbonate } : carbonate;
}

/** Salt of water and dose over their mass. */
function salinityAfter(water: SystemWater, solution: SolutionStrength, doseL: number): number {
  const waterKg = water.volumeL * densityKgPerL(water.salinity, water.temperatureDegC);
  const doseKg = (doseL * solutionDensityGPerL(solution.saltGPerL, water.temperatureDegC)) / 1000;
  const saltG = water.salinity * gramsPerKgPerSalinity * waterKg + solution.saltGPerL * doseL;
  return saltG / gramsPerKgPerSalinity / (waterKg + doseKg);
}

/** The carbonate state of a system's water as it is. */
export function carbonateOf(
  water: Omit<SystemWater, "volumeL">,
  kept?: SeaWaterConstants,
): CarbonateState | NoAnswer {
  const litresPerKg = 1 / densityKgPerL(water.salinity, water.temperatureDegC);
  return fromAlkalinityAndDic(
    {
      alkalinityUmolPerKg: 1000 * water.alkalinityMeqPerL * litresPerKg,
      dicUmolPerKg: 1000 * water.dicMmolPerL * litresPerKg,
    },
    {
      salinity: water.salinity,
      temperatureDegC: water.temperatureDegC,
      calciumUmolPerKg: ((1000 * water.calciumMgPerL) / atomicWeight.Ca) * litresPerKg,
    },
    kept,
  );
}
