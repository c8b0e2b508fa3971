/** Texts and problems → the texts after their safe fixes, and what was done. Writes nothing. */
import { inOneGo } from "../culture/keep.ts";
import type { LineEdit, Problem } from "./problem.ts";

export interface FixNote {
  readonly file: string;
  /** From 0, in the text before. */
  readonly line: number;
  readonly title: string;
}

export interface Fixed {
  /** Only the texts that changed. */
  readonly texts: ReadonlyMap<string, string>;
  readonly done: readonly FixNote[];
  /** Fixes that touch what another one changed; they may be done to the texts after. */
  readonly skipped: readonly FixNote[];
}

const byteOrderMark = "\ufeff";

const problemsAtOnce = 256;

/** Does the one safe fix of each problem that has one. Byte order mark and line endings stay as they are. */
export const applySafeFixes = (texts: ReadonlyMap<string, string>, problems: readonly Problem[]): Fixed =>
  inOneGo(applySafeFixesInSteps(texts, problems));

/** The same, pausing now and then. */
export function* applySafeFixesInSteps(
  texts: ReadonlyMap<string, string>,
  problems: readonly Problem[],
): Generator<void, Fixed> {
  const done: FixNote[] = [];
  const skipped: FixNote[] = [];
  const edits = new Map<string, LineEdit[]>();
  /** The same edits by file and line: those of other lines needn't be looked at. */
  const byLine = new Map<string, LineEdit[]>();
  const lineOf = ({ file, line }: LineEdit): string => `${line} ${file}`;
  for (const [index, { place, fixes }] of problems.entries()) {
    if (index % problemsAtOnce === 0) yield;
    const [fix, ...others] = fixes.filter(({ safe }) => safe);
    if (!fix || others.length > 0 || !fix.edits.every(({ file }) => texts.has(file))) continue;
    const note = { file: place.file, line: place.line, title: fix.title };
    const isFree = fix.edits.every(
      (edit) => !byLine.get(lineOf(edit))?.some((other) => overlap(edit, other)),
    );
    if (isFree)
      for (const edit of fix.edits) {
        pushTo(edits, edit.file, edit);
        pushTo(byLine, lineOf(edit), edit);
      }
    (isFree ? done : skipped).push(note);
  }
  const changed = [...edits].map(([file, list]) => [file, editedText(texts.get(file)!, list)] as const);
  return { texts: new Map(changed), done, skipped };
}

function pushTo<K, V>(lists: Map<K, V[]>, key: K, value: V): void {
  const list = lists.get(key);
  if (list) list.push(value);
  else lists.set(key, [value]);
}

/** True where two edits touch: also where both put something at the same place, whose order nobody knows. */
function overlap(left: LineEdit, right: LineEdit): boolean {
  if (left.line !== right.line) return false;
  if (left.text === null || right.text === null) return true;
  if (left.start === right.start) return true;
  return left.start < right.end && right.start < left.end;
}

/** A text with edits that don't overlap. */
export function editedText(text: string, edits: readonly LineEdit[]): string {
  const mark = text.startsWith(byteOrderMark) ? byteOrderMark : "";
  const lines = text.slice(mark.length).split("\n");
  const ending = lines.length > 1 && lines[0]!.endsWith("\r") ? "\r\n" : "\n";
  const byLine = new Map<number, LineEdit[]>();
  for (const edit of edits) byLine.set(edit.line, [...(byLine.get(edit.line) ?? []), edit]);
  const pieces = lines.flatMap((line, number) => {
    const own = byLine.get(number);
    if (!own) return [line];
    return own.some((edit) => edit.text === null) ? [] : [editedLine(line, own, ending)];
  });
  // Without its last line, which has no ending, a text ends with the line before, as it did: without one.
  const isLastGone = byLine.get(lines.length - 1)?.some((edit) => edit.text === null) ?? false;
  const joined = pieces.join("\n");
  return mark + (isLastGone && joined.endsWith("\r") ? joined.slice(0, -1) : joined);
}

/** From right to left, so that no edit moves the place of the next. */
const editedLine = (line: string, edits: readonly LineEdit[], ending: string): string =>
  [...edits]
    .sort((left, right) => right.start - left.start)
    .reduce(
      (text, { start, end, text: put }) =>
        text.slice(0, start) + (put ?? "").replaceAll("\n", ending) + text.slice(end),
      line,
    );
