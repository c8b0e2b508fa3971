/**
 * The farm's model: what the files say, with names bound, units in one spelling, facts dated and events in
 * order. Alkalinity is in meq/L, dissolved elements in mg/L, volumes in litres, times in minutes since
 * 1970-01-01 of the wall clock. Shapes only.
 */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { LimitKind } from "../../grammar/syntax.ts";
import type { History } from "./history.ts";
import type { Place } from "./place.ts";

/** Values by parameter, in its own unit. */
export type ByParameter<T> = Readonly<Partial<Record<ParameterName, T>>>;

/** Parts of the day in minutes after midnight. */
export interface DayHours {
  readonly from: number;
  readonly to: number;
}

export interface Hold {
  readonly parameter: ParameterName;
  readonly low: number;
  readonly high: number;
  readonly aim: number;
  /** The scale that a pH is held on. */
  readonly scale: "NBS" | "total" | null;
  readonly aimStated: boolean;
  /** How the band was written, for messages. */
  readonly unit: DisplayUnit;
}

/** How a person writes this parameter: the factor from the model's unit, and the unit's spelling. */
export interface DisplayUnit {
  readonly spelling: string;
  readonly perModelUnit: number;
}

export interface Limit {
  readonly parameter: ParameterName;
  readonly which: LimitKind;
  /** A rate a day for `rise` and `fall`, a difference for `swing` and `dose`, a value for `max` and `min`. */
  readonly value: number;
  /** Of a pH. */
  readonly scale: "NBS" | "total" | null;
}

export interface Cohort {
  readonly name: string;
  readonly count:
    | { readonly by: "pieces"; readonly number: number }
    | { readonly by: "area"; readonly squareMetres: number };
  /** Alkalinity taken, meq a day: by all as declared, by a piece, or by a square metre. */
  readonly uptakeMeqPerDay: number;
  readonly uptakeOf: "all" | "piece" | "square metre";
  /** Standard deviation of the same as written after `±`; null where none was. */
  readonly uptakeDeviation: number | null;
  /** Mole fraction of magnesium in its mineral; null for the system's. */
  readonly magnesiumFraction: number | null;
  /** Growth, a share a day; 0 where none was written. */
  readonly growthPerDay: number;
}

/** What the technician found the whole system to take: a change of the water a day, or an amount a day. */
export interface StatedUptake {
  readonly parameter: ParameterName;
  readonly per: "litre" | "whole";
  /** meq or mg a day, in a litre or in all. */
  readonly value: number;
  readonly deviation: number | null;
}

export interface Source {
  /** The pump's name, or "hand". */
  readonly by: string;
  readonly device: "pump" | "hand";
  readonly solution: string;
  readonly flowLPerDay: number | null;
  readonly leastL: number | null;
  readonly hours: DayHours | null;
  readonly alwaysLPerDay: number;
  readonly holdingL: number | null;
  /** Deliveries a day by hand. */
  readonly times: number;
}

/** Ions and alkalinity in a millilitre of solution; null where it isn't known. */
export interface Strength {
  readonly alkalinityMeq: number | null;
  readonly calciumMg: number | null;
  readonly magnesiumMg: number | null;
  readonly potassiumMg: number | null;
  readonly strontiumMg: number | null;
  readonly sodiumMg: number | null;
  readonly chlorideMg: number | null;
  readonly sulfateMg: number | null;
  readonly carbonMmol: number | null;
}

export interface Solution {
  /** Its reference in the farm: the name, with the file where two files share one. */
  readonly ref: string;
  readonly name: string;
  readonly title: string | null;
  readonly place: Place;
  /** Its strength over time: recipes change. Empty where no recipe can be worked out. */
  readonly strengths: History<Strength>;
  readonly assumptions: readonly Assumption[];
}

/** A water to exchange with: a salt water of the farm. */
export interface SaltWater {
  readonly ref: string;
  readonly name: string;
  readonly title: string | null;
  readonly place: Place;
  readonly values: ReadonlyMap<ParameterName, History<number>>;
}

/** Something taken for granted, told wherever a result rests on it. */
export interface Assumption {
  readonly what: string;
  readonly value: string;
  readonly basis: string;
}

/** One value of a `read` line. */
export interface ReadValue {
  readonly place: Place;
  /** meq/L, mg/L, PSS-78, °C, pH. */
  readonly value: number;
  /** Of what was written for a kilogram: meq or mg in it. */
  readonly perKilogram: number | null;
  /** A test that showed less than this. */
  readonly below: boolean;
  /** Sea water can't have it: kept in the report, left out of every estimate. */
  readonly impossible: boolean;
  readonly scale: "NBS" | "total" | null;
  /** The unit as the technician wrote it. */
  readonly unit: DisplayUnit;
}

