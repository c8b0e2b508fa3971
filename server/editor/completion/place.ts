/** Where completion was asked for: the word at the cursor, what stands before it, and what could stand there. */
import type { IToken } from "chevrotain";
import { expectedAfter, longestLine } from "../../../grammar/line.ts";
import { parameterOf } from "../../../grammar/parameters.ts";
import type { StatementRow } from "../../../grammar/statements.ts";
import type { SectionKind } from "../../../grammar/syntax.ts";
import { cut, dateWord, isBlank, timeWord, unclosed } from "../../../grammar/tokens.ts";
import type { System } from "../../culture/model.ts";
import type { Farm } from "../../farm.ts";
import { type Cursor, type LineInFarm, lineIn } from "../cursor.ts";
import { rowOfLine } from "../signature-help.ts";
import { systemOfLine } from "../things.ts";

export interface CompletionPlace {
  readonly farm: Farm;
  readonly cursor: Cursor;
  readonly line: LineInFarm;
  readonly section: SectionKind | null;
  readonly system: System | null;
  /** The minute that it is. */
  readonly now: number;
  /** The line up to the word at the cursor. */
  readonly before: string;
  /** The word up to the cursor. */
  readonly typed: string;
  /** Where the whole word stands. */
  readonly start: number;
  readonly end: number;
  /** The words before, without the date and the time of an event. */
  readonly words: readonly IToken[];
  readonly isDated: boolean;
  readonly hasTime: boolean;
  /** The statement that the words before begin. */
  readonly row: StatementRow | null;
  /** The last parameter before the cursor. */
  readonly parameter: string | null;
  /** In the language's own words. */
  readonly expected: readonly string[];
  /** True where the word stands at the margin. */
  readonly atMargin: boolean;
  /** True where nothing but a comment follows the word. */
  readonly isLast: boolean;
}

/** Where a word ends: names hold `-`, units `/`. */
const wordAfter = /^[^\s,"“”„#±×]*/;
const betweenWords = /[\s,"“”„#±×]/;

/** Where the word begins that ends at a column. */
function startOfWord(text: string, column: number): number {
  let start = column;
  while (start > 0 && !betweenWords.test(text[start - 1]!)) start -= 1;
  return start;
}
/** A number and its unit without the space between them. */
const numberBefore = /^[-+−]?\d+(?:\.\d+)?(?=[A-Za-zµμ°℃℉%])/;

/** Null where nothing of the language stands: in comments, in quotes, outside the farm. */
export function completionPlace(farm: Farm, cursor: Cursor, now: number): CompletionPlace | null {
  const line = lineIn(farm, cursor.file, cursor.line);
  if (!line) return null;
  const { text, comment } = line.line;
  if (comment && cursor.column > comment.start) return null;
  if (text.length > longestLine) return null;
  const run = text.slice(startOfWord(text, cursor.column), cursor.column);
  const typed = run.slice(numberBefore.exec(run)?.[0].length ?? 0);
  const start = cursor.column - typed.length;
  const before = text.slice(0, start);
  const { tokens } = cut(before);
  if (tokens.at(-1)?.tokenType === unclosed) return null;
  const isDated = tokens[0]?.tokenType === dateWord;
  const hasTime = isDated && tokens[1]?.tokenType === timeWord;
  const words = isDated ? tokens.slice(hasTime ? 2 : 1) : tokens;
  const end = cursor.column + (wordAfter.exec(text.slice(cursor.column))?.[0].length ?? 0);
  const section = line.section?.kind ?? null;
  const own = sectionAbove(line) ?? section;
  return {
    ...{ farm, cursor, line, now, before, typed, start, end, words, isDated, hasTime },
    section: own,
    system: systemOfLine(farm, line),
    row: words.length === 0 ? null : rowOfLine({ ...line, line: { ...line.line, text: before } }),
    parameter: words.findLast(({ image }) => parameterOf(image))?.image ?? null,
    expected: expectedAfter(own, before),
    atMargin: before === "",
    isLast: isBlank(text.slice(end, comment?.start ?? text.length)),
  };
}

/** A header that is being typed is part of its own section; what could stand in its place follows the one before. */
function sectionAbove({ document, number, section, line }: LineInFarm): SectionKind | null {
  if (section?.headerLine !== number || line.section === null) return null;
  return document.sections[line.section - 1]?.kind ?? null;
}

/** The last of these words before the cursor. */
export function lastOf({ words }: CompletionPlace, known: ReadonlySet<string>): string | null {
  return words.findLast(({ image }) => known.has(image))?.image ?? null;
}
