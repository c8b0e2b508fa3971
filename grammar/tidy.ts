/**
 * A file's text → its tidy form, through the one writer of lines. What a file means stays the same, and so does
 * every line that can't be read, byte for byte: only its line ending may become that of the first line.
 */
import { type DocumentLine, type MarlDocument, readDocument } from "./document.ts";
import { longestLine } from "./line.ts";
import type { Statement } from "./syntax.ts";
import { isBlank } from "./tokens.ts";
import { readUnit } from "./units.ts";
import { unitsIn, writeStatement } from "./write.ts";

const byteOrderMark = "\ufeff";
const indent = "  ";
const linesAtOnce = 64;

/** The tidy form of a file. */
export function tidyText(text: string): string {
  const steps = tidyInSteps(readDocument(text));
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/**
 * The tidy form of a document's text, with its byte order mark and the line ending of its first line. Pauses every so
 * many lines.
 */
export function* tidyInSteps(document: MarlDocument): Generator<void, string> {
  const headers = new Set(document.sections.map(({ headerLine }) => headerLine));
  const lines: string[] = [];
  /** Where the comments begin that stand right above whatever comes next. */
  let commentsFrom = 0;
  for (const [number, line] of document.lines.entries()) {
    if (number % linesAtOnce === linesAtOnce - 1) yield;
    const text = tidyLine(line);
    if (text === "") {
      if (lines.length > 0 && lines.at(-1) !== "") lines.push("");
      commentsFrom = lines.length;
    } else {
      if (headers.has(number) && commentsFrom > 0 && lines[commentsFrom - 1] !== "")
        lines.splice(commentsFrom, 0, "");
      lines.push(text);
      if (!text.startsWith("#")) commentsFrom = lines.length;
    }
  }
  if (lines.at(-1) === "") lines.pop();
  // A stray byte order mark would become the file's own at the very front.
  if (!document.hasByteOrderMark && lines[0]?.startsWith(byteOrderMark)) lines.unshift("");
  const mark = document.hasByteOrderMark ? byteOrderMark : "";
  return mark + lines.map((line) => line + document.lineEnding).join("");
}

/** The tidy form of one line of a document: empty for a blank one, unchanged for one that can't be read. */
export function tidyLine({ text, statement, comment }: DocumentLine): string {
  if (isBlank(text)) return "";
  const before = comment ? text.slice(0, comment.start) : text;
  const remark = comment ? text.slice(comment.start).trimEnd() : "";
  let tidy: string;
  if (isBlank(before)) {
    tidy = before === "" ? remark : indent + remark;
  } else if (statement && !hasUnknownUnit(statement)) {
    tidy = (isAtMargin(statement) ? "" : indent) + writeStatement(statement);
    if (comment) tidy += spaceBefore(before) + remark;
  } else {
    // A carriage return at the end belongs to the line's ending, which may not be its own.
    return text.slice(
      0,
      endWithout(text, (character) => character === "\r"),
    );
  }
  // One that would become too long to be read again stays as it is.
  return tidy.length > longestLine ? text : tidy;
}

/** The space that stands before a comment: spaces and tabs as they are, any other as a space, at least one. */
const spaceBefore = (before: string): string =>
  before.slice(endWithout(before, isBlank)).replace(/[^ \t]/g, " ") || " ";

/** Where a text ends, if these characters at its end aren't counted. */
function endWithout(text: string, isLeftOut: (character: string) => boolean): number {
  let end = text.length;
  while (end > 0 && isLeftOut(text.charAt(end - 1))) end -= 1;
  return end;
}

/** True where a statement has a unit that is none: its line counts for nothing, like any other that can't be read. */
const hasUnknownUnit = (statement: Statement): boolean =>
  unitsIn(statement).some((unit) => !readUnit(unit).known);

const isAtMargin = ({ kind }: Statement): boolean => kind === "header" || kind === "use";
