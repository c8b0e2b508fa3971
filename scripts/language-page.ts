// Writes docs/language.md: the prose of scripts/language.md, and the language's own tables in its marked places.
import { readFile, writeFile } from "node:fs/promises";
import { parameterTable } from "../grammar/parameters.ts";
import { partTable, statementsWith } from "../grammar/parts.ts";
import { type StatementRow, statementTable } from "../grammar/statements.ts";
import { type SectionKind, sectionKinds } from "../grammar/syntax.ts";
import { unitTable } from "../grammar/units.ts";
import type { Rule } from "../server/checks/rule.ts";
import { codes, rules } from "../server/checks/rules.ts";
import { ambiguousReagents, reagents } from "../server/chemistry/reagents.ts";
import { type Default, defaultLimits, defaults } from "../server/culture/defaults.ts";
import { eventKinds } from "../server/culture/event-order.ts";
import { parameterTopic } from "../server/report/explain/parameters.ts";
import { reagentTopic } from "../server/report/explain/reagents.ts";
import { statementTopic } from "../server/report/explain/statements.ts";
import { unitTopic } from "../server/report/explain/units.ts";
import { code, table } from "./markdown-table.ts";
import { pageName } from "./problem-pages.ts";

export const languagePage = "docs/language.md";
const template = "scripts/language.md";

/** What every standing line or event may have, said once on the page. */
const shared = [/^DATE \[TIME\] /, / \[by WHO\]$/, / \[from DATE \[TIME\]\] \[until DATE \[TIME\]\]$/];
const bareForm = (written: string): string => shared.reduce((form, part) => form.replace(part, ""), written);

/** Words that only ever stand with others say more with them. */
const headings: Readonly<Record<string, string>> = {
  measured: "measured volume",
  skeleton: "skeleton magnesium",
  air: "air CO2",
  light: "light between",
  make: "make up to",
  keep: "keep at",
  acknowledge: "acknowledge caustic",
};

function statementText(row: StatementRow): string {
  const { word, written, meaning, examples, form, sections } = statementTopic(row);
  const isHeader = form === "header";
  const section = isHeader ? "header" : (sections[0] ?? "header");
  return [
    `#### ${headings[word] ?? word}${isHeader ? " (opens the section)" : ""}`,
    meaning,
    ["```", isHeader ? written : bareForm(written), "```"].join("\n"),
    [`\`\`\`marl ${section}`, ...examples.map((line) => (isHeader ? line : `  ${line}`)), "```"].join("\n"),
  ].join("\n\n");
}

/** A statement of more sections than this is told once, for all. */
const fewSections = 2;

function statementsOf(section: SectionKind | "any"): string {
  const rows = statementTable.filter(({ form, word, sections }) => {
    if (section === "any") return sections.length > fewSections;
    if (form === "header") return word === section;
    return sections[0] === section && sections.length <= fewSections;
  });
  return rows.map(statementText).join("\n\n");
}

const parts = (): string =>
  table(
    ["word", "what it adds", "in"],
    partTable.map(({ word, meaning }) => {
      const inside = [...new Set(statementsWith(word).map((row) => row.word))];
      const everywhere = { from: "any standing line", until: "any standing line", by: "any event" } as const;
      const where = everywhere[word as keyof typeof everywhere];
      const listed =
        inside.length > 8
          ? "many"
          : inside.map((other) => (other === "a parameter" ? other : code(other))).join(" ");
      return [code(word), meaning, where ?? listed];
    }),
  );

const range = (pair: readonly [number, number] | null, unit: string): string =>
  pair ? `${pair[0]} to ${pair[1]}${unit && ` ${unit}`}` : "–";

const parameters = (): string =>
  table(
    ["parameter", "usual", "possible", "written in"],
    parameterTable.flatMap(({ name }) => {
      const topic = parameterTopic(name);
      if (!topic) return [];
      const units = topic.units.map(({ unit }) => code(unit)).join(" · ");
      return [
        [
          code(name),
          range(topic.usual, topic.unit),
          range(topic.possible, topic.unit),
          topic.bare ? `no unit · ${units}` : units,
        ],
      ];
    }),
  );

