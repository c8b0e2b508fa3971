/** What a statement says, in which section it stands and how it is written; likewise a word inside statements. */
import { formOf } from "../../../grammar/form.ts";
import type { ParameterName } from "../../../grammar/parameters.ts";
import { linesWith, partOf, statementsWith } from "../../../grammar/parts.ts";
import { aParameter, rowsOf, type StatementRow, statementTable } from "../../../grammar/statements.ts";
import type { SectionKind } from "../../../grammar/syntax.ts";

export interface StatementTopic {
  readonly kind: "statement";
  /** A header opens a section, a fact stands, an event is dated. */
  readonly form: StatementRow["form"];
  readonly word: string;
  /** `hold PARAMETER q to q [aim q] …`. */
  readonly written: string;
  readonly sections: readonly SectionKind[];
  readonly meaning: string;
  readonly examples: readonly string[];
  /** Of a header: the words that its section's lines begin with. */
  readonly holds: readonly string[];
}

export interface PartTopic {
  readonly kind: "part";
  readonly word: string;
  readonly meaning: string;
  /** The words that lines with it begin with. */
  readonly statements: readonly string[];
  readonly examples: readonly string[];
}

export function statementTopic(row: StatementRow): StatementTopic {
  return {
    kind: "statement",
    form: row.form,
    word: row.word,
    written: formOf(row),
    sections: row.sections,
    meaning: row.meaning,
    examples: row.examples,
    holds: row.form === "header" ? wordsIn(row.word as SectionKind) : [],
  };
}

const wordsIn = (section: SectionKind): string[] => [
  ...new Set(statementTable.filter(({ sections }) => sections.includes(section)).map(({ word }) => word)),
];

/** A form without its date, which every event starts with. */
const undated = (row: StatementRow): string => formOf(row).replace(/^DATE \[TIME\] /, "");

/** Statements that begin with this word, or with these words: `measured volume`. */
export function statementTopics(words: string): StatementTopic[] {
  const rows = words === aParameter ? [] : rowsOf(words);
  const found =
    rows.length > 0 || !words.includes(" ")
      ? rows
      : statementTable.filter((row) => undated(row).startsWith(`${words} `));
  return found.map(statementTopic);
}

/** Statements that begin with this parameter's name. */
export const parameterStatements = (parameter: ParameterName): StatementTopic[] =>
  rowsOf(aParameter)
    .map(statementTopic)
    .map((topic) => ({
      ...topic,
      word: parameter,
      written: topic.written.replace("PARAMETER", parameter),
      examples: topic.examples.filter((line) => line.startsWith(`${parameter} `)),
    }));

/** Few examples show a word well enough. */
const mostExamples = 3;

export function partTopic(word: string): PartTopic | null {
  const part = partOf(word);
  if (!part) return null;
  return {
    kind: "part",
    word: part.word,
    meaning: part.meaning,
    statements: [...new Set(statementsWith(part.word).map((row) => row.word))],
    examples: linesWith(part.word)
      .slice(0, mostExamples)
      .map(({ line }) => line),
  };
}
