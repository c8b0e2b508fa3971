/** How a file is built: which lines its sections fill, and which the months of a log. */
import { minutesPerDay, writeDate } from "../../grammar/dates.ts";
import type { DocumentLine, MarlDocument, Section } from "../../grammar/document.ts";
import { isBlank } from "../../grammar/tokens.ts";
import { linesAtOnce } from "../culture/keep.ts";
import type { LinesSpan } from "./cursor.ts";

/** Lines from one to another, both included. */
export interface Lines {
  readonly first: number;
  readonly last: number;
}

export interface Month extends Lines {
  /** `2026-09`. */
  readonly month: string;
}

/** From a section's header to the last line that is its own: what leads over to the next section isn't. */
export function linesOfSection({ lines }: MarlDocument, { headerLine, lastLine }: Section): Lines {
  let last = lastLine;
  while (last > headerLine && leadsOver(lines[last]!)) last -= 1;
  return { first: headerLine, last };
}

const leadsOver = ({ text, comment, statement }: DocumentLine): boolean =>
  isBlank(text) || comment?.start === 0 || statement?.kind === "use";

/**
 * Runs of lines of one month, in the order in which they stand; lines without a date go with those above. Pauses now
 * and then.
 */
export function* monthsOf(
  { lines }: MarlDocument,
  { firstLine, lastLine }: Section,
): Generator<void, readonly Month[]> {
  const months: Month[] = [];
  let open: { readonly month: string; readonly first: number; last: number } | null = null;
  let day: number | null = null;
  for (let number = firstLine; number <= lastLine; number += 1) {
    if (number % linesAtOnce === 0) yield;
    const { statement, findings } = lines[number]!;
    if (!statement || !("at" in statement)) {
      if (open && (statement ? statement.kind !== "use" : findings.length > 0)) open.last = number;
      continue;
    }
    const dayHere = Math.floor(statement.at.minute / minutesPerDay);
    if (open && dayHere === day) {
      open.last = number;
      continue;
    }
    day = dayHere;
    const month = writeDate(statement.at.minute).slice(0, "2026-09".length);
    if (open && open.month === month) open.last = number;
    else {
      open = { month, first: number, last: number };
      months.push(open);
    }
  }
  return months;
}

/** Whole lines, from the first character to the last one's end. */
export const spanOfLines = (file: string, { lines }: MarlDocument, { first, last }: Lines): LinesSpan => ({
  ...{ file, first, start: 0, last },
  end: lines[last]?.text.length ?? 0,
});