export interface EventHead {
  readonly minute: number;
  readonly timeKnown: boolean;
  readonly place: Place;
  /** Tidy text: orders events of one minute and kind. */
  readonly text: string;
  readonly by: string | null;
}

export interface ReadEvent extends EventHead {
  readonly kind: "read";
  readonly values: ByParameter<ReadValue>;
  readonly disregarded: boolean;
  readonly kit: string | null;
}

/** What happened to a system's water, bound and converted. */
export type SystemEvent =
  | ReadEvent
  | (EventHead & {
      readonly kind: "set";
      /** Which source, as `sourceKey`, gives how much a day from now on. */
      readonly rates: readonly {
        readonly source: string;
        readonly litresPerDay: number;
        readonly place: Place;
      }[];
    })
  | (EventHead & {
      readonly kind: "gave";
      readonly doses: readonly {
        readonly solution: string;
        readonly litres: number;
        readonly place: Place;
      }[];
    })
  | (EventHead & { readonly kind: "renewed"; readonly litres: number; readonly water: string })
  | (EventHead & { readonly kind: "topped"; readonly litres: number; readonly solution: string | null })
  | (EventHead & {
      readonly kind: "stocked" | "removed" | "moved";
      readonly cohort: string;
      /** Pieces, or square metres. */
      readonly count: number;
      readonly system: string | null;
    })
  | (EventHead & { readonly kind: "filled" | "level"; readonly pump: string; readonly litres: number })
  | (EventHead & { readonly kind: "calibrated"; readonly pump: string; readonly flowLPerDay: number })
  | (EventHead & { readonly kind: "stopped" | "started"; readonly pump: string })
  | (EventHead & { readonly kind: "note" });

export interface System {
  readonly ref: string;
  readonly name: string;
  readonly title: string | null;
  readonly place: Place;
  readonly facts: SystemFacts;
  /** In canonical order, doubled lines once, lines of the future included. */
  readonly events: readonly SystemEvent[];
  /** The files that its log stands in. */
  readonly logFiles: readonly string[];
  /** References of the solutions, salt waters and other systems that its facts and events name. */
  readonly refersTo: ReadonlySet<string>;
}

/** The constants of a system over time, one value. */
export interface SystemFacts {
  readonly tanks: ReadonlyMap<string, History<number>>;
  readonly displacements: ReadonlyMap<string, History<number>>;
  readonly measuredVolume: History<number>;
  readonly holds: ReadonlyMap<ParameterName, History<Hold>>;
  /** By parameter and kind, `alkalinity rise`. */
  readonly limits: ReadonlyMap<string, History<Limit>>;
  readonly cohorts: ReadonlyMap<string, History<Cohort>>;
  readonly uptakes: ReadonlyMap<ParameterName, History<StatedUptake>>;
  readonly skeletonMagnesium: History<number>;
  readonly air: History<{ readonly value: number; readonly unit: "ppm" | "uatm" }>;
  readonly light: History<DayHours>;
  readonly evaporatesLPerDay: History<number>;
  /** Protein fed, g a day. */
  readonly proteinGPerDay: History<number>;
  readonly topOff: History<{ readonly solution: string | null; readonly litres: number }>;
  readonly flowsThrough: History<{ readonly litresPerDay: number; readonly water: string }>;
  /** By `sourceKey`, in order of declaration. */
  readonly sources: ReadonlyMap<string, History<Source>>;
}

/** `head-1` for a pump, `hand ash-part` for a hand: no name holds a space. */
export const sourceKey = (source: {
  readonly device: "pump" | "hand";
  readonly by: string;
  readonly solution: string;
}): string => (source.device === "pump" ? source.by : `hand ${source.solution}`);

export interface Kit {
  readonly ref: string;
  readonly name: string;
  readonly place: Place;
  /** One standard deviation by parameter, in the model's unit, or as a share of the value. */
  readonly deviations: ReadonlyMap<
    ParameterName,
    History<{ readonly value: number; readonly relative: boolean }>
  >;
}

/** Everything by reference. */
export interface FarmModel {
  readonly systems: ReadonlyMap<string, System>;
  readonly solutions: ReadonlyMap<string, Solution>;
  readonly waters: ReadonlyMap<string, SaltWater>;
  readonly kits: ReadonlyMap<string, Kit>;
}
