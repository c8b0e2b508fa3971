/**
 * The carbonate system of sea water from any of four pairs of what is known: alkalinity with pH, with DIC or
 * with pCO2; DIC with pH. Per kilogram of water; nothing here knows litres, doses or the air.
 */
import { constantsAt, type NoAnswer, type SeaWaterConstants } from "./constants-at.ts";
import { hydrogenIon, otherAlkalinity } from "./hydrogen-ion.ts";
import type { OutsideRange } from "./in-seawater.ts";

export type Water = {
  readonly salinity: number;
  readonly temperatureDegC: number;
  readonly calciumUmolPerKg: number;
};

export type CarbonateState = {
  readonly ok: true;
  readonly pHTotal: number;
  readonly pHNbs: number;
  readonly alkalinityUmolPerKg: number;
  /** Dissolved inorganic carbon. */
  readonly dicUmolPerKg: number;
  readonly bicarbonateUmolPerKg: number;
  readonly carbonateUmolPerKg: number;
  readonly co2UmolPerKg: number;
  readonly fCO2Uatm: number;
  readonly pCO2Uatm: number;
  readonly omegaAragonite: number;
  readonly omegaCalcite: number;
  /** Formulas used outside the range of their paper. */
  readonly outsideRange: readonly OutsideRange[];
};

/** The constants of a water where the caller keeps them; those of another water are never used. */
function constantsOf(water: Water, kept: SeaWaterConstants | undefined): SeaWaterConstants | NoAnswer {
  if (!(water.calciumUmolPerKg >= 0 && water.calciumUmolPerKg <= largest)) return impossibleFigure;
  if (kept?.salinity === water.salinity && kept.temperatureDegC === water.temperatureDegC) return kept;
  return constantsAt(water.salinity, water.temperatureDegC);
}

const impossibleFigure: NoAnswer = { ok: false, reason: "impossible-figure" };
const impossiblePh: NoAnswer = { ok: false, reason: "impossible-ph" };

/** µmol/kg and µatm beyond this (100 mol/kg) are no water; the cap keeps every result finite. */
const largest = 1e8;
const isAmount = (value: number) => value >= 0 && value <= largest;
const isAlkalinity = (value: number) => Math.abs(value) <= largest;
const isPh = (value: number) => value >= 0 && value <= 14;

/** The state of a water from its alkalinity and its pH on the total scale. */
export function fromAlkalinityAndPh(
  known: { readonly alkalinityUmolPerKg: number; readonly pHTotal: number },
  water: Water,
  kept?: SeaWaterConstants,
): CarbonateState | NoAnswer {
  if (!isAlkalinity(known.alkalinityUmolPerKg)) return impossibleFigure;
  if (!isPh(known.pHTotal)) return impossiblePh;
  const constants = constantsOf(water, kept);
  if (!constants.ok) return constants;
  const hydrogen = 10 ** -known.pHTotal;
  const { K1, K2 } = constants;
  const alkalinity = known.alkalinityUmolPerKg * 1e-6;
  const carbonAlkalinity = alkalinity - otherAlkalinity(hydrogen, constants);
  if (carbonAlkalinity < 0) return { ok: false, reason: "needs-negative-carbon" };
  const dic =
    (carbonAlkalinity * (hydrogen * hydrogen + K1 * hydrogen + K1 * K2)) / (K1 * hydrogen + 2 * K1 * K2);
  return stateAt(hydrogen, dic, alkalinity, water, constants);
}

/** The state of a water from its alkalinity and dissolved inorganic carbon. */
export function fromAlkalinityAndDic(
  known: { readonly alkalinityUmolPerKg: number; readonly dicUmolPerKg: number },
  water: Water,
  kept?: SeaWaterConstants,
): CarbonateState | NoAnswer {
  if (!isAlkalinity(known.alkalinityUmolPerKg) || !isAmount(known.dicUmolPerKg)) return impossibleFigure;
  const constants = constantsOf(water, kept);
  if (!constants.ok) return constants;
  const alkalinity = known.alkalinityUmolPerKg * 1e-6;
  const dic = known.dicUmolPerKg * 1e-6;
  return stateAt(hydrogenIon(alkalinity, { dic }, constants), dic, alkalinity, water, constants);
}

