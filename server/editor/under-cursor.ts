/** The one question that hover, completion, renaming and the rest ask first: what is under the cursor? */
import type { System } from "../culture/model.ts";
import type { Farm } from "../farm.ts";
import { type Cursor, type LineInFarm, lineIn } from "./cursor.ts";
import { lookUp, type Thing } from "./things.ts";
import { type LineWord, wordAt, wordsIn } from "./words.ts";

export interface UnderCursor {
  readonly cursor: Cursor;
  readonly line: LineInFarm;
  readonly words: readonly LineWord[];
  /** The word that the cursor stands in or touches; null in a comment, between words, on an empty line. */
  readonly word: LineWord | null;
  /** What the word names. */
  readonly thing: Thing | null;
  /** The system that the line belongs to. */
  readonly system: System | null;
}

/** What is under the cursor; null outside the farm's files. */
export function underCursor(farm: Farm, cursor: Cursor): UnderCursor | null {
  const line = lineIn(farm, cursor.file, cursor.line);
  if (!line) return null;
  const words = wordsIn(line.line);
  const word = wordAt(words, cursor.column);
  const names = lookUp(farm);
  return {
    ...{ cursor, line, words, word },
    thing: word && names.thingOf(line, word),
    system: names.systemOf(line),
  };
}
