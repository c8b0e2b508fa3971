/** Lines and words at a place where they don't belong: what is said of each, and the edit that puts it right. */
import type { DocumentLine, MarlDocument, Section } from "../../grammar/document.ts";
import { readLine } from "../../grammar/line.ts";
import { statementTable } from "../../grammar/statements.ts";
import type { SectionKind } from "../../grammar/syntax.ts";
import type { Files } from "../culture/names.ts";
import { endOfWords, lineAt, removedLine, replacing } from "./fixing.ts";
import type { LineFix } from "./problem.ts";
import type { Of } from "./rule.ts";
import { linesAtEnd } from "./sections.ts";
import { inQuotes, oneOf, said } from "./words.ts";

type Misplaced = Of<"syntax/misplaced">;

const sections = (belongs: readonly SectionKind[]): string => {
  const words = oneOf(belongs);
  return `${/^[aeiou]/.test(words) ? "an" : "a"} ${words}`;
};

const isHeader = (word: string): boolean =>
  statementTable.some((row) => row.form === "header" && row.word === word);

/** What a line lacks where it goes, besides the place: a fact has no date in front, an event has one. */
function formThere({ place, word, belongs }: Misplaced, files: Files): string {
  const text = lineAt(files, place)?.text;
  if (text === undefined) return "";
  const rows = statementTable.filter(
    (row) => row.word === word && row.sections.some((section) => belongs.includes(section)),
  );
  const only = (form: "fact" | "event") => rows.length > 0 && rows.every((row) => row.form === form);
  if (frontDate(text) && only("fact")) return ", with its date at the end behind from";
  return !frontDate(text) && only("event") ? ", with its date in front" : "";
}

/** What is said and to be done for each way in which a word can stand wrongly. */
export const misplaced: Readonly<
  Record<
    Misplaced["why"],
    { says: (finding: Misplaced) => string; todo: (finding: Misplaced, files: Files) => string }
  >
> = {
  section: {
    says: ({ word, belongs }) =>
      `A line that starts with ${inQuotes(word)} belongs in ${sections(belongs)} section.`,
    todo: (finding, files) =>
      `Move it under the header of ${sections(finding.belongs)}${formThere(finding, files)}.`,
  },
  margin: {
    says: ({ word }) => `${inQuotes(word)} stands at the margin, where sections begin.`,
    todo: () => "Indent the line by two spaces.",
  },
  repeated: {
    says: ({ word }) => `${inQuotes(word)} stands on this line twice.`,
    todo: () => "Keep one of the two.",
  },
  "keyword-as-name": {
    says: ({ word }) => `${inQuotes(word)} is a word of the language and can't be a name.`,
    todo: ({ word }) => `Choose another name, for example ${word}-1.`,
  },
  dated: {
    says: ({ word }) => `A line with ${inQuotes(word)} states a fact, and doesn't start with a date.`,
    todo: ({ word, place }, files) =>
      isHeader(word)
        ? "Leave out the date."
        : `Write the date at the end instead: from ${frontDate(lineAt(files, place)?.text ?? "")?.date ?? "2026-12-01"}.`,
  },
  undated: {
    says: ({ word }) => `A line with ${inQuotes(word)} says what happened, and starts with its date.`,
    todo: () => "Put the date in front, for example 2026-12-01 08:00.",
  },
  "no-section": {
    says: () => "This line stands before any section.",
    todo: ({ belongs }) =>
      belongs.length > 0
        ? `Put it under the header of ${sections(belongs)}.`
        : "Put it under its section's header.",
  },
  order: {
    says: ({ word }) => `${inQuotes(word)} stands at the wrong place of its line.`,
    todo: ({ expected }) =>
      expected && expected.length > 0 ? `Here comes ${said(expected)}.` : "Move it to its place.",
  },
};

/** The edits that are offered; none where the line wouldn't read there either. */
export function misplacedFixes(finding: Misplaced, files: Files): readonly LineFix[] {
  const { place, word, why } = finding;
  const document = files.get(place.file);
  const line = document?.lines[place.line];
  if (!document || !line) return [];
  switch (why) {
    case "margin":
      return [indenting(finding, document, line)];
    case "keyword-as-name":
      return replacing(place, `${word}-1`, false);
    case "dated":
      return isHeader(word) ? withoutDate(finding, line) : dateAtEnd(finding, document, line);
    case "undated":
      return dateInFront(finding, document, line);
    case "section":
    case "no-section":
      return moving(finding, document, line);
    default:
      return [];
  }
}

/** Safe where the line then reads in the section above it. */
function indenting({ place }: Misplaced, { sections: all }: MarlDocument, line: DocumentLine): LineFix {
  const { file, line: number } = place;
  const kind = line.section === null ? null : (all[line.section]?.kind ?? null);
  const text = "  ";
  const safe = readLine(kind, text + line.text).statement !== null;
  return { title: "Indent the line", safe, edits: [{ file, line: number, start: 0, end: 0, text }] };
}

