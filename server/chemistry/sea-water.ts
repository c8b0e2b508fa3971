/** Density of sea water, and what the sea holds at a salinity. Salinity itself is read in `salinity.ts`. */
import { atomicWeight } from "./elements.ts";

/**
 * Temperature on the IPTS-68 scale from one on ITS-90, both in °C: EOS-80 and PSS-78 are written in it.
 *
 * Saunders 1990, WOCE Newsletter 10, 10 (t68 = 1.00024 t90).
 */
export function celsiusIpts68(temperatureDegC: number): number {
  return 1.00024 * temperatureDegC;
}

/** Where EOS-80 holds. */
export const densityRange = { salinity: [0, 42], celsius: [-2, 40] } as const;

/**
 * Density of sea water at one atmosphere, kg/m³, temperature on IPTS-68; fresh water at salinity 0.
 *
 * Millero & Poisson 1981, Deep-Sea Res. 28A, 625–629; coefficients as in UNESCO 1983, Tech. Pap. Mar. Sci. 44
 * (from memory, held to its printed check values in the tests).
 * Range: `densityRange`; beyond it the polynomial goes on smoothly to salinity 60 and 45 °C. A salinity
 * is never negative.
 */
export function densityKgPerM3AtIpts68(salinity: number, celsius68: number): number {
  const t = celsius68;
  const fresh =
    999.842594 +
    t * (6.793952e-2 + t * (-9.09529e-3 + t * (1.001685e-4 + t * (-1.120083e-6 + t * 6.536332e-9))));
  const linear = 8.24493e-1 + t * (-4.0899e-3 + t * (7.6438e-5 + t * (-8.2467e-7 + t * 5.3875e-9)));
  const threeHalves = -5.72466e-3 + t * (1.0227e-4 - t * 1.6546e-6);
  return fresh + salinity * (linear + threeHalves * Math.sqrt(salinity) + 4.8314e-4 * salinity);
}

/** Density of sea water at one atmosphere, kg/L, temperature on ITS-90; see `densityKgPerM3AtIpts68`. */
export function densityKgPerL(salinity: number, temperatureDegC: number): number {
  return densityKgPerM3AtIpts68(salinity, celsiusIpts68(temperatureDegC)) / 1000;
}

/**
 * The reference composition of sea water, mmol/kg at practical salinity 35.
 *
 * Millero, Feistel, Wright & McDougall 2008, Deep-Sea Res. I 55, 50–72 (bromide, fluoride, boric acid,
 * hydroxide and carbon dioxide from memory).
 */
export const referenceCompositionMmolPerKg = {
  sodium: 468.9674,
  magnesium: 52.8171,
  calcium: 10.2821,
  potassium: 10.2077,
  strontium: 0.0907,
  chloride: 545.8696,
  sulfate: 28.2352,
  bicarbonate: 1.7177,
  carbonate: 0.2389,
  borate: 0.1008,
  bromide: 0.8421,
  boricAcid: 0.3143,
  fluoride: 0.0683,
  hydroxide: 0.0079,
  carbonDioxide: 0.0096,
} as const;

export type SeaWaterComposition = {
  readonly alkalinityUmolPerKg: number;
  readonly calciumMgPerKg: number;
  readonly magnesiumMgPerKg: number;
  readonly potassiumMgPerKg: number;
  readonly strontiumMgPerKg: number;
  readonly sodiumMgPerKg: number;
  readonly chlorideMgPerKg: number;
  readonly sulfateMgPerKg: number;
  readonly boronMgPerKg: number;
  readonly calciumUmolPerKg: number;
};

/** Dissolved salt in g/kg for one unit of practical salinity (Millero et al. 2008: 35.16504 g/kg at 35). */
export const gramsPerKgPerSalinity = 35.16504 / 35;

/** What sea water of this salinity holds: the reference composition of Millero et al. 2008, in proportion. */
export function seaWaterComposition(salinity: number): SeaWaterComposition {
  const scale = salinity / 35;
  const sea = referenceCompositionMmolPerKg;
  const alkalinityMmolPerKg = sea.bicarbonate + 2 * sea.carbonate + sea.borate + sea.hydroxide;
  const sulfateGPerMol = atomicWeight.S + 4 * atomicWeight.O;
  return {
    alkalinityUmolPerKg: 1000 * alkalinityMmolPerKg * scale,
    calciumMgPerKg: sea.calcium * atomicWeight.Ca * scale,
    magnesiumMgPerKg: sea.magnesium * atomicWeight.Mg * scale,
    potassiumMgPerKg: sea.potassium * atomicWeight.K * scale,
    strontiumMgPerKg: sea.strontium * atomicWeight.Sr * scale,
    sodiumMgPerKg: sea.sodium * atomicWeight.Na * scale,
    chlorideMgPerKg: sea.chloride * atomicWeight.Cl * scale,
    sulfateMgPerKg: sea.sulfate * sulfateGPerMol * scale,
    boronMgPerKg: (sea.borate + sea.boricAcid) * atomicWeight.B * scale,
    calciumUmolPerKg: 1000 * sea.calcium * scale,
  };
}
