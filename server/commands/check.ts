/** `marl check`: what is wrong in a farm, or in some of its files. */
import type { Problem } from "../checks/problem.ts";
import { problemLines } from "../report/problem-lines.ts";
import { reportOn } from "../report/report.ts";
import { problemsIn } from "../report/scope.ts";
import { type Command, formatOf, momentOf, type Status } from "./command.ts";
import { openFarm } from "./open-farm.ts";
import { refuse } from "./refuse.ts";

export const check: Command = {
  name: "check",
  form: "marl check [PATH…]",
  about: "what is wrong in the farm, or in the files and folders named",
  options: { strict: { type: "boolean", about: "end with 1 for a warning too" } },
  run: async (words, outlet) => {
    const moment = momentOf(words, outlet.clock);
    if ("reason" in moment) return refuse(outlet, moment.reason);
    const format = formatOf(words);
    if (typeof format !== "string") return refuse(outlet, format.reason);
    const opened = await openFarm(words.paths, moment, outlet);
    if ("reason" in opened) return refuse(outlet, opened.reason);
    const { farm, scope } = opened.open;
    const problems = problemsIn(scope, farm);
    if (format === "json") outlet.out(`${JSON.stringify(reportOn(farm, scope), null, 2)}\n`);
    else outlet.out(problemLines(farm, problems, outlet.color));
    return statusOf(problems, words.flag("strict"));
  },
};

/** 1 where something is worse than a warning; with `strict` for a warning too. */
export function statusOf(problems: readonly Problem[], strict: boolean): Status {
  const bad = problems.some(({ severity }) => severity === "error" || (strict && severity === "warning"));
  return bad ? 1 : 0;
}
