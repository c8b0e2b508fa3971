/** What a client does with edits: puts all of them into the text that they were made for. */
import type { LineEdit } from "../../server/checks/problem.ts";
import type { TextEdit, TextPoint } from "../../server/editor/text-edits.ts";

const byteOrderMark = "\ufeff";

/** Where a place is in a text; the line's ending isn't part of the line. */
function offsetIn(text: string, { line, column }: TextPoint): number {
  const mark = text.startsWith(byteOrderMark) ? 1 : 0;
  const lines = text.slice(mark).split("\n");
  if (line >= lines.length) throw new Error(`there is no line ${line}`);
  const before = lines.slice(0, line).reduce((sum, each) => sum + each.length + 1, mark);
  const length = line === lines.length - 1 ? lines[line]!.length : lines[line]!.replace(/\r$/, "").length;
  if (column > length) throw new Error(`line ${line} has no column ${column}`);
  return before + column;
}

/** The text after edits that don't overlap; those at one place go in as they are given. */
export function applied(text: string, edits: readonly TextEdit[]): string {
  const placed = edits
    .map((edit) => ({ start: offsetIn(text, edit.from), end: offsetIn(text, edit.to), put: edit.text }))
    .sort((left, right) => left.start - right.start);
  let result = "";
  let reached = 0;
  for (const { start, end, put } of placed) {
    if (start < reached || end < start) throw new Error("edits overlap");
    result += text.slice(reached, start) + put;
    reached = end;
  }
  return result + text.slice(reached);
}

/** An edit inside a line, or the removal of one, as one over lines. */
export function overLines(text: string, { file, line, start, end, text: put }: LineEdit): TextEdit {
  const lines = text.replace(/^\ufeff/, "").split("\n");
  const ending = lines.length > 1 && lines[0]!.endsWith("\r") ? "\r\n" : "\n";
  if (put !== null)
    return {
      ...{ file, from: { line, column: start }, to: { line, column: end } },
      text: put.replaceAll("\n", ending),
    };
  if (line + 1 < lines.length)
    return { file, from: { line, column: 0 }, to: { line: line + 1, column: 0 }, text: "" };
  const from =
    line > 0
      ? { line: line - 1, column: lines[line - 1]!.replace(/\r$/, "").length }
      : { line: 0, column: 0 };
  return { file, from, to: { line, column: lines[line]!.length }, text: "" };
}
