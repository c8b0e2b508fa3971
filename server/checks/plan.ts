/** What the plan couldn't do as wished, and what is worth knowing about how it doses. */
import type { Files } from "../culture/names.ts";
import { changeFigure, doseFigure } from "./figures.ts";
import type { LineFix } from "./problem.ts";
import type { Of, Rules } from "./rule.ts";
import { linesAtEnd, sectionAt, sees } from "./sections.ts";
import { atStart, isParameter, nameOf } from "./words.ts";

type Obstacle = Of<"plan/held-back" | "plan/no-source" | "plan/passive-breach">;

const perDay = ({ parameter, perDay: amount, unit }: Obstacle): string | null =>
  amount === null ? null : `${changeFigure(parameter, amount, unit)} a day`;

/** How far beyond: of a greatest or least value, after a day. */
const excess = ({ by, parameter, perDay: amount, unit }: Obstacle): string =>
  `${changeFigure(parameter, amount ?? 0, unit)} ${/ (max|min)$/.test(by) ? "within a day" : "a day"}`;

/** A source's name out of `head-1 hours`, `hand ash-part dose`. */
const sourceOf = (by: string): string => {
  const words = by.split(" ").slice(0, -1);
  return words[0] === "hand" ? `${nameOf(words[1] ?? "")} by hand` : words.join(" ");
};

/** Nothing at all is corrected for this, where a limit only slows it down. */
const isWithheld = (by: string): boolean => /^(magnesium under|calcium over) /.test(by);

/** What stands in the way, in words. */
function reason(by: string): string {
  if (/^(magnesium under|calcium over) /.test(by)) return by.replace(/^(magnesium|calcium)/, "$1 is");
  if (by === "sea water") return "more of it at once would be no sea water any more";
  if (by.startsWith("Ω")) return `one dose may bring Ω of aragonite to ${by.slice(2)} at most`;
  const limit = limitIn(by);
  if (limit) return `the limit on ${limit} stands in the way`;
  if (by.endsWith(" hours")) return `${sourceOf(by)} can't give more in its hours`;
  if (by.endsWith(" least")) return `the smallest dose of ${sourceOf(by)} is more than one dose may be`;
  return by.endsWith(" dose") ? `${sourceOf(by)} can't give more in its doses` : by;
}

/** `alkalinity rise` where this is the name of a limit; `head-1 dose` is none. */
const limitIn = (by: string): string | null => {
  const [limit, parameter] = /^(\S+) (?:rise|fall|max|min|dose)$/.exec(by) ?? [];
  return limit !== undefined && isParameter(parameter ?? "") ? limit : null;
};

function heldBackTodo({ by }: Obstacle): string {
  const first = /^(magnesium under|calcium over) /.exec(by);
  if (first) return by.startsWith("magnesium") ? "Raise magnesium first." : "Let calcium come down first.";
  if (by.endsWith(" least")) return "Dilute the solution, or give it by hand or with a finer pump.";
  if (by.endsWith(" max")) return "Move the aim below the limit, or the limit above the aim.";
  if (by.endsWith(" hours")) return "Give the pump more hours or a faster head, or make a stronger solution.";
  return /^(Ω|sea water)| dose$|^pH /.test(by)
    ? "Spread it over more and smaller doses, or add a pump."
    : "Nothing needs to be done while it stays in its band: it takes more days.";
}

const mostSolutions = 3;

/** A hand dose of each solution that the file sees and that holds it. */
function handDoses({ place, solutions }: Of<"plan/no-source">, files: Files): readonly LineFix[] {
  const document = files.get(place.file);
  const section = sectionAt(files, place);
  if (!document || section?.kind !== "system" || !solutions) return [];
  const seen = solutions.filter((ref) => sees(files, place.file, "solution", ref));
  return seen.slice(0, mostSolutions).map((ref) => {
    const text = `by-hand ${nameOf(ref)}`;
    return { title: `Add ${text}`, safe: false, edits: [linesAtEnd(document, place.file, section, [text])] };
  });
}

