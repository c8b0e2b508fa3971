/** Entering a dated fact in its history, for every section alike. */
import type { Standing } from "../../grammar/syntax.ts";
import { type Line, placeOf } from "./binder.ts";
import { addEntry, type Entry, entryOf } from "./history.ts";

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
