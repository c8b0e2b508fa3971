/** The facts of a system while they are gathered. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { Hours, SystemFact } from "../../grammar/syntax.ts";
import type { Entry } from "./history.ts";
import type { Cohort, DayHours, Hold, Limit, Source, StatedUptake } from "./model.ts";

/** One statement of a system's section. */
export type FactOf<K extends SystemFact["kind"]> = Extract<SystemFact, { kind: K }>;

type Histories<T> = Map<string, Entry<T>[]>;

/** The histories while they are filled. */
export interface FactsDraft {
  readonly tanks: Histories<number>;
  readonly displacements: Histories<number>;
  readonly measuredVolume: Entry<number>[];
  readonly holds: Map<ParameterName, Entry<Hold>[]>;
  readonly limits: Histories<Limit>;
  readonly cohorts: Histories<Cohort>;
  readonly uptakes: Map<ParameterName, Entry<StatedUptake>[]>;
  readonly skeletonMagnesium: Entry<number>[];
  readonly air: Entry<{ value: number; unit: "ppm" | "uatm" }>[];
  readonly light: Entry<DayHours>[];
  readonly evaporatesLPerDay: Entry<number>[];
  readonly proteinGPerDay: Entry<number>[];
  readonly topOff: Entry<{ solution: string | null; litres: number }>[];
  readonly flowsThrough: Entry<{ litresPerDay: number; water: string }>[];
  readonly sources: Histories<Source>;
}

export const emptyFacts = (): FactsDraft => ({
  tanks: new Map(),
  displacements: new Map(),
  measuredVolume: [],
  holds: new Map(),
  limits: new Map(),
  cohorts: new Map(),
  uptakes: new Map(),
  skeletonMagnesium: [],
  air: [],
  light: [],
  evaporatesLPerDay: [],
  proteinGPerDay: [],
  topOff: [],
  flowsThrough: [],
  sources: new Map(),
});

export const hoursOf = (hours: Hours): DayHours => ({ from: hours.from.minute, to: hours.to.minute });
