/** What the corals take a day, as stated or from the cohorts; what nitrification takes of alkalinity beside them. */

import { minutesPerDay } from "../../grammar/dates.ts";
import { calcificationPerMeq, calciumCarbonateGPerMeq } from "../chemistry/calcification.ts";
import { atomicWeight } from "../chemistry/elements.ts";
import { defaults } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { Cohort, SystemFacts } from "../culture/model.ts";
import { type Dosed, dosed } from "./tracked.ts";
import type { WaterState } from "./water-state.ts";

export interface Uptake {
  readonly basis: "stated" | "cohorts" | "none";
  /** Taken out a day in the whole system: meq of alkalinity (calcification and other loss together), mg of the rest; null where unknown. */
  readonly perDay: Readonly<Record<Dosed, number | null>>;
  /** meq a day of alkalinity lost otherwise than by calcification. */
  readonly otherLossMeqPerDay: number;
  /** The food alone would take more alkalinity than is stated for all: the statements contradict each other. */
  readonly foodTakesMore: boolean;
  readonly calcificationGPerDay: number | null;
  /** Mole fraction of magnesium in the mineral laid down. */
  readonly magnesiumFraction: number;
  readonly magnesiumFractionStated: boolean;
}

/** Nitrogen in protein, by mass (Kjeldahl's 6.25: common practice). */
const nitrogenInProtein = 0.16;
/**
 * Equivalents of alkalinity that a mole of food nitrogen takes on its way to nitrate: two for nitrification
 * (Middelburg, Soetaert & Hagens 2020, Rev. Geophys. 58), less the one that its release as ammonia gave.
 */
const equivalentsPerMoleOfNitrogen = 1;

/** meq of alkalinity a day from the protein fed, g a day. */
export const nitrificationMeqPerDay = (proteinGPerDay: number): number =>
  ((proteinGPerDay * nitrogenInProtein) / atomicWeight.N) * equivalentsPerMoleOfNitrogen * 1000;

/** Uptake at a minute. `firstEvent`: from when a cohort without `from` has grown. */
export function uptakeAt(
  facts: SystemFacts,
  state: WaterState,
  minute: number,
  litres: number,
  firstEvent: number | null,
): Uptake {
  const byFood = nitrificationMeqPerDay(factAt(facts.proteinGPerDay, minute)?.value ?? 0);
  const skeleton = factAt(facts.skeletonMagnesium, minute)?.value;
  const cohorts = cohortUptakes(facts, state, minute, firstEvent);
  const fromCohorts = cohorts.reduce((sum, { meqPerDay }) => sum + meqPerDay, 0);
  const fractionOf = ({ cohort }: CohortUptake) =>
    cohort.magnesiumFraction ?? skeleton ?? defaults.skeletonMagnesium.value;
  const magnesiumFraction =
    fromCohorts > 0
      ? cohorts.reduce((sum, entry) => sum + entry.meqPerDay * fractionOf(entry), 0) / fromCohorts
      : (skeleton ?? defaults.skeletonMagnesium.value);
  const stated = (name: Dosed): number | null => {
    const entry = factAt(facts.uptakes.get(name), minute);
    if (!entry) return null;
    return entry.value.per === "litre" ? entry.value.value * litres : entry.value.value;
  };
  const statedAlkalinity = stated("alkalinity");
  // What is stated is calcification and other loss together: the food can't take more than that.
  const otherLossMeqPerDay = Math.min(byFood, statedAlkalinity ?? byFood);
  const calcificationMeqPerDay =
    statedAlkalinity !== null
      ? Math.max(0, statedAlkalinity - otherLossMeqPerDay)
      : cohorts.length > 0
        ? fromCohorts
        : null;
  const mineral = calcificationPerMeq(magnesiumFraction);
  const bySkeleton = {
    alkalinity: calcificationMeqPerDay === null ? null : calcificationMeqPerDay + otherLossMeqPerDay,
    calcium: calcificationMeqPerDay === null ? null : calcificationMeqPerDay * mineral.calciumMg,
    magnesium: calcificationMeqPerDay === null ? null : calcificationMeqPerDay * mineral.magnesiumMg,
    potassium: null,
    strontium: null,
  };
  const perDay = Object.fromEntries(dosed.map((name) => [name, stated(name) ?? bySkeleton[name]])) as Record<
    Dosed,
    number | null
  >;
  const anyStated = dosed.some((name) => stated(name) !== null);
  return {
    basis:
      statedAlkalinity !== null ? "stated" : cohorts.length > 0 ? "cohorts" : anyStated ? "stated" : "none",
    perDay,
    otherLossMeqPerDay,
    foodTakesMore: byFood > otherLossMeqPerDay,
    calcificationGPerDay:
      calcificationMeqPerDay === null ? null : calcificationMeqPerDay * calciumCarbonateGPerMeq,
    magnesiumFraction,
    magnesiumFractionStated:
      skeleton !== undefined ||
      (cohorts.length > 0 && cohorts.every(({ cohort }) => cohort.magnesiumFraction !== null)),
  };
}

interface CohortUptake {
  readonly cohort: Cohort;
  readonly meqPerDay: number;
}

function cohortUptakes(
  facts: SystemFacts,
  state: WaterState,
  minute: number,
  firstEvent: number | null,
): CohortUptake[] {
  return [...facts.cohorts.values()].flatMap((history) => {
    const entry = factAt(history, minute);
    if (!entry) return [];
    const cohort = entry.value;
    const stock = state.stock.get(cohort.name);
    const change = stock && stock.from === entry.from ? stock.change : 0;
    const declared = cohort.count.by === "pieces" ? cohort.count.number : cohort.count.squareMetres;
    const count = Math.max(0, declared + change);
    const size = cohort.uptakeOf === "all" ? (declared > 0 ? count / declared : 0) : count;
    const since = Number.isFinite(entry.from) ? entry.from : (firstEvent ?? minute);
    const days = Math.max(0, minute - since) / minutesPerDay;
    const grown = Math.min(mostGrown, (1 + cohort.growthPerDay * daysPerWeek) ** (days / daysPerWeek));
    return [{ cohort, meqPerDay: size * cohort.uptakeMeqPerDay * grown }];
  });
}

/** `grows 1 %/week` compounds week by week. */
const daysPerWeek = 7;

/** However long ago its count was made, a cohort takes no more than this many times what was stated. */
const mostGrown = 1e6;

/** The mean of uptakes, each weighted by its days; what is unknown at any time is unknown. */
export function meanUptake(
  uptakes: readonly { readonly uptake: Uptake; readonly days: number }[],
  now: Uptake,
): Uptake {
  const days = uptakes.reduce((sum, each) => sum + each.days, 0);
  if (!(days > 0)) return now;
  const mean = (value: (uptake: Uptake) => number | null): number | null =>
    uptakes.reduce<number | null>((sum, { uptake, days: own }) => {
      const each = value(uptake);
      return sum === null || each === null ? null : sum + (each * own) / days;
    }, 0);
  return {
    ...now,
    perDay: Object.fromEntries(
      dosed.map((name) => [name, mean(({ perDay }) => perDay[name])]),
    ) as Uptake["perDay"],
    otherLossMeqPerDay: mean(({ otherLossMeqPerDay }) => otherLossMeqPerDay) ?? now.otherLossMeqPerDay,
    calcificationGPerDay: mean(({ calcificationGPerDay }) => calcificationGPerDay),
  };
}
