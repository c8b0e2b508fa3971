/**
 * Equilibrium constants of the carbonate system in sea water at one atmosphere, mol/kg of solution, each with
 * its paper and range. All on the total hydrogen ion scale unless said; put together in `constants-at.ts`.
 *
 * Coefficients, ranges and page numbers are written from memory of the papers; the coefficients are held in
 * the tests to a reference library and to the check values of Dickson, Sabine & Christian 2007 (PICES Spec.
 * Publ. 3, ch. 5).
 */
import { inSeawater } from "./in-seawater.ts";

const gasConstant = 83.14462618; // cm³ bar/(mol K), CODATA 2018

/** Ionic strength of sea water, mol/kg of water (DOE 1994, Handbook of methods, ch. 5). */
function ionicStrength(salinity: number): number {
  return (19.924 * salinity) / (1000 - 1.005 * salinity);
}

/** Solubility of CO2 (K0), mol/(kg atm). Weiss 1974, Mar. Chem. 2, 203–215. */
export const carbonDioxideSolubility = inSeawater(
  { quantity: "K0", salinity: [0, 40], celsius: [-1, 40] },
  ({ salinity, kelvin }) => {
    const hundreds = kelvin / 100;
    return Math.exp(
      -60.2409 +
        93.4517 / hundreds +
        23.3585 * Math.log(hundreds) +
        salinity * (0.023517 - 0.023656 * hundreds + 0.0047036 * hundreds * hundreds),
    );
  },
);

/** First dissociation constant of carbonic acid (K1). Lueker, Dickson & Keeling 2000, Mar. Chem. 70, 105–119. */
export const carbonicAcidFirst = inSeawater(
  { quantity: "K1", salinity: [19, 43], celsius: [2, 35] },
  ({ salinity, kelvin, lnKelvin }) =>
    10 **
    -(3633.86 / kelvin - 61.2172 + 9.6777 * lnKelvin - 0.011555 * salinity + 0.0001152 * salinity * salinity),
);

/** Second dissociation constant of carbonic acid (K2). Lueker, Dickson & Keeling 2000, Mar. Chem. 70, 105–119. */
export const carbonicAcidSecond = inSeawater(
  { quantity: "K2", salinity: [19, 43], celsius: [2, 35] },
  ({ salinity, kelvin, lnKelvin }) =>
    10 **
    -(471.78 / kelvin + 25.929 - 3.16967 * lnKelvin - 0.01781 * salinity + 0.0001122 * salinity * salinity),
);

/** Dissociation constant of boric acid (KB). Dickson 1990a, Deep-Sea Res. 37, 755–766. */
export const boricAcid = inSeawater(
  { quantity: "KB", salinity: [5, 45], celsius: [0, 45] },
  ({ salinity, kelvin, lnKelvin, rootSalinity: root }) =>
    Math.exp(
      (-8966.9 -
        2890.53 * root -
        77.942 * salinity +
        1.728 * salinity * root -
        0.0996 * salinity * salinity) /
        kelvin +
        148.0248 +
        137.1942 * root +
        1.62142 * salinity +
        (-24.4344 - 25.085 * root - 0.2474 * salinity) * lnKelvin +
        0.053105 * root * kelvin,
    ),
);

/**
 * Ion product of water (KW) on the *seawater* scale, (mol/kg)².
 *
 * Millero 1995, Geochim. Cosmochim. Acta 59, 661–677. `constants-at.ts` brings it to the total scale through
 * the sulfate and fluoride equilibria. The handbook of Dickson et al. 2007 takes a fixed 0.015 off its
 * logarithm instead, which gives a KW 0.8 % higher at salinity 35 and 25 °C.
 */
export const waterOnSeawaterScale = inSeawater(
  { quantity: "KW", salinity: [0, 45], celsius: [0, 45] },
  ({ salinity, kelvin, lnKelvin, rootSalinity }) =>
    Math.exp(
      148.9802 -
        13847.26 / kelvin -
        23.6521 * lnKelvin +
        (118.67 / kelvin - 5.977 + 1.0495 * lnKelvin) * rootSalinity -
        0.01615 * salinity,
    ),
);

/** Dissociation constant of bisulfate (KSO4) on the *free* scale. Dickson 1990b, J. Chem. Thermodyn. 22, 113–127. */
export const bisulfate = inSeawater(
  { quantity: "KSO4", salinity: [5, 45], celsius: [0, 45] },
  ({ salinity, kelvin, lnKelvin }) => {
    const strength = ionicStrength(salinity);
    const root = Math.sqrt(strength);
    return Math.exp(
      -4276.1 / kelvin +
        141.328 -
        23.093 * lnKelvin +
        (-13856 / kelvin + 324.57 - 47.986 * lnKelvin) * root +
        (35474 / kelvin - 771.54 + 114.723 * lnKelvin) * strength -
        (2698 / kelvin) * strength * root +
        (1776 / kelvin) * strength * strength +
        Math.log(1 - 0.001005 * salinity),
    );
  },
);

