/** A farm as a text with a cursor: `|` marks it, `// file: NAME` begins another file; the mark isn't in the farm. */
import type { Cursor } from "../../server/editor/cursor.ts";
import type { Farm } from "../../server/farm.ts";
import { filesOf, walk } from "../checks/walk.ts";

export interface Marked {
  readonly farm: Farm;
  /** By file, the texts without marks. */
  readonly files: ReadonlyMap<string, string>;
  readonly cursors: readonly Cursor[];
}

/** Every `|` is a cursor, in order; no Marl text of these tests holds one. */
export function marked(text: string, at?: string): Marked {
  const cursors: Cursor[] = [];
  const files = new Map<string, string>();
  for (const [file, given] of filesOf(text.replace(/^\n/, ""), "farm.marl")) {
    const lines = given.split("\n").map((line, number) => {
      const pieces = line.split("|");
      let column = 0;
      for (const piece of pieces.slice(0, -1)) {
        column += piece.length;
        cursors.push({ file, line: number, column });
      }
      return pieces.join("");
    });
    files.set(file, lines.join("\n"));
  }
  return { farm: walk(files, at), files, cursors };
}

/** The one cursor of a text. */
export function cursorIn(text: string, at?: string): { readonly farm: Farm; readonly cursor: Cursor } {
  const { farm, cursors } = marked(text, at);
  const [cursor, ...others] = cursors;
  if (!cursor || others.length > 0) throw new Error("one | marks the cursor");
  return { farm, cursor };
}
