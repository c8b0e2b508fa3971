/** What a problem's page says: all of it comes from the rule, its message from the rule's own example. */
import { readMoment } from "../../../grammar/dates.ts";
import type { Rule } from "../../checks/rule.ts";
import { type Code, codes, type Problem, problemsOf, rules } from "../../checks/rules.ts";
import { advance } from "../../farm.ts";

export interface ExampleFile {
  readonly file: string;
  readonly text: string;
}

export interface ProblemTopic {
  readonly kind: "problem";
  readonly code: Code;
  readonly title: string;
  readonly severity: string;
  /** The message, as it is told of the example. */
  readonly says: string;
  readonly why: string;
  readonly todo: string;
  readonly background: string | null;
  readonly fires: readonly ExampleFile[];
  readonly silent: readonly ExampleFile[];
  /** A problem that comes with it in the example. */
  readonly also: Code | null;
}

/** The moment that the rules' examples are seen as at, and the real clock of theirs. */
export const exampleMoment = "2026-12-01T08:00";

/** Files of an example: the text up to the first `// file: NAME` is the file named by `file`. */
export function filesOf(text: string, file = "farm.marl"): Map<string, string> {
  const [first = "", ...others] = text.split(/^\/\/ file: /m);
  const files = new Map<string, string>();
  if (first.trim() !== "" || others.length === 0) files.set(file, first);
  for (const other of others) {
    const end = other.indexOf("\n");
    files.set(other.slice(0, end).trim(), other.slice(end + 1));
  }
  return files;
}

function problemsIn(text: string): readonly Problem[] {
  const moment = readMoment(exampleMoment, "midnight");
  if (!moment.known) return [];
  const { minute } = moment.moment;
  const changes = new Map([...filesOf(text)].map(([file, lines]) => [file, { text: lines }]));
  return advance(null, changes, { at: minute, clock: minute }).problems;
}

export const isCode = (word: string): word is Code => (codes as readonly string[]).includes(word);

const listed = (text: string): ExampleFile[] =>
  [...filesOf(text)].map(([file, lines]) => ({ file, text: `${lines.trimEnd()}\n` }));

export function problemTopic(code: Code): ProblemTopic {
  const rule = rules[code] as unknown as Rule;
  const { example, sample } = rule;
  const problems = example ? problemsIn(example.fires) : sample ? problemsOf([sample]) : [];
  const shown = problems.find((problem) => problem.code === code);
  return {
    kind: "problem",
    code,
    title: rule.title,
    // Where it depends on the finding, the rule says so in words.
    severity:
      rule.severityInWords ?? (typeof rule.severity === "string" ? rule.severity : (shown?.severity ?? "")),
    says: shown?.message ?? "",
    why: rule.why,
    todo: rule.todo,
    background: rule.background ?? null,
    fires: example ? listed(example.fires) : [],
    silent: example ? listed(example.silent) : [],
    also: example?.also ?? null,
  };
}
