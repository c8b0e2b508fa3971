/** Pieces of sentences that many rules share: lists, names, parameters, days. */
import { type ParameterName, parameterOf } from "../../grammar/parameters.ts";

/** `a, b or c`; of a long list the first few, said so. */
export function oneOf(words: readonly string[], most = 5): string {
  const distinct = [...new Set(words)];
  const shown = distinct.slice(0, most);
  return `${distinct.length > most ? "for example " : ""}${listed(shown, "or")}`;
}

/** `a, b and c`. */
export const allOf = (words: readonly string[]): string => listed(words, "and");

const listed = (words: readonly string[], last: "or" | "and"): string =>
  words.length < 2 ? (words[0] ?? "") : `${words.slice(0, -1).join(", ")} ${last} ${words.at(-1)}`;

/** Longer words are cut: nobody reads them to their end. */
const longestWord = 60;

/** A word of the file in quotes. */
export const inQuotes = (word: string): string =>
  `"${word.length > longestWord ? `${word.slice(0, longestWord)}…` : word}"`;

/** The name in a reference, which may carry its file after a space. */
export const nameOf = (reference: string): string => reference.split(" ")[0] ?? reference;

/** A pump's name, or `by hand`. */
export const sourceName = (by: string): string => (by === "hand" || by.startsWith("hand ") ? "by hand" : by);

/** The parameter at the start of a sentence. */
export const atStart = (parameter: ParameterName): string =>
  parameter === "pH" ? parameter : parameter.charAt(0).toUpperCase() + parameter.slice(1);

export const isParameter = (word: string): boolean => parameterOf(word) !== undefined;

/** What could stand there: kinds of words (`a unit`) and parameters as they are, words to be written so in quotes. */
export const said = (expected: readonly string[]): string =>
  oneOf(expected.map((word) => (/^an? /.test(word) || isParameter(word) ? word : inQuotes(word))));

const weekdays = ["Sunday", "Monday", "Tuesday", "Wednesday", "Thursday", "Friday", "Saturday"];
const months = [
  ...["January", "February", "March", "April", "May", "June", "July"],
  ...["August", "September", "October", "November", "December"],
];

/** `Thursday 3 December`; minutes since 1970-01-01 of the wall clock. */
export function dayText(minute: number): string {
  const date = new Date(minute * 60_000);
  return `${weekdays[date.getUTCDay()]} ${date.getUTCDate()} ${months[date.getUTCMonth()]}`;
}

const minutesPerHour = 60;

/** `Thursday 3 December about 14:00`: what is foreseen is told to the hour. */
export function aboutWhen(minute: number): string {
  const hour = Math.round(minute / minutesPerHour) * minutesPerHour;
  const clock = new Date(hour * 60_000).toISOString().slice(11, 16);
  return `${dayText(hour)} about ${clock}`;
}
