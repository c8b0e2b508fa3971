/** Signature help: how the statement of the cursor's line is written, and the part that the cursor is at. */
import { longestLine } from "../../grammar/line.ts";
import { parameterOf } from "../../grammar/parameters.ts";
import { aParameter, rowsOf, type StatementRow } from "../../grammar/statements.ts";
import { cut, dateWord, timeWord } from "../../grammar/tokens.ts";
import type { Farm } from "../farm.ts";
import { type Cursor, type LineInFarm, lineIn } from "./cursor.ts";
import { type Form, filledTo, formsOf } from "./form-parts.ts";
import { marlBlock } from "./markdown.ts";

export interface Signature {
  readonly label: string;
  /** Where its parts stand in the label; end exclusive. */
  readonly parts: readonly { readonly start: number; readonly end: number }[];
  /** The part that the cursor is at; null where the form is full. */
  readonly active: number | null;
}

export interface SignatureHelp {
  readonly signatures: readonly Signature[];
  /** The one that the line's words fit best. */
  readonly active: number;
  /** What the statement means, and a line that shows it. */
  readonly markdown: string;
}

export function signatureHelp(farm: Farm, cursor: Cursor): SignatureHelp | null {
  const line = lineIn(farm, cursor.file, cursor.line);
  if (!line || (line.line.comment && cursor.column > line.line.comment.start)) return null;
  const { text } = line.line;
  const row = text.length > longestLine ? null : rowOfLine(line);
  if (!row) return null;
  if (cursor.column < text.length - text.trimStart().length) return null;
  const filled = formsOf(row).map((form) => ({ form, ...filledTo(form, text, cursor.column) }));
  const most = Math.max(...filled.map(({ fitting }) => fitting));
  return {
    signatures: filled.map(({ form, part, fitting }) => signatureOf(form, fitting === most ? part : null)),
    active: filled.findLastIndex(({ fitting }) => fitting === most),
    markdown: `${row.meaning}\n\n${marlBlock(exampleFor(row, text))}`,
  };
}

const signatureOf = ({ text, parts }: Form, active: number | null): Signature => ({
  label: text,
  parts: parts.map(({ start, end }) => ({ start, end })),
  active,
});

/** The statement that a line's first word begins here, whether or not the rest of the line reads. */
export function rowOfLine({ line, section }: LineInFarm): StatementRow | null {
  const { tokens } = cut(line.text);
  const isDated = tokens[0]?.tokenType === dateWord;
  const word = tokens[isDated ? (tokens[1]?.tokenType === timeWord ? 2 : 1) : 0]?.image;
  if (word === undefined) return null;
  const rows = rowsOf(parameterOf(word) ? aParameter : word);
  const form = isDated ? "event" : "fact";
  return (
    rows.find((row) => row.form === "header" && !isDated) ??
    rows.find((row) => section && row.form === form && row.sections.includes(section.kind)) ??
    null
  );
}

/** The example that is most like the line so far. */
function exampleFor({ examples }: StatementRow, text: string): string {
  const words = new Set(text.split(/[\s,]+/));
  const likeness = (line: string) => line.split(/[\s,]+/).filter((word) => words.has(word)).length;
  return examples.reduce((best, line) => (likeness(line) > likeness(best) ? line : best));
}
