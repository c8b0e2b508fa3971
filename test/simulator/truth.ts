/**
 * What is true of a simulated system and of those who look after it. Shapes only. Nothing here comes from the
 * product: a truth is stated in plain amounts, so that what the product makes of a log can be held against it.
 */

/** What is dissolved in a litre of water. */
export interface Water {
  readonly alkalinityMeqPerL: number;
  readonly calciumMmolPerL: number;
  readonly magnesiumMmolPerL: number;
  /** PSS-78. */
  readonly salinity: number;
}

export interface Solution {
  readonly name: string;
  readonly alkalinityMeqPerMl: number;
  readonly calciumMmolPerMl: number;
  readonly magnesiumMmolPerMl: number;
  /** Dry salt in it. */
  readonly saltMgPerMl: number;
}

export interface Cohort {
  readonly name: string;
  /** Pieces or square metres on the first day. */
  readonly amount: number;
  readonly countedIn: "pieces" | "m2";
  /** Alkalinity that one piece or square metre takes on the first day. */
  readonly meqPerDayEach: number;
  readonly growthPerWeek: number;
  /** Mole fraction of magnesium in what it lays down. */
  readonly magnesiumFraction: number;
}

export interface Pump {
  readonly name: string;
  readonly solution: Solution;
  readonly startMlPerDay: number;
  /** What it really delivers of what it is set to: 1 for a true pump. */
  readonly delivers: number;
  readonly holdsL: number;
  /** What the technician watches when setting it. */
  readonly serves: "alkalinity" | "calcium";
}

/** How a test errs, and how finely it is read. */
export interface Test {
  readonly scatter: number;
  readonly bias: number;
  readonly step: number;
}

export interface Kit {
  readonly name: string;
  readonly alkalinityDkh: Test;
  readonly calciumMgPerL: Test;
  readonly magnesiumMgPerL: Test;
  readonly salinity: Test;
  readonly temperatureDegC: Test;
  readonly pH: Test;
}

/** 0 is Sunday. */
export type Weekday = 0 | 1 | 2 | 3 | 4 | 5 | 6;

/** What the technicians do by habit. */
export interface Habits {
  readonly people: readonly string[];
  /** Share of days on which nobody tests. */
  readonly daysMissed: number;
  /** Calcium and magnesium are tested on this day. */
  readonly fullTestOn: Weekday;
  /** Days, counted from the first, on which the pumps are set anew, unless they just were. */
  readonly setOnDays: readonly number[];
  /** And on any day when two tests in a row are further off the aim. */
  readonly setWhenOffByDkh: number;
  readonly aim: {
    readonly alkalinityDkh: number;
    readonly calciumMgPerL: number;
    readonly magnesiumMgPerL: number;
  };
  /** What they take the volume to be when they reckon a dose. */
  readonly believedVolumeL: number;
  readonly exchange: { readonly on: Weekday; readonly litres: number; readonly water: string } | null;
  readonly fillOn: Weekday;
  readonly magnesiumByHand: { readonly solution: Solution; readonly mostMl: number } | null;
}

/** What happened once, on a day counted from the first. */
export type Happening = { readonly day: number; readonly time: string } & (
  | { readonly what: "stocked" | "removed"; readonly cohort: string; readonly amount: number }
  | { readonly what: "stopped" | "started"; readonly pump: string }
  | { readonly what: "note"; readonly text: string }
  /** An alkalinity test gone wrong by so much, and left out by the technician. */
  | { readonly what: "disregarded"; readonly wrongByDkh: number; readonly why: string }
);

export interface Truth {
  readonly system: string;
  /** `2026-09-02`; the first visit is that morning. */
  readonly firstDay: string;
  /** The log ends on the morning so many days later. */
  readonly days: number;
  readonly volumeL: number;
  readonly start: Water;
  readonly cohorts: readonly Cohort[];
  readonly light: {
    readonly fromHour: number;
    readonly toHour: number;
    /** Uptake in the light over uptake in the dark. */
    readonly overDark: number;
  };
  /** Alkalinity lost otherwise than to skeletons: what is fed turns to nitrate. */
  readonly otherLossMeqPerDay: number;
  readonly evaporation: { readonly litresPerDay: number; readonly dayToDay: number };
  /** What makes up the water that evaporates; null for fresh water. */
  readonly topOff: Solution | null;
  readonly pumps: readonly Pump[];
  readonly exchangeWater: Water;
  /** What nobody can explain, one standard deviation after a day, growing with the root of time. */
  readonly unexplained: Omit<Water, "salinity">;
  readonly temperatureDegC: number;
  /** At the end of the night, and at the end of the light. */
  readonly pH: { readonly lowest: number; readonly highest: number };
  readonly kit: Kit;
  readonly habits: Habits;
  readonly happenings: readonly Happening[];
}
