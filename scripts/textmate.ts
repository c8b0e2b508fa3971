// Writes grammar/marl.tmLanguage.json: colouring before the server has answered, from the language's own tables, with
// the scopes that every theme knows.
import { writeFile } from "node:fs/promises";
import { parameterTable } from "../grammar/parameters.ts";
import { partTable } from "../grammar/parts.ts";
import { aParameter, statementTable } from "../grammar/statements.ts";
import { keywords } from "../grammar/tokens.ts";
import { unitTable } from "../grammar/units.ts";
import { reagents } from "../server/chemistry/reagents.ts";

export const grammarFile = "grammar/marl.tmLanguage.json";

const escaped = (word: string): string => word.replace(/[\\^$.*+?()[\]{}|/]/g, "\\$&");

/** One of some words; the longest first, since the first that fits is taken. */
const oneOf = (words: Iterable<string>): string =>
  [...new Set(words)]
    .sort((left, right) => right.length - left.length || (left < right ? -1 : 1))
    .map(escaped)
    .join("|");

/** Names and words hold letters, digits, `_` and `-`. */
const before = "(?<![A-Za-z0-9_-])";
const after = "(?![A-Za-z0-9_-])";
const name = "[A-Za-z][A-Za-z0-9_-]*";

const wordsOf = (form: "header" | "fact" | "event"): string[] =>
  statementTable.flatMap((row) => (row.form === form && row.word !== aParameter ? [row.word] : []));

/** Words that stand inside statements, and those that are the second of two, such as `up` of `make up to`. */
const starting = new Set<string>(statementTable.map(({ word }) => word));
const inside = [
  ...keywords.filter((word) => !starting.has(word)),
  ...partTable.map(({ word }) => word).filter((word) => /^[A-Za-z]/.test(word) && word !== "x"),
];

const parameters = parameterTable.map(({ name: parameter }) => parameter);
const units = unitTable.flatMap(({ spelling, also }) => [spelling, ...also]);
const unit = `(?:${oneOf(units)})(?:/(?:${oneOf(units)}))*`;
const number = "[-+−]?\\d+(?:\\.\\d+)?";

const scoped = (match: string, scope: string) => ({ match, name: `${scope}.marl` });

/** A statement's word with the name that it declares or speaks of. */
const declaring = ["tank", "displace", "cohort", "pump"];

export const grammar = {
  name: "Marl",
  scopeName: "source.marl",
  fileTypes: ["marl"],
  patterns: [
    { include: "#comment" },
    { include: "#text" },
    { include: "#header" },
    { include: "#use" },
    { include: "#conflict" },
    { include: "#moment" },
    { include: "#declaration" },
    { include: "#formula" },
    { include: "#quantity" },
    { include: "#statement" },
    { include: "#parameter" },
    { include: "#reagent" },
    { include: "#part" },
    { include: "#sign" },
  ],
  repository: {
    comment: {
      patterns: [
        {
          match: "(#\\s*)(quiet(?:\\s+file)?:)([^#]*)(.*)$",
          name: "comment.line.number-sign.marl",
          captures: { 2: { name: "keyword.other.quiet.marl" } },
        },
        scoped("#.*$", "comment.line.number-sign"),
      ],
    },
    text: {
      patterns: [
        scoped('"[^"]*"|[“”„][^“”„"]*[“”"]|"[^"“”]*[“”]', "string.quoted.double"),
        // One that isn't closed ends with its line.
        scoped('["“”„].*$', "invalid.illegal.unclosed"),
      ],
    },
    header: {
      match: `^(${oneOf(wordsOf("header").filter((word) => word !== "use"))})${after}(?:\\s+(${name}))?`,
      captures: {
        1: { name: "keyword.control.section.marl" },
        2: { name: "entity.name.section.marl" },
      },
    },
    use: { match: `^\\s*(use)${after}`, captures: { 1: { name: "keyword.control.import.marl" } } },
    conflict: scoped("^(?:<{7}|\\|{7}|={7}|>{7})(?=\\s|$).*$", "invalid.illegal.conflict"),
    moment: {
      patterns: [
        scoped(`${before}\\d{4}-\\d{2}-\\d{2}(?:[ T]\\d{1,2}:\\d{2})?${after}`, "constant.numeric.date"),
        scoped(`${before}\\d{1,2}:\\d{2}${after}`, "constant.numeric.time"),
      ],
    },
    declaration: {
      match: `(^\\s+)(${oneOf(declaring)})\\s+(${name})`,
      captures: {
        2: { name: "keyword.control.statement.marl" },
        3: { name: "variable.other.declaration.marl" },
      },
    },
    formula: {
      match: `(^\\s+)(formula)\\s+([^\\s#"]+)`,
      captures: {
        2: { name: "keyword.control.statement.marl" },
        3: { name: "constant.other.formula.marl" },
      },
    },
    quantity: {
      match: `${before}(${number})(?:\\s*(${unit})${after})?`,
      captures: {
        1: { name: "constant.numeric.marl" },
        2: { name: "keyword.other.unit.marl" },
      },
    },
    /** A statement's word stands first in its line, or right behind the date. */
    statement: {
      match: `(?:(^\\s+)|(?<=\\d{4}-\\d{2}-\\d{2} |\\d:\\d{2} ))(${oneOf([...wordsOf("fact"), ...wordsOf("event")])})${after}`,
      captures: { 2: { name: "keyword.control.statement.marl" } },
    },
    parameter: scoped(`${before}(?:${oneOf(parameters)})${after}`, "variable.other.property"),
    reagent: scoped(`${before}(?:${oneOf(Object.keys(reagents))})${after}`, "support.constant.reagent"),
    part: {
      patterns: [
        scoped(`${before}as\\s+CaCO3${after}`, "keyword.other.unit"),
        scoped(`${before}(?:${oneOf(inside)})${after}`, "keyword.control.part"),
      ],
    },
    sign: {
      patterns: [
        scoped("±|\\+/?[-−]", "keyword.operator"),
        scoped("(?<=\\s)(?:x|×)(?=\\s)", "keyword.operator"),
        scoped(",", "punctuation.separator"),
      ],
    },
  },
};

export const grammarText = (): string => `${JSON.stringify(grammar, null, 2)}\n`;

export async function main(): Promise<void> {
  await writeFile(grammarFile, grammarText());
  console.log(grammarFile);
}
