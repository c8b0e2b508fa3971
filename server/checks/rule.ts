/** What a rule is: everything that is said about one code. The pages in `docs/problems/` start from it too. */
import type { Files } from "../culture/names.ts";
import type { DosingFinding } from "../dosing/finding.ts";
import type { LineFix, Problem, Severity } from "./problem.ts";

/** What can be wrong with a file as a whole. */
export type FileFinding = {
  readonly place: DosingFinding["place"];
  readonly system: null;
} & (
  | { readonly code: "file/unreadable"; readonly reason: string }
  | { readonly code: "file/more"; readonly hidden: number }
);

/** A code in a `# quiet:` comment that quietens nothing, and why. */
export interface QuietFinding {
  readonly code: "quiet/unused";
  readonly place: DosingFinding["place"];
  readonly system: null;
  /** The code as written; empty where none is. */
  readonly word: string;
  readonly why: "nothing-here" | "error" | "unknown" | "no-code" | "no-line";
  readonly wholeFile: boolean;
  readonly nearest: readonly string[];
  /** What the comment is without this code: an edit's place and text. */
  readonly without: { readonly start: number; readonly end: number };
}

/** Everything that can be found. */
export type Finding = DosingFinding | FileFinding | QuietFinding;

/** A line that nobody can have written isn't read; it is told as a file that can't be read. */
export type Code = Exclude<Finding["code"], "syntax/too-long">;

/** The finding of a code. */
export type Of<C extends Code> = Finding extends infer F
  ? F extends { readonly code: infer Codes }
    ? C extends Codes
      ? F
      : never
    : never
  : never;

export interface Example {
  /** A short farm that has the problem and no other, and one that has none. `// file: NAME` begins another file. */
  readonly fires: string;
  readonly silent: string;
  /** A problem that comes with it, where it never comes alone. */
  readonly also?: Code;
}

export interface Rule<C extends Code = Code> {
  readonly severity: Severity | ((finding: Of<C>) => Severity);
  /** A short name, for the page and for lists. */
  readonly title: string;
  /** What is wrong, with its numbers: a sentence or two. */
  readonly says: (finding: Of<C>) => string;
  /** Why it matters, as the page says it; and what the message says instead, with the finding's own numbers. */
  readonly why: string;
  readonly whyHere?: (finding: Of<C>) => string;
  /** What to do, likewise. */
  readonly todo: string;
  readonly todoHere?: (finding: Of<C>, files: Files) => string;
  readonly related?: (finding: Of<C>, files: Files) => Problem["related"];
  /** What would mend it; the files are those that it was found in. */
  readonly fixes?: (finding: Of<C>, files: Files) => readonly LineFix[];
  /** For the page: what stands behind a threshold, and anything else worth knowing. */
  readonly background?: string;
  /** For the page, where the severity depends on the finding. */
  readonly severityInWords?: string;
  /** Null where no text of a farm brings it about; then a sample stands for it. */
  readonly example: Example | null;
  readonly sample?: Of<C>;
}

/** Rules by code. */
export type Rules<C extends Code> = { readonly [Each in C]: Rule<Each> };
