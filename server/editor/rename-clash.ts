/** What a new name would be mixed up with. */

import { kindOf } from "../checks/name.ts";
import { inQuotes } from "../checks/words.ts";
import { ambiguousReagents, isReagent } from "../chemistry/reagents.ts";
import { linesAtOnce } from "../culture/keep.ts";
import type { Farm } from "../farm.ts";
import { lineIn } from "./cursor.ts";
import { isOwn, type LookUp, type Mention, type Thing } from "./things.ts";
import { namesIn } from "./words.ts";

/** Why a thing can't be called so, as a sentence; null where it can. */
export function* clashOf(
  farm: Farm,
  names: LookUp,
  thing: Thing,
  mentions: readonly Mention[],
  newName: string,
): Generator<void, string | null> {
  if (!isOwn(thing.kind)) {
    const shared = sharedClash(farm, names, thing, newName);
    return shared ?? (thing.kind === "solution" ? takenByPump(farm, names, mentions, newName) : null);
  }
  const system = thing.ref === null ? undefined : farm.bound.model.systems.get(thing.ref);
  if (!system) return null;
  if (names.ownNames(system, thing.kind).has(newName))
    return `The system ${inQuotes(system.name)} has a ${kindOf(thing.kind)} ${inQuotes(newName)} already. Choose another name.`;
  return thing.kind === "pump" ? yield* takenFromSolution(farm, names, system.ref, newName) : null;
}

/** A file that sees the thing must not see another by its new name. */
function sharedClash(farm: Farm, names: LookUp, thing: Thing, newName: string): string | null {
  if (thing.kind === "reagent" && (isReagent(newName) || ambiguousReagents.has(newName)))
    return `${inQuotes(newName)} is the name of a reagent that every farm has. Choose another name.`;
  const same = new Set(names.declarationsOf(thing).map(({ ref }) => ref));
  for (const [file, table] of farm.bound.names.visible) {
    const seen = table.get(thing.name);
    const other = table.get(newName);
    if (!seen || !other || !same.has(seen.ref)) continue;
    return `${inQuotes(newName)} is a ${kindOf(other.kind)} in ${other.place.file} already, and ${file} sees both. Choose another name.`;
  }
  return null;
}

/** `set` takes a word for a pump's name before it takes it for a solution's. */
function takenByPump(
  farm: Farm,
  names: LookUp,
  mentions: readonly Mention[],
  newName: string,
): string | null {
  for (const { file, line: number, start } of mentions) {
    const line = lineIn(farm, file, number);
    const word = line && namesIn(line.line).find((each) => each.start === start);
    if (!line || !word?.name?.kinds.includes("pump")) continue;
    const system = names.systemOf(line);
    if (system && names.ownNames(system, "pump").has(newName))
      return `The system ${inQuotes(system.name)} has a pump ${inQuotes(newName)}, and its set lines would mean the pump. Choose another name.`;
  }
  return null;
}

/** The other way round: a pump's new name that `set` lines have for a solution. */
function* takenFromSolution(
  farm: Farm,
  names: LookUp,
  system: string,
  newName: string,
): Generator<void, string | null> {
  for (const [file, document] of farm.documents) {
    yield;
    if (!farm.texts.get(file)?.includes(newName)) continue;
    for (const [number, line] of document.lines.entries()) {
      if (number % linesAtOnce === 0) yield;
      if (line.statement?.kind !== "set" || !line.text.includes(newName)) continue;
      const here = lineIn(farm, file, number);
      if (!here || names.systemOf(here)?.ref !== system) continue;
      const isMeant = namesIn(line).some(
        (word) => word.text === newName && names.thingOf(here, word)?.kind === "solution",
      );
      if (isMeant)
        return `Set lines in ${file} mean the solution ${inQuotes(newName)}, and would mean the pump. Choose another name.`;
    }
  }
  return null;
}