/** The state of a water from its alkalinity and the partial pressure of CO2 with which it is in balance, µatm. */
export function fromAlkalinityAndPco2(
  known: { readonly alkalinityUmolPerKg: number; readonly pCO2Uatm: number },
  water: Water,
  kept?: SeaWaterConstants,
): CarbonateState | NoAnswer {
  if (!isAlkalinity(known.alkalinityUmolPerKg) || !isAmount(known.pCO2Uatm)) return impossibleFigure;
  const constants = constantsOf(water, kept);
  if (!constants.ok) return constants;
  const { K0, K1, K2 } = constants;
  const alkalinity = known.alkalinityUmolPerKg * 1e-6;
  const co2 = known.pCO2Uatm * 1e-6 * constants.fugacityFactor * K0;
  const hydrogen = hydrogenIon(alkalinity, { co2 }, constants);
  const dic = co2 * (1 + K1 / hydrogen + (K1 * K2) / (hydrogen * hydrogen));
  return stateAt(hydrogen, dic, alkalinity, water, constants);
}

/** The state of a water from its dissolved inorganic carbon and its pH on the total scale. */
export function fromDicAndPh(
  known: { readonly dicUmolPerKg: number; readonly pHTotal: number },
  water: Water,
  kept?: SeaWaterConstants,
): CarbonateState | NoAnswer {
  if (!isAmount(known.dicUmolPerKg)) return impossibleFigure;
  if (!isPh(known.pHTotal)) return impossiblePh;
  const constants = constantsOf(water, kept);
  if (!constants.ok) return constants;
  const { K1, K2 } = constants;
  const hydrogen = 10 ** -known.pHTotal;
  const dic = known.dicUmolPerKg * 1e-6;
  const carbonAlkalinity =
    (dic * (K1 * hydrogen + 2 * K1 * K2)) / (hydrogen * hydrogen + K1 * hydrogen + K1 * K2);
  const alkalinity = carbonAlkalinity + otherAlkalinity(hydrogen, constants);
  return stateAt(hydrogen, dic, alkalinity, water, constants);
}

/** Everything about a water whose hydrogen ion (total scale), carbon and alkalinity are known, mol/kg. */
function stateAt(
  hydrogen: number,
  dic: number,
  alkalinity: number,
  water: Water,
  constants: SeaWaterConstants,
): CarbonateState {
  const { K0, K1, K2 } = constants;
  const denominator = hydrogen * hydrogen + K1 * hydrogen + K1 * K2;
  const co2 = (dic * hydrogen * hydrogen) / denominator;
  const bicarbonate = (dic * K1 * hydrogen) / denominator;
  const carbonate = (dic * K1 * K2) / denominator;
  const pHTotal = -Math.log10(hydrogen);
  const fCO2Uatm = (1e6 * co2) / K0;
  const ionProduct = water.calciumUmolPerKg * 1e-6 * carbonate;
  return {
    ok: true,
    pHTotal,
    pHNbs: pHTotal + constants.nbsLessTotal,
    alkalinityUmolPerKg: 1e6 * alkalinity,
    dicUmolPerKg: 1e6 * dic,
    bicarbonateUmolPerKg: 1e6 * bicarbonate,
    carbonateUmolPerKg: 1e6 * carbonate,
    co2UmolPerKg: 1e6 * co2,
    fCO2Uatm,
    pCO2Uatm: fCO2Uatm / constants.fugacityFactor,
    omegaAragonite: ionProduct / constants.aragonite,
    omegaCalcite: ionProduct / constants.calcite,
    outsideRange: constants.outsideRange,
  };
}

/**
 * pH on the total scale from one on the NBS scale: through fH (Takahashi et al. 1982) and the sulfate and
 * fluoride equilibria. Good to ±0.02 to 0.05 for a real electrode.
 */
export function totalFromNbs(pHNbs: number, constants: SeaWaterConstants): number {
  return pHNbs - constants.nbsLessTotal;
}

/** pH on the NBS scale from one on the total scale; see `totalFromNbs`. */
export function nbsFromTotal(pHTotal: number, constants: SeaWaterConstants): number {
  return pHTotal + constants.nbsLessTotal;
}
