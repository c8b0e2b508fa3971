/** What a careful technician makes of the water: tests with the scatter of a kit, and the arithmetic of setting a pump. */
import {
  calciumMgPerL,
  dkh,
  magnesiumMgPerL,
  meqOfDkh,
  mmolOfCalcium,
  mmolOfMagnesium,
} from "./mass-balance.ts";
import type { Chance } from "./random.ts";
import type { Habits, Pump, Test, Truth, Water } from "./truth.ts";

export interface Tested {
  readonly day: number;
  readonly alkalinityDkh: number;
}

/** What a test shows of a true value: scattered, then read off at its step. */
export function shown(value: number, { scatter, bias, step }: Test, chance: Chance): number {
  const read = value + bias + scatter * chance.normal();
  const steps = Math.round(read / step);
  return Number((steps * step).toFixed(6));
}

export const truly = {
  alkalinity: (water: Water): number => dkh(water.alkalinityMeqPerL),
  calcium: calciumMgPerL,
  magnesium: magnesiumMgPerL,
  salinity: (water: Water): number => water.salinity,
} as const;

/** pH falls through the dark and rises through the light: a course by the hour, no part of the balance. */
export function pHAt({ pH, light }: Truth, hour: number): number {
  const lightHours = light.toHour - light.fromHour;
  const sinceDawn = (hour - light.fromHour + 24) % 24;
  const risen =
    sinceDawn < lightHours ? sinceDawn / lightHours : 1 - (sinceDawn - lightHours) / (24 - lightHours);
  return pH.lowest + (pH.highest - pH.lowest) * risen;
}

/** Days over which what is missing is made up. */
const correctionDays = 10;
/** Pumps are set to whole fives of a millilitre a day. */
const setStepMl = 5;

/**
 * What to set an alkalinity pump to: what it gives now, less what the water gained a day by the last tests, and
 * a tenth of what is missing to the aim.
 */
export function alkalinitySetting(
  pump: Pump,
  nowMlPerDay: number,
  tests: readonly Tested[],
  { aim, believedVolumeL }: Habits,
): number {
  const recent = tests.slice(-8);
  const last = recent.slice(-3);
  const mean = last.reduce((sum, { alkalinityDkh }) => sum + alkalinityDkh, 0) / Math.max(1, last.length);
  const wantedDkhPerDay = (aim.alkalinityDkh - mean) / correctionDays - slope(recent);
  const change = (meqOfDkh(wantedDkhPerDay) * believedVolumeL) / pump.solution.alkalinityMeqPerMl;
  return settable(nowMlPerDay + change);
}

/** Whether today's and the test before it, some days after the last setting, are too far off to wait. */
export function wantsSetting(
  tests: readonly Tested[],
  day: number,
  { aim, setWhenOffByDkh }: Habits,
): boolean {
  const last = tests.slice(-2);
  if (tests.length < 4 || last.at(-1)?.day !== day) return false;
  return last.every(({ alkalinityDkh }) => Math.abs(alkalinityDkh - aim.alkalinityDkh) > setWhenOffByDkh);
}

/** A calcium pump keeps pace with alkalinity, and makes up what the last two tests found missing: one is too coarse. */
export function calciumSetting(
  pump: Pump,
  alkalinityMeqPerDay: number,
  testsMgPerL: readonly number[],
  { aim, believedVolumeL }: Habits,
): number {
  const last = testsMgPerL.slice(-2);
  const mean = last.reduce((sum, test) => sum + test, 0) / Math.max(1, last.length);
  const missing = last.length === 0 ? 0 : mmolOfCalcium(aim.calciumMgPerL - mean);
  const mmolPerDay = alkalinityMeqPerDay / 2 + (missing * believedVolumeL) / (2 * correctionDays);
  return settable(mmolPerDay / pump.solution.calciumMmolPerMl);
}

/** Half of what the last test found missing, in whole tens of a millilitre; 0 where little is missing. */
export function magnesiumDose(
  testedMgPerL: number,
  { aim, believedVolumeL, magnesiumByHand }: Habits,
): number {
  const missingMgPerL = aim.magnesiumMgPerL - testedMgPerL;
  if (!magnesiumByHand || missingMgPerL < 10) return 0;
  const { solution, mostMl } = magnesiumByHand;
  const half = (mmolOfMagnesium(missingMgPerL) * believedVolumeL) / 2 / solution.magnesiumMmolPerMl;
  return Math.min(mostMl, Math.round(half / 10) * 10);
}

const settable = (mlPerDay: number): number =>
  Math.max(setStepMl, Math.round(mlPerDay / setStepMl) * setStepMl);

/** dKH a day by least squares; 0 where there are too few tests for it. */
function slope(tests: readonly Tested[]): number {
  if (tests.length < 4) return 0;
  const meanOf = (of: (test: Tested) => number) =>
    tests.reduce((sum, test) => sum + of(test), 0) / tests.length;
  const day = meanOf((test) => test.day);
  const value = meanOf((test) => test.alkalinityDkh);
  const together = meanOf((test) => (test.day - day) * (test.alkalinityDkh - value));
  return together / meanOf((test) => (test.day - day) * (test.day - day));
}
