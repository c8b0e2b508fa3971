/** Doses of the log that broke a limit, however old they are. */

import type { Files } from "../culture/names.ts";
import { type Dosed, dosed } from "../dosing/tracked.ts";
import { changeBeside, edgeFigure, figure, valueBeside } from "./figures.ts";
import { doseSplit, ratesSet } from "./mending.ts";
import type { LineFix } from "./problem.ts";
import type { Example, Of, Rule, Rules } from "./rule.ts";
import { atStart } from "./words.ts";

type DosedCode = `overdose/${Dosed}-${"rise" | "dose" | "max"}`;
type OfDosed = Of<DosedCode>;

/** Where the file states no limit, the default is named as such. */
const byDefault = ({ limitStated }: OfDosed): string => (limitStated ? "" : ", by default");

/** A rate is set anew; a dose that isn't long past is given in parts. */
const mended = (finding: OfDosed, files: Files): readonly LineFix[] =>
  finding.solution === null
    ? finding.remedies
      ? ratesSet(finding.system, finding.remedies, files)
      : []
    : doseSplit(finding, files);

/** A farm whose log has one dose by hand; strength and limits so that nothing else is wrong with it. */
const oneDose = (supplies: string, facts: string, reading: string, dose: string): string =>
  [
    "system vat",
    "  tank main 1000 L",
    ...facts.split("\n").map((fact) => `  ${fact}`),
    "  by-hand part",
    "",
    "solution part",
    `  supplies ${supplies}`,
    "",
    "log vat",
    `  2026-11-30 07:00 read ${reading}`,
    `  2026-11-30 08:00 gave part ${dose}`,
    "",
  ].join("\n");

interface Sample {
  /** Ten times as much in a millilitre as the dose's litre gives a litre of water. */
  readonly supplies: string;
  readonly unit: string;
  readonly usual: string;
  readonly nearMax: string;
  readonly max: string;
  readonly large: string;
  readonly small: string;
  readonly limit: string;
}

const samples: Readonly<Record<Dosed, Sample>> = {
  alkalinity: {
    supplies: "alkalinity 1 meq/mL as bicarbonate",
    unit: "meq/L",
    usual: "2.5",
    nearMax: "3.2",
    max: "3.25",
    large: "150 mL",
    small: "40 mL",
    limit: "0.1",
  },
  calcium: {
    supplies: "calcium 100 mg/mL",
    unit: "mg/L",
    usual: "420",
    nearMax: "440",
    max: "445",
    large: "150 mL",
    small: "40 mL",
    limit: "10",
  },
  magnesium: {
    supplies: "magnesium 100 mg/mL",
    unit: "mg/L",
    usual: "1300",
    nearMax: "1390",
    max: "1395",
    large: "150 mL",
    small: "40 mL",
    limit: "10",
  },
  potassium: {
    supplies: "potassium 100 mg/mL",
    unit: "mg/L",
    usual: "400",
    nearMax: "440",
    max: "445",
    large: "150 mL",
    small: "40 mL",
    limit: "10",
  },
  strontium: {
    supplies: "strontium 10 mg/mL",
    unit: "mg/L",
    usual: "8",
    nearMax: "12",
    max: "12.5",
    large: "80 mL",
    small: "40 mL",
    limit: "0.5",
  },
};

function exampleOf(parameter: Dosed, which: "rise" | "dose" | "max"): Example {
  const { supplies, unit, usual, nearMax, max, large, small, limit } = samples[parameter];
  const uptake = `uptake ${parameter} 0 ${unit}/day`;
  const reading = `${parameter} ${which === "max" ? nearMax : usual} ${unit}`;
  const facts = {
    rise: `${uptake}\nlimit ${parameter} rise ${limit} ${unit}/day\nlimit ${parameter} dose ${Number(limit) * 5} ${unit}`,
    dose: `limit ${parameter} dose ${limit} ${unit}`,
    max: `limit ${parameter} max ${max} ${unit}\nlimit ${parameter} dose ${Number(limit) * 5} ${unit}`,
  }[which];
  // A second reading stands for what was done about it.
  const later = which === "max" ? `  2026-11-30 20:00 read ${reading}\n` : "";
  return {
    fires: oneDose(supplies, facts, reading, large) + later,
    silent: oneDose(supplies, facts, reading, small),
  };
}

