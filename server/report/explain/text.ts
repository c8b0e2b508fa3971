/** Topics as text for a terminal: at most 100 columns, but for lines of Marl, which stand as they are. */
import { allOf } from "../../checks/words.ts";
import { paintIf, wrapped } from "../text.ts";
import type { ParameterTopic } from "./parameters.ts";
import type { ExampleFile, ProblemTopic } from "./problems.ts";
import type { ReagentTopic } from "./reagents.ts";
import type { PartTopic, StatementTopic } from "./statements.ts";
import type { Topic } from "./topics.ts";
import type { UnitTopic } from "./units.ts";

interface Page {
  readonly title: string;
  /** What kind of word it is. */
  readonly is: string;
  readonly lines: readonly string[];
}

export function topicText(topics: readonly Topic[], color: boolean): string {
  const paint = paintIf(color);
  return topics
    .map((topic) => {
      const { title, is, lines } = pageOf(topic);
      return `${[`${paint("bold", title)}${is && `  ${paint("dim", is)}`}`, ...lines].join("\n")}\n`;
    })
    .join("\n");
}

function pageOf(topic: Topic): Page {
  switch (topic.kind) {
    case "problem":
      return problemPage(topic);
    case "statement":
      return statementPage(topic);
    case "part":
      return partPage(topic);
    case "parameter":
      return parameterPage(topic);
    case "unit":
      return unitPage(topic);
    case "reagent":
      return reagentPage(topic);
  }
}

const paragraph = (text: string): string[] => wrapped(text, 2);
const marl = (lines: readonly string[]): string[] => lines.map((line) => `    ${line}`.trimEnd());
const examples = (lines: readonly string[]): string[] =>
  lines.length === 0 ? [] : ["  For example:", ...marl(lines)];

function problemPage({ code, title, severity, says, why, todo, background, ...example }: ProblemTopic): Page {
  const { fires, silent, also } = example;
  const part = (heading: string, text: string) => ["", `  ${heading}`, ...wrapped(text, 4)];
  return {
    title: code,
    is: "a problem",
    lines: [
      ...paragraph(`${title}.`),
      ...paragraph(`Severity: ${severity}.`),
      ...part("What it says", says),
      ...part("Why it matters", why),
      ...part("What to do", todo),
      ...(background ? part("Background", background) : []),
      ...(fires.length > 0
        ? [
            "",
            `  This is told of${also ? ` (with it comes ${also})` : ""}:`,
            ...farmLines(fires),
            "",
            "  This isn't:",
            ...farmLines(silent),
          ]
        : []),
    ],
  };
}

function farmLines(files: readonly ExampleFile[]): string[] {
  return files.flatMap(({ file, text }, index) => [
    ...(files.length > 1 ? [...(index > 0 ? [""] : []), `    # ${file}`] : []),
    ...marl(text.trimEnd().split("\n")),
  ]);
}

const sectionName = (sections: readonly string[]): string =>
  sections.length > 1 ? `${allOf(sections)} sections` : `a ${sections.join("")} section`;

function statementPage({
  form,
  word,
  written,
  sections,
  meaning,
  examples: lines,
  holds,
}: StatementTopic): Page {
  const kinds = {
    header: word === "use" ? "a line at the margin" : "opens a section",
    fact: `a standing line of ${sectionName(sections)}`,
    event: `an event of ${sectionName(sections)}`,
  };
  return {
    title: word,
    is: kinds[form],
    lines: [
      ...paragraph(written),
      ...paragraph(meaning),
      ...(holds.length > 0 ? paragraph(`Its lines begin with: ${holds.join(", ")}.`) : []),
      ...examples(lines),
    ],
  };
}

const partPage = ({ word, meaning, statements, examples: lines }: PartTopic): Page => ({
  title: word,
  is: "a word inside statements",
  lines: [...paragraph(meaning), ...paragraph(`Stands in: ${statements.join(", ")}.`), ...examples(lines)],
});

function parameterPage(topic: ParameterTopic): Page {
  const { parameter, unit, possible, usual, bare, units, limits, otherwise } = topic;
  const range = ([low, high]: readonly [number, number]) => `${low} to ${high}${unit && ` ${unit}`}`;
  const shown = units.map((row) => row.unit);
  const conversions = units.flatMap(({ is }) => (is ? [is] : []));
  return {
    title: parameter,
    is: "a parameter",
    lines: [
      ...(usual ? paragraph(`Usual: ${range(usual)}. Outside this a value is asked about.`) : []),
      ...(possible
        ? paragraph(`Possible: ${range(possible)}. Outside this a reading is left out of every estimate.`)
        : []),
      ...paragraph(
        parameter === "pH"
          ? "Written bare, or with total after it."
          : `Written ${bare ? "bare or " : ""}in ${shown.join(", ")}.`,
      ),
      ...conversions.map((text) => `    ${text}`),
      ...(otherwise
        ? paragraph(
            `Where nothing says it, ${otherwise.what} is taken as ${otherwise.value} (${otherwise.basis}).`,
          )
        : []),
      ...(limits.length > 0
        ? [
            "  Where no limit is written:",
            ...limits.map(({ limit, value, basis }) => `    ${limit} ${value} (${basis})`),
          ]
        : []),
    ],
  };
}

function unitPage({ unit, also, is, measures, counts }: UnitTopic): Page {
  return {
    title: unit,
    is: "a unit",
    lines: [
      ...(also.length > 0 ? paragraph(`Read too, and tidied: ${also.join(", ")}.`) : []),
      ...(measures.length > 0
        ? paragraph(`Measures ${allOf(measures)}.`)
        : paragraph(`Counts an ${counts}; joined with / it makes others, such as ${unit}/L.`)),
      ...is.flatMap((text) => wrapped(`${text}.`, 4)),
    ],
  };
}

const reagentPage = ({ reagent, title, formula, molarMassGPerMol, gramBrings }: ReagentTopic): Page => ({
  title: reagent,
  is: "a built-in reagent",
  lines: [
    ...paragraph(`${title}, ${formula}, ${molarMassGPerMol} g/mol.`),
    ...paragraph(`1 g brings ${allOf(gramBrings.map(({ what, amount }) => `${amount} of ${what}`))}.`),
  ],
});
