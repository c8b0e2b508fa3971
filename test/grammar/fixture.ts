/** A test is a text: lines as a technician writes them, and under a line what it got wrong. */
import { expect } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { readLine } from "../../grammar/line.ts";
import type { LineFinding, SectionKind, Statement } from "../../grammar/syntax.ts";
import { writeStatement } from "../../grammar/write.ts";

/** Long lists are cut: what stands in them is the table's business. */
const list = (words: readonly string[]): string => {
  if (words.length === 0) return "nothing";
  return words.length > 8 ? `${words.slice(0, 2).join(", ")} and ${words.length - 2} more` : words.join(", ");
};

/** A finding in one line: its code, its data. */
export function inWords(finding: LineFinding): string {
  const code = finding.code.replace("syntax/", "");
  switch (finding.code) {
    case "syntax/unknown-word":
      return `${code} ${finding.word} → ${list(finding.nearest)} | ${list(finding.expected)}`;
    case "syntax/unfinished":
      return `${code} | ${list(finding.expected)}`;
    case "syntax/number-form":
    case "syntax/date-form":
      return `${code} ${finding.word} → ${list(finding.readings)}`;
    case "syntax/misplaced": {
      const belongs = finding.belongs.length > 0 ? ` → ${list(finding.belongs)}` : "";
      const expected = finding.expected ? ` | ${list(finding.expected)}` : "";
      return `${code} ${finding.word} ${finding.why}${belongs}${expected}`;
    }
    default:
      return code;
  }
}

/** The line's findings drawn under it. */
function drawn(text: string, findings: readonly LineFinding[]): string[] {
  const under = findings.map(({ span, ...finding }) => {
    expect(span.start).toBeLessThanOrEqual(span.end);
    expect(span.end).toBeLessThanOrEqual(text.length);
    const marks = "^".repeat(Math.max(1, span.end - span.start));
    return `${" ".repeat(span.start)}${marks} ${inWords({ span, ...finding } as LineFinding)}`;
  });
  return [text, ...under];
}

const isUnder = (line: string): boolean => /^\s*\^+ /.test(line);
const written = (text: string): string[] => text.split("\n").slice(1, -1);

/** Reads each line by itself. A problem that isn't drawn fails the test, and so does a drawn one that isn't there. */
export function lines(section: SectionKind | null, text: string): void {
  const given = written(text);
  const answer = given
    .filter((line) => !isUnder(line))
    .flatMap((line) => {
      const { statement, findings } = readLine(section, line);
      expect(statement === null, `${line}: a statement or a finding`).toBe(findings.length > 0);
      return drawn(line, findings);
    });
  expect(answer.join("\n")).toBe(given.join("\n"));
}

/** Reads the lines as one file. */
export function file(text: string): ReturnType<typeof readDocument> {
  const given = written(text);
  const document = readDocument(given.filter((line) => !isUnder(line)).join("\n"));
  const answer = document.lines.flatMap((line) => drawn(line.text, line.findings));
  expect(answer.join("\n")).toBe(given.join("\n"));
  return document;
}

/** Reads a line that has nothing wrong with it. */
export function reads(section: SectionKind | null, line: string): Statement {
  const { statement, findings } = readLine(section, line);
  expect(findings.map(inWords), line).toEqual([]);
  expect(statement, line).not.toBeNull();
  return statement as Statement;
}

/** Reads a line and writes it tidily. */
export const tidies = (section: SectionKind | null, line: string): string =>
  writeStatement(reads(section, line));

/** A value without its spans, wherever they are. */
export function withoutSpans(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutSpans);
  if (value === null || typeof value !== "object") return value;
  const entries = Object.entries(value).filter(([key]) => key !== "start" && key !== "end");
  // Of `as CaCO3` only the span is kept: that it was there must not be lost with it.
  if (entries.length === 0) return "here";
  return Object.fromEntries(entries.map(([key, inner]) => [key, withoutSpans(inner)]));
}
