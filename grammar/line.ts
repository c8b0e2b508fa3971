/**
 * One line → one statement. What it reads depends on the line's own words and on the kind of its section only,
 * and whatever the line holds, an answer comes back: a statement, or what is wrong with the words.
 */
import type { IToken } from "chevrotain";
import { clockMinute, dateReadings, dayMinute, timeReadings } from "./dates.ts";
import { expectedAt, syntaxProblem } from "./expected.ts";
import { nearestWords, parameterWords } from "./nearest.ts";
import { numberReadings, plainNumber } from "./numbers.ts";
import { parameterOf } from "./parameters.ts";
import { MarlParser } from "./parser.ts";
import { momentOf, wordOf } from "./phrases.ts";
import { aParameter, headerWords, rowsOf, type StatementRow, wordsOf } from "./statements.ts";
import type { LineFinding, SectionKind, Span, Statement, Word } from "./syntax.ts";
import { cut, dateWord, nameWord, numberWord, quoted, spanOf, timeWord, unclosed } from "./tokens.ts";

export interface LineReading {
  /** Null where the line is empty, only a comment, or couldn't be read. */
  readonly statement: Statement | null;
  /** From the `#` to the line's end. */
  readonly comment: Span | null;
  /** Where there are any, there is no statement. */
  readonly findings: readonly LineFinding[];
}

/** Longer lines are left unread: no technician writes one, and a file that isn't text is full of them. */
export const longestLine = 20_000;

/** The one parser, built when first needed: building it is most of what a start costs. */
let built: MarlParser | undefined;
export const parser = (): MarlParser => {
  built ??= new MarlParser({ skipValidations: true });
  return built;
};

/** Reads a line; `section` is null where no section is open. */
export function readLine(section: SectionKind | null, text: string): LineReading {
  if (text.length > longestLine) {
    const span = { start: 0, end: text.length };
    return { statement: null, comment: null, findings: [{ code: "syntax/too-long", span }] };
  }
  const mark = mergeMark.exec(text);
  if (mark) {
    const span = { start: 0, end: mark[1]!.length };
    return { statement: null, comment: null, findings: [{ code: "syntax/merge-marks", span }] };
  }
  const { tokens, comment } = cut(text);
  if (tokens.length === 0) return { statement: null, comment, findings: [] };
  const answer = readWords(section, tokens);
  return Array.isArray(answer)
    ? { statement: null, comment, findings: answer as LineFinding[] }
    : { statement: answer as Statement, comment, findings: [] };
}

/** A mark that version control leaves where two people's lines couldn't be merged. */
export const mergeMark = /^(<{7}|\|{7}|={7}|>{7})(?:\s|$)/;

function readWords(section: SectionKind | null, tokens: IToken[]): Statement | LineFinding[] {
  const first = tokens[0]!;
  const isDated = first.tokenType === dateWord;
  const hasTime = isDated && tokens[1]?.tokenType === timeWord;
  const words = isDated ? tokens.slice(hasTime ? 2 : 1) : tokens;
  const start = words[0];
  if (isDated) {
    const wrong = tokens.slice(0, hasTime ? 2 : 1).flatMap(formProblem);
    if (wrong.length > 0) return wrong;
  }
  if (start === undefined) {
    const span = spanOf(tokens.at(-1)!);
    return [{ code: "syntax/unfinished", span, expected: section ? wordsOf(section, "event") : [] }];
  }
  const row = rowFor(section, start, words[1], isDated);
  if (!("rule" in row)) return [isDated && !hasTime ? (clockProblem(start) ?? row) : row];
  const wrong = words.flatMap(formProblem);
  if (wrong.length > 0) return wrong;
  const time = hasTime ? tokens[1] : undefined;
  return runRule(row.rule, words, isDated ? [first, time] : null);
}

/** Lets the parser read the words by one of its rules. */
function runRule(
  rule: string,
  words: IToken[],
  moment: readonly [IToken, IToken | undefined] | null,
): Statement | LineFinding[] {
  const reader = parser();
  reader.begin(words);
  if (moment) reader.at = momentOf(moment[0], moment[1], "noon");
  const statement = (reader as unknown as Record<string, () => Statement>)[rule]!();
  const error = reader.errors[0];
  if (!error && reader.findings.length === 0) return statement;
  const findings = [...reader.findings];
  const problem = error && syntaxProblem(reader, rule, words, error);
  // A word that was answered already isn't answered twice.
  if (problem && !findings.some(({ span }) => span.start === problem.span.start)) findings.push(problem);
  return findings.sort((a, b) => a.span.start - b.span.start);
}

/** The row that a line's first word calls for here, or why there is none. */
function rowFor(
  section: SectionKind | null,
  start: IToken,
  next: IToken | undefined,
  isDated: boolean,
): StatementRow | LineFinding {
  const word = start.image;
  const rows = rowsOf(parameterOf(word) ? aParameter : word);
  const form = isDated ? "event" : "fact";
  const here = rows.filter((row) => section !== null && row.sections.includes(section));
  const found =
    rows.find((row) => row.form === "header" && !isDated) ?? here.find((row) => row.form === form);
  if (found) return found;
  const misplaced = (why: "section" | "dated" | "undated" | "no-section", belongs: readonly SectionKind[]) =>
    ({ code: "syntax/misplaced", span: spanOf(start), word, belongs, why }) as const;
  if (here.length > 0) return misplaced(isDated ? "dated" : "undated", []);
  if (rows.some((row) => row.form === "header")) return misplaced("dated", []);
  if (rows.length > 0) {
    // A line of the same form is likelier to be meant: an undated `note` isn't a log's.
    const alike = rows.filter((row) => row.form === form);
    const belongs = (alike.length > 0 ? alike : rows)
      .filter((row) => fits(row, next))
      .flatMap((row) => row.sections);
    return misplaced(section === null ? "no-section" : "section", [...new Set(belongs)]);
  }
  return unknownStart(section, start, form);
}

