/** Columns as a client counts them, and as Marl does: UTF-16 units of a line's own text, from 0. */

/** In the order in which they are taken, where a client offers several. */
export const encodings = ["utf-8", "utf-16", "utf-32"] as const;
export type Encoding = (typeof encodings)[number];

/** How many a code point counts. */
const lengthIn: Readonly<Record<Encoding, (codePoint: number) => number>> = {
  "utf-16": (codePoint) => (codePoint > 0xffff ? 2 : 1),
  "utf-32": () => 1,
  "utf-8": (codePoint) => (codePoint < 0x80 ? 1 : codePoint < 0x800 ? 2 : codePoint < 0x10000 ? 3 : 4),
};

const isPlain = /^[\0-\x7f]*$/;

/** A client's character → the column; beyond the line it is the line's end, inside a character its start. */
export function columnOf(text: string, character: number, encoding: Encoding): number {
  if (character <= 0) return 0;
  if (encoding === "utf-16" || isPlain.test(text)) return Math.min(character, text.length);
  const length = lengthIn[encoding];
  let counted = 0;
  let column = 0;
  for (const symbol of text) {
    counted += length(symbol.codePointAt(0)!);
    if (counted > character) return column;
    column += symbol.length;
    if (counted === character) return column;
  }
  return column;
}

/** A column → the client's character. */
export function characterOf(text: string, column: number, encoding: Encoding): number {
  const end = Math.min(Math.max(column, 0), text.length);
  if (encoding === "utf-16" || isPlain.test(text)) return end;
  const length = lengthIn[encoding];
  let counted = 0;
  for (const symbol of text.slice(0, end)) counted += length(symbol.codePointAt(0)!);
  return counted;
}
