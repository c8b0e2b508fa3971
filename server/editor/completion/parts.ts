/** Words inside a statement: `aim`, `with`, `from`, and what may follow a quantity. */

import type { ParameterName } from "../../../grammar/parameters.ts";
import { partOf } from "../../../grammar/parts.ts";
import { asCaCO3, numberWord, plusMinus, unitWord } from "../../../grammar/tokens.ts";
import { mayBeWritten } from "../../report/explain/units.ts";
import type { Offer } from "./item.ts";
import type { CompletionPlace } from "./place.ts";

export function partOffers(place: CompletionPlace): Offer[] {
  const { expected, words, row } = place;
  if (words.length === 0 || !row) return [];
  if (needsUnit(place)) return [];
  const keywords = expected.filter(
    (word) => !word.startsWith("a ") && !elsewhere.has(word) && !(word === "each" && isArea(words)),
  );
  const calcite = words.at(-1)?.image === "as" ? behindUnit({ ...place, words: words.slice(0, -1) }) : [];
  return [
    ...(calcite.includes("as CaCO3") ? [{ ...partOffer("as CaCO3"), label: "CaCO3" }] : []),
    ...[...keywords, ...behindUnit(place)].map(partOffer),
  ];
}

/** An uptake is that of one piece only where pieces are counted. */
const isArea = (words: CompletionPlace["words"]): boolean =>
  words.some(({ image }) => image === "uptake") && !words.some(({ image }) => /^pieces?$/.test(image));

/** Statements in which a number may take its unit from a later one. */
const borrowing: ReadonlySet<string> = new Set(["hold", "tank"]);

/** True behind a number that can't stand without a unit. */
function needsUnit({ words, expected, parameter, row }: CompletionPlace): boolean {
  if (words.at(-1)?.tokenType !== numberWord || !expected.includes("a unit")) return false;
  if (words.at(-2)?.tokenType === plusMinus || (row && borrowing.has(row.rule))) return false;
  return parameter === null || !mayBeWritten(parameter as ParameterName, null);
}

/** A comma is typed sooner than chosen; pieces stand with the units that could stand in their place. */
const elsewhere: ReadonlySet<string> = new Set([",", "pieces"]);
/** Words that nothing has to follow. */
const whole: ReadonlySet<string> = new Set([
  "each",
  "pieces",
  "as CaCO3",
  "carbonate",
  "bicarbonate",
  "hydroxide",
]);

export const partOffer = (word: string): Offer => ({
  kind: "part",
  label: word,
  detail: partOf(word)?.meaning ?? "",
  about: { kind: "part", word },
  begins: !whole.has(word),
  // What can be typed of it.
  ...(word === "±" ? { filter: "+-" } : {}),
});

/** `as CaCO3` and `±`, which may follow any quantity that they make sense of. */
function behindUnit({ words, parameter, row }: CompletionPlace): string[] {
  const last = words.at(-1);
  const isCalcite = last?.tokenType === asCaCO3;
  const isUnit = last?.tokenType.CATEGORIES?.includes(unitWord) ?? false;
  const number = words.findLastIndex(({ image }) => /^[-+−]?\d/.test(image));
  if (!last || !(isCalcite || isUnit) || number < 0) return [];
  const unit = words.slice(number + 1);
  // A name or a keyword stands between a number and this word: it is no unit.
  if (!isCalcite && unit.some(({ image }, at) => image !== "/" && at > 0 && unit[at - 1]?.image !== "/"))
    return [];
  if (words[number - 1]?.tokenType === plusMinus) return [];
  const spelling = unit.map(({ image }) => image).join("");
  const ofParameter =
    !isCalcite && parameter !== null && mayBeWritten(parameter as ParameterName, `${spelling} as CaCO3`);
  const ofUptake = row?.rule === "cohort" && /^(mmol|mol|g|mg)\/((m2|cm2)\/)?(day|week)$/.test(spelling);
  return [...(ofParameter || ofUptake ? ["as CaCO3"] : []), "±"];
}