/**
 * Dissociation constant of hydrogen fluoride (KF). Perez & Fraga 1987, Mar. Chem. 21, 161–168.
 *
 * Used with the free hydrogen ion, as the common reference libraries do; read on the total scale instead,
 * pH on the seawater scale would come out 0.003 lower (and with it that on the NBS scale), well inside what
 * the NBS scale can be trusted for.
 */
export const hydrogenFluoride = inSeawater(
  { quantity: "KF", salinity: [10, 40], celsius: [9, 33] },
  ({ kelvin, rootSalinity }) => Math.exp(874 / kelvin - 9.68 + 0.111 * rootSalinity),
);

/** Solubility product of aragonite in sea water, (mol/kg)². Mucci 1983, Am. J. Sci. 283, 780–799. */
export const aragoniteSolubility = inSeawater(
  { quantity: "Ksp of aragonite", salinity: [5, 44], celsius: [5, 40] },
  ({ salinity, kelvin, lnKelvin, rootSalinity }) =>
    10 **
    (-171.945 -
      0.077993 * kelvin +
      2903.293 / kelvin +
      71.595 * lnKelvin * Math.LOG10E +
      (-0.068393 + 0.0017276 * kelvin + 88.135 / kelvin) * rootSalinity -
      0.10018 * salinity +
      0.0059415 * salinity * rootSalinity),
);

/** Solubility product of calcite in sea water, (mol/kg)². Mucci 1983, Am. J. Sci. 283, 780–799. */
export const calciteSolubility = inSeawater(
  { quantity: "Ksp of calcite", salinity: [5, 44], celsius: [5, 40] },
  ({ salinity, kelvin, lnKelvin, rootSalinity }) =>
    10 **
    (-171.9065 -
      0.077993 * kelvin +
      2839.319 / kelvin +
      71.595 * lnKelvin * Math.LOG10E +
      (-0.77712 + 0.0028426 * kelvin + 178.34 / kelvin) * rootSalinity -
      0.07711 * salinity +
      0.0041249 * salinity * rootSalinity),
);

/**
 * Apparent activity coefficient of the hydrogen ion (fH): a(H) on the NBS scale over [H] on the seawater scale.
 *
 * Takahashi, Williams & Bos 1982, GEOSECS Pacific Expedition 3, 77–83. The range is that of ocean water, from
 * memory. Liquid junctions differ by electrode: a real one agrees within ±0.02 to 0.05 pH.
 */
export const hydrogenActivity = inSeawater(
  { quantity: "fH", salinity: [20, 40], celsius: [0, 40] },
  ({ salinity, kelvin }) => 1.2948 - 0.002036 * kelvin + (4.607e-4 - 1.475e-6 * kelvin) * salinity * salinity,
);

/** Fugacity over partial pressure of CO2 in air at one atmosphere, no unit. Weiss 1974, Mar. Chem. 2, 203–215. */
export const fugacityFactor = inSeawater(
  { quantity: "CO2 fugacity", salinity: [0, 60], celsius: [-1, 40] },
  ({ kelvin }) => {
    const cross = 57.7 - 0.118 * kelvin;
    const virial = -1636.75 + kelvin * (12.0408 + kelvin * (-0.0327957 + kelvin * 3.16528e-5));
    return Math.exp(((virial + 2 * cross) * 1.01325) / (gasConstant * kelvin));
  },
);

/**
 * Share of one atmosphere over sea water that is not water vapour, no unit: pCO2 in µatm over ppm in dry air.
 *
 * Weiss & Price 1980, Mar. Chem. 8, 347–359.
 */
export const dryAirShare = inSeawater(
  { quantity: "water vapour", salinity: [0, 40], celsius: [-1, 40] },
  ({ salinity, kelvin }) =>
    1 - Math.exp(24.4543 - 67.4509 * (100 / kelvin) - 4.8489 * Math.log(kelvin / 100) - 0.000544 * salinity),
);

/** Total boron, mol/kg. Uppström 1974, Deep-Sea Res. 21, 161–162, as in Dickson et al. 2007. */
export function totalBoron(salinity: number): number {
  return (0.0004157 * salinity) / 35;
}

/** Total sulfate, mol/kg. Morris & Riley 1966, Deep-Sea Res. 13, 699–705. */
export function totalSulfate(salinity: number): number {
  return ((0.14 / 96.062) * salinity) / 1.80655;
}

/** Total fluoride, mol/kg. Riley 1965, Deep-Sea Res. 12, 219–220. */
export function totalFluoride(salinity: number): number {
  return ((0.000067 / 18.998) * salinity) / 1.80655;
}
