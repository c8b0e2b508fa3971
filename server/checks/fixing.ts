/** Edits that mend a line, made from a finding's place and, where that isn't enough, from the line itself. */
import type { DocumentLine } from "../../grammar/document.ts";
import type { Files } from "../culture/names.ts";
import type { Place } from "../culture/place.ts";
import type { LineEdit, LineFix } from "./problem.ts";

/** Puts a text in the place of what the finding points at; none where it points at a whole line. */
export function replacing({ file, line, span }: Place, text: string, safe: boolean): readonly LineFix[] {
  if (!span) return [];
  const edits = [{ file, line, start: span.start, end: span.end, text }];
  return [{ title: text === "" ? "Remove it" : `Write ${text}`, safe, edits }];
}

/** One fix for each text; the only one there is may be safe. */
export const replacingWith = (
  place: Place,
  texts: readonly string[],
  onlyOneIsSafe: boolean,
): readonly LineFix[] => texts.flatMap((text) => replacing(place, text, onlyOneIsSafe && texts.length === 1));

/** Adds a text behind what the finding points at. */
export function adding({ file, line, span }: Place, text: string, safe: boolean): readonly LineFix[] {
  if (!span) return [];
  return [
    { title: `Add ${text.trim()}`, safe, edits: [{ file, line, start: span.end, end: span.end, text }] },
  ];
}

/** The line that a place is in, as it was read; undefined where the file isn't at hand. */
export const lineAt = (files: Files, { file, line }: Place): DocumentLine | undefined =>
  files.get(file)?.lines[line];

/** True where what the finding points at has a space, a comma or a sign before it, and isn't the end of another word. */
export function standsApart(files: Files, place: Place): boolean {
  const text = lineAt(files, place)?.text;
  return text === undefined || /(?:^|[\s,±]|\+\/?[-−])$/.test(text.slice(0, place.span?.start ?? 0));
}

/** Where the words of a line end and its comment, or nothing, begins. */
export const endOfWords = ({ text, comment }: DocumentLine): number =>
  text.slice(0, comment?.start ?? text.length).trimEnd().length;

/** Takes a whole line away. */
export const removedLine = ({ file, line }: Place, { text }: DocumentLine): LineEdit => ({
  file,
  line,
  start: 0,
  end: text.length,
  text: null,
});

/**
 * Takes a line away that says what another says; safe where nothing goes with it but the words: no comment that the
 * other line hasn't.
 */
export function removingDoubled(place: Place, first: Place, files: Files): readonly LineFix[] {
  const line = lineAt(files, place);
  const other = lineAt(files, first);
  if (!line || !other) return [];
  const comment = ({ text, comment: span }: DocumentLine) => (span ? text.slice(span.start).trim() : "");
  const safe = ["", comment(other)].includes(comment(line));
  return [{ title: "Remove this line", safe, edits: [removedLine(place, line)] }];
}

/** Puts two words, or groups of words, of a line in each other's place. */
export function swapping(
  { file, line }: Place,
  text: string,
  title: string,
  left: { readonly start: number; readonly end: number },
  right: { readonly start: number; readonly end: number },
): readonly LineFix[] {
  const put = (at: typeof left, from: typeof left): LineEdit => ({
    ...{ file, line, start: at.start, end: at.end },
    text: text.slice(from.start, from.end),
  });
  return [{ title, safe: false, edits: [put(left, right), put(right, left)] }];
}