function units(): string {
  const kinds = [...new Set(unitTable.map(({ kind }) => kind))];
  const rows = kinds.flatMap((kind) =>
    unitTable
      .filter((row) => row.kind === kind)
      .map((row) => {
        const topic = unitTopic(row.spelling);
        return [
          kind,
          code(row.spelling),
          row.also.map(code).join(" "),
          (topic?.is ?? []).filter((text) => !/^[a-z]+: /i.test(text)).join("; "),
        ];
      }),
  );
  return table(["kind", "unit", "read too", "what it is"], rows);
}

/** Every unit that a factor turns into a parameter's own, by parameter. */
function conversions(): string {
  const columns = parameterTable.flatMap(({ name, unit }) => {
    const told = new Map((parameterTopic(name)?.units ?? []).map((row) => [row.unit, row.is]));
    return [...told.values()].some((is) => is !== null) ? [{ name, unit, told }] : [];
  });
  const spellings = [...new Set(columns.flatMap(({ told }) => [...told.keys()]))];
  return table(
    ["1 of this is", ...columns.map(({ name, unit }) => `${name}, ${unit}`)],
    spellings.map((unit) => [
      code(unit),
      ...columns.map(({ unit: own, told }) =>
        unit === own ? "1" : (/= (\S+)/.exec(told.get(unit) ?? "")?.[1] ?? ""),
      ),
    ]),
  );
}

const reagentTable = (): string =>
  table(
    ["reagent", "what it is", "formula", "g/mol", "1 g brings"],
    Object.keys(reagents).flatMap((name) => {
      const topic = reagentTopic(name);
      if (!topic) return [];
      const brings = topic.gramBrings.map(({ what, amount }) => `${amount} ${what}`).join(", ");
      return [[code(name), topic.title, topic.formula, String(topic.molarMassGPerMol), brings]];
    }),
  );

const openReagents = (): string =>
  `A bare ${[...ambiguousReagents.keys()].map(code).join(", ")} leaves open how much water the crystals hold, and with it the strength, up to twofold: that is an error that offers each.`;

const defaultTable = (head: string, rows: Readonly<Record<string, Default>>): string =>
  table(
    [head, "taken", "basis"],
    Object.values(rows).map(({ what, text, basis }) => [what, text, basis]),
  );

const problems = (): string =>
  table(
    ["problem", "severity", "title"],
    codes.map((name) => {
      const rule = rules[name] as unknown as Rule;
      const severity = rule.severityInWords ?? (typeof rule.severity === "string" ? rule.severity : "");
      return [`[${name}](problems/${pageName(name)})`, severity, rule.title];
    }),
  );

/** What stands for each mark of the template. */
const marks: ReadonlyMap<string, () => string> = new Map([
  ["section words", () => sectionKinds.map(code).join(", ")],
  ...[...sectionKinds, "any" as const].map(
    (kind) => [`statements ${kind}`, () => statementsOf(kind)] as const,
  ),
  ["parts", parts],
  ["parameters", parameters],
  ["units", units],
  ["conversions", conversions],
  ["reagents", reagentTable],
  ["open reagents", openReagents],
  ["limits", () => defaultTable("limit", defaultLimits)],
  ["defaults", () => defaultTable("otherwise", defaults)],
  ["event order", () => eventKinds.join(", ")],
  ["problems", problems],
]);

/** The anchor that a heading gets: its words in small letters, joined by hyphens. */
export const anchorOf = (heading: string): string =>
  heading
    .toLowerCase()
    .replace(/[^\p{L}\p{N} _-]/gu, "")
    .trim()
    .replaceAll(" ", "-");

function contents(page: string): string {
  const headings = [...page.replace(/```[\s\S]*?```/g, "").matchAll(/^(##|###) (.+)$/gm)];
  return headings
    .map(([, depth, text = ""]) => `${depth === "##" ? "" : "  "}- [${text}](#${anchorOf(text)})`)
    .join("\n");
}

/** The page from its template. */
export function pageFrom(text: string): string {
  const filled = text.replace(/\{\{([a-z ]+)\}\}/g, (mark, name: string) => {
    if (name === "contents") return mark;
    const write = marks.get(name);
    if (!write) throw new Error(`${template}: nothing stands for ${mark}`);
    return write();
  });
  const note = `<!-- Made by scripts/language-page.ts from ${template} and the language's tables; npm run generate rewrites it. -->`;
  return `${note}\n\n${filled.replace("{{contents}}", () => contents(filled))}`;
}

export const page = async (): Promise<string> => pageFrom(await readFile(template, "utf8"));

export async function main(): Promise<void> {
  await writeFile(languagePage, await page());
  console.log(languagePage);
}