/** A parameter opens lines of two sections; the word after it tells which. */
const fits = (row: StatementRow, next: IToken | undefined): boolean =>
  row.word !== aParameter || (row.rule === "kitAccuracy") === /^(scatter|tolerance)$/.test(next?.image ?? "");

/** A first word that starts no statement: the nearest that do are offered. */
function unknownStart(section: SectionKind | null, start: IToken, form: "fact" | "event"): LineFinding {
  const { image: word, tokenType } = start;
  const span = spanOf(start);
  const dates = tokenType === numberWord && /^\d{8}$/.test(word) ? dateReadings(word) : [];
  if (dates.length > 0) return { code: "syntax/date-form", span, word, readings: dates };
  if (tokenType === timeWord && form === "fact")
    return { code: "syntax/unknown-word", span, word, expected: ["a date"], nearest: [] };
  const own = section === null ? headerWords : wordsOf(section, form);
  const others = section === null ? [] : wordsOf(section, form === "fact" ? "event" : "fact");
  // Where events are at home, a line may lack its date.
  const expected = form === "fact" && others.length > 1 ? [...own, "a date"] : own;
  const spelt = (words: readonly string[]) =>
    words.flatMap((known) => (known === aParameter ? parameterWords : [known]));
  const near = nearestWords(word, spelt(own));
  const nearest = near.length > 0 ? near : nearestWords(word, [...spelt(others), ...headerWords]);
  return { code: "syntax/unknown-word", span, word, expected, nearest };
}

/** `8.10` where a time could stand. */
function clockProblem(token: IToken): LineFinding | null {
  const word = token.image;
  const readings = /^\d{1,2}\.\d\d$/.test(word) ? timeReadings(word.replace(".", ":")) : [];
  return readings.length > 0 ? { code: "syntax/date-form", span: spanOf(token), word, readings } : null;
}

/** What is wrong with a number, a date, a time or a text as a word of its own. */
function formProblem(token: IToken): LineFinding[] {
  const { image: word, tokenType } = token;
  const span = spanOf(token);
  switch (tokenType) {
    case numberWord:
      if (plainNumber(word) !== null) return [];
      return [{ code: "syntax/number-form", span, word, readings: numberReadings(word) }];
    case dateWord:
      if (dayMinute(word) !== null) return [];
      return [{ code: "syntax/date-form", span, word, readings: dateReadings(word) }];
    case timeWord:
      if (clockMinute(word) !== null) return [];
      return [{ code: "syntax/date-form", span, word, readings: timeReadings(word) }];
    case unclosed:
      return [{ code: "syntax/unfinished", span, expected: ['"'] }];
    default:
      return [];
  }
}

/** How a line begins, whether or not the rest can be read. */
export interface Beginning {
  readonly first: Word;
  readonly isDated: boolean;
  /** The name and the title, where the words after the first are a header's. */
  readonly name: Word | null;
  readonly title: Word | null;
  /** True where nothing but a name and a title follows. */
  readonly looksLikeHeader: boolean;
}

/** Reads a line's first words only; null where there are none. */
export function beginningOf(text: string): Beginning | null {
  if (text.length > longestLine) return null;
  const { tokens } = cut(text);
  const first = tokens[0];
  if (!first) return null;
  const rest = tokens.slice(1);
  const name = rest[0] && isName(rest[0]) ? wordOf(rest.shift()!) : null;
  const token = rest.find((word) => word.tokenType === quoted);
  const title = token ? { text: token.image.slice(1, -1), ...spanOf(token) } : null;
  const looksLikeHeader = isName(first) && rest.length === (title ? 1 : 0);
  return { first: wordOf(first), isDated: first.tokenType === dateWord, name, title, looksLikeHeader };
}

const isName = (token: IToken): boolean => token.tokenType.CATEGORIES?.includes(nameWord) ?? false;

/** What could follow these words: for completion. Words that are a kind of thing come as `a name`, `a unit`. */
export function expectedAfter(section: SectionKind | null, text: string): readonly string[] {
  const { tokens } = cut(text);
  const isDated = tokens[0]?.tokenType === dateWord;
  const words = isDated ? tokens.slice(tokens[1]?.tokenType === timeWord ? 2 : 1) : tokens;
  const start = words[0];
  if (!start)
    return section === null
      ? headerWords
      : [...wordsOf(section, isDated ? "event" : "fact"), ...(isDated ? [] : headerWords)];
  const row = rowFor(section, start, words[1], isDated);
  if (!("rule" in row)) return [];
  const reader = parser();
  reader.begin(words);
  (reader as unknown as Record<string, () => Statement>)[row.rule]!();
  return expectedAt(reader, row.rule, words);
}
