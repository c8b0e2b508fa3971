/** What a file holds, section by section: the outline, and the plain list of what has a name. */
import type { DocumentLine, MarlDocument, Section } from "../../grammar/document.ts";
import type { Span } from "../../grammar/syntax.ts";
import { linesAtOnce } from "../culture/keep.ts";
import type { Farm } from "../farm.ts";
import type { LineSpan, LinesSpan } from "./cursor.ts";
import { type Lines, linesOfSection, monthsOf, spanOfLines } from "./outline.ts";
import { isOwn } from "./things.ts";
import type { ThingKind } from "./words.ts";
import { namesIn, parametersIn } from "./words.ts";

export type SymbolSort = ThingKind | "log" | "store" | "month" | "event" | "fact";

export interface FileSymbol {
  readonly name: string;
  readonly detail: string | null;
  readonly sort: SymbolSort;
  readonly whole: LinesSpan;
  /** What is shown when it is gone to. */
  readonly head: LineSpan;
  readonly children: readonly FileSymbol[];
}

/** A section or a named thing, by itself. */
export interface NamedSymbol {
  readonly name: string;
  readonly sort: SymbolSort;
  /** The section that it is declared in; null of a section. */
  readonly within: string | null;
  readonly whole: LinesSpan;
  readonly head: LineSpan;
}

/** The outline of a file, pausing now and then; in a log the lines stand by month. */
export function* fileSymbols(farm: Farm, file: string): Generator<void, readonly FileSymbol[]> {
  const document = farm.documents.get(file);
  const symbols: FileSymbol[] = [];
  for (const section of document?.sections ?? []) {
    const lines = linesOfSection(document!, section);
    const below = { first: section.firstLine, last: lines.last };
    const children =
      section.kind === "log"
        ? yield* monthSymbols(file, document!, section)
        : yield* lineSymbols(file, document!, below);
    symbols.push({
      name: `${section.kind}${section.name ? ` ${section.name.text}` : ""}`,
      detail: section.title?.text.trim() || null,
      sort: section.kind,
      whole: spanOfLines(file, document!, lines),
      head: headOf(file, document!, section),
      children,
    });
  }
  return symbols;
}

/** Sections and what systems declare, in order. */
export function* namedSymbols(farm: Farm, file: string): Generator<void, readonly NamedSymbol[]> {
  const document = farm.documents.get(file);
  const symbols: NamedSymbol[] = [];
  for (const section of document?.sections ?? []) {
    yield;
    const { kind } = section;
    const own = section.name?.text ?? "";
    const lines = linesOfSection(document!, section);
    symbols.push({
      // A log's name is its system's.
      name: kind === "log" || kind === "store" || own === "" ? `${kind} ${own}`.trim() : own,
      ...{ sort: kind, within: null },
      whole: spanOfLines(file, document!, lines),
      head: headOf(file, document!, section),
    });
    if (kind !== "system") continue;
    for (let line = section.firstLine; line <= lines.last; line += 1)
      for (const { text, start, end, name } of namesIn(document!.lines[line]!)) {
        const sort = name?.declares && name.kinds[0];
        if (!sort || !isOwn(sort)) continue;
        const whole = spanOfLines(file, document!, { first: line, last: line });
        symbols.push({ name: text, sort, within: own, whole, head: { file, line, start, end } });
      }
  }
  return symbols;
}

function headOf(file: string, { lines }: MarlDocument, { headerLine: line, name }: Section): LineSpan {
  const { start, end } = name ?? firstWord(lines[line]!.text, 0);
  return { file, line, start, end };
}

function* monthSymbols(
  file: string,
  document: MarlDocument,
  section: Section,
): Generator<void, readonly FileSymbol[]> {
  const symbols: FileSymbol[] = [];
  for (const { month, first, last } of yield* monthsOf(document, section)) {
    const children = yield* lineSymbols(file, document, { first, last });
    const { start, end } = children[0]!.head;
    symbols.push({
      name: month,
      detail: children.length === 1 ? "1 line" : `${children.length} lines`,
      sort: "month",
      whole: spanOfLines(file, document, { first, last }),
      head: { file, line: first, start, end },
      children,
    });
  }
  return symbols;
}

function* lineSymbols(
  file: string,
  { lines }: MarlDocument,
  { first, last }: Lines,
): Generator<void, readonly FileSymbol[]> {
  const symbols: FileSymbol[] = [];
  for (let number = first; number <= last; number += 1) {
    if (number % linesAtOnce === 0) yield;
    const line = lines[number]!;
    const { statement, text, comment } = line;
    if (!statement || statement.kind === "use") continue;
    const head = headOfLine(line);
    const end = text.slice(0, comment?.start).trimEnd().length;
    const declared = namesIn(line).find(({ name }) => name?.declares)?.name?.kinds[0];
    symbols.push({
      name: text.slice(head.start, head.end).replace(/\s+/g, " "),
      detail: text.slice(head.end, end).trim() || null,
      sort: declared ?? ("at" in statement ? "event" : "fact"),
      whole: { file, first: number, start: head.start, last: number, end },
      head: { file, line: number, ...head },
      children: [],
    });
  }
  return symbols;
}

/** How a line is called: its date and first word, and the name or parameter that follows right behind. */
function headOfLine(line: DocumentLine): Span {
  const { text, statement } = line;
  const isDated = statement !== null && "at" in statement;
  const start = firstWord(text, 0).start;
  const { end } = firstWord(text, isDated ? statement.at.end : 0);
  const next = [...namesIn(line), ...parametersIn(line)].find(
    (word) => word.start >= end && text.slice(end, word.start).trim() === "",
  );
  return { start, end: !isDated && next ? next.end : end };
}

function firstWord(text: string, from: number): Span {
  const found = /\S+/.exec(text.slice(from));
  const start = from + (found?.index ?? 0);
  return { start, end: start + (found?.[0].length ?? 0) };
}
