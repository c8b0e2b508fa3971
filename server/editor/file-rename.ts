/** Files and folders that get another path: the `use` lines that lead to them, and their own, are mended. */
import { pathTo } from "../checks/name.ts";
import type { LineEdit } from "../checks/problem.ts";
import { fileMeant } from "../culture/names.ts";
import type { Farm } from "../farm.ts";

/** By the old path of a file of the farm, its new one; null where it leaves the farm. */
export type Moves = ReadonlyMap<string, string | null>;

/** The edits that keep each `use` line leading where it led, by the files' old paths. */
export function mendedUses(farm: Farm, moves: Moves): readonly LineEdit[] {
  const edits: LineEdit[] = [];
  const moved = (file: string): string | null => {
    const to = moves.get(file);
    return to === undefined ? file : to;
  };
  for (const [file, document] of farm.documents) {
    const here = moved(file);
    if (here === null) continue;
    for (const { line, path } of document.uses) {
      const target = fileMeant(file, path.text, farm.links);
      const there = target !== null && farm.documents.has(target) ? moved(target) : null;
      if (there === null || fileMeant(here, path.text, farm.links) === there) continue;
      const text = `${path.text.startsWith("./") ? "./" : ""}${pathTo(here, there)}`;
      // A path can't say a quote.
      if (/["“”„\r\n]/.test(text)) continue;
      edits.push({ file, line, start: path.start + 1, end: path.end - 1, text });
    }
  }
  return edits;
}

/** What becomes of a farm's files when one of these paths, of a file or a folder, becomes another. */
export function movesOf(farm: Farm, renames: readonly (readonly [from: string, to: string | null])[]): Moves {
  const moves = new Map<string, string | null>();
  for (const file of farm.documents.keys())
    for (const [from, to] of renames) {
      if (file === from) moves.set(file, to);
      else if (file.startsWith(`${from}/`))
        moves.set(file, to === null ? null : `${to}${file.slice(from.length)}`);
    }
  return moves;
}
