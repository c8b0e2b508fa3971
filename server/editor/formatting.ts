/** Tidying in the editor: the edits that make a file, some of its lines, or the line just left what `marl tidy` makes of them. */
import { tidyInSteps, tidyLine } from "../../grammar/tidy.ts";
import { isBlank } from "../../grammar/tokens.ts";
import type { Farm } from "../farm.ts";
import {
  changesBetween,
  editsOf,
  type LineChange,
  rawLines,
  type TextEdit,
  type TextPoint,
} from "./text-edits.ts";

/** All that tidying looks at of a farm. */
type Files = Pick<Farm, "documents" | "texts">;

/** What tidies a whole file; none where it is tidy. Pauses now and then. */
export function* tidyEdits(farm: Files, file: string): Generator<void, TextEdit[]> {
  const found = yield* changesIn(farm, file);
  return found ? editsOf(file, found.lines, found.changes) : [];
}

/** The same for the lines that stand whole between two places. */
export function* tidyRangeEdits(
  farm: Files,
  file: string,
  from: TextPoint,
  to: TextPoint,
): Generator<void, TextEdit[]> {
  const found = yield* changesIn(farm, file);
  if (!found) return [];
  const { lines, changes } = found;
  const length = (lines[to.line] ?? "").replace(/\r$/, "").length;
  const first = from.column === 0 ? from.line : from.line + 1;
  // A selection that ends where a line begins touches nothing of it.
  const last = to.column > 0 && to.column >= length ? to.line : to.line - 1;
  const isInside = ({ from: start, to: end }: LineChange): boolean =>
    start >= first && Math.min(Math.max(start, end - 1), lines.length - 1) <= last;
  return editsOf(file, lines, changes.filter(isInside));
}

/**
 * After a line's end was typed: the line just left becomes tidy, and an empty new line gets the indent of its section.
 * What already stands on the new line is being typed and stays.
 */
export function tidyTypedEdits(farm: Files, file: string, newLine: number): TextEdit[] {
  const document = farm.documents.get(file);
  const left = document?.lines[newLine - 1];
  const here = document?.lines[newLine];
  if (!document || !left || !here) return [];
  const edits = editsOf(
    file,
    document.lines.map(({ text }) => text),
    [{ from: newLine - 1, to: newLine, lines: [tidyLine(left)] }],
  );
  const isIndented = here.section !== null && !isBlank(left.text) && left.statement?.kind !== "use";
  if (!isIndented || here.text !== "") return edits;
  const at = { line: newLine, column: 0 };
  return [...edits, { file, from: at, to: at, text: "  " }];
}

/** What becomes of each line when a file is tidied: lines that aren't blank become one each, in order. */
function* changesIn(
  farm: Files,
  file: string,
): Generator<void, { readonly lines: readonly string[]; readonly changes: readonly LineChange[] } | null> {
  const document = farm.documents.get(file);
  const text = farm.texts.get(file);
  if (!document || text === undefined) return null;
  const tidy = yield* tidyInSteps(document);
  yield;
  const lines = rawLines(text);
  if (tidy === text) return { lines, changes: [] };
  const next = rawLines(tidy);
  yield;
  return { lines, changes: byWrittenLines(lines, next) ?? changesBetween(lines, next) };
}

/** Pairs the lines with something on them, and between them the blank ones from the end. */
function byWrittenLines(old: readonly string[], next: readonly string[]): LineChange[] | null {
  const placesIn = (lines: readonly string[]): number[] =>
    lines.flatMap((line, number) => (isBlank(line) ? [] : [number]));
  const [left, right] = [placesIn(old), placesIn(next)];
  if (left.length !== right.length) return null;
  const changes: LineChange[] = [];
  let [a, b] = [0, 0];
  const pair = (x: number, y: number): void => {
    if (old[x] !== next[y]) changes.push({ from: x, to: x + 1, lines: [next[y]!] });
  };
  for (const [index, x] of [...left, old.length].entries()) {
    const y = right[index] ?? next.length;
    const surplus = x - a - (y - b);
    if (surplus > 0) changes.push({ from: a, to: a + surplus, lines: [] });
    if (surplus < 0) changes.push({ from: a, to: a, lines: next.slice(b, b - surplus) });
    for (let blank = a + Math.max(surplus, 0); blank < x; blank += 1) pair(blank, y - (x - blank));
    if (x < old.length) pair(x, y);
    [a, b] = [x + 1, y + 1];
  }
  return changes;
}
