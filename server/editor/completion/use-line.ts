/** The line that makes the names of another file seen, at the place where it belongs. */
import { isBlank } from "../../../grammar/tokens.ts";
import { pathTo } from "../../checks/name.ts";
import type { LineEdit } from "../../checks/problem.ts";
import type { Farm } from "../../farm.ts";

/** Behind the last `use` line; else at the top, under what the file says of itself. */
export function useEdit(farm: Farm, file: string, used: string): readonly LineEdit[] {
  const document = farm.documents.get(file);
  if (!document) return [];
  const { lines, uses } = document;
  const written = `use "${pathTo(file, used)}"`;
  const last = uses.at(-1);
  if (last) {
    const end = lines[last.line]?.text.length ?? 0;
    return [{ file, line: last.line, start: end, end, text: `\n${written}` }];
  }
  const firstWords = lines.findIndex(({ text }) => !text.startsWith("#"));
  const line = firstWords > 0 && isBlank(lines[firstWords]!.text) ? firstWords : 0;
  const isApart = isBlank(lines[line]?.text ?? "");
  return [{ file, line, start: 0, end: 0, text: `${written}\n${isApart ? "" : "\n"}` }];
}
