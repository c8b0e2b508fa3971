/** How a system is, in short: the worst that is told of it, today's doses, as at when. */
import type { Problem, Severity } from "../checks/problem.ts";
import { sectionAt } from "../checks/sections.ts";
import type { System } from "../culture/model.ts";
import type { Farm } from "../farm.ts";
import { dosesTitle } from "./code-lens.ts";
import { momentText } from "./usual-reading.ts";

export interface SystemState {
  readonly name: string;
  readonly ref: string;
  /** Null where nothing is wrong. */
  readonly worst: "error" | "warning" | null;
  readonly errors: number;
  readonly warnings: number;
  /** The worst problem's words; null where there is none. */
  readonly message: string | null;
  /** Today's doses in one line. */
  readonly doses: string | null;
  /** `2026-12-01 08:00`: as at when all this is. */
  readonly asAt: string;
  /** When the water was last read; null where it never was. */
  readonly lastRead: string | null;
}

/** Counts what is told of the system and of the lines of its section and its log. */
export function systemState(farm: Farm, system: System): SystemState {
  const files = new Set([system.place.file, ...system.logFiles]);
  const told = farm.problems.filter((problem) => isOf(farm, problem, system.name, files));
  const of = (severity: Severity) => told.filter((problem) => problem.severity === severity);
  const [errors, warnings] = [of("error"), of("warning")];
  const lastRead = farm.assessments.get(system.ref)?.readings.at(-1)?.event.minute;
  return {
    name: system.name,
    ref: system.ref,
    worst: errors.length > 0 ? "error" : warnings.length > 0 ? "warning" : null,
    errors: errors.length,
    warnings: warnings.length,
    message: (errors[0] ?? warnings[0])?.message ?? null,
    doses: dosesTitle(farm, system.ref),
    asAt: momentText(farm.moment.at),
    lastRead: lastRead === undefined ? null : momentText(lastRead),
  };
}

/** Of the lines in its files that belong to no system those count that stand in no other section either. */
function isOf(farm: Farm, { system, place }: Problem, name: string, files: ReadonlySet<string>): boolean {
  if (system !== null) return system === name;
  if (!files.has(place.file)) return false;
  const section = sectionAt(farm.documents, place);
  return !section || ((section.kind === "system" || section.kind === "log") && section.name?.text === name);
}
