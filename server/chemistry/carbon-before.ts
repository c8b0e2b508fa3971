/** The dissolved inorganic carbon of a litre of a system's water, from its alkalinity and one thing more. */
import {
  type CarbonateState,
  fromAlkalinityAndPco2,
  fromAlkalinityAndPh,
  totalFromNbs,
} from "./carbonate-system.ts";
import { constantsAt, type NoAnswer, type SeaWaterConstants } from "./constants-at.ts";
import { atomicWeight } from "./elements.ts";
import { densityKgPerL } from "./sea-water.ts";

/** What is known of the carbon beside alkalinity; CO2 in dry air of one atmosphere, or as a partial pressure. */
export type CarbonEvidence =
  | { readonly pHNbs: number }
  | { readonly pHTotal: number }
  | { readonly co2PpmDryAir: number }
  | { readonly pCO2Uatm: number };

export type LitreOfWater = {
  readonly alkalinityMeqPerL: number;
  readonly calciumMgPerL: number;
  readonly salinity: number;
  readonly temperatureDegC: number;
};

/** pCO2 in µatm over water, of air with this much CO2 when dry, at one atmosphere (Weiss & Price 1980). */
export function pco2OfAir(co2PpmDryAir: number, constants: SeaWaterConstants): number {
  return co2PpmDryAir * constants.dryAirShare;
}

/** The carbonate state of a litre of water, and its dissolved inorganic carbon in mmol/L. */
export function carbonBefore(
  water: LitreOfWater,
  evidence: CarbonEvidence,
  kept?: SeaWaterConstants,
): { readonly ok: true; readonly dicMmolPerL: number; readonly carbonate: CarbonateState } | NoAnswer {
  const { salinity, temperatureDegC } = water;
  const sameWater = kept?.salinity === salinity && kept.temperatureDegC === temperatureDegC;
  const constants = sameWater ? kept : constantsAt(salinity, temperatureDegC);
  if (!constants.ok) return constants;
  const density = densityKgPerL(salinity, temperatureDegC);
  const alkalinityUmolPerKg = (1000 * water.alkalinityMeqPerL) / density;
  const calciumUmolPerKg = (1000 * water.calciumMgPerL) / atomicWeight.Ca / density;
  const perKg = { salinity, temperatureDegC, calciumUmolPerKg };

  let carbonate: CarbonateState | NoAnswer;
  if ("pHNbs" in evidence || "pHTotal" in evidence) {
    const pHTotal = "pHNbs" in evidence ? totalFromNbs(evidence.pHNbs, constants) : evidence.pHTotal;
    carbonate = fromAlkalinityAndPh({ alkalinityUmolPerKg, pHTotal }, perKg, constants);
  } else {
    const pCO2Uatm = "pCO2Uatm" in evidence ? evidence.pCO2Uatm : pco2OfAir(evidence.co2PpmDryAir, constants);
    carbonate = fromAlkalinityAndPco2({ alkalinityUmolPerKg, pCO2Uatm }, perKg, constants);
  }
  return carbonate.ok
    ? { ok: true, dicMmolPerL: (carbonate.dicUmolPerKg * density) / 1000, carbonate }
    : carbonate;
}
