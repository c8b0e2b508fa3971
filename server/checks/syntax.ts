/** Lines that can't be read. Each is left out and every other line still counts. */

import { numberReadings } from "../../grammar/numbers.ts";
import { isReserved } from "../../grammar/tokens.ts";
import type { Files } from "../culture/names.ts";
import type { Place } from "../culture/place.ts";
import { adding, lineAt, replacingWith, standsApart } from "./fixing.ts";
import { misplaced, misplacedFixes } from "./misplaced.ts";
import type { LineFix } from "./problem.ts";
import type { Of, Rules } from "./rule.ts";
import { linesAtEnd, sectionAt } from "./sections.ts";
import { inQuotes, isParameter, oneOf, said } from "./words.ts";

const why = "What the line says counts for nothing until it can be read; every other line counts.";
const leftOut = (): string => "This line is left out.";

/** What is told of a line's words; the recipe of a solution is told of as a whole. */
const isRecipe = ({ place }: Of<"syntax/unfinished">): boolean => place.span === null;

const isFormula = (expected: readonly string[]): boolean =>
  expected[0]?.startsWith("a chemical formula") === true;

/** `x30x40`, as people write sizes without spaces; with their unit too, `x30cm` or `cmx30`. */
export const isCrossed = (word: string): boolean =>
  /^(?:mm|cm|m|inch|ft)?(?:x\d+(?:mm|cm|m|inch|ft)?)+$/.test(word);

const crossed =
  /(?<![\w.,-])\d+(?:\.\d+)?(?:mm|cm|m|inch|ft)?(?:x\d+(?:\.\d+)?(?:mm|cm|m|inch|ft)?)+(?![\w.,])/g;

/** The sizes that the place is among with a space on either side of each x; none where no such sizes are there. */
export function crossesApart(place: Place, files: Files): readonly LineFix[] {
  const { span } = place;
  const text = lineAt(files, place)?.text ?? "";
  const sizes = [...text.matchAll(crossed)].find(
    ({ index, 0: found }) => span && index <= span.start && span.start < index + found.length,
  );
  if (!sizes) return [];
  const { index: start, 0: found } = sizes;
  const apart = found.replace(/x(?=\d)/g, " x ").replace(/(\d)(?=[a-z])/g, "$1 ");
  const { file, line } = place;
  const edits = [{ file, line, start, end: start + found.length, text: apart }];
  return [{ title: "Put spaces round x", safe: true, edits }];
}

function unknownWord(finding: Of<"syntax/unknown-word">): string {
  const { word, expected } = finding;
  if (isCrossed(word) && expected.includes("x")) return `In ${inQuotes(word)} the x stands without spaces.`;
  if (expected.includes("a name") && isReserved(word))
    return `${inQuotes(word)} is a word of the language and can't be a name.`;
  if (isFormula(expected)) return `${inQuotes(word)} can't be read as part of a chemical formula.`;
  if (isParameter(word)) return `${inQuotes(word)} can't be given here.`;
  if (expected.length > 0 && expected.every((other) => other === "a parameter" || isParameter(other)))
    return `${inQuotes(word)} is no parameter.`;
  if (expected.includes("a unit") && !expected.includes("a quantity") && /^\D/.test(word))
    return `${inQuotes(word)} is no unit.`;
  return `${inQuotes(word)} has no meaning here.`;
}

/** Digits that are plain and still can't be what is asked for here. */
const isPlain = (word: string): boolean => /^-?\d+(\.\d+)?$/.test(word);
const mostDigits = 15;

function numberForm({ word }: Of<"syntax/number-form">): string {
  if (!isPlain(word)) return `${inQuotes(word)} isn't a plain number.`;
  if (word.length > mostDigits) return `${inQuotes(word)} has more digits than any quantity here.`;
  return word.startsWith("-") ? `${inQuotes(word)} is below zero.` : `${inQuotes(word)} can't be used here.`;
}

function numberTodo({ place, word, readings }: Of<"syntax/number-form">, files: Files): string {
  if (!standsApart(files, place)) return "Put a space before the number, and on either side of an x.";
  if (readings.length > 0) return `Write ${oneOf(readings)}.`;
  if (!isPlain(word))
    return "Write the digits with a point before the decimals and nothing else between them.";
  return word.length > mostDigits
    ? "Write it with fewer digits."
    : "Write a share as at most 100 %, and a count as a whole number above 0.";
}

