/** Where `use` lines belong that a file lacks: one place for every edit that adds some. */
import type { MarlDocument } from "../../grammar/document.ts";
import { isBlank } from "../../grammar/tokens.ts";
import type { LineEdit } from "./problem.ts";

/** Puts lines below the `use` lines that a file has, else below the comment that it begins with. */
export function addingUseLines(file: string, document: MarlDocument, written: readonly string[]): LineEdit {
  const { lines, sections, uses } = document;
  const text = written.map((line) => `${line}\n`).join("");
  const put = (line: number, what: string, at = 0): LineEdit => ({
    ...{ file, line, start: at, end: at, text: what },
  });
  const firstHeader = sections[0]?.headerLine ?? lines.length;
  const last = uses.filter(({ line }) => line < firstHeader).at(-1)?.line;
  if (last !== undefined && last + 1 < lines.length) return put(last + 1, text);
  if (last !== undefined) return put(last, `\n${text.slice(0, -1)}`, lines[last]!.text.length);
  // A comment with a blank line below it is the file's own; one right above a header is the header's.
  let below = 0;
  while (lines[below]?.text.startsWith("#")) below += 1;
  const isFilesOwn = below > 0 && below + 1 < lines.length && isBlank(lines[below]!.text);
  return put(isFilesOwn ? below + 1 : 0, `${text}\n`);
}
