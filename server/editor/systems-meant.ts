/** The systems that a place speaks of. */
import type { System } from "../culture/model.ts";
import type { Farm } from "../farm.ts";
import { lineIn } from "./cursor.ts";
import { systemOfLine } from "./things.ts";

/**
 * The system of a line; else those of the file, by section or log; else all of the farm. With a name only those that
 * are called so, as the file sees it.
 */
export function systemsMeant(
  farm: Farm,
  file: string,
  line: number | null,
  name: string | null,
): readonly System[] {
  const all = [...farm.bound.model.systems.values()];
  if (name !== null) {
    const seen = farm.bound.names.visible.get(file)?.get(name);
    const own = all.filter(({ ref }) => seen?.kind === "system" && ref === seen.ref);
    return own.length > 0 ? own : all.filter((system) => system.name === name);
  }
  const at = line === null ? null : lineIn(farm, file, line);
  const ofLine = at && systemOfLine(farm, at);
  if (ofLine) return [ofLine];
  const ofFile = all.filter(({ place, logFiles }) => place.file === file || logFiles.includes(file));
  return ofFile.length > 0 ? ofFile : all;
}
