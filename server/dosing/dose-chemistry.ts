/** The water of a state as chemistry sees it, and what one delivery of a solution does to it. */
import { minutesPerDay } from "../../grammar/dates.ts";
import {
  afterDose,
  type SolutionStrength,
  type SystemWater,
  type WaterAfterDose,
} from "../chemistry/after-dose.ts";
import { type CarbonEvidence, carbonBefore } from "../chemistry/carbon-before.ts";
import { answeredRange } from "../chemistry/constants-at.ts";
import { densityKgPerL, seaWaterComposition } from "../chemistry/sea-water.ts";
import { defaults } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { Strength } from "../culture/model.ts";
import type { Assuming } from "./assumptions.ts";
import type { SystemConstants } from "./constants.ts";
import { saltGPerMl } from "./tracked.ts";
import { volumeAt } from "./volume.ts";
import { carriedMinutes, type WaterState } from "./water-state.ts";

/** Salinity now: as carried, else what is held, else the default. */
export function salinityNow(state: WaterState, constants: SystemConstants, assumed: Assuming | null): number {
  const known =
    state.carried.salinity?.value ?? factAt(constants.facts.holds.get("salinity"), state.minute)?.value.aim;
  const salinity = known ?? assumed?.use(defaults.salinity) ?? defaults.salinity.value;
  return Math.min(Math.max(salinity, answeredRange.salinity[0]), answeredRange.salinity[1]);
}

/** Temperature now: as last read, else what is held, else the default; °C. */
export function temperatureNow(
  state: WaterState,
  constants: SystemConstants,
  assumed: Assuming | null,
): number {
  const known =
    state.temperature?.value ?? factAt(constants.facts.holds.get("temperature"), state.minute)?.value.aim;
  const temperature = known ?? assumed?.use(defaults.temperature) ?? defaults.temperature.value;
  return Math.min(Math.max(temperature, answeredRange.celsius[0]), answeredRange.celsius[1]);
}

/**
 * The water of a state, with its carbon from the last pH of seven days, else as in balance with the room's
 * air; what doses brought since then and within a day comes on top, for no air has answered it yet (a day: common
 * practice, no source). Null where alkalinity or volume isn't known, or no sea water is like it.
 */
export function waterOf(
  state: WaterState,
  constants: SystemConstants,
  assumed: Assuming | null,
): SystemWater | null {
  const volumeL = volumeAt(constants.facts, state.minute).litres;
  const alkalinityMeqPerL = state.carried.alkalinity?.value;
  if (volumeL === null || alkalinityMeqPerL === undefined) return null;
  const salinity = salinityNow(state, constants, assumed);
  const temperatureDegC = temperatureNow(state, constants, assumed);
  const calciumMgPerL =
    state.carried.calcium?.value ??
    seaWaterComposition(salinity).calciumMgPerKg * densityKgPerL(salinity, temperatureDegC);
  const litre = { alkalinityMeqPerL, calciumMgPerL, salinity, temperatureDegC };
  // The evidence is of the water before what was brought at once since.
  const recent = state.unanswered.filter(({ minute }) => state.minute - minute <= minutesPerDay);
  const sumOf = (key: "alkalinityMeqPerL" | "carbonMmolPerL") =>
    recent.reduce((sum, brought) => sum + brought[key], 0);
  const before = alkalinityMeqPerL - sumOf("alkalinityMeqPerL");
  // A test since then that finds less than was brought says that it isn't there.
  const isThere = before > 0;
  const carbon = carbonBefore(
    isThere ? { ...litre, alkalinityMeqPerL: before } : litre,
    carbonEvidence(state, constants, assumed),
  );
  if (!carbon.ok) return null;
  const dicMmolPerL = carbon.dicMmolPerL + (isThere ? sumOf("carbonMmolPerL") : 0);
  return { ...litre, dicMmolPerL, volumeL };
}

/** What tells of the carbon: a recent pH, the room's air as stated, or its default. */
export function carbonEvidence(
  state: WaterState,
  constants: SystemConstants,
  assumed: Assuming | null,
): CarbonEvidence {
  const { pH } = state;
  if (pH && state.minute - pH.minute <= carriedMinutes) {
    if (pH.reading.scale === "total") return { pHTotal: pH.reading.value };
    assumed?.use(defaults.pHScale);
    return { pHNbs: pH.reading.value };
  }
  const air = factAt(constants.facts.air, state.minute)?.value;
  if (air) return air.unit === "ppm" ? { co2PpmDryAir: air.value } : { pCO2Uatm: air.value };
  return { co2PpmDryAir: assumed?.use(defaults.airCarbonDioxide) ?? defaults.airCarbonDioxide.value };
}

/** What a litre of solution brings to the carbonate system; null where its alkalinity or carbon isn't known. */
export function strengthForChemistry(strength: Strength): SolutionStrength | null {
  if (strength.alkalinityMeq === null || strength.carbonMmol === null) return null;
  return {
    alkalinityMeqPerL: 1000 * strength.alkalinityMeq,
    dicMmolPerL: 1000 * strength.carbonMmol,
    calciumMgPerL: 1000 * (strength.calciumMg ?? 0),
    saltGPerL: 1000 * saltGPerMl(strength),
  };
}

/** The water right after one delivery, carbon closed; null where it can't be said. */
export function afterDelivery(water: SystemWater, strength: Strength, litres: number): WaterAfterDose | null {
  const solution = strengthForChemistry(strength);
  const mixed = solution && afterDose(water, solution, litres);
  return mixed?.ok ? mixed : null;
}
