/** `marl check`: what is wrong in a farm, or in some of its files. */
import type { Problem } from "../checks/problem.ts";
import { problemLines } from "../report/problem-lines.ts";
import { reportOn } from "../report/report.ts";
import { problemsIn } from "../report/scope.ts";
import { type Command, formatOf, momentOf, type Status } from "./command.ts";
import { fixFarm, fixText } from "./fix.ts";
import { openFarm } from "./open-farm.ts";
import { refuse } from "./refuse.ts";

export const check: Command = {
  name: "check",
  form: "marl check [PATH…] [--fix]",
  about: "what is wrong in the farm, or in the files and folders named",
  options: {
    strict: { type: "boolean", about: "end with 1 for a warning too" },
    fix: { type: "boolean", about: "first mend, in the files, what can have meant one thing only" },
  },
  run: async (words, outlet) => {
    const moment = momentOf(words, outlet.clock);
    if ("reason" in moment) return refuse(outlet, moment.reason);
    const format = formatOf(words);
    if (typeof format !== "string") return refuse(outlet, format.reason);
    const opened = await openFarm(words.paths, moment, outlet);
    if ("reason" in opened) return refuse(outlet, opened.reason);
    const { scope } = opened.open;
    let { farm } = opened.open;
    if (words.flag("fix")) {
      const fixed = await fixFarm(opened.open);
      // Standard output stays empty where it ends with 2, and one JSON object where that is asked for.
      const say = format === "json" || fixed.failed !== null ? outlet.error : outlet.out;
      for (const note of fixed.done) say(fixText(note));
      for (const note of fixed.skipped) say(`left: ${fixText(note)}`);
      if (fixed.failed !== null) return refuse(outlet, fixed.failed);
      if (fixed.done.length > 0 && format !== "json") outlet.out("\n");
      farm = fixed.farm;
    }
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
