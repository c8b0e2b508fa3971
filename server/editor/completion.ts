/** Completion: what could stand at the cursor, from each source in turn. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { Farm } from "../farm.ts";
import { mayBeWritten } from "../report/explain/units.ts";
import { codeItems } from "./completion/codes.ts";
import { formulaOffers } from "./completion/formulas.ts";
import type { CompletionItem, ItemKind, Offer } from "./completion/item.ts";
import { momentOffers } from "./completion/moments.ts";
import { nameOffers } from "./completion/names.ts";
import { parameterOffers } from "./completion/parameters.ts";
import { partOffers } from "./completion/parts.ts";
import { pathItems } from "./completion/paths.ts";
import { personOffers } from "./completion/people.ts";
import { type CompletionPlace, completionPlace } from "./completion/place.ts";
import { readingLineOffers } from "./completion/reading-lines.ts";
import { statementOffers } from "./completion/statements.ts";
import { unitOffers } from "./completion/units.ts";
import type { Cursor } from "./cursor.ts";
import { type WordRole, wordsIn } from "./words.ts";

/** In the order in which they are shown. */
const sources: readonly ((place: CompletionPlace) => readonly Offer[])[] = [
  momentOffers,
  readingLineOffers,
  personOffers,
  nameOffers,
  parameterOffers,
  unitOffers,
  formulaOffers,
  statementOffers,
  partOffers,
];

/** Everything that could stand at the cursor, best first; `now` is the minute that it is. */
export function completions(farm: Farm, cursor: Cursor, now: number): readonly CompletionItem[] {
  const special = codeItems(farm, cursor) ?? pathItems(farm, cursor);
  if (special) return special;
  const place = completionPlace(farm, cursor, now);
  return place ? sources.flatMap((source) => source(place)).map((offer) => itemOf(place, offer)) : [];
}

/** Kinds of words that a space may ask for: only few words can stand there. */
const afterSpace: ReadonlySet<string> = new Set(["a name", "a parameter", "a unit", "a formula"]);

/** Behind a number that may stand bare nobody waits for a unit: offered unasked, it would be taken by mistake. */
const mayStayBare = ({ parameter, row }: CompletionPlace): boolean =>
  parameter !== null && row?.rule !== "limit" && mayBeWritten(parameter as ParameterName, null);

/**
 * Whether a character that was just typed asks for something: a space behind a word that takes a name, a parameter
 * or a unit, a quote behind `use`.
 */
export function isAskedBy(farm: Farm, cursor: Cursor, character: string): boolean {
  if (pathItems(farm, cursor) !== null) return true;
  if (character !== " ") return false;
  if (codeItems(farm, cursor) !== null) return true;
  const place = completionPlace(farm, cursor, 0);
  return (
    place !== null &&
    place.words.length > 0 &&
    place.expected.some((kind) => afterSpace.has(kind) && !(kind === "a unit" && mayStayBare(place)))
  );
}

/** By the kind of an item, what stands where it could have stood. */
const roleOf = (kind: ItemKind): WordRole => {
  if (kind === "parameter" || kind === "unit" || kind === "person" || kind === "formula") return kind;
  if (kind === "moment") return "moment";
  return kind === "statement" || kind === "part" || kind === "line" ? "keyword" : "name";
};

function itemOf(place: CompletionPlace, offer: Offer): CompletionItem {
  const { kind, label, detail, text = label, snippet = null, filter = label } = offer;
  const { also = [], about = null, begins = false } = offer;
  const { cursor, start, end } = place;
  const span = { file: cursor.file, line: cursor.line, start };
  const stays = isKept(place, offer);
  return {
    ...{ kind, label, detail, snippet: stays ? null : snippet, filter, also, about, begins },
    text: stays ? `${text} ` : text,
    insert: { ...span, end: cursor.column },
    replace: { ...span, end: stays ? cursor.column : end },
  };
}

/** True where the cursor stands before a word of another kind: what is taken then comes before it. */
function isKept({ line, typed, start, end }: CompletionPlace, { kind, label }: Offer): boolean {
  if (typed !== "" || end === start) return false;
  const word = wordsIn(line.line).find((each) => each.start === start);
  // Pieces stand in the place of a unit.
  const roles = isPieces(label) ? ["unit", "keyword"] : [roleOf(kind), "unknown"];
  return word !== undefined && !roles.includes(word.role) && !(kind === "unit" && isPieces(word.text));
}

const isPieces = (word: string): boolean => /^pieces?$/.test(word);
