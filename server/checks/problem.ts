/** What is told to people: a problem with its place, its words, and edits that would mend it. Shapes only. */
import type { Place } from "../culture/place.ts";

/** From worst to least. */
export const severities = ["error", "warning", "info", "hint"] as const;
export type Severity = (typeof severities)[number];

/**
 * An edit inside one line: UTF-16 offsets from the line's first character (a byte order mark not counted), end
 * exclusive.
 */
export interface LineEdit {
  readonly file: string;
  /** From 0. */
  readonly line: number;
  readonly start: number;
  readonly end: number;
  /** A `\n` starts a new line, with the line ending of the file. Null: the whole line goes, its ending too. */
  readonly text: string | null;
}

export interface LineFix {
  readonly title: string;
  /** True where the line means the same afterwards, or can have meant nothing else. */
  readonly safe: boolean;
  readonly edits: readonly LineEdit[];
}

export interface Problem {
  readonly code: string;
  readonly severity: Severity;
  /** What, why it matters, what to do, in that order. */
  readonly message: string;
  readonly why: string;
  readonly todo: string;
  readonly place: Place;
  readonly system: string | null;
  readonly related: readonly { readonly place: Place; readonly message: string }[];
  readonly fixes: readonly LineFix[];
}

/** 0 is the worst. */
export const severityRank = (severity: Severity): number => severities.indexOf(severity);

/** How many there are of each. */
export function countBySeverity(problems: readonly Problem[]): Readonly<Record<Severity, number>> {
  const counts: Record<Severity, number> = { error: 0, warning: 0, info: 0, hint: 0 };
  for (const { severity } of problems) counts[severity] += 1;
  return counts;
}
