/** Texts that a client has open, and what its edits make of them. A line ends with `\n`, a `\r` before it included. */
import { columnOf, type Encoding } from "./positions.ts";

export interface OpenText {
  readonly uri: string;
  readonly version: number;
  readonly text: string;
}

/** A part of a text to be replaced; without a range the whole. Positions as the client counts them. */
export interface TextChange {
  readonly range?: {
    readonly start: { readonly line: number; readonly character: number };
    readonly end: { readonly line: number; readonly character: number };
  };
  readonly text: string;
}

/** The text after these changes, done one after the other. */
export function changed(text: string, changes: readonly TextChange[], encoding: Encoding): string {
  return changes.reduce((before, { range, text: put }) => {
    if (!range) return put;
    const start = offsetOf(before, range.start, encoding);
    const end = Math.max(start, offsetOf(before, range.end, encoding));
    return before.slice(0, start) + put + before.slice(end);
  }, text);
}

function offsetOf(
  text: string,
  { line, character }: { readonly line: number; readonly character: number },
  encoding: Encoding,
): number {
  let start = 0;
  for (let number = 0; number < line; number += 1) {
    const end = text.indexOf("\n", start);
    if (end < 0) return text.length;
    start = end + 1;
  }
  const end = text.indexOf("\n", start);
  let last = end < 0 ? text.length : end;
  // Between the two characters of a line ending nothing can be put.
  if (end > start && text[end - 1] === "\r") last -= 1;
  return start + columnOf(text.slice(start, last), character, encoding);
}
