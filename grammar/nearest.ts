/** Which known words are near enough to a misspelt one to be offered. */
import type { IToken } from "chevrotain";
import { distance } from "fastest-levenshtein";
import { parameterOf, parameterTable } from "./parameters.ts";
import type { LineFinding } from "./syntax.ts";
import { spanOf } from "./tokens.ts";
import { unitTable } from "./units.ts";

export const parameterWords: readonly string[] = parameterTable.map((row) => row.name);
export const unitWords: readonly string[] = unitTable.map((row) => row.spelling);

/** Longer than any word of the language and a slip: not worth comparing. */
const longest = 40;
const shortWord = 4;

/** The known words near this one, best first: the same but for capitals, else a slip or two away. */
export function nearestWords(word: string, known: Iterable<string>): readonly string[] {
  if (word.length > longest || !/^[A-Za-zµμ°]/.test(word)) return [];
  const lower = word.toLowerCase();
  const near: { word: string; away: number }[] = [];
  for (const candidate of new Set(known)) {
    if (candidate === word) continue;
    const allowed = Math.min(word.length, candidate.length) < shortWord ? 1 : 2;
    if (Math.abs(candidate.length - word.length) > allowed) continue;
    const away = slips(lower, candidate.toLowerCase());
    // A word that shares no letter in place is no slip: `mk` isn't near `kg`.
    if (away <= allowed && away < Math.max(word.length, candidate.length))
      near.push({ word: candidate, away });
  }
  return near
    .sort((a, b) => a.away - b.away)
    .slice(0, 3)
    .map((entry) => entry.word);
}

/** How many slips lie between two words; two letters that changed places are one. */
function slips(word: string, other: string): number {
  const away = distance(word, other);
  return away === 2 && isSwapped(word, other) ? 1 : away;
}

function isSwapped(word: string, other: string): boolean {
  if (word.length !== other.length) return false;
  const first = [...word].findIndex((letter, at) => letter !== other[at]);
  const isPair = word[first] === other[first + 1] && word[first + 1] === other[first];
  return isPair && word.slice(first + 2) === other.slice(first + 2);
}

/** The finding for a word that stands where a parameter should and is none. */
export function parameterUnknown(token: IToken): LineFinding | null {
  if (parameterOf(token.image)) return null;
  return {
    code: "syntax/unknown-word",
    span: spanOf(token),
    word: token.image,
    expected: ["a parameter"],
    nearest: nearestWords(token.image, parameterWords),
  };
}