const dosedRule = (parameter: Dosed) => ({
  rise: {
    severity: "warning",
    title: `More ${parameter} in a day than the system allows`,
    says: (finding: OfDosed) => {
      const { value, limit, unit, solution } = finding;
      const rise = changeBeside(parameter, value, limit, unit);
      const most = edgeFigure(parameter, limit, unit);
      return solution === null
        ? `As set from here on, ${parameter} rises by ${rise} a day; the limit is ${most} a day${byDefault(finding)}.`
        : `With this dose ${parameter} rises by ${rise} within a day; the limit is ${most} a day${byDefault(finding)}.`;
    },
    why: "Corals follow a slow change of their water, and suffer from a fast one.",
    todo: "Spread it over more days.",
    todoHere: ({ solution }: OfDosed) =>
      solution === null ? "Set less, and reach the aim over more days." : "Spread it over more days.",
    fixes: mended,
    background: riseBackground[parameter],
    example: exampleOf(parameter, "rise"),
  },
  dose: {
    severity: "warning",
    title: `More ${parameter} in one dose than the system allows`,
    says: (finding: OfDosed) => {
      const { value, limit, unit } = finding;
      return `This raised ${parameter} by ${changeBeside(parameter, value, limit, unit)} at once; the limit is ${edgeFigure(parameter, limit, unit)}${byDefault(finding)}.`;
    },
    why:
      parameter === "alkalinity"
        ? "A sudden rise stresses coral tissue and can set off precipitation."
        : "A sudden rise stresses coral tissue.",
    todo: "Split it over several deliveries.",
    fixes: mended,
    background:
      parameter === "alkalinity"
        ? "Without a `limit alkalinity dose` line 0.5 dKH by hand and 0.2 dKH by pump are taken: common practice, no source."
        : `There is no default: told only where the system has a \`limit ${parameter} dose\` line.`,
    example: exampleOf(parameter, "dose"),
  },
  max: {
    severity: "error",
    title: `${atStart(parameter)} dosed above its limit`,
    says: (finding: OfDosed) => {
      const { value, limit, unit } = finding;
      return `This brought ${parameter} to ${valueBeside(parameter, value, [limit], unit)}; the limit is ${edgeFigure(parameter, limit, unit)}${byDefault(finding)}.`;
    },
    why: "Beyond a limit not growth but lives are at risk.",
    todo: `Test ${parameter}, and dose nothing that raises it until it is below.`,
    fixes: mended,
    background: maxBackground[parameter],
    example: exampleOf(parameter, "max"),
  },
});

const practice = "common practice, no source";
const riseBackground: Readonly<Record<Dosed, string>> = {
  alkalinity: `Without a \`limit alkalinity rise\` line 0.7 dKH a day is taken: ${practice}. A rise is a change of the mean of 24 hours; what the corals take meanwhile is counted.`,
  calcium: `Without a \`limit calcium rise\` line 25 mg/L a day is taken: ${practice}.`,
  magnesium: `Without a \`limit magnesium rise\` line 75 mg/L a day is taken: ${practice}.`,
  potassium: `Without a \`limit potassium rise\` line 15 mg/L a day is taken: ${practice}.`,
  strontium: `Without a \`limit strontium rise\` line 1 mg/L a day is taken: ${practice}.`,
};
const maxBackground: Readonly<Record<Dosed, string>> = {
  alkalinity: `Without a \`limit alkalinity max\` line 12 dKH is taken: ${practice}.`,
  calcium: `Without a \`limit calcium max\` line 500 mg/L is taken: ${practice}.`,
  magnesium: `Without a \`limit magnesium max\` line 1600 mg/L is taken: ${practice}.`,
  potassium: `Without a \`limit potassium max\` line 480 mg/L is taken: ${practice}.`,
  strontium: `Without a \`limit strontium max\` line 14 mg/L is taken: ${practice}.`,
};

/** Three rules for each of what is dosed. */
const dosedRules = Object.fromEntries(
  dosed.flatMap((parameter) =>
    Object.entries(dosedRule(parameter)).map(([which, rule]) => [`overdose/${parameter}-${which}`, rule]),
  ),
) as unknown as Rules<DosedCode>;

type Precipitation = Of<"overdose/precipitation">;