/** A volume that a recipe lacks: an example of one. */
const exampleVolume = "make up to 1 L";

/** What is missing, where that can be one thing only. */
function unfinishedFixes(finding: Of<"syntax/unfinished">, files: Files): readonly LineFix[] {
  const { place, expected } = finding;
  const [word = "", ...others] = expected;
  if (isRecipe(finding)) {
    const document = files.get(place.file);
    const section = sectionAt(files, place);
    if (word !== "make up to" || !document || section?.kind !== "solution") return [];
    const edits = [linesAtEnd(document, place.file, section, [exampleVolume])];
    return [{ title: `Add ${exampleVolume}, an example to correct`, safe: false, edits }];
  }
  if (word === '"') return adding(place, word, false);
  return others.length === 0 && isReserved(word) ? adding(place, ` ${word}`, false) : [];
}

/** `8.10`, which may be a time and may be a number. */
const isHalfTime = (word: string): boolean => /^\d{1,2}\.\d\d$/.test(word);
const isTime = (word: string): boolean => word.includes(":") || isHalfTime(word);

/**
 * True where its one reading is all that a word can have meant: not `8.10`, which may be a number, nor `8:5`, which
 * may lack a digit, nor `2026-13-05`, whose month may be a slip.
 */
const isCertain = (word: string): boolean =>
  !isHalfTime(word) && !/^[Tt]?\d{1,2}:\d(?!\d)/.test(word) && !/^\d{4}-\d\d-\d\d$/.test(word);

export const syntaxRules: Rules<
  | "syntax/unknown-word"
  | "syntax/unfinished"
  | "syntax/number-form"
  | "syntax/date-form"
  | "syntax/misplaced"
  | "syntax/merge-marks"
