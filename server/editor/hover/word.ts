/** Words of the language: what each means, its form, an example; dates; codes of problems in comments. */
import { dayMinute, writeDate } from "../../../grammar/dates.ts";
import { linesWith, partOf } from "../../../grammar/parts.ts";
import { type StatementRow, statementTable } from "../../../grammar/statements.ts";
import type { SectionKind, Span, Statement } from "../../../grammar/syntax.ts";
import { type Code, rules } from "../../checks/rules.ts";
import { allOf, dayText } from "../../checks/words.ts";
import { isCode } from "../../report/explain/problems.ts";
import { type StatementTopic, statementTopic } from "../../report/explain/statements.ts";
import { type Topic, topicsOf } from "../../report/explain/topics.ts";
import type { UnderCursor } from "../under-cursor.ts";
import { daysApart, type Told } from "./parts.ts";

/** The row of the table that a statement of a section is an instance of. */
export function rowOf(statement: Statement, section: SectionKind | null, word: string): StatementRow | null {
  const isHere = ({ sections, form }: StatementRow) =>
    form === "header" || (section !== null && sections.includes(section));
  const isDated = "at" in statement;
  const rows = statementTable.filter(
    (row) => row.word === word && isHere(row) && (row.form === "event") === isDated,
  );
  return rows[0] ?? null;
}

const mostExamples = 2;
const fewStatements = 8;

function statementText({ written, meaning, examples, form, holds }: StatementTopic): Told {
  const held = form === "header" && holds.length > 0 ? [`Its lines begin with: ${holds.join(", ")}.`] : [];
  return { answer: meaning, blocks: [held], form: written, marl: examples.slice(0, mostExamples) };
}

/** A statement in the words of the language; of a word that several share, that of this section. */
export const rowTold = (row: StatementRow): Told => statementText(statementTopic(row));

const byKind: { readonly [K in Topic["kind"]]: (topic: Extract<Topic, { readonly kind: K }>) => Told } = {
  problem: ({ title, why }) => ({ answer: `${title}.`, blocks: [[why]] }),
  statement: statementText,
  part: ({ meaning, statements, examples }) => ({
    answer: meaning,
    // A word that stands nearly everywhere needs no list.
    blocks: [statements.length <= fewStatements ? [`Stands in: ${statements.join(", ")}.`] : []],
    marl: examples.slice(0, mostExamples),
  }),
  parameter: ({ usual, possible, unit, units, bare, otherwise }) => {
    const range = ([low, high]: readonly [number, number]) => `${low} to ${high}${unit && ` ${unit}`}`;
    const written = units.map((each) => each.unit).join(", ");
    return {
      answer: usual ? `Usual: ${range(usual)}.` : "No range is usual.",
      blocks: [
        possible ? [`Sea water can have ${range(possible)}; a reading outside counts in no estimate.`] : [],
        [
          written === "total"
            ? "Written bare, or with total after it."
            : `Written ${bare ? "bare or " : ""}in ${written}.`,
        ],
        otherwise
          ? [`Where nothing says it: ${otherwise.what} ${otherwise.value} (${otherwise.basis}).`]
          : [],
      ],
    };
  },
  unit: ({ is, measures, unit, counts }) => ({
    answer: is[0] ? `${is[0]}.` : `${unit} counts ${counts}.`,
    blocks: [
      is.slice(1, 5).map((text) => `${text}.`),
      measures.length > 0 ? [`Measures ${allOf(measures)}.`] : [],
    ],
  }),
  reagent: ({ title, formula, molarMassGPerMol, gramBrings }) => ({
    answer: `1 g brings ${gramBrings.map(({ what, amount }) => `${amount} of ${what}`).join(", ")}.`,
    blocks: [[`${title}, ${formula}, ${molarMassGPerMol} g/mol.`]],
  }),
};

/** What a word means where it stands inside a line: a part first, then whatever else. */
export function wordTold(
  word: string,
  section: SectionKind | null,
  first: string | null = null,
): Told | null {
  const topics = topicsOf(word).filter(({ kind }) => kind !== "problem");
  const isHere = (topic: Topic) =>
    topic.kind === "statement" && section !== null && topic.sections.includes(section);
  const part = partOf(word);
  if (part) {
    const lines = linesWith(part.word);
    const own = lines.filter(({ row }) => row.word === first);
    const shown = (own.length > 0 ? own : lines).map(({ line }) => line);
    const topic = topics.find((each) => each.kind === "part");
    if (topic) return byKind.part({ ...topic, examples: shown });
  }
  const best = topics.find(isHere) ?? topics.find(({ kind }) => kind !== "statement") ?? topics[0];
  return best ? (byKind[best.kind] as (topic: Topic) => Told)(best) : null;
}

/** A parameter where a line begins with it, else what it is. */
export function parameterWord(word: string, section: SectionKind | null): Told | null {
  const topics = topicsOf(word);
  const here = topics.find(
    (topic) => topic.kind === "statement" && section !== null && topic.sections.includes(section),
  );
  const best = here ?? topics.find(({ kind }) => kind === "parameter");
  return best ? (byKind[best.kind] as (topic: Topic) => Told)(best) : null;
}

/** A date: its weekday, and how far from the moment. */
export function momentTold(text: string, at: number): Told | null {
  const day = dayMinute(text.slice(0, 10));
  if (day === null) return null;
  const year = writeDate(day).slice(0, 4);
  const clock = text.slice(10).trim();
  const hour = clock ? ` ${clock.replace(/^[Tt]/, "")}` : "";
  return { answer: `${dayText(day)} ${year}${hour}, ${daysApart(day, at)}.`, blocks: [] };
}

/** A problem's code in a comment. */
export function codeUnder({
  cursor,
  line,
}: UnderCursor): { readonly span: Span; readonly told: Told } | null {
  const { comment, text } = line.line;
  if (!comment || cursor.column < comment.start) return null;
  for (const match of text.slice(comment.start).matchAll(/[a-z]+\/[A-Za-z0-9-]+/g)) {
    const start = comment.start + match.index;
    const end = start + match[0].length;
    if (cursor.column < start || cursor.column > end || !isCode(match[0])) continue;
    return { span: { start, end }, told: codeTold(match[0]) };
  }
  return null;
}

const codeTold = (code: Code): Told => ({ answer: `${rules[code].title}.`, blocks: [[rules[code].why]] });
