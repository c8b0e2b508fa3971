/** Where a thing is declared: all its sections or lines; of a `use` line, the file. */
import { fileMeant } from "../culture/names.ts";
import { comparePlaces } from "../culture/place.ts";
import type { Farm } from "../farm.ts";
import { type Cursor, type LineSpan, type LinesSpan, lineIn } from "./cursor.ts";
import { wholeLineSpan } from "./line-span.ts";
import { linesOfSection, spanOfLines } from "./outline.ts";
import { isOwn, type LookUp, lookUp, type Thing } from "./things.ts";
import { namesIn, wordAt, wordsIn } from "./words.ts";

export interface Definition {
  /** The name there. */
  readonly name: LineSpan;
  /** All that declares it: a section, a line, a file's beginning. */
  readonly whole: LinesSpan;
}

export interface Definitions {
  /** The word that was asked about. */
  readonly origin: LineSpan;
  readonly found: readonly Definition[];
}

/** Where what stands under the cursor is declared; null where the cursor is on nothing that could be. */
export function definition(farm: Farm, cursor: Cursor): Definitions | null {
  const line = lineIn(farm, cursor.file, cursor.line);
  const word = line && wordAt(wordsIn(line.line), cursor.column);
  if (!line || !word) return null;
  const { start, end } = word;
  const origin = { file: cursor.file, line: cursor.line, start, end };
  const { statement } = line.line;
  if (word.role === "path" && statement?.kind === "use") {
    const file = fileMeant(cursor.file, statement.path.text, farm.links);
    return file !== null && farm.documents.has(file) ? { origin, found: [beginningOf(file)] } : null;
  }
  const names = lookUp(farm);
  const thing = names.thingOf(line, word);
  return thing && { origin, found: definitionsOf(farm, names, thing) };
}

const beginningOf = (file: string): Definition => ({
  name: { file, line: 0, start: 0, end: 0 },
  whole: { file, first: 0, start: 0, last: 0, end: 0 },
});

/** Every place that declares a thing, by file and line; none for what every farm has. */
export function definitionsOf(farm: Farm, names: LookUp, thing: Thing): Definition[] {
  const places = names.declarationsOf(thing).flatMap(({ sections }) => sections);
  const found = new Map<string, Definition>();
  for (const { file, section: index } of places) {
    const document = farm.documents.get(file);
    const section = document?.sections[index];
    if (!document || !section) continue;
    const lines = linesOfSection(document, section);
    const candidates = isOwn(thing.kind) ? range(lines.first + 1, lines.last) : [section.headerLine];
    for (const line of candidates) {
      const name = namesIn(document.lines[line]!).find(
        (word) => word.name?.declares && word.text === thing.name && word.name.kinds[0] === thing.kind,
      );
      if (!name) continue;
      const { start, end } = wholeLineSpan(farm, { file, line, span: null });
      found.set(`${line} ${file}`, {
        name: { file, line, start: name.start, end: name.end },
        whole: isOwn(thing.kind)
          ? { file, first: line, start, last: line, end }
          : spanOfLines(file, document, lines),
      });
    }
  }
  return [...found.values()].sort((left, right) =>
    comparePlaces({ ...left.name, span: left.name }, { ...right.name, span: right.name }),
  );
}

const range = (first: number, last: number): number[] =>
  Array.from({ length: Math.max(0, last - first + 1) }, (_, index) => first + index);
