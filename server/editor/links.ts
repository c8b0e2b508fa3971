/** Words that lead elsewhere: the paths of `use` lines, and the codes of problems in `# quiet:` comments. */
import { wishesOfLine } from "../checks/quieten.ts";
import { type Code, codes } from "../checks/rules.ts";
import { linesAtOnce } from "../culture/keep.ts";
import { fileMeant } from "../culture/names.ts";
import type { Farm } from "../farm.ts";
import type { LineSpan } from "./cursor.ts";

export interface Link {
  readonly span: LineSpan;
  readonly to: { readonly file: string } | { readonly code: Code };
}

/** By line, pausing now and then; a path that leads to no file of the farm is none. */
export function* links(farm: Farm, file: string): Generator<void, readonly Link[]> {
  const found: Link[] = [];
  for (const [number, line] of farm.documents.get(file)?.lines.entries() ?? []) {
    if (number % linesAtOnce === 0) yield;
    const { statement, comment, text } = line;
    if (statement?.kind === "use") {
      const { start, end } = statement.path;
      const target = fileMeant(file, statement.path.text, farm.links);
      // The quotes are no part of it.
      const span = { file, line: number, start: start + 1, end: end - 1 };
      if (target !== null && farm.documents.has(target)) found.push({ span, to: { file: target } });
    }
    if (!comment || !text.includes("quiet", comment.start)) continue;
    for (const { code, span } of wishesOfLine(file, number, line, comment))
      if (isCode(code))
        found.push({ span: { file, line: number, start: span.start, end: span.end }, to: { code } });
  }
  return found;
}

const isCode = (word: string): word is Code => (codes as readonly string[]).includes(word);
