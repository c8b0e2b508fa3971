/** Every constant of the carbonate system for one salinity and temperature, computed once and handed round. */
import {
  aragoniteSolubility,
  bisulfate,
  boricAcid,
  calciteSolubility,
  carbonDioxideSolubility,
  carbonicAcidFirst,
  carbonicAcidSecond,
  dryAirShare,
  fugacityFactor,
  hydrogenActivity,
  hydrogenFluoride,
  totalBoron,
  totalFluoride,
  totalSulfate,
  waterOnSeawaterScale,
} from "./equilibrium.ts";
import { type OutsideRange, type SeawaterFormula, seaWaterPoint } from "./in-seawater.ts";

/** mol/kg, total scale except `KSO4` and `KF` (free scale). */
export type SeaWaterConstants = {
  readonly ok: true;
  readonly salinity: number;
  readonly temperatureDegC: number;
  readonly K0: number;
  readonly K1: number;
  readonly K2: number;
  readonly KB: number;
  readonly KW: number;
  readonly KSO4: number;
  readonly KF: number;
  readonly aragonite: number;
  readonly calcite: number;
  readonly boron: number;
  readonly sulfate: number;
  readonly fluoride: number;
  readonly fH: number;
  readonly fugacityFactor: number;
  readonly dryAirShare: number;
  /** [H] on the total scale over [H] on the free scale, 1 + SO4/KSO4. */
  readonly totalOverFree: number;
  /** pH on the NBS scale less pH on the total scale. */
  readonly nbsLessTotal: number;
  /** pH on the seawater scale less pH on the total scale. */
  readonly seawaterScaleLessTotal: number;
  readonly outsideRange: readonly OutsideRange[];
};

export type NoAnswer = { readonly ok: false; readonly reason: NoAnswerReason };

export type NoAnswerReason =
  /** A figure isn't finite, or a concentration or pressure is negative. */
  | "impossible-figure"
  /** Salinity or temperature beyond `answeredRange`. */
  | "impossible-water"
  /** A pH outside 0 to 14. */
  | "impossible-ph"
  /** Alkalinity is lower than hydroxide and borate alone make it at this pH. */
  | "needs-negative-carbon";

/** Beyond this the formulas mean nothing for sea water, and nothing is answered. */
export const answeredRange = { salinity: [0, 60], celsius: [-2, 45] } as const;

export function constantsAt(salinity: number, temperatureDegC: number): SeaWaterConstants | NoAnswer {
  const within = (value: number, [low, high]: readonly [number, number]) => value >= low && value <= high;
  if (!within(salinity, answeredRange.salinity) || !within(temperatureDegC, answeredRange.celsius)) {
    return { ok: false, reason: "impossible-water" };
  }
  const point = seaWaterPoint(salinity, temperatureDegC);
  const outsideRange: OutsideRange[] = [];
  const at = (formula: SeawaterFormula): number => {
    const { value, outsideRange: findings } = formula(point);
    if (findings.length > 0) outsideRange.push(...findings);
    return value;
  };

  const sulfate = totalSulfate(salinity);
  const fluoride = totalFluoride(salinity);
  const KSO4 = at(bisulfate);
  const KF = at(hydrogenFluoride);
  const totalOverFree = 1 + sulfate / KSO4;
  const totalOverSeawater = totalOverFree / (totalOverFree + fluoride / KF);
  const fH = at(hydrogenActivity);
  return {
    ok: true,
    salinity,
    temperatureDegC,
    K0: at(carbonDioxideSolubility),
    K1: at(carbonicAcidFirst),
    K2: at(carbonicAcidSecond),
    KB: at(boricAcid),
    KW: at(waterOnSeawaterScale) * totalOverSeawater,
    KSO4,
    KF,
    aragonite: at(aragoniteSolubility),
    calcite: at(calciteSolubility),
    boron: totalBoron(salinity),
    sulfate,
    fluoride,
    fH,
    fugacityFactor: at(fugacityFactor),
    dryAirShare: at(dryAirShare),
    totalOverFree,
    nbsLessTotal: Math.log10(totalOverSeawater / fH),
    seawaterScaleLessTotal: Math.log10(totalOverSeawater),
    outsideRange,
  };
}
