/** Codes of problems, behind `# quiet:` and `# quiet file:`; those that the line or the file has first. */
import { type Code, codes, rules } from "../../checks/rules.ts";
import type { Farm } from "../../farm.ts";
import { type Cursor, lineIn } from "../cursor.ts";
import type { CompletionItem } from "./item.ts";

const asking = /#\s*quiet(\s+file)?\s*:([^#]*)$/;

/** Null where the cursor is behind no such words of a comment. */
export function codeItems(farm: Farm, cursor: Cursor): CompletionItem[] | null {
  const line = lineIn(farm, cursor.file, cursor.line);
  const { text = "", comment = null } = line?.line ?? {};
  if (!comment || cursor.column <= comment.start) return null;
  const asked = asking.exec(text.slice(comment.start, cursor.column));
  if (!asked) return null;
  const wholeFile = asked[1] !== undefined;
  const [typed = ""] = /[^\s,]*$/.exec(asked[2]!) ?? [];
  const [rest = ""] = /^[^\s,#]*/.exec(text.slice(cursor.column)) ?? [];
  const written = new Set((asked[2]! + rest).split(/[\s,]+/).filter((word) => word !== typed + rest));
  const here = new Set<string>(
    farm.problems.flatMap(({ code, place: { file, line: number } }) =>
      // That this comment quietens nothing yet is no reason to quieten that.
      file === cursor.file && (wholeFile || number === cursor.line) && code !== "quiet/unused" ? [code] : [],
    ),
  );
  const start = cursor.column - typed.length;
  const span = { file: cursor.file, line: cursor.line, start };
  return codes
    .filter((code) => rules[code].severity !== "error" && !written.has(code))
    .sort((left, right) => Number(here.has(right)) - Number(here.has(left)))
    .map((code: Code) => ({
      ...{ kind: "code", label: code, detail: rules[code].title, text: code, snippet: null, filter: code },
      insert: { ...span, end: cursor.column },
      replace: { ...span, end: cursor.column + rest.length },
      also: [],
      about: { kind: "problem", word: code },
      begins: false,
    }));
}
