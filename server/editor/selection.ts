/** What a selection grows to: word, quantity or item, statement, line, month, section, file. */
import type { Section } from "../../grammar/document.ts";
import type { Farm } from "../farm.ts";
import { type Cursor, type LineInFarm, type LinesSpan, lineIn, touches } from "./cursor.ts";
import { linesOfSection, type Month, monthsOf, spanOfLines } from "./outline.ts";
import { wordAt, wordsIn } from "./words.ts";

/** Of each cursor in a file, from the smallest to the whole file, each larger than the one before. Pauses now and then. */
export function* selections(
  farm: Farm,
  cursors: readonly Cursor[],
): Generator<void, readonly (readonly LinesSpan[])[]> {
  const months = new Map<Section, readonly Month[]>();
  const all: LinesSpan[][] = [];
  for (const cursor of cursors) {
    yield;
    const line = lineIn(farm, cursor.file, cursor.line);
    const grown: LinesSpan[] = [];
    all.push(grown);
    if (!line) continue;
    const { document, section } = line;
    if (section?.kind === "log" && !months.has(section))
      months.set(section, yield* monthsOf(document, section));
    const around = overLines(line, (section && months.get(section)) ?? []);
    for (const span of [...withinLine(line, cursor.column), ...around]) {
      const last = grown.at(-1);
      if (!last || isLarger(span, last)) grown.push(span);
    }
  }
  return all;
}

function withinLine({ file, number, line }: LineInFarm, column: number): LinesSpan[] {
  const { text, statement, comment } = line;
  const span = (start: number, end: number): LinesSpan => ({ file, first: number, start, last: number, end });
  const whole = span(0, text.length);
  if (comment && column > comment.start) return [span(comment.start, comment.end), whole];
  const words = wordsIn(line);
  const [first] = words;
  const last = words.at(-1);
  if (!first || !last || column < first.start || column > last.end) return [whole];
  const word = wordAt(words, column);
  const parts: { start: number; end: number }[] = word ? [word] : [];
  collect(statement, (part) => {
    if (touches(column, part) && (!word || (part.start <= word.start && word.end <= part.end)))
      parts.push(part);
  });
  return [
    ...parts
      .sort((left, right) => left.end - left.start - (right.end - right.start))
      .map(({ start, end }) => span(start, end)),
    span(first.start, last.end),
    whole,
  ];
}

/** All parts of a statement that have a place; a borrowed unit stands elsewhere and isn't the part's own. */
function collect(value: unknown, take: (part: { start: number; end: number }) => void): void {
  if (typeof value !== "object" || value === null) return;
  const { start, end } = value as { start?: unknown; end?: unknown };
  if (typeof start === "number" && typeof end === "number") take({ start, end });
  for (const part of Object.values(value)) collect(part, take);
}

function overLines({ file, number, document, section }: LineInFarm, months: readonly Month[]): LinesSpan[] {
  const spans = months
    .filter(({ first, last }) => first <= number && number <= last)
    .map((month) => spanOfLines(file, document, month));
  if (section) {
    const lines = linesOfSection(document, section);
    if (number <= lines.last) spans.push(spanOfLines(file, document, lines));
  }
  spans.push(spanOfLines(file, document, { first: 0, last: document.lines.length - 1 }));
  return spans;
}

const isBefore = (line: number, column: number, other: number, otherColumn: number): boolean =>
  line < other || (line === other && column <= otherColumn);

function isLarger(span: LinesSpan, than: LinesSpan): boolean {
  const holds =
    isBefore(span.first, span.start, than.first, than.start) &&
    isBefore(than.last, than.end, span.last, span.end);
  const isSame =
    span.first === than.first &&
    span.start === than.start &&
    span.last === than.last &&
    span.end === than.end;
  return holds && !isSame;
}
