/** Facts that hold for a time: of facts about one thing the newest `from` in force wins. */
import type { Standing } from "../../grammar/syntax.ts";
import type { Place } from "./place.ts";

export interface Entry<T> {
  /** Minute from which it holds; -Infinity where none was written. */
  readonly from: number;
  /** First minute at which it doesn't hold any more; Infinity where none was written. */
  readonly until: number;
  readonly value: T;
  readonly place: Place;
}

/** Entries in order of `from`. */
export type History<T> = readonly Entry<T>[];

export const entryOf = <T>(standing: Standing, value: T, place: Place): Entry<T> => ({
  from: standing.from?.minute ?? Number.NEGATIVE_INFINITY,
  until: standing.until?.minute ?? Number.POSITIVE_INFINITY,
  value,
  place,
});

/** The fact in force at a minute, or null. */
export function factAt<T>(history: History<T> | undefined, minute: number): Entry<T> | null {
  if (!history) return null;
  for (let index = history.length - 1; index >= 0; index--) {
    const entry = history[index]!;
    if (entry.from <= minute && minute < entry.until) return entry;
  }
  return null;
}

/** The minutes at which any of these histories changes. */
export function changesOf(histories: Iterable<History<unknown>>): number[] {
  const minutes = new Set<number>();
  for (const history of histories) {
    for (const { from, until } of history) {
      if (Number.isFinite(from)) minutes.add(from);
      if (Number.isFinite(until)) minutes.add(until);
    }
  }
  return [...minutes].sort((left, right) => left - right);
}

/** Adds an entry in order; the entry already there with the same `from`, if there is one, is given back and stays. */
export function addEntry<T>(history: Entry<T>[], entry: Entry<T>): Entry<T> | null {
  const same = history.find(({ from }) => from === entry.from);
  if (same) return same;
  const index = history.findIndex(({ from }) => from > entry.from);
  history.splice(index < 0 ? history.length : index, 0, entry);
  return null;
}
