/** What could have stood where a line went wrong, in the language's own words. */
import {
  type IProduction,
  type IRecognitionException,
  type IToken,
  NonTerminal,
  Terminal,
  tokenLabel,
} from "chevrotain";
import { nearestWords, parameterWords, unitWords } from "./nearest.ts";
import type { MarlParser } from "./parser.ts";
import type { Parts } from "./phrases.ts";
import type { LineFinding } from "./syntax.ts";
import {
  asCaCO3,
  isReserved,
  keyword,
  nameWord,
  numberWord,
  plainWord,
  plusMinus,
  quoted,
  spanOf,
  stroke,
} from "./tokens.ts";

/** More words than a line of a person has; the search for what could follow isn't run on such. */
const mostWords = 400;

const aTitle = "a title in quotes";

/** What could stand after these words, most telling first. */
export function expectedAt(parser: MarlParser, rule: string, before: IToken[]): readonly string[] {
  if (before.length > mostWords) return [];
  const paths = parser.computeContentAssist(rule, before);
  const said = new Set(Object.entries(parser.parts).flatMap(([key, value]) => (value === null ? [] : [key])));
  const words = new Set<string>();
  for (const { nextTokenType, ruleStack } of paths) {
    const label = labelOf(tokenLabel(nextTokenType), ruleStack);
    const part = label === aTitle ? "title" : label;
    if (label !== null && !said.has(part as string)) words.add(label);
  }
  return [...words];
}

function labelOf(token: string, ruleStack: readonly string[]): string | null {
  // These could stand after almost any number: to name them would hide what was forgotten.
  if (token === plusMinus.name || token === stroke.name || token === asCaCO3.name) return null;
  const rule = ruleStack.at(-1);
  const above = ruleStack.at(-2);
  if (token === nameWord.name && rule === "parameter") return "a parameter";
  if (token === numberWord.name && (above === "quantity" || above === "afterUnit")) return "a quantity";
  if (token === quoted.name && rule === "text" && above === "title") return aTitle;
  return token;
}

/** The finding for the parser's first error. */
export function syntaxProblem(
  parser: MarlParser,
  rule: string,
  words: IToken[],
  error: IRecognitionException,
): LineFinding {
  const found = words.indexOf(error.token);
  const index = found === -1 ? words.length : found;
  const unit = parser.lastUnit;
  // A word that was taken for a unit and is none is the slip, not what comes after it.
  if (unit && !unit.known && unit.last === words[index - 1]) {
    const at = words.indexOf(unit.first);
    const span = { start: spanOf(unit.first).start, end: spanOf(unit.last).end };
    return unknownWord(unit.text, span, expectedAt(parser, rule, words.slice(0, at)));
  }
  const expected = expectedAt(parser, rule, words.slice(0, index));
  const token = words[index];
  if (!token) {
    return { code: "syntax/unfinished", span: spanOf(words[index - 1] ?? error.token), expected };
  }
  const word = token.image;
  const misplaced = { code: "syntax/misplaced", span: spanOf(token), word, belongs: [] } as const;
  if (Object.hasOwn(parser.parts, word) && parser.parts[word as keyof Parts] !== null)
    return { ...misplaced, why: "repeated" };
  if (expected.includes("a name") && isReserved(word)) {
    // `pump gives soda …` lacks its name, `tank pump 3 L` has one that it can't have.
    const isNext = expectedAt(parser, rule, [...words.slice(0, index), anyName]).includes(word);
    return isNext
      ? unknownWord(word, misplaced.span, expected)
      : { ...misplaced, why: "keyword-as-name", expected };
  }
  if (Object.hasOwn(keyword, word) && keywordsIn(parser, rule).has(word))
    return { ...misplaced, why: "order", expected };
  return unknownWord(word, spanOf(token), expected);
}

/** Stands for a name that isn't there. */
const anyName: IToken = {
  ...{ image: "name", startOffset: 0, tokenType: plainWord },
  tokenTypeIdx: plainWord.tokenTypeIdx as number,
};

function unknownWord(
  word: string,
  span: { start: number; end: number },
  expected: readonly string[],
): LineFinding {
  const known = expected.flatMap((label) => {
    if (label === "a parameter") return parameterWords;
    if (label === "a unit") return unitWords;
    return label.startsWith("a ") ? [] : [label];
  });
  return { code: "syntax/unknown-word", span, word, expected, nearest: nearestWords(word, known) };
}

const wordsByRule = new Map<string, ReadonlySet<string>>();

/** The keywords that a rule of the parser has anywhere in it. */
export function keywordsIn(parser: MarlParser, rule: string): ReadonlySet<string> {
  const known = wordsByRule.get(rule);
  if (known) return known;
  const words = new Set<string>();
  const walk = (parts: readonly IProduction[]): void => {
    for (const part of parts) {
      if (part instanceof Terminal) words.add(tokenLabel(part.terminalType));
      else if (part instanceof NonTerminal) walk([part.referencedRule]);
      else walk((part as IProduction & { definition: IProduction[] }).definition);
    }
  };
  walk([parser.getGAstProductions()[rule] as IProduction]);
  wordsByRule.set(rule, words);
  return words;
}
