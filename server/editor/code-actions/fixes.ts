/** The fixes that problems bring along, and all safe ones of a file at once. */
import { applySafeFixesInSteps } from "../../checks/apply-fixes.ts";
import type { LineFix, Problem } from "../../checks/problem.ts";
import type { Farm } from "../../farm.ts";
import { wholeLineSpan } from "../line-span.ts";
import { editsBetween } from "../text-edits.ts";
import { type Asked, type FindActions, type FindInSteps, inLines, type Selection } from "./action.ts";

/** More problems than this are no menu: the actions of the first ones are offered. */
const mostProblems = 50;

/** The first problems whose words a selection touches. */
export function problemsAt({ farm, selection }: Pick<Asked, "farm" | "selection">): readonly Problem[] {
  const found: Problem[] = [];
  for (const problem of farm.problems) {
    const { place } = problem;
    if (place.line < selection.from.line || place.line > selection.to.line) continue;
    if (place.file !== selection.file || !touches(selection, wholeLineSpan(farm, place))) continue;
    found.push(problem);
    if (found.length === mostProblems) break;
  }
  return found;
}

function touches(
  { from, to }: Selection,
  { line, start, end }: { readonly line: number; readonly start: number; readonly end: number },
): boolean {
  if (line < from.line || line > to.line) return false;
  return (line > from.line || from.column <= end) && (line < to.line || to.column >= start);
}

/** One for each fix of each problem; edits outside the farm's files are none of ours. */
export const fixes: FindActions = (asked) => {
  const seen = new Set<string>();
  return problemsAt(asked).flatMap((problem) => {
    const own = problem.fixes.filter((fix) => staysInside(asked.farm, fix));
    const safe = own.filter((fix) => fix.safe);
    // Two problems of one line may be mended alike.
    const fresh = own.filter(({ title }) => {
      const key = `${problem.place.line} ${title}`;
      return !seen.has(key) && seen.add(key);
    });
    return fresh.map((fix) => ({
      title: fix.title,
      kind: "quickfix",
      problem,
      isPreferred: fix.safe && safe.length === 1,
      edit: () => inLines(fix.edits),
    }));
  });
};

const staysInside = ({ texts }: Farm, { edits }: LineFix): boolean =>
  edits.length > 0 && edits.every(({ file }) => texts.has(file));

/** All safe fixes of the problems of this file that change nothing but this file. */
export const fixAll: FindInSteps = function* ({ farm, selection: { file } }) {
  const text = farm.texts.get(file);
  if (text === undefined) return [];
  const own = farm.problems.filter(({ place }) => place.file === file);
  const { texts, done } = yield* applySafeFixesInSteps(new Map([[file, text]]), own);
  const after = texts.get(file);
  if (after === undefined || after === text) return [];
  return [
    {
      title:
        done.length === 1
          ? "Do the one safe fix of this file"
          : `Do the ${done.length} safe fixes of this file`,
      kind: "source.fixAll.marl",
      problem: null,
      isPreferred: false,
      edit: () => inLines(editsBetween(file, text, after)),
    },
  ];
};
