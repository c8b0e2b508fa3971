/** The facts of a system while they are gathered, and how one is entered in its history. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { Hours, Standing, SystemFact } from "../../grammar/syntax.ts";
import { type Line, placeOf } from "./binder.ts";
import { addEntry, type Entry, entryOf } from "./history.ts";
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

/** Puts an entry in its history, or reports that the same fact is declared twice. */
export function enter<T>(line: Line, history: Entry<T>[], standing: Standing, value: T, what: string): void {
  if (standing.from && standing.until && standing.until.minute <= standing.from.minute) {
    line.report({
      code: "system/until-before-from",
      place: placeOf(line, standing.until),
      system: line.system,
    });
    return;
  }
  const same = addEntry(history, entryOf(standing, value, placeOf(line, null)));
  if (same) {
    line.report({
      code: "name/twice",
      place: placeOf(line, null),
      system: line.system,
      word: what,
      what: "fact",
      first: same.place,
    });
  }
}

/** The history under a key, made where it isn't there yet. */
export function into<K, T>(histories: Map<K, Entry<T>[]>, key: K): Entry<T>[] {
  const history = histories.get(key) ?? [];
  histories.set(key, history);
  return history;
}

export const hoursOf = (hours: Hours): DayHours => ({ from: hours.from.minute, to: hours.to.minute });