> = {
  "syntax/unknown-word": {
    severity: "error",
    title: "A word that has no meaning where it stands",
    says: unknownWord,
    why,
    whyHere: leftOut,
    todo: "Write the word as the language spells it; the message offers the nearest ones, or names what can stand there.",
    todoHere: ({ word, expected, nearest }) =>
      nearest.length > 0
        ? `Is ${oneOf(nearest)} meant?`
        : isCrossed(word) && expected.includes("x")
          ? "Put a space on either side of it, as in 40 cm x 30 cm."
          : isFormula(expected)
            ? "Write it like SrCl2·6H2O."
            : expected.length > 0
              ? `Here can stand ${said(expected)}.`
              : "Remove it, or start a comment with # before it.",
    fixes: (finding, files) =>
      isCrossed(finding.word) && finding.expected.includes("x")
        ? crossesApart(finding.place, files)
        : replacingWith(finding.place, finding.nearest, false),
    background:
      "A misspelt header is one problem: the lines below it are read as the nearest header's section. Where no header is near, they are left out with it.",
    example: {
      fires: "system vat\n  tnak main 500 L\n  tank sump 100 L\n",
      silent: "system vat\n  tank main 500 L\n  tank sump 100 L\n",
    },
  },
  "syntax/unfinished": {
    severity: "error",
    title: "A line or a recipe that stops short",
    says: (finding) =>
      isRecipe(finding)
        ? finding.expected.includes("make up to")
          ? "This recipe doesn't say to which volume it is made up."
          : "This recipe doesn't say what is in it."
        : finding.expected[0] === '"'
          ? "This text in quotes isn't closed."
          : "This line stops short.",
    why,
    whyHere: (finding) =>
      isRecipe(finding) ? "Its strength stays unknown, so no dose of it can be worked out." : leftOut(),
    todo: "Add what the message says comes next; of a recipe, the line that it lacks.",
    todoHere: (finding) => {
      const { expected } = finding;
      if (isRecipe(finding))
        return expected.includes("make up to")
          ? "Add a line: make up to, and the volume."
          : `Add a line that starts with ${oneOf(expected)}.`;
      if (expected[0] === '"') return 'Put a " at its end.';
      return expected.length > 0 ? `Next comes ${said(expected)}.` : "Finish it, or remove it.";
    },
    fixes: unfinishedFixes,
    background: "Of a solution whose recipe lacks a part the problem stands at the solution's header.",
    example: {
      fires: "system vat\n  tank main 500 L\n  evaporates\n",
      silent: "system vat\n  tank main 500 L\n  evaporates 4 L/day\n",
    },
  },
  "syntax/number-form": {
    severity: "error",
    title: "A number that can be read in more than one way, or can't be one",
    says: numberForm,
    why,
    whyHere: leftOut,
    todo: "Write the digits with a point before decimals and nothing between thousands.",
    todoHere: numberTodo,
    fixes: ({ place, word, readings }, files) =>
      standsApart(files, place)
        ? replacingWith(place, readings, sameNumber(word, readings))
        : crossesApart(place, files),
    background:
      "A point stands before decimals, and nothing between thousands: 1,250 is 1.25 to some and 1250 to others, and a dose a thousand times too large is not to be guessed at.",
    example: {
      fires: "system vat\n  tank main 1,250 L\n  tank sump 100 L\n",
      silent: "system vat\n  tank main 1250 L\n  tank sump 100 L\n",
    },
  },
  "syntax/date-form": {
    severity: "error",
    title: "A date or a time that isn't one",
    says: ({ word }) =>
      isTime(word)
        ? `${inQuotes(word)} isn't a time of day written like 08:10.`
        : `${inQuotes(word)} isn't a day written like 2026-12-01.`,
    why,
    whyHere: leftOut,
    todo: "Write year, month and day as 2026-12-01, and the time as 08:10.",
    todoHere: ({ word, readings }) =>
      readings.length > 0
        ? `Write ${oneOf(readings)}.`
        : isTime(word)
          ? "Write hours and minutes, 00:00 to 24:00."
          : "Write year, month and day of a day that exists.",
    fixes: ({ place, word, readings }, files) =>
      standsApart(files, place) ? replacingWith(place, readings, isCertain(word)) : [],
    background: "03/04 is March to some and April to others, so the year comes first and the day last.",
    example: {
      fires: 'system vat\n  tank main 500 L\n\nlog vat\n  03.04.2026 08:00 note "Moved to the new hall."\n',
      silent: 'system vat\n  tank main 500 L\n\nlog vat\n  2026-04-03 08:00 note "Moved to the new hall."\n',
    },
  },
  "syntax/misplaced": {
    severity: "error",
    title: "A line or a word at a place where it doesn't belong",
    says: (finding) => misplaced[finding.why].says(finding),
    why,
    whyHere: leftOut,
    todo: "Move the line or the word to where the message says that it belongs.",
    todoHere: (finding, files) => misplaced[finding.why].todo(finding, files),
    fixes: misplacedFixes,
    background:
      "Standing facts belong to what they describe (`system`, `solution`, `kit` …) and may end with `from` and `until`; what happened belongs in a `log` or `store` and starts with its date.",
    example: {
      fires: "system vat\n  tank main 500 L\n  2026-11-30 evaporates 4 L/day\n",
      silent: "system vat\n  tank main 500 L\n  evaporates 4 L/day from 2026-11-30\n",
    },
  },
  "syntax/merge-marks": {
    severity: "error",
    title: "Marks of an unfinished merge",
    says: () => "Here an unfinished merge left its marks.",
    why: "The lines of both sides count until it is settled, so doses and readings may count twice.",
    todo: "Keep the lines that are right, and remove the marks.",
    example: {
      fires: [
        "system vat",
        "  tank main 500 L",
        "<<<<<<< ours",
        "  tank sump 100 L",
        "=======",
        "  tank settler 80 L",
        ">>>>>>> theirs",
        "",
      ].join("\n"),
      silent: "system vat\n  tank main 500 L\n  tank sump 100 L\n",
    },
  },
};

/** True where the digits can have meant one number only: not where a sign or a mark is dropped that says more. */
function sameNumber(word: string, readings: readonly string[]): boolean {
  return readings.length === 1 && !isPlain(word) && numberReadings(word).length === 1;
}
