/** What can be folded: sections, the months of a log, blocks of comments, runs of `use` lines. */
import type { DocumentLine, MarlDocument } from "../../grammar/document.ts";
import { linesAtOnce } from "../culture/keep.ts";
import type { Farm } from "../farm.ts";
import { type Lines, linesOfSection, monthsOf } from "./outline.ts";

export interface Fold extends Lines {
  readonly sort: "section" | "month" | "comment" | "use";
}

/** By line, pausing now and then; nothing of one line is folded, nor the month of a log that has no other. */
export function* folds(farm: Farm, file: string): Generator<void, readonly Fold[]> {
  const document = farm.documents.get(file);
  if (!document) return [];
  const found: Fold[] = [];
  const add = (sort: Fold["sort"], runs: readonly Lines[]): void => {
    for (const { first, last } of runs) if (last > first) found.push({ sort, first, last });
  };
  for (const section of document.sections) {
    yield;
    add("section", [linesOfSection(document, section)]);
    const months = section.kind === "log" ? yield* monthsOf(document, section) : [];
    if (months.length > 1) add("month", months);
  }
  add("comment", yield* runsOf(document, isComment));
  add("use", yield* runsOf(document, isUse));
  return found.sort((left, right) => left.first - right.first || right.last - left.last);
}

const isComment = ({ text, comment }: DocumentLine): boolean =>
  comment !== null && text.slice(0, comment.start).trim() === "";

const isUse = ({ statement }: DocumentLine): boolean => statement?.kind === "use";

function* runsOf(
  { lines }: MarlDocument,
  belongs: (line: DocumentLine) => boolean,
): Generator<void, readonly Lines[]> {
  const runs: { first: number; last: number }[] = [];
  for (const [number, line] of lines.entries()) {
    if (number % linesAtOnce === 0) yield;
    if (!belongs(line)) continue;
    const run = runs.at(-1);
    if (run && run.last === number - 1) run.last = number;
    else runs.push({ first: number, last: number });
  }
  return runs;
}
