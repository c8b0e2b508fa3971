/** The part of a line that a place means: its own span, else the words of the whole line. */
import type { Place } from "../culture/place.ts";
import type { Farm } from "../farm.ts";
import type { LineSpan } from "./cursor.ts";

export function wholeLineSpan(farm: Farm, { file, line, span }: Place): LineSpan {
  if (span) return { file, line, start: span.start, end: span.end };
  const found = farm.documents.get(file)?.lines[line];
  if (!found) return { file, line, start: 0, end: 0 };
  const { text, comment } = found;
  const start = text.length - text.trimStart().length;
  const end = (comment ? text.slice(0, comment.start) : text).trimEnd().length;
  return { file, line, start, end: Math.max(start, end) };
}
