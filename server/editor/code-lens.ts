/** Lenses: today's doses above a system, and a way to record a reading above a log. */

import type { Farm } from "../farm.ts";
import { dosesSection, dosesToday } from "../report/sheet-doses.ts";
import { type LineSpan, linesOf } from "./cursor.ts";
import { systemOfLine } from "./things.ts";

export type LensKind = "doses" | "reading";

export interface Lens {
  readonly kind: LensKind;
  /** The header's words. */
  readonly span: LineSpan;
  /** The system's reference and its name. */
  readonly system: string;
  readonly name: string;
}

/** The lenses of a file; what they say is worked out when they are shown. */
export function codeLenses(farm: Farm, file: string, kinds: ReadonlySet<LensKind>): Lens[] {
  const lines = linesOf(farm, file);
  return (farm.documents.get(file)?.sections ?? []).flatMap(({ kind, name, headerLine }): Lens[] => {
    const lens: LensKind | null = kind === "system" ? "doses" : kind === "log" ? "reading" : null;
    const line = lines[headerLine];
    const system = line && systemOfLine(farm, line);
    if (!lens || !name || !system || !kinds.has(lens)) return [];
    const start = line.line.text.length - line.line.text.trimStart().length;
    const span = { file, line: headerLine, start, end: name.end };
    return [{ kind: lens, span, system: system.ref, name: system.name }];
  });
}

/**
 * `Today: head-1 112 mL · by hand epsom 40 mL`, with what a hand has given already, or what is missing; null of a
 * system that isn't there any more.
 */
export function dosesTitle(farm: Farm, system: string): string | null {
  const assessment = farm.assessments.get(system);
  if (!assessment) return null;
  const { model } = farm.bound;
  if (!assessment.plan) return dosesSection(model, assessment).lines[0] ?? null;
  const doses = dosesToday(model, assessment).map(({ name, by, aDay, given }) =>
    by === null ? `by hand ${name} ${aDay}${given ? ` (${given})` : ""}` : `${by} ${aDay}`,
  );
  return `Today: ${doses.join(" · ")}`;
}

export const readingTitle = "Record a reading";
