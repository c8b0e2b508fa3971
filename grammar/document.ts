/**
 * A file → its lines and sections. Each line is read by itself and the reading kept by section kind and text, so
 * an edit reads only the lines that it touches; what this file adds is which section a line stands in.
 */
import { beginningOf, type LineReading, mergeMark, readLine } from "./line.ts";
import { nearestWords } from "./nearest.ts";
import { parameterOf } from "./parameters.ts";
import { headerWords, rowsOf, statementTable } from "./statements.ts";
import { type LineFinding, type Moment, type SectionKind, sectionKinds, type Word } from "./syntax.ts";

/** One line of a file. Spans count from its first character; equal lines may share their statement. */
export interface DocumentLine extends LineReading {
  readonly text: string;
  /** Which of the document's sections it stands in or opens. */
  readonly section: number | null;
}

export interface Section {
  readonly kind: SectionKind;
  /** Null for `store`, and where the header has none. */
  readonly name: Word | null;
  readonly title: Word | null;
  /** From when a recipe counts. */
  readonly from: Moment | null;
  readonly headerLine: number;
  /** The lines below the header; none where `lastLine` is before `firstLine`. */
  readonly firstLine: number;
  readonly lastLine: number;
}

export interface MarlDocument {
  readonly lines: readonly DocumentLine[];
  readonly sections: readonly Section[];
  readonly uses: readonly { readonly line: number; readonly path: Word }[];
  readonly lineEnding: "\n" | "\r\n";
  readonly hasByteOrderMark: boolean;
  /** Readings kept for the next version of this document. */
  readonly kept: Kept;
}

type Opening = Pick<Section, "kind" | "name" | "title" | "from">;

/** A line's reading, and the section that it opens; `unread` where nobody can tell of which kind. */
interface Entry {
  readonly kind: SectionKind | null;
  readonly text: string;
  readonly reading: LineReading;
  readonly opens: Opening | "unread" | null;
  /** The first character of a merge mark. */
  readonly mark: string | null;
}

type Readings = ReadonlyMap<SectionKind | null, Map<string, Entry>>;

interface Kept {
  readonly readings: Readings;
  /** Of each line, to find it again without a look-up. */
  readonly entries: readonly Entry[];
}

const noReading: LineReading = { statement: null, comment: null, findings: [] };
const kinds: readonly string[] = sectionKinds;
const linesAtOnce = 64;
const statementWords = [...new Set(statementTable.map((row) => row.word))];

const indentedHeader = new RegExp(`^\\W*(?:${sectionKinds.join("|")})`);

const isAtMargin = (text: string): boolean => /^[^\s\u180e\u200b\u2060\ufeff]/.test(text);

