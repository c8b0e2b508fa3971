/** Files of the farm, behind `use`. */
import { cut, quoted, spanOf, unclosed } from "../../../grammar/tokens.ts";
import { pathTo } from "../../checks/name.ts";
import type { Farm } from "../../farm.ts";
import { type Cursor, lineIn } from "../cursor.ts";
import type { CompletionItem } from "./item.ts";

/** The files that a `use` line may name, in quotes; null where the cursor is on no such line's path. */
export function pathItems(farm: Farm, cursor: Cursor): CompletionItem[] | null {
  const line = lineIn(farm, cursor.file, cursor.line);
  const [use, path] = line ? cut(line.line.text).tokens : [];
  if (!line || use?.image !== "use" || cursor.column <= spanOf(use).end) return null;
  const isPath = path?.tokenType === quoted || path?.tokenType === unclosed;
  if (path && (!isPath || cursor.column < spanOf(path).start)) return null;
  const start = path ? spanOf(path).start : cursor.column;
  const end = path ? start + path.image.trimEnd().length : cursor.column;
  // A comment behind an open quote belongs to the text; behind a closed one the path is done.
  if (cursor.column > end || (path?.tokenType === quoted && cursor.column === end)) return null;
  const used = new Set(
    line.document.uses.flatMap(({ line: number, path: { text } }) => (number === cursor.line ? [] : [text])),
  );
  return [...farm.documents.keys()].flatMap((file): CompletionItem[] => {
    const way = pathTo(cursor.file, file);
    if (file === cursor.file || used.has(way)) return [];
    const span = { file: cursor.file, line: cursor.line, start };
    const text = `"${way}"`;
    return [
      {
        ...{ kind: "path", label: way, detail: namesIn(farm, file), text, snippet: null, filter: text },
        ...{ insert: { ...span, end: cursor.column }, replace: { ...span, end } },
        ...{ also: [], about: null, begins: false },
      },
    ];
  });
}

/** A few of the names that a file declares. */
function namesIn(farm: Farm, file: string): string {
  const names = (farm.documents.get(file)?.sections ?? []).flatMap(({ kind, name }) =>
    name && kind !== "log" ? [name.text] : [],
  );
  const few = 4;
  return [...new Set(names)].slice(0, few).join(", ") + (names.length > few ? ", …" : "");
}
