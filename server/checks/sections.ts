/** Edits that add whole lines or sections to a file: where they go, and with which indent. */
import type { MarlDocument, Section } from "../../grammar/document.ts";
import type { SectionKind } from "../../grammar/syntax.ts";
import type { Files } from "../culture/names.ts";
import type { Place } from "../culture/place.ts";
import type { LineEdit } from "./problem.ts";

/** What a new section's lines are indented with, and those of a section without any. */
const usualIndent = "  ";

/** The last line of a section that says something; its header where none does. */
export function lastSaid({ lines }: MarlDocument, { headerLine, lastLine }: Section): number {
  for (let line = lastLine; line > headerLine; line -= 1) if (lines[line]!.statement) return line;
  return headerLine;
}

/** The section that a place stands in; undefined where the file isn't at hand or the line is in none. */
export function sectionAt(files: Files, { file, line }: Place): Section | undefined {
  const document = files.get(file);
  const section = document?.lines[line]?.section ?? null;
  return section === null ? undefined : document?.sections[section];
}

/** The first section of a file with this kind and name. */
export const sectionNamed = (
  files: Files,
  file: string,
  kind: SectionKind,
  name: string,
): Section | undefined =>
  files.get(file)?.sections.find((section) => section.kind === kind && section.name?.text === name);

/** Puts lines behind a line of a section, indented as that line is. */
export function linesAfter(
  { lines }: MarlDocument,
  file: string,
  line: number,
  isHeader: boolean,
  texts: readonly string[],
): LineEdit {
  const before = lines[line]!.text;
  const indent = isHeader ? usualIndent : (/^\s*/.exec(before)?.[0] ?? "") || usualIndent;
  const text = texts.map((each) => `\n${indent}${each}`).join("");
  return { file, line, start: before.length, end: before.length, text };
}

/** Puts lines at the end of a section, before the blank lines and comments that end it. */
export function linesAtEnd(
  document: MarlDocument,
  file: string,
  section: Section,
  texts: readonly string[],
): LineEdit {
  const after = lastSaid(document, section);
  return linesAfter(document, file, after, after === section.headerLine, texts);
}

/** Puts a section behind all that a file says. */
export function sectionAtEnd(
  { lines }: MarlDocument,
  file: string,
  header: string,
  texts: readonly string[],
): LineEdit {
  const found = lines.findLastIndex(({ text }) => text.trim() !== "");
  const line = Math.max(found, 0);
  const end = lines[line]!.text.length;
  const apart = found < 0 ? "" : "\n\n";
  const body = [header, ...texts.map((each) => `${usualIndent}${each}`)].join("\n");
  return { file, line, start: end, end, text: `${apart}${body}` };
}

/** Puts lines dated `minute` into a system's log, in order of time: the log that its newest line stands in. */
export function intoLog(
  files: Files,
  system: string,
  newest: Place | null,
  minute: number,
  texts: readonly string[],
): LineEdit | null {
  const document = newest && files.get(newest.file);
  const section = newest && sectionAt(files, newest);
  if (!document || section?.kind !== "log" || section.name?.text !== system) return null;
  const after = lastUpTo(document, section, minute);
  return linesAfter(document, newest.file, after, after === section.headerLine, texts);
}

/** A path of a `use` line, from the farm's folder. */
function usedFrom(file: string, path: string): string {
  const steps = file.split("/").slice(0, -1);
  for (const step of path.split(/[/\\]/)) {
    if (step === "..") steps.pop();
    else if (step !== "" && step !== ".") steps.push(step);
  }
  return steps.join("/");
}

/** Whether a file sees what a reference stands for: a name, with its file behind it where two share the name. */
export function sees(files: Files, from: string, kind: SectionKind, ref: string): boolean {
  const [name = "", ...rest] = ref.split(" ");
  const only = rest.join(" ");
  const seen = new Set([from]);
  for (const file of seen) {
    if ((only === "" || only === file) && sectionNamed(files, file, kind, name)) return true;
    for (const { path } of files.get(file)?.uses ?? []) seen.add(usedFrom(file, path.text));
  }
  return false;
}

/** The last line of a log that isn't dated after a minute; its header where all are. */
export function lastUpTo(document: MarlDocument, section: Section, minute: number): number {
  for (let line = lastSaid(document, section); line > section.headerLine; line -= 1) {
    const statement = document.lines[line]!.statement;
    if (statement && "at" in statement && statement.at.minute <= minute) return line;
  }
  return section.headerLine;
}
