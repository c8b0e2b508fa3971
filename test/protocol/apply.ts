/** What a client does with edits: puts them into its text, counting characters as it does. */
export type CountedIn = "utf-8" | "utf-16" | "utf-32";

export interface ClientEdit {
  readonly range: { readonly start: ClientPlace; readonly end: ClientPlace };
  readonly newText: string;
}
interface ClientPlace {
  readonly line: number;
  readonly character: number;
}

const lengthOf: Readonly<Record<CountedIn, (text: string) => number>> = {
  "utf-8": (text) => Buffer.byteLength(text, "utf8"),
  "utf-16": (text) => text.length,
  "utf-32": (text) => [...text].length,
};

function offsetOf(text: string, { line, character }: ClientPlace, encoding: CountedIn): number {
  const lines = text.split("\n");
  if (line >= lines.length) throw new Error(`there is no line ${line}`);
  const start = lines.slice(0, line).reduce((sum, each) => sum + each.length + 1, 0);
  let column = 0;
  for (const symbol of lines[line]!) {
    if (lengthOf[encoding](lines[line]!.slice(0, column)) >= character) break;
    column += symbol.length;
  }
  if (lengthOf[encoding](lines[line]!.slice(0, column)) !== character)
    throw new Error(`line ${line} has no character ${character}`);
  return start + column;
}

/** The text after all of the edits, which are all of the text before. */
export function appliedIn(text: string, edits: readonly ClientEdit[], encoding: CountedIn): string {
  const placed = edits
    .map(({ range, newText }) => ({
      start: offsetOf(text, range.start, encoding),
      end: offsetOf(text, range.end, encoding),
      newText,
    }))
    .sort((left, right) => left.start - right.start);
  let result = "";
  let reached = 0;
  for (const { start, end, newText } of placed) {
    if (start < reached || end < start) throw new Error("edits overlap");
    result += text.slice(reached, start) + newText;
    reached = end;
  }
  return result + text.slice(reached);
}