/** The date in front of a line, and the words from it to the first that isn't of it. */
function frontDate(
  text: string,
): { readonly date: string; readonly start: number; readonly end: number } | null {
  const [all = "", before = "", date] = /^(\s*)(\d{4}-\d\d-\d\d(?:[ T]\d{1,2}:\d\d)?)\s+/.exec(text) ?? [];
  return date ? { date: date.replace("T", " "), start: before.length, end: all.length } : null;
}

/** The date behind `from` at a line's end, with the space before it. */
function endDate(
  line: DocumentLine,
): { readonly date: string; readonly start: number; readonly end: number } | null {
  const end = endOfWords(line);
  const [all = "", date] =
    /\s+from\s+(\d{4}-\d\d-\d\d(?: \d{1,2}:\d\d)?)$/.exec(line.text.slice(0, end)) ?? [];
  return date ? { date, start: end - all.length, end } : null;
}

const kindOf = ({ sections: all }: MarlDocument, { section }: DocumentLine): SectionKind | null =>
  section === null ? null : (all[section]?.kind ?? null);

const cutOut = (text: string, { start, end }: { readonly start: number; readonly end: number }): string =>
  text.slice(0, start) + text.slice(end);

const reads = (kind: SectionKind | null, text: string): boolean => readLine(kind, text).statement !== null;

function withoutDate(
  { place: { file, line: number } }: Misplaced,
  { text }: DocumentLine,
): readonly LineFix[] {
  const front = frontDate(text);
  if (!front || !reads(null, cutOut(text, front))) return [];
  const edits = [{ file, line: number, start: front.start, end: front.end, text: "" }];
  return [{ title: "Leave out the date", safe: false, edits }];
}

/** `2026-11-30 tank …` → `tank … from 2026-11-30`. */
function dateAtEnd({ place: { file, line: number } }: Misplaced, document: MarlDocument, line: DocumentLine) {
  const front = frontDate(line.text);
  const end = endOfWords(line);
  if (!front || !reads(kindOf(document, line), asFact(line) ?? "")) return [];
  const at = { file, line: number };
  const edits = [
    { ...at, start: front.start, end: front.end, text: "" },
    { ...at, start: end, end, text: ` from ${front.date}` },
  ];
  return [{ title: `Write from ${front.date} at its end`, safe: false, edits }];
}

/** `read … from 2026-11-30` → `2026-11-30 read …`. */
function dateInFront(
  { place: { file, line: number } }: Misplaced,
  document: MarlDocument,
  line: DocumentLine,
) {
  const last = endDate(line);
  if (!last || !reads(kindOf(document, line), asEvent(line) ?? "")) return [];
  const start = line.text.length - line.text.trimStart().length;
  const at = { file, line: number };
  const edits = [
    { ...at, start, end: start, text: `${last.date} ` },
    { ...at, start: last.start, end: last.end, text: "" },
  ];
  return [{ title: `Write ${last.date} in front`, safe: false, edits }];
}

/** The line's text with the date in front moved to its end; null where there is none. */
function asFact(line: DocumentLine): string | null {
  const front = frontDate(line.text);
  const end = endOfWords(line);
  if (!front) return null;
  return cutOut(`${line.text.slice(0, end)} from ${front.date}${line.text.slice(end)}`, front);
}

/** The line's text with the date behind `from` moved to its front; null where there is none. */
function asEvent(line: DocumentLine): string | null {
  const last = endDate(line);
  return last && `  ${last.date} ${cutOut(line.text, last).trimStart()}`;
}

/** Moves the line to the end of the one section that it can be meant for, in the form that it has there. */
function moving(
  { place, belongs }: Misplaced,
  document: MarlDocument,
  line: DocumentLine,
): readonly LineFix[] {
  const target = meantSection(document, line, belongs);
  if (!target) return [];
  const texts = [line.text, asFact(line), asEvent(line)];
  const text = texts.find((each) => each !== null && reads(target.kind, each));
  if (!text) return [];
  const { file } = place;
  const edits = [removedLine(place, line), linesAtEnd(document, file, target, [text.trimStart()])];
  const name = [target.kind, target.name?.text].filter(Boolean).join(" ");
  return [{ title: `Move it under ${name}`, safe: false, edits }];
}

/** The section of a fitting kind with the same name as the line's own, or the only one of the file. */
function meantSection(
  document: MarlDocument,
  line: DocumentLine,
  belongs: readonly SectionKind[],
): Section | null {
  const fitting = document.sections.filter(({ kind }) => belongs.includes(kind));
  const name = line.section === null ? null : document.sections[line.section]?.name?.text;
  const alike = fitting.filter((section) => name && section.name?.text === name);
  const [only, ...others] = alike.length > 0 ? alike : fitting;
  return only && others.length === 0 ? only : null;
}
