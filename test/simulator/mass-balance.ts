/**
 * The true water from one moment to the next: what comes in less what goes out, over the volume. Plain arithmetic
 * of its own, that shares no formula, constant or table with the product, so that it can serve as a check of it.
 */
import type { Cohort, Solution, Truth, Water } from "./truth.ts";

/** g/mol, IUPAC abridged standard atomic weights. */
const calciumGPerMol = 40.078;
const magnesiumGPerMol = 24.305;
const carbonateGPerMol = 60.008;

export const calciumMgPerL = (water: Water): number => water.calciumMmolPerL * calciumGPerMol;
export const magnesiumMgPerL = (water: Water): number => water.magnesiumMmolPerL * magnesiumGPerMol;
export const mmolOfCalcium = (mg: number): number => mg / calciumGPerMol;
export const mmolOfMagnesium = (mg: number): number => mg / magnesiumGPerMol;

/** A degree of carbonate hardness is 10 mg of CaO (56.077 g/mol, two equivalents) in a litre. */
const meqPerDkh = (2 * 10) / 56.077;
export const dkh = (meqPerL: number): number => meqPerL / meqPerDkh;
export const meqOfDkh = (degrees: number): number => degrees * meqPerDkh;

/** Sea water of salinity 35 holds 35.165 g of salt in a kilogram (Millero et al. 2008), 1.0233 kg in a litre at 25 °C. */
const salinityPerGPerL = 35 / 35.165 / 1.0233;

/** What the system takes and is given at a moment, steady until something changes. */
export interface Running {
  /** By cohort, pieces or square metres now. */
  readonly stock: ReadonlyMap<string, number>;
  readonly daysSinceStart: number;
  readonly isLight: boolean;
  /** What the pumps really deliver. */
  readonly pumped: readonly { readonly solution: Solution; readonly mlPerDay: number }[];
  readonly evaporatedLPerDay: number;
}

/** Alkalinity that a cohort takes at its present size and stock, mean of day and night, meq/day. */
function takenBy(cohort: Cohort, { stock, daysSinceStart }: Running): number {
  const weeks = daysSinceStart / 7;
  const grown = Math.exp(weeks * Math.log(1 + cohort.growthPerWeek));
  return (stock.get(cohort.name) ?? 0) * cohort.meqPerDayEach * grown;
}

/** All cohorts together, mean of day and night, meq/day. */
export const calcificationMeqPerDay = (truth: Truth, running: Running): number =>
  truth.cohorts.reduce((sum, cohort) => sum + takenBy(cohort, running), 0);

/** Uptake now over the day's mean: so chosen that a whole day comes out as its mean. */
function lightFactor({ light }: Truth, isLight: boolean): number {
  const lightHours = light.toHour - light.fromHour;
  const inDark = 24 / (lightHours * light.overDark + (24 - lightHours));
  return isLight ? inDark * light.overDark : inDark;
}

/** The water after some days of the same. Exact while nothing changes, growth apart: take steps of an hour or less. */
export function carried(water: Water, truth: Truth, running: Running, days: number): Water {
  const factor = lightFactor(truth, running.isLight);
  let alkalinity = -truth.otherLossMeqPerDay;
  let calcium = 0;
  let magnesium = 0;
  let saltMg = 0;
  for (const cohort of truth.cohorts) {
    const taken = takenBy(cohort, running) * factor;
    // A mole of carbonate mineral takes two equivalents of alkalinity and one mole of metal.
    const mineral = taken / 2;
    const inMagnesium = mineral * cohort.magnesiumFraction;
    alkalinity -= taken;
    calcium -= mineral - inMagnesium;
    magnesium -= inMagnesium;
    saltMg -=
      (mineral - inMagnesium) * calciumGPerMol + inMagnesium * magnesiumGPerMol + mineral * carbonateGPerMol;
  }
  const inflows = [...running.pumped];
  if (truth.topOff) {
    // A float valve lets in what is missing: what evaporated less what the pumps brought.
    const pumpedMl = running.pumped.reduce((sum, { mlPerDay }) => sum + mlPerDay, 0);
    const mlPerDay = Math.max(0, running.evaporatedLPerDay * 1000 - pumpedMl);
    inflows.push({ solution: truth.topOff, mlPerDay });
  }
  for (const { solution, mlPerDay } of inflows) {
    alkalinity += mlPerDay * solution.alkalinityMeqPerMl;
    calcium += mlPerDay * solution.calciumMmolPerMl;
    magnesium += mlPerDay * solution.magnesiumMmolPerMl;
    saltMg += mlPerDay * solution.saltMgPerMl;
  }
  const share = days / truth.volumeL;
  return {
    alkalinityMeqPerL: water.alkalinityMeqPerL + alkalinity * share,
    calciumMmolPerL: water.calciumMmolPerL + calcium * share,
    magnesiumMmolPerL: water.magnesiumMmolPerL + magnesium * share,
    salinity: water.salinity + (saltMg / 1000) * share * salinityPerGPerL,
  };
}

/** The water right after a dose at once. */
export function dosed(water: Water, truth: Truth, solution: Solution, millilitres: number): Water {
  const share = millilitres / truth.volumeL;
  return {
    alkalinityMeqPerL: water.alkalinityMeqPerL + solution.alkalinityMeqPerMl * share,
    calciumMmolPerL: water.calciumMmolPerL + solution.calciumMmolPerMl * share,
    magnesiumMmolPerL: water.magnesiumMmolPerL + solution.magnesiumMmolPerMl * share,
    salinity: water.salinity + (solution.saltMgPerMl / 1000) * share * salinityPerGPerL,
  };
}

/** The water after so much of it was drained and filled up with another. */
export function renewed(water: Water, truth: Truth, litres: number): Water {
  const share = litres / truth.volumeL;
  const mixed = (name: keyof Water) => water[name] + (truth.exchangeWater[name] - water[name]) * share;
  return {
    alkalinityMeqPerL: mixed("alkalinityMeqPerL"),
    calciumMmolPerL: mixed("calciumMmolPerL"),
    magnesiumMmolPerL: mixed("magnesiumMmolPerL"),
    salinity: mixed("salinity"),
  };
}
