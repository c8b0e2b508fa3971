/** The one table of all rules, and what makes problems of findings with it. */
import type { Files } from "../culture/names.ts";
import { comparePlaces } from "../culture/place.ts";
import type { DosingFinding } from "../dosing/finding.ts";
import { fileRules } from "./file.ts";
import { hazardRules } from "./hazard.ts";
import { logRules } from "./log.ts";
import { nameRules } from "./name.ts";
import { overdoseRules } from "./overdose.ts";
import { planRules } from "./plan.ts";
import type { Problem } from "./problem.ts";
import { quietRules } from "./quiet.ts";
import { readingRules } from "./reading.ts";
import type { Code, FileFinding, Finding, Rule, Rules } from "./rule.ts";
import { syntaxRules } from "./syntax.ts";
import { systemRules } from "./system.ts";
import { unitRules } from "./unit.ts";
import { useRules } from "./use.ts";
import { waterRules } from "./water.ts";

export type { LineEdit, LineFix, Problem, Severity } from "./problem.ts";
export { countBySeverity, severities, severityRank } from "./problem.ts";
export type { Code, FileFinding, Finding } from "./rule.ts";

export const rules: Rules<Code> = {
  ...syntaxRules,
  ...unitRules,
  ...nameRules,
  ...useRules,
  ...logRules,
  ...readingRules,
  ...systemRules,
  ...waterRules,
  ...overdoseRules,
  ...planRules,
  ...hazardRules,
  ...quietRules,
  ...fileRules,
};

export const codes = Object.keys(rules) as readonly Code[];

const noFiles: Files = new Map();

/**
 * What is told of findings: in order of place and code, the same once. Fixes that need more than the finding look
 * into the files that it was found in.
 */
export function problemsOf(findings: readonly Finding[], files: Files = noFiles): Problem[] {
  return inOrder(findings.map((finding) => problemOf(finding, files)));
}

/** Problems in order of place and code, the same once. */
export function inOrder(given: readonly Problem[]): Problem[] {
  const problems = [...given].sort(compareProblems);
  return problems.filter((problem, index) => {
    const before = problems[index - 1];
    return before === undefined || !isSame(before, problem);
  });
}

function problemOf(finding: Finding, files: Files): Problem {
  const known = finding.code === "syntax/too-long" ? unread(finding) : finding;
  const { place, system } = known;
  // The table's own type holds each rule to the findings of its code.
  const rule = rules[known.code] as unknown as Rule;
  const of = known as Parameters<Rule["says"]>[0];
  const why = rule.whyHere?.(of) ?? rule.why;
  const todo = rule.todoHere?.(of, files) ?? rule.todo;
  return {
    code: known.code,
    severity: typeof rule.severity === "string" ? rule.severity : rule.severity(of),
    message: [rule.says(of), why, todo].join(" "),
    why,
    todo,
    place: {
      file: place.file,
      line: place.line,
      span: place.span && { start: place.span.start, end: place.span.end },
    },
    system,
    related: rule.related?.(of, files) ?? [],
    fixes: rule.fixes?.(of, files) ?? [],
  };
}

/** A line that no person wrote: the file isn't text there. */
const unread = ({ place }: Extract<DosingFinding, { code: "syntax/too-long" }>): FileFinding => ({
  code: "file/unreadable",
  place,
  system: null,
  reason: "a line of it is longer than any that a person writes",
});

const compareTexts = (left: string, right: string): number => (left < right ? -1 : left > right ? 1 : 0);

const compareProblems = (left: Problem, right: Problem): number =>
  comparePlaces(left.place, right.place) ||
  compareTexts(left.code, right.code) ||
  (left.place.span?.end ?? 0) - (right.place.span?.end ?? 0) ||
  compareTexts(left.message, right.message) ||
  compareTexts(left.system ?? "", right.system ?? "");

const isSame = (left: Problem, right: Problem): boolean => compareProblems(left, right) === 0;
