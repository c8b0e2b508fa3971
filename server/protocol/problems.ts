/** Problems as the protocol has them: which are shown, and how each is told. */
import { type Diagnostic, DiagnosticTag } from "vscode-languageserver/node";
import { type Problem, severityRank } from "../checks/problem.ts";
import { problemsOf } from "../checks/rules.ts";
import { wholeLineSpan } from "../editor/line-span.ts";
import type { Farm } from "../farm.ts";
import { severityFor } from "./convert.ts";
import type { Session } from "./session.ts";
import type { Look } from "./workspace.ts";

/** By file, in order of place. */
export function problemsByFile(farm: Farm): ReadonlyMap<string, readonly Problem[]> {
  const byFile = new Map<string, Problem[]>([...farm.texts.keys()].map((file) => [file, []]));
  for (const problem of farm.problems) {
    const list = byFile.get(problem.place.file);
    if (list) list.push(problem);
    else byFile.set(problem.place.file, [problem]);
  }
  return byFile;
}

/** The worst of them, at most so many, with one more that says how many are left out. */
export function shown(file: string, problems: readonly Problem[], most: number): readonly Problem[] {
  if (problems.length <= most) return problems;
  const worst = problems
    .map((problem, index) => ({ problem, index }))
    .sort((a, b) => severityRank(a.problem.severity) - severityRank(b.problem.severity) || a.index - b.index)
    .slice(0, most)
    .sort((a, b) => a.index - b.index)
    .map(({ problem }) => problem);
  const hidden = problems.length - most;
  const place = { file, line: 0, span: null };
  return [...problemsOf([{ code: "file/more", place, system: null, hidden }]), ...worst];
}

/** Problems of one file for the wire. */
export function diagnosticsOf(session: Session, look: Look, file: string, problems: readonly Problem[]) {
  const most = session.settings()["problems.mostPerFile"];
  return shown(file, problems, most).map((problem) => diagnosticOf(session, look, problem));
}

const unusedCodes: ReadonlySet<string> = new Set(["name/unused", "quiet/unused"]);

export function diagnosticOf({ client, convert, pageOf }: Session, look: Look, problem: Problem): Diagnostic {
  const { farm } = look;
  const { code, message, place, severity } = problem;
  const page = client.codeDescriptions ? pageOf(code) : null;
  const related = problem.related.map(({ place: other, message: text }) => ({
    location: convert.location(look, wholeLineSpan(farm, other)),
    message: text,
  }));
  return {
    range: convert.range(farm, wholeLineSpan(farm, place)),
    severity: severityFor[severity],
    code,
    source: "marl",
    message,
    ...(page === null ? {} : { codeDescription: { href: page } }),
    ...(client.relatedPlaces && related.length > 0 ? { relatedInformation: related } : {}),
    ...(client.problemTags && unusedCodes.has(code) ? { tags: [DiagnosticTag.Unnecessary] } : {}),
  };
}
