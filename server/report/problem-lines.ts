/** Problems as lines of text, and how many there are. */
import { countBySeverity, type Problem } from "../checks/problem.ts";
import type { Farm } from "../farm.ts";
import { sheetProblem } from "./sheet.ts";
import { paintIf, problemText } from "./text.ts";

export function problemLines(farm: Farm, problems: readonly Problem[], color: boolean): string {
  const paint = paintIf(color);
  const lines = problems.flatMap((problem) => problemText(sheetProblem(farm, problem), paint, 0));
  return `${[...lines, ...(lines.length > 0 ? [""] : []), countText(problems)].join("\n")}\n`;
}

function countText(problems: readonly Problem[]): string {
  const counts = Object.entries(countBySeverity(problems)).filter(([, count]) => count > 0);
  if (counts.length === 0) return "No problems.";
  const word = (severity: string, count: number) =>
    severity === "info" ? (count === 1 ? "note" : "notes") : count === 1 ? severity : `${severity}s`;
  return `${counts.map(([severity, count]) => `${count} ${word(severity, count)}`).join(", ")}.`;
}
