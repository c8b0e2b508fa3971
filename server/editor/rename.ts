/** Renaming a thing: every place that speaks of it, or why it can't be done. */
import { cut, isReserved, nameWord } from "../../grammar/tokens.ts";
import type { LineEdit } from "../checks/problem.ts";
import { inQuotes } from "../checks/words.ts";
import type { Farm } from "../farm.ts";
import type { Cursor, LineSpan } from "./cursor.ts";
import { clashOf } from "./rename-clash.ts";
import { type LookUp, lookUp, type Mention, mentionSteps, type Thing } from "./things.ts";
import { type UnderCursor, underCursor } from "./under-cursor.ts";

export interface Refused {
  readonly ok: false;
  readonly reason: string;
}

export type Renamable = { readonly ok: true; readonly span: LineSpan; readonly thing: Thing } | Refused;
export type Renamed = { readonly ok: true; readonly edits: readonly LineEdit[] } | Refused;

const refused = (reason: string): Refused => ({ ok: false, reason });

const onlyNames = "Only names that the farm's files declare can be renamed.";

/** The name under the cursor, or why there is nothing to rename. */
export function renamable(farm: Farm, cursor: Cursor): Renamable {
  const found = underCursor(farm, cursor);
  if (!found?.word) return refused(`There is no name here. ${onlyNames}`);
  const { thing, word } = found;
  if (!thing || thing.builtIn) return refused(whyNot(found, word.text));
  const { start, end } = word;
  return { ok: true, span: { file: cursor.file, line: cursor.line, start, end }, thing };
}

function whyNot({ word, thing }: UnderCursor, text: string): string {
  const quoted = inQuotes(text);
  if (thing?.builtIn)
    return `${quoted} is a reagent that every farm has, so its name stays. Declare a reagent of your own to use another name.`;
  if (word?.name)
    return `${quoted} isn't declared here, so nothing is known to rename. Declare it, or correct the name.`;
  switch (word?.role) {
    case "keyword":
      return `${quoted} is a word of the language. ${onlyNames}`;
    case "parameter":
      return `${quoted} is a parameter of the language. ${onlyNames}`;
    case "path":
      return "This is a file's path. Rename the file itself, and the use lines follow.";
    default:
      return `${quoted} is no name. ${onlyNames}`;
  }
}

/** All edits that give the thing under the cursor another name, pausing now and then. */
export function* rename(farm: Farm, cursor: Cursor, newName: string): Generator<void, Renamed> {
  const target = renamable(farm, cursor);
  if (!target.ok) return target;
  const wrong = whyNoName(newName);
  if (wrong) return refused(wrong);
  const { thing } = target;
  if (newName === thing.name) return { ok: true, edits: [] };
  const names = lookUp(farm);
  const edits: LineEdit[] = [];
  for (const each of movingTogether(farm, names, thing)) {
    const mentions = yield* mentionSteps(farm, each);
    const clash = yield* clashOf(farm, names, each, mentions, newName);
    if (clash) return refused(clash);
    for (const mention of mentions) edits.push(editOf(mention, newName));
  }
  return { ok: true, edits };
}

const editOf = ({ file, line, start, end }: Mention, text: string): LineEdit => ({
  ...{ file, line, start, end },
  text,
});

/** Why a word can't be a name; null where it can. */
export function whyNoName(word: string): string | null {
  const [token, ...others] = cut(word).tokens;
  if (token && others.length === 0 && token.image === word) {
    if (token.tokenType.CATEGORIES?.includes(nameWord)) return null;
    if (/^[A-Za-z]/.test(word) && isReserved(word))
      return `${inQuotes(word)} is a word of the language, so it can't be a name. Choose another name.`;
  }
  return `${inQuotes(word)} can't be a name. A name begins with a letter from a to z and goes on with letters, digits, - or _.`;
}

/**
 * A thing with those that must keep its name: corals that move to another system arrive in its cohort of the same
 * name, so these cohorts are renamed together.
 */
function movingTogether(farm: Farm, names: LookUp, thing: Thing): Thing[] {
  if (thing.kind !== "cohort" || thing.ref === null) return [thing];
  const { systems } = farm.bound.model;
  const ways: (readonly [string, string])[] = [];
  for (const system of systems.values())
    for (const event of system.events) {
      if (event.kind !== "moved" || event.cohort !== thing.name || event.system === null) continue;
      const target = systems.get(event.system);
      if (target && names.ownNames(target, "cohort").has(thing.name)) ways.push([system.ref, target.ref]);
    }
  const refs = new Set([thing.ref]);
  for (let before = 0; before < refs.size; ) {
    before = refs.size;
    for (const [from, to] of ways)
      if (refs.has(from) || refs.has(to)) {
        refs.add(from);
        refs.add(to);
      }
  }
  return [...refs].map((ref) => ({ ...thing, ref, key: `cohort ${thing.name} of ${ref}` }));
}
