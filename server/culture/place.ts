/** Where something stands: a file of the farm, a line, a word. */
import type { Span } from "../../grammar/syntax.ts";

export interface Place {
  /** Relative to the farm's folder, with `/`. */
  readonly file: string;
  /** From 0. */
  readonly line: number;
  /** Null for the whole line. */
  readonly span: Span | null;
}

export const comparePlaces = (left: Place, right: Place): number =>
  (left.file < right.file ? -1 : left.file > right.file ? 1 : 0) ||
  left.line - right.line ||
  (left.span?.start ?? 0) - (right.span?.start ?? 0);
