/** Farm → the report object, version 1: field names are a contract, numbers plain and at full precision. */
import { writeMoment } from "../../grammar/dates.ts";
import type { Problem } from "../checks/problem.ts";
import { factAt } from "../culture/history.ts";
import type { Assumption, Solution, Strength } from "../culture/model.ts";
import type { Farm } from "../farm.ts";
import { coversSystem, problemsIn, type Scope, solutionsIn } from "./scope.ts";
import { type SystemReport, systemReport } from "./system-report.ts";

export interface Report {
  readonly marl: 1;
  readonly at: string;
  readonly problems: readonly ProblemReport[];
  readonly assumptions: readonly (Assumption & { readonly system: string | null })[];
  readonly solutions: readonly SolutionReport[];
  readonly systems: readonly SystemReport[];
}

/** Lines and columns from 1, columns in UTF-16 units, end exclusive; null for a file or the farm as a whole. */
export interface ProblemReport {
  readonly file: string;
  readonly line: number | null;
  readonly column: number | null;
  readonly endLine: number | null;
  readonly endColumn: number | null;
  readonly severity: Problem["severity"];
  readonly code: string;
  readonly message: string;
  readonly system: string | null;
}

export interface SolutionReport {
  readonly name: string;
  readonly file: string;
  readonly per_mL: PerMl;
  readonly saturation: null;
  readonly heat_rise_degC: null;
  readonly hazards: null;
  readonly signal: null;
  readonly remaining_mL: null;
  readonly days_left: null;
}

type PerMl = Readonly<Record<PerMlField, number | null>>;
type PerMlField =
  | "alkalinity_meq"
  | "calcium_mg"
  | "magnesium_mg"
  | "potassium_mg"
  | "strontium_mg"
  | "sodium_mg"
  | "chloride_mg"
  | "sulfate_mg"
  | "carbon_mmol";

/** The report on what a scope covers. */
export function reportOn(farm: Farm, scope: Scope): Report {
  const { model } = farm.bound;
  const covered = [...farm.assessments.values()].filter(({ system }) => coversSystem(scope, system));
  const used = solutionsIn(scope, farm);
  const solutions = [...model.solutions.values()].filter(({ ref }) => used.has(ref));
  return {
    marl: 1,
    at: writeMoment(farm.moment.at),
    problems: problemsIn(scope, farm).map((problem) => problemReport(farm, problem)),
    assumptions: covered.flatMap(({ system, assumptions }) =>
      assumptions.map((assumption) => ({ system: system.name, ...assumption })),
    ),
    solutions: solutions.map((solution) => solutionReport(solution, farm.moment.at)),
    systems: covered.map((assessment) => systemReport(model, assessment)),
  };
}

/** The problem with its columns; a problem of a whole line covers its text. */
export function problemReport(farm: Farm, problem: Problem): ProblemReport {
  const { place, severity, code, message, system } = problem;
  const line = farm.documents.get(place.file)?.lines[place.line];
  const shared = { severity, code, message, system };
  if (!line) return { file: place.file, line: null, column: null, endLine: null, endColumn: null, ...shared };
  const text = line.text;
  const start = place.span?.start ?? text.length - text.trimStart().length;
  const end = place.span?.end ?? (line.comment ? text.slice(0, line.comment.start) : text).trimEnd().length;
  const number = place.line + 1;
  return {
    file: place.file,
    line: number,
    column: start + 1,
    endLine: number,
    endColumn: Math.max(start, end) + 1,
    ...shared,
  };
}

function solutionReport(solution: Solution, at: number): SolutionReport {
  return {
    name: solution.name,
    file: solution.place.file,
    per_mL: perMl(factAt(solution.strengths, at)?.value ?? null),
    saturation: null,
    heat_rise_degC: null,
    hazards: null,
    signal: null,
    remaining_mL: null,
    days_left: null,
  };
}

const perMl = (strength: Strength | null): PerMl => ({
  alkalinity_meq: strength?.alkalinityMeq ?? null,
  calcium_mg: strength?.calciumMg ?? null,
  magnesium_mg: strength?.magnesiumMg ?? null,
  potassium_mg: strength?.potassiumMg ?? null,
  strontium_mg: strength?.strontiumMg ?? null,
  sodium_mg: strength?.sodiumMg ?? null,
  chloride_mg: strength?.chlorideMg ?? null,
  sulfate_mg: strength?.sulfateMg ?? null,
  carbon_mmol: strength?.carbonMmol ?? null,
});