const vat = (facts: string, log: string) =>
  `system vat\n  tank main 1000 L\n  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0.3 dKH/day\n${facts}\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL as bicarbonate\n\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH\n${log}`;

const pump = "  pump head-1 gives ash-part at 40 mL/min\n";
const set = "  2026-12-01 07:00 set head-1 67 mL/day\n";

/** A sixth of the other examples' uptake, and of what is set. */
const small = (text: string): string => (text === "0.3 dKH" ? "0.05 dKH" : "11 mL");

export const planRules: Rules<
  "plan/held-back" | "plan/no-source" | "plan/passive-breach" | "plan/every-other-day"
> = {
  "plan/held-back": {
    severity: "warning",
    title: "A parameter that can't be given as much as it needs",
    says: (finding) => {
      const amount = perDay(finding);
      const parameter = atStart(finding.parameter);
      return amount === null || isWithheld(finding.by)
        ? `${parameter} isn't corrected: ${reason(finding.by)}.`
        : `${parameter} moves ${amount} slower than it should: ${reason(finding.by)}.`;
    },
    why: "Until then it stays away from its aim.",
    todo: "Do first what the message names, or leave it: with a limit in the way it takes more days.",
    todoHere: heldBackTodo,
    background:
      "A correction takes 7 days from inside the band and a day from outside, cut down to what the limits allow. Alkalinity isn't raised while magnesium is under 1150 mg/L or calcium over 480 mg/L. All of this is common practice without a source.",
    example: {
      fires: vat(pump.replace("40 mL/min", "0.03 mL/min"), set.replace("67", "43")).replace(
        "7.5 to 8.5",
        "6.5 to 9.5",
      ),
      silent: vat(pump, set),
    },
  },
  "plan/no-source": {
    severity: "warning",
    title: "A parameter that nothing raises",
    says: (finding) =>
      `No pump or hand dose of this system raises ${finding.parameter}; ${perDay(finding) ?? "some of it"} is needed.`,
    why: "It falls for as long as corals take it.",
    todo: "Add a pump or by-hand line with a solution that holds it, or leave out its hold line.",
    fixes: handDoses,
    example: {
      fires:
        "system vat\n  tank main 1000 L\n  hold alkalinity 6.5 to 9.5 dKH\n  uptake alkalinity 0.1 dKH/day\n\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH\n",
      silent: vat(pump, set),
    },
  },
  "plan/passive-breach": {
    severity: "warning",
    title: "A limit that breaks whatever is planned",
    says: (finding) => `Whatever is planned, the limit on ${finding.by} is passed by ${excess(finding)}.`,
    why: "Uptake, exchange water or a dose that always runs do it by themselves.",
    todo: "Check the always rates, the water that comes in, and the uptake that is stated.",
    example: {
      fires:
        "system vat\n  tank main 1000 L\n  hold alkalinity 6.5 to 9.5 dKH\n  uptake alkalinity 0.3 dKH/day\n  limit alkalinity rise 0.1 dKH/day\n  pump head-1 gives ash-part at 40 mL/min always 100 mL/day\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL as bicarbonate\n\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH\n",
      silent: vat(pump, set),
    },
  },
  "plan/every-other-day": {
    severity: "info",
    title: "A dose too small for every day",
    says: ({ source, solution, everyDays, litresPerDose, leastL }) =>
      source === "hand"
        ? `${nameOf(solution)} is given by hand every ${everyDays} days, ${doseFigure(litresPerDose)} each time.`
        : `${source} runs every ${everyDays} days, ${doseFigure(litresPerDose)} each time: it repeats no dose under ${doseFigure(leastL)}.`,
    why: "A pump's smallest doses are off by too much to be counted on.",
    todo: "Nothing needs to be done; for a dose every day dilute the solution.",
    background:
      "Without `least` on its line a pump's smallest dose is taken as 1 mL: common practice, no source.",
    example: {
      fires: vat(pump.replace("mL/min", "mL/min least 20 mL"), set).replace(/0\.3 dKH|67 mL/g, small),
      silent: vat(pump, set),
    },
  },
};