/** Reads a whole file; with the version before it, only what changed. */
export function readDocument(text: string, previous?: MarlDocument): MarlDocument {
  const steps = readDocumentInSteps(text, previous);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** The same, pausing every so many lines. */
export function* readDocumentInSteps(text: string, previous?: MarlDocument): Generator<void, MarlDocument> {
  const hasByteOrderMark = text.startsWith("\ufeff");
  const texts = (hasByteOrderMark ? text.slice(1) : text).split("\n");
  const lineEnding = texts.length > 1 && texts[0]!.endsWith("\r") ? "\r\n" : "\n";
  const readings = keptReadings(previous, texts.length);
  const lookUp = finder(readings, previous, texts.length);
  const linesBefore = previous?.lines ?? [];
  const entries: Entry[] = [];
  const lines: DocumentLine[] = [];
  const sections: Section[] = [];
  const uses: { line: number; path: Word }[] = [];
  let open: Section | "unread" | null = null;
  let inConflict = false;

  for (let number = 0; number < texts.length; number += 1) {
    if (number % linesAtOnce === linesAtOnce - 1) yield;
    const raw = texts[number]!;
    const kind: SectionKind | null = open === null || open === "unread" ? null : open.kind;
    const entry = lookUp(number, kind, raw.endsWith("\r") ? raw.slice(0, -1) : raw);
    let { reading } = entry;
    if (entry.mark) {
      // One conflict is one problem, at its first mark.
      if (inConflict && entry.mark !== "<") reading = noReading;
      inConflict = entry.mark !== ">";
    } else if (entry.opens === "unread") {
      open = "unread";
    } else if (entry.opens) {
      open = { ...entry.opens, headerLine: number, firstLine: number + 1, lastLine: number };
      sections.push(open);
    } else if (open === "unread" && !isAtMargin(entry.text)) {
      reading = { ...noReading, comment: reading.comment };
    }
    if (reading.statement?.kind === "use") uses.push({ line: number, path: reading.statement.path });
    const section = open === null || open === "unread" ? null : sections.length - 1;
    entries.push(entry);
    const { statement, comment, findings } = reading;
    const was = linesBefore[number];
    const isSame =
      was !== undefined &&
      was.section === section &&
      was.findings === findings &&
      was.comment === comment &&
      was.statement === statement &&
      was.text === entry.text;
    lines.push(isSame ? was : { text: entry.text, statement, comment, findings, section });
  }
  return {
    lines,
    sections: sections.map((section, index) => ({
      ...section,
      lastLine: (sections[index + 1]?.headerLine ?? lines.length) - 1,
    })),
    uses,
    lineEnding,
    hasByteOrderMark,
    kept: { readings, entries },
  };
}

/** Finds a line's entry: where the version before had it, counted from either end, else by its text. */
function finder(readings: Readings, previous: MarlDocument | undefined, lineCount: number) {
  const before = previous?.kept.entries ?? [];
  const shift = before.length - lineCount;
  return (number: number, kind: SectionKind | null, text: string): Entry => {
    const same = before[number];
    if (same && same.kind === kind && same.text === text) return same;
    const moved = before[number + shift];
    if (moved && moved.kind === kind && moved.text === text) return moved;
    return entryOf(readings, kind, text, same ?? moved);
  };
}

/** The readings of the version before, unless they are mostly of lines long gone. */
function keptReadings(previous: MarlDocument | undefined, lineCount: number): Readings {
  let size = 0;
  for (const ofKind of previous?.kept.readings.values() ?? []) size += ofKind.size;
  if (previous && size <= 2 * lineCount + 1000) return previous.kept.readings;
  return new Map([null, ...sectionKinds].map((kind) => [kind, new Map<string, Entry>()]));
}

function entryOf(
  readings: Readings,
  kind: SectionKind | null,
  text: string,
  before: Entry | undefined,
): Entry {
  const ofKind = readings.get(kind)!;
  const kept = ofKind.get(text);
  if (kept) return kept;
  // A part of a string keeps the whole in memory: a kept line must not hold on to the file that it was cut from.
  const own = text.length === 0 ? "" : ` ${text}`.slice(1);
  const entry = sayingAsBefore(readEntry(kind, own), before);
  ofKind.set(own, entry);
  return entry;
}

/** Where only the comment or the space at the end changed, the statement stays the same value: it says the same. */
function sayingAsBefore(entry: Entry, before: Entry | undefined): Entry {
  const { statement } = entry.reading;
  const said = before?.kind === entry.kind ? before.reading.statement : null;
  if (!statement || !said || JSON.stringify(statement) !== JSON.stringify(said)) return entry;
  return { ...entry, reading: { ...entry.reading, statement: said } };
}

function readEntry(kind: SectionKind | null, text: string): Entry {
  const reading = readLine(kind, text);
  const { statement } = reading;
  const as = (opens: Entry["opens"], ...findings: LineFinding[]): Entry => ({
    kind,
    text,
    mark: mergeMark.exec(text)?.[1]?.[0] ?? null,
    reading: findings.length > 0 ? { ...reading, statement: null, findings } : reading,
    opens,
  });
  if (statement?.kind === "header") {
    const { section, name, title, from } = statement;
    return as({ kind: section, name, title, from });
  }
  // Most lines are indented and no header: their first word is enough to know it.
  if (!isAtMargin(text) && !indentedHeader.test(text)) return as(null);
  if (statement?.kind === "use" || mergeMark.test(text)) return as(null);
  const beginning = beginningOf(text);
  if (!beginning) return as(null);
  const { first, name, title } = beginning;
  if (kinds.includes(first.text)) return as({ kind: first.text as SectionKind, name, title, from: null });
  if (!isAtMargin(text) || first.text === "use") return as(null);
  if (beginning.isDated || rowsOf(first.text).length > 0 || parameterOf(first.text)) {
    // Where no section is open, the line's own reading says so.
    if (kind === null) return as(null);
    return as(null, {
      code: "syntax/misplaced",
      span: span(first),
      word: first.text,
      belongs: [],
      why: "margin",
    });
  }
  const headers = nearestWords(first.text, headerWords);
  const others = headers.length > 0 ? [] : nearestWords(first.text, statementWords);
  const finding: LineFinding = {
    code: "syntax/unknown-word",
    span: span(first),
    word: first.text,
    expected: headerWords,
    nearest: headers.length > 0 ? headers : others,
  };
  const meant = headers.find((word) => kinds.includes(word)) as SectionKind | undefined;
  if (meant) return as({ kind: meant, name: meant === "store" ? null : name, title, from: null }, finding);
  // A strange header's lines are left out with it: added to the section above they would change that one.
  return as(
    beginning.looksLikeHeader && others.length === 0 && headers.length === 0 ? "unread" : null,
    finding,
  );
}

const span = ({ start, end }: Word): { start: number; end: number } => ({ start, end });
