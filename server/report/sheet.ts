/** Farm → the dose sheet as plain data: headings, tables, lines. The faces (text, Markdown) only draw it. */

import { minutesPerDay, writeClock } from "../../grammar/dates.ts";
import { figure } from "../checks/figures.ts";
import type { Problem } from "../checks/problem.ts";
import { dayText } from "../checks/words.ts";
import type { Assessment } from "../dosing/assess.ts";
import type { Farm } from "../farm.ts";
import { assumptionLines } from "./assumption-lines.ts";
import { problemReport } from "./report.ts";
import { coversSystem, problemsIn, type Scope, solutionsIn } from "./scope.ts";
import { dosesSection, effectsSection } from "./sheet-doses.ts";
import { type Section, type Sheet, type SheetProblem, type SystemSheet, section } from "./sheet-model.ts";
import { cautionLines, solutionSection } from "./sheet-solutions.ts";
import { uptakeSection, waterSection } from "./sheet-water.ts";

export function momentText(minute: number): string {
  const year = new Date(minute * 60_000).getUTCFullYear();
  const clock = writeClock(((minute % minutesPerDay) + minutesPerDay) % minutesPerDay);
  return `${dayText(minute)} ${year} ${clock}`;
}

export function sheetOf(farm: Farm, scope: Scope): Sheet {
  const { model } = farm.bound;
  // What caustic solutions need heads the sheet; the reagents' own cautions stand with their lines.
  const problems = problemsIn(scope, farm).filter(
    ({ severity, code }) => severity !== "hint" && code !== "hazard/caustic",
  );
  const covered = [...farm.assessments.values()].filter(({ system }) => coversSystem(scope, system));
  const names = new Set(covered.map(({ system }) => system.name));
  const solutions = [...model.solutions.values()].filter(({ ref }) => solutionsIn(scope, farm).has(ref));
  const others = problems.filter(({ system }) => system === null || !names.has(system));
  return {
    title: `Dose sheet, ${momentText(farm.moment.at)}`,
    cautions: cautionLines(solutions, farm.moment.at),
    systems: covered.map((assessment) =>
      systemSheet(
        farm,
        assessment,
        problems.filter(({ system }) => system === assessment.system.name),
      ),
    ),
    closing: [
      ...(solutions.length > 0 ? [solutionSection(solutions, farm.moment.at)] : []),
      ...(others.length > 0 ? [problemSection(farm, "Elsewhere in the farm", others)] : []),
    ],
  };
}

function systemSheet(farm: Farm, assessment: Assessment, problems: readonly Problem[]): SystemSheet {
  const { system, volume } = assessment;
  const measures =
    volume.measuredL !== null && volume.geometricL !== null
      ? `, ${volume.geometricL.toFixed(0)} L by its tanks' measures`
      : "";
  const net =
    volume.litres === null
      ? "volume unknown"
      : `${volume.litres < 1 ? figure(volume.litres * 1000, "mL") : figure(volume.litres, "L")} of water`;
  const sections = [
    dosesSection(farm.bound.model, assessment),
    ...(problems.length > 0 ? [problemSection(farm, "To look at", problems)] : []),
    waterSection(assessment),
    uptakeSection(assessment),
    effectsSection(farm.bound.model, assessment),
    assumptionSection(assessment),
  ];
  return {
    heading: system.title ? `${system.name}: ${system.title}` : system.name,
    subtitle: `${net}${measures}`,
    sections: sections.filter((candidate) => candidate !== null),
  };
}

function problemSection(farm: Farm, title: string, problems: readonly Problem[]): Section {
  const ranked = [...problems].sort((left, right) => rank(left) - rank(right));
  return section(title, { problems: ranked.map((problem) => sheetProblem(farm, problem)) });
}

const rank = ({ severity }: Problem): number => ["error", "warning", "info", "hint"].indexOf(severity);

/** A problem with its place as `file:line:column`. */
export function sheetProblem(farm: Farm, problem: Problem): SheetProblem {
  const { file, line, column } = problemReport(farm, problem);
  const { severity, message, code } = problem;
  return { severity, code, message, place: line === null ? file : `${file}:${line}:${column}` };
}

/** What was taken for granted, together by what it rests on. */
function assumptionSection({ assumptions }: Assessment): Section | null {
  if (assumptions.length === 0) return null;
  return section("Taken for granted", { lines: assumptionLines(assumptions) });
}
