/** Keeps a warning, note or hint to itself: on its line, or in its whole file. Errors are always told. */
import type { MarlDocument } from "../../../grammar/document.ts";
import { isBlank } from "../../../grammar/tokens.ts";
import { endOfWords } from "../../checks/fixing.ts";
import type { LineEdit, Problem } from "../../checks/problem.ts";
import { type Action, type FindActions, inLines } from "./action.ts";
import { problemsAt } from "./fixes.ts";

/** A comment about quiet comments would be one more of them. */
const neverQuiet: ReadonlySet<string> = new Set(["quiet/unused", "file/more"]);

export const quieting: FindActions = (asked) => {
  const seen = new Set<string>();
  return problemsAt(asked).flatMap((problem) => {
    const { code, severity, place } = problem;
    const document = asked.farm.documents.get(place.file);
    const key = `${code} ${place.line}`;
    // Two of a kind on a line are quietened together, and all of a kind in a file.
    if (!document || severity === "error" || neverQuiet.has(code) || seen.has(key)) return [];
    const isFirst = !seen.has(code);
    seen.add(key).add(code);
    const action = (title: string, edit: () => LineEdit): Action => ({
      ...{ title, kind: "quickfix", problem, isPreferred: false },
      edit: () => inLines([edit()]),
    });
    const here = quietHere(document, problem);
    return [
      ...(here ? [action(`Keep ${code} quiet on this line`, () => here)] : []),
      ...(isFirst ? [action(`Keep ${code} quiet in this file`, () => quietInFile(document, problem))] : []),
    ];
  });
};

const onLine = /#\s*quiet\s*:\s*[^\s,#]+(?:\s*,\s*[^\s,#]+)*/;
const inFile = /#\s*quiet\s+file\s*:\s*[^\s,#]+(?:\s*,\s*[^\s,#]+)*/;

/** Joins a comment that is there, else comes behind the line's words; none on a line that says nothing. */
function quietHere(document: MarlDocument, { code, place: { file, line } }: Problem): LineEdit | null {
  const found = document.lines[line];
  if (!found || endOfWords(found) === 0) return null;
  const { text, comment } = found;
  const known = comment && onLine.exec(text.slice(comment.start));
  const end = known
    ? comment.start + known.index + known[0].length
    : comment
      ? text.trimEnd().length
      : endOfWords(found);
  return { file, line, start: end, end, text: known ? `, ${code}` : ` # quiet: ${code}` };
}

/** Joins a comment for the file, else stands below the comments that the file begins with, or above everything. */
function quietInFile({ lines }: MarlDocument, { code, place: { file } }: Problem): LineEdit {
  for (const [line, { text, comment }] of lines.entries()) {
    const known = comment && inFile.exec(text.slice(comment.start));
    if (!known) continue;
    const end = comment.start + known.index + known[0].length;
    return { file, line, start: end, end, text: `, ${code}` };
  }
  const isComment = (line: number): boolean => {
    const found = lines[line];
    return (
      found?.comment !== null && found !== undefined && isBlank(found.text.slice(0, found.comment.start))
    );
  };
  let below = 0;
  while (isComment(below)) below += 1;
  const end = below === 0 ? 0 : lines[below - 1]!.text.length;
  const text = `# quiet file: ${code}`;
  return below === 0
    ? { file, line: 0, start: 0, end: 0, text: `${text}\n` }
    : { file, line: below - 1, start: end, end, text: `\n${text}` };
}
