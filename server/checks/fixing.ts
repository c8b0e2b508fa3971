/** Edits that mend a line, made from a finding's place. */
import type { Place } from "../culture/place.ts";
import type { LineFix } from "./problem.ts";

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