const precipitationWhy: Readonly<Record<Precipitation["grade"], string>> = {
  info: "From Ω 7 fresh grains and dirty surfaces can set off precipitation that takes out more than was given.",
  warning: "From about Ω 12 carbonate begins to fall out of clear water, and takes out more than was given.",
  error: "Above Ω 30 or pH 10 it precipitates within hours, with magnesium hydroxide first.",
};

const precipitation: Rule<"overdose/precipitation"> = {
  severity: ({ grade }) => grade,
  severityInWords: "info from Ω 7, warning from Ω 12, error from Ω 30 or pH 10",
  title: "A dose that can make carbonate fall out",
  says: ({ omega, pH }) =>
    `Right after this dose Ω of aragonite was ${figure(omega, "Ω")} and pH ${figure(pH, "pH")}.`,
  why: "What falls out takes calcium and alkalinity with it, clouds the water and clogs pumps and heaters.",
  whyHere: ({ grade }) => precipitationWhy[grade],
  todo: "Give less at a time, slowly, diluted, into strong flow.",
  todoHere: ({ grade }) =>
    grade === "info"
      ? "Give it slowly, diluted, into strong flow."
      : "Give less at a time, slowly, diluted, into strong flow.",
  background: [
    "Ω and pH are those of the mixed water right after the dose, before CO2 can come in from the air. At the point of dosing they are far higher.",
    "Ω 7: aragonite precipitated on grains, and more alkalinity went than was added (Moras et al. 2022, Biogeosciences 19, 3537–3557).",
    "Ω 12: about 12.3 is where carbonate forms in clear sea water (Marion et al. 2009, Ocean Science 5, 285–291, from memory).",
    "Ω 30 or pH 10: sodium hydroxide in sea water precipitated above these (Ringham et al. 2024, Biogeosciences 21, 3551–3570).",
  ].join("\n\n"),
  example: {
    fires: oneDose(
      "alkalinity 1 meq/mL as carbonate",
      "limit alkalinity dose 3 meq/L\nlimit pH max 9.5\nlimit pH dose 1",
      "alkalinity 2.5 meq/L, salinity 35, temperature 25 degC, pH 8.2",
      "700 mL",
    ),
    silent: oneDose(
      "alkalinity 1 meq/mL as carbonate",
      "limit alkalinity dose 3 meq/L\nlimit pH max 9.5\nlimit pH dose 1",
      "alkalinity 2.5 meq/L, salinity 35, temperature 25 degC, pH 8.2",
      "70 mL",
    ),
  },
};

const pH: Rule<"overdose/ph"> = {
  severity: "error",
  title: "A dose that raised pH above what the system allows",
  says: ({ before, after, limit, of }) => {
    const unit = { spelling: "", perModelUnit: 1 };
    return of === "max"
      ? `This brought pH from ${figure(before, "pH")} to ${valueBeside("pH", after, [limit], unit)}; the limit is ${edgeFigure("pH", limit, unit)}.`
      : `This raised pH by ${changeBeside("pH", after - before, limit, unit)} at once, to ${figure(after, "pH")}; the limit is ${edgeFigure("pH", limit, unit)}.`;
  },
  why: "Carbonate and hydroxide raise pH right away, before CO2 from the air brings it down again.",
  todo: "Split it over several deliveries, or give it slowly through the day.",
  background:
    "Without `limit pH max` and `limit pH dose` lines 8.6 (NBS) and a step of 0.1 are taken: common practice, no source. The step counts for the whole water, mixed.",
  example: {
    fires: oneDose(
      "alkalinity 1 meq/mL as hydroxide",
      "limit alkalinity dose 1 meq/L",
      "alkalinity 2.5 meq/L, salinity 35, temperature 25 degC, pH 8.1",
      "150 mL",
    ),
    silent: oneDose(
      "alkalinity 1 meq/mL as hydroxide",
      "limit alkalinity dose 1 meq/L",
      "alkalinity 2.5 meq/L, salinity 35, temperature 25 degC, pH 8.1",
      "30 mL",
    ),
  },
};

export const overdoseRules: Rules<DosedCode | "overdose/ph" | "overdose/precipitation"> = {
  ...dosedRules,
  "overdose/ph": pH,
  "overdose/precipitation": precipitation,
};
