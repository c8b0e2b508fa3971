/**
 * A test is a text: a farm as a technician writes it, and under a place `^^^^ severity code part of the message`.
 * A problem that isn't drawn fails the test, and so does a drawn one that isn't there.
 */
import { expect } from "vitest";
import { editedText } from "../../server/checks/apply-fixes.ts";
import type { Problem } from "../../server/checks/rules.ts";
import type { Farm } from "../../server/farm.ts";
import { filesOf, walk } from "./walk.ts";

export const isMark = (line: string): boolean => /^\s*\^+ (?:error|warning|info|hint) /.test(line);

export interface Settings {
  readonly at?: string;
  readonly file?: string;
}

/** Where a problem is drawn: under its words, or under all of its line. */
function columns({ place: { span } }: Problem, text: string): readonly [number, number] {
  if (span) return [span.start, Math.max(span.end, span.start + 1)];
  const start = text.length - text.trimStart().length;
  return [start, Math.max(text.replace(/\s+#.*$/, "").trimEnd().length, start + 1)];
}

const drawn = (problem: Problem, text: string, message: string): string => {
  const [start, end] = columns(problem, text);
  return `${" ".repeat(start)}${"^".repeat(end - start)} ${problem.severity} ${problem.code} ${message}`;
};

/** Draws what was found under its lines; where a given mark fits, in the words of the mark. */
function answerFor(given: string, file: string, problems: readonly Problem[]): string {
  const answer: string[] = [];
  let number = -1;
  let found: Problem[] = [];
  let text = "";
  const flush = () => {
    for (const problem of found) answer.push(drawn(problem, text, problem.message));
    found = [];
  };
  for (const line of given.split("\n")) {
    if (!isMark(line)) {
      flush();
      number += 1;
      text = line;
      answer.push(line);
      found = problems.filter(({ place }) => place.file === file && place.line === number);
      continue;
    }
    const fits = found.findIndex((problem) => {
      const part = drawn(problem, text, "");
      return line.startsWith(part.trimEnd()) && problem.message.includes(line.slice(part.length).trim());
    });
    if (fits < 0) continue;
    answer.push(line);
    found.splice(fits, 1);
  }
  flush();
  return answer.join("\n");
}

/** Reads the text as a farm and holds its problems against those that are drawn. */
export function problems(text: string, { at, file = "farm.marl" }: Settings = {}): Farm {
  const given = filesOf(text.replace(/^\n/, ""), file);
  const files = new Map(
    [...given].map(([name, marked]) => [
      name,
      marked
        .split("\n")
        .filter((line) => !isMark(line))
        .join("\n"),
    ]),
  );
  const farm = walk(files, at);
  for (const [name, marked] of given) expect(answerFor(marked, name, farm.problems), name).toBe(marked);
  expect(farm.problems.filter(({ place }) => !given.has(place.file))).toEqual([]);
  return farm;
}

/** The texts after one fix. Edits of one fix never overlap. */
export function mended(text: string, code: string, title: string, file = "farm.marl"): string {
  const files = filesOf(text.replace(/^\n/, ""), file);
  const problem = walk(files).problems.find((other) => other.code === code);
  const fix = problem?.fixes.find((other) => other.title === title);
  expect(fix, `${code}: ${problem?.fixes.map((other) => other.title).join(", ")}`).toBeDefined();
  const given = files.get(file)!;
  const lines = given.split("\n");
  for (const edit of fix!.edits) {
    expect(edit.file).toBe(file);
    expect(edit.end).toBeLessThanOrEqual(lines[edit.line]!.length);
  }
  return editedText(given, fix!.edits);
}
