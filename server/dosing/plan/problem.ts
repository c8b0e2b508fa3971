/**
 * The plan as a problem of plain numbers: what must be supplied, what may be given, within which limits; and
 * its answer. Concentrations are in a parameter's own unit (meq/L, mg/L), volumes in litres, times in days.
 */
import type { ParameterName } from "../../../grammar/parameters.ts";

/** A parameter that is held and that some source can raise, in order of priority: alkalinity, calcium, magnesium, the rest. */
export interface PlanParameter {
  readonly name: ParameterName;
  /** The estimate now; null where it was never read. */
  readonly now: number | null;
  readonly low: number;
  readonly high: number;
  readonly aim: number;
  /**
   * What sources must supply a day to keep it at its aim: uptake, less exchange taken at the aim, less what
   * a top-off solution brings. Negative where more comes in than goes out. Null where uptake is unknown.
   */
  readonly needPerDay: number | null;
  /** What happens a day without any source, at the water as it is now: −uptake + exchange + top-off. Unknown uptake counts 0 here. */
  readonly passivePerDay: number;
  readonly risePerDay: number | null;
  readonly fallPerDay: number | null;
  readonly max: number | null;
  readonly min: number | null;
  /** Why it isn't corrected though it may be off its aim; null where it may be. */
  readonly heldBack: string | null;
}

/** A pump or a hand that gives one solution, in order of declaration. */
export interface PlanSource {
  readonly key: string;
  /** Parameter units × litres per litre of solution: 1 L of it in 1 L of water raises the parameter by this. */
  readonly strength: Readonly<Partial<Record<ParameterName, number>>>;
  /** The largest single delivery that the limits on one dose (dose, pH, Ω) allow, L; 0 where none is allowed. */
  readonly largestDoseL: number;
  /** What holds `largestDoseL` down, in words of the report ("alkalinity dose", "pH max"); null where nothing does. */
  readonly largestDoseBy: string | null;
  /** The smallest delivery that is repeated well, L. */
  readonly leastDoseL: number;
  /** What it can deliver a day within its hours, L; null by hand. */
  readonly capacityLPerDay: number | null;
  /** Deliveries a day: fixed for a hand, the most that is sensible for a pump. */
  readonly deliveries: { readonly kind: "fixed" | "at-most"; readonly count: number };
  /** Runs at this rate whatever is planned, L/day. */
  readonly alwaysLPerDay: number;
}

export interface PlanProblem {
  readonly volumeL: number;
  /** The share of the water that flows through a day: distances to the aim shrink by it, beside what is dosed. */
  readonly exchangePerDay: number;
  readonly parameters: readonly PlanParameter[];
  readonly sources: readonly PlanSource[];
}

/** A rise to the aim, given over some days. */
export interface PlannedCorrection {
  readonly parameter: ParameterName;
  /** How far it comes up; `amount` of that is dosed, exchange or a top-off may close the rest. */
  readonly distance: number;
  readonly amount: number;
  readonly perDay: number;
  readonly days: number;
  /** The limit that cut its rate, in words of the report: "alkalinity rise", "ash-part dose"; null where none did. */
  readonly limitedBy: string | null;
}

/** A fall to the aim: maintenance runs this much lower for some days. */
export interface PlannedCut {
  readonly parameter: ParameterName;
  readonly perDay: number;
  readonly days: number;
}

/** What is given a day from one moment to the next; the last phase has no end. Rates in litres a day, by source. */
export interface PlanPhase {
  readonly untilDays: number | null;
  readonly litresPerDay: readonly number[];
}

export interface PlannedSource {
  readonly key: string;
  /** While cuts run, after the cut. Includes what always runs. Null where the uptake that it would meet is unknown. */
  readonly maintenanceLPerDay: number | null;
  readonly correctionLPerDay: number;
  /** The parameter that the correction serves, and the litres of the whole of it. */
  readonly serves: ParameterName | null;
  readonly correctionTotalL: number;
  /** Null where maintenance is unknown. */
  readonly totalLPerDay: number | null;
  readonly dosesPerDay: number;
  readonly litresPerDose: number;
  /** 1, or k where it runs every k-th day only. */
  readonly everyDays: number;
}

/** What stands in the way of what should be given. */
export interface PlanObstacle {
  readonly parameter: ParameterName;
  /** `held-back`: maintenance less than wished, or no correction at all; `no-source`: nothing can raise it; `passive-breach`: without any dose a limit breaks. */
  readonly kind: "held-back" | "no-source" | "passive-breach";
  /** In words of the report: "alkalinity rise", "magnesium under 1150 mg/L", "head-1 hours". */
  readonly by: string;
  /** What is missing or over a day, in the parameter's unit; null where it has no figure. */
  readonly perDay: number | null;
}

export interface PlanAnswer {
  readonly sources: readonly PlannedSource[];
  readonly corrections: readonly PlannedCorrection[];
  readonly cuts: readonly PlannedCut[];
  /** The longest correction, 0 without one. */
  readonly correctionDays: number;
  /** Litres a day by source over time, for the projection. */
  readonly phases: readonly PlanPhase[];
  readonly obstacles: readonly PlanObstacle[];
  /** The first limit that bound a correction (in priority order), else one that bound maintenance, else null. */
  readonly limitedBy: string | null;
}
