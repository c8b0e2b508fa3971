/** The printed form of a statement cut into its parts, and which of them the words of a line have come to. */
import type { IToken } from "chevrotain";
import { formOf } from "../../grammar/form.ts";
import type { StatementRow } from "../../grammar/statements.ts";
import {
  asCaCO3,
  comma,
  cut,
  dateWord,
  nameWord,
  numberWord,
  plusMinus,
  quoted,
  spanOf,
  stroke,
  timeWord,
  unclosed,
  unitWord,
} from "../../grammar/tokens.ts";
import { readUnit, unitTable } from "../../grammar/units.ts";

/** What a part of a form is filled with; a `word` is written as it is. */
export type PartKind =
  | "word"
  | "choice"
  | "name"
  | "parameter"
  | "quantity"
  | "number"
  | "unit"
  | "text"
  | "date"
  | "time"
  | "formula";

/** One part: a word or what stands for one, or several in brackets that may be left out together. */
export interface FormPart {
  /** In the form. */
  readonly start: number;
  readonly end: number;
  readonly text: string;
  readonly kind: PartKind | "optional";
  /** Of what may be left out, what it is made of; of anything else itself. */
  readonly inside: readonly FormPart[];
  /** Words that may stand here. */
  readonly words: readonly string[];
}

export interface Form {
  readonly text: string;
  readonly parts: readonly FormPart[];
  /** After a comma the parts from here on come again; null where nothing does. */
  readonly repeatsFrom: number | null;
}

const kindOfPlaceholder: Readonly<Record<string, PartKind>> = {
  PARAMETER: "parameter",
  q: "quantity",
  volume: "quantity",
  mass: "quantity",
  temperature: "quantity",
  N: "number",
  unit: "unit",
  '"text"': "text",
  '"title"': "text",
  DATE: "date",
  TIME: "time",
  FORMULA: "formula",
};

/** Labels of quantities that are keywords too; in these statements they are the keyword. */
const fixedWords: Readonly<Record<string, readonly string[]>> = { measured: ["volume"] };

/** The forms of a statement, one for each way in which it may go on. */
export function formsOf(row: StatementRow): readonly Form[] {
  return expanded(formOf(row)).map((text) => formFrom(text, fixedWords[row.rule] ?? []));
}

const groups = /\(([^()]*)\)/;

/** A choice between more than single words makes a form of each. */
function expanded(text: string): string[] {
  const found = groups.exec(text);
  const ways = found?.[1]?.split(" | ") ?? [];
  if (!found || ways.every((way) => !way.includes(" "))) return [text];
  return ways.map((way) => text.slice(0, found.index) + way + text.slice(found.index + found[0].length));
}

function formFrom(text: string, fixed: readonly string[]): Form {
  const parts = partsIn(text, 0, text.length, fixed);
  const list = parts.some((part) => part.text.endsWith(", …"));
  const isStart = ({ kind }: FormPart) => kind === "word";
  return { text, parts, repeatsFrom: list ? parts.findIndex(isStart) + 1 : null };
}

function partsIn(text: string, start: number, end: number, fixed: readonly string[]): FormPart[] {
  const parts: FormPart[] = [];
  let at = start;
  while (at < end) {
    if (text[at] === " ") {
      at += 1;
      continue;
    }
    const last = text[at] === "[" || text[at] === "(" ? closing(text, at) : wordEnd(text, at, end);
    parts.push(partFrom(text, at, last, fixed));
    at = last;
  }
  return parts;
}

function closing(text: string, open: number): number {
  let depth = 0;
  for (let at = open; at < text.length; at += 1) {
    if (text[at] === "[" || text[at] === "(") depth += 1;
    else if (text[at] === "]" || text[at] === ")") depth -= 1;
    if (depth === 0) return at + 1;
  }
  return text.length;
}

function wordEnd(text: string, from: number, end: number): number {
  const space = text.indexOf(" ", from);
  const last = space < 0 || space > end ? end : space;
  return text.slice(last, last + 2) === " …" ? last + 2 : last;
}

function partFrom(text: string, start: number, end: number, fixed: readonly string[]): FormPart {
  const own = text.slice(start, end);
  if (own.startsWith("[")) {
    const inside = partsIn(text, start + 1, end - 1, fixed);
    return { start, end, text: own, kind: "optional", inside, words: inside[0]?.words ?? [] };
  }
  const bare = own.replace(/, …$/, "");
  const plain = (kind: PartKind, words: readonly string[]): FormPart => {
    const part = { start, end, text: own, kind, words };
    return { ...part, inside: [{ ...part, inside: [] }] };
  };
  if (own.startsWith("(")) return plain("choice", own.slice(1, -1).split(" | "));
  const kind = fixed.includes(bare) ? undefined : kindOfPlaceholder[bare];
  if (kind) return plain(kind, []);
  return /^[A-Z]+$/.test(bare) ? plain("name", []) : plain("word", [bare]);
}

/** How far a line has filled a form. */
export interface Filled {
  /** The part that the cursor's word belongs to, or that the next word would; null where the form is full. */
  readonly part: number | null;
  /** How many words fitted before the first that didn't; the best form takes in most. */
  readonly fitting: number;
}

/** Words of a line that end before the cursor, and the one that it touches, if any. */
export function filledTo(form: Form, line: string, column: number): Filled {
  const tokens = cut(line).tokens.filter(({ startOffset }) => startOffset < column);
  const walk = walkOf(form);
  for (const [index, token] of tokens.entries()) {
    const isTouched = index === tokens.length - 1 && spanOf(token).end >= column;
    if (!walk.take(token, isTouched)) break;
    // Right behind a comma the next item begins.
    if (isTouched && token.tokenType !== comma) return { part: walk.current(), fitting: walk.fitting() };
  }
  return { part: walk.next(), fitting: walk.fitting() };
}

const isName = ({ tokenType }: IToken): boolean => tokenType.CATEGORIES?.includes(nameWord) ?? false;
const isUnit = ({ tokenType }: IToken): boolean => tokenType.CATEGORIES?.includes(unitWord) ?? false;
const isUnitSpelling = (word: string): boolean =>
  readUnit(word).known || unitTable.some(({ spelling }) => spelling.startsWith(word));

const begins: Readonly<Record<Exclude<PartKind, "word">, (token: IToken, part: FormPart) => boolean>> = {
  choice: (token, { words }) =>
    words.includes(token.image) || (words.includes("unit") && isUnit(token)) || token.image === "piece",
  name: isName,
  parameter: isName,
  quantity: ({ tokenType }) => tokenType === numberWord,
  number: ({ tokenType }) => tokenType === numberWord,
  unit: isUnit,
  text: ({ tokenType }) => tokenType === quoted || tokenType === unclosed,
  date: ({ tokenType }) => tokenType === dateWord,
  time: ({ tokenType }) => tokenType === timeWord,
  formula: () => true,
};

/** Goes through a form word by word. */
function walkOf(form: Form) {
  const { parts, repeatsFrom } = form;
  /** The part that the last word belongs to, and which of what is inside it. */
  let at = -1;
  let within = 0;
  let fitting = 0;
  /** Of a quantity, what of it was said. */
  let said: "nothing" | "number" | "unit" | "stroke" | "sign" = "nothing";
  const written = new Set<number>();

  const isOptional = (index: number) => parts[index]?.kind === "optional";
  const piece = (): FormPart | undefined => parts[at]?.inside[within];
  const takesUnit = () =>
    piece()?.kind === "quantity" ||
    (piece()?.kind === "choice" && (piece()?.words.includes("unit") ?? false));

  function begin(index: number, inner: number): boolean {
    at = index;
    within = inner;
    written.add(index);
    const kind = piece()?.kind;
    said = kind === "quantity" ? "number" : kind === "choice" && takesUnit() ? "unit" : "nothing";
    fitting += 1;
    return true;
  }

  const fits = (part: FormPart | undefined, token: IToken, isTouched: boolean): boolean => {
    if (!part) return false;
    if (part.kind === "optional") return fits(part.inside[0], token, isTouched);
    if (part.kind === "word" || part.kind === "choice") {
      const { words } = part;
      const isStart = isTouched && words.some((word) => word.startsWith(token.image));
      if (words.includes(token.image) || isStart) return true;
      return part.kind === "choice" && begins.choice(token, part);
    }
    return begins[part.kind as Exclude<PartKind, "word">](token, part);
  };

  /** Goes on inside a quantity: its unit, `as CaCO3`, and what it may be off. */
  function goesOn(token: IToken, isTouched: boolean): boolean {
    if (!takesUnit() || said === "nothing") return false;
    const { tokenType, image } = token;
    if (tokenType === stroke) said = "stroke";
    else if (tokenType === plusMinus) said = "sign";
    else if (said === "sign" && tokenType === numberWord) said = "number";
    else if (tokenType === asCaCO3) said = "unit";
    else if (said === "stroke" && isUnit(token)) said = "unit";
    else if (said === "number" && isUnit(token) && !(startsNext(token, isTouched) && !isUnitSpelling(image)))
      said = "unit";
    else return false;
    fitting += 1;
    return true;
  }

  /** Where a word could go on: inside brackets, then the next parts up to the first that must be there. */
  function candidates(): number[] {
    const list: number[] = [];
    for (let index = at + 1; index < parts.length; index += 1) {
      list.push(index);
      if (!isOptional(index)) return list;
    }
    // Parts that may be left out stand in any order.
    let first = at;
    while (first > 0 && isOptional(first) && isOptional(first - 1)) first -= 1;
    for (let index = Math.max(first, 0); index < at; index += 1) {
      if (isOptional(index) && !written.has(index)) list.push(index);
    }
    return list;
  }

  const startsNext = (token: IToken, isTouched: boolean): boolean =>
    fits(parts[at]?.inside[within + 1], token, isTouched) ||
    candidates().some((index) => fits(parts[index], token, isTouched));

  function take(token: IToken, isTouched: boolean): boolean {
    if (at >= 0 && goesOn(token, isTouched)) return true;
    if (token.tokenType === comma && repeatsFrom !== null && at >= repeatsFrom) {
      at = repeatsFrom - 1;
      within = parts[at]!.inside.length;
      said = "nothing";
      for (let index = repeatsFrom; index < parts.length; index += 1) written.delete(index);
      fitting += 1;
      return true;
    }
    const inside = parts[at]?.inside ?? [];
    for (let inner = within + 1; at >= 0 && inner < inside.length; inner += 1) {
      if (fits(inside[inner], token, isTouched)) return begin(at, inner);
      if (inside[inner]?.kind !== "optional") break;
    }
    const found = candidates().find((index) => fits(parts[index], token, isTouched));
    return found === undefined ? false : begin(found, 0);
  }

  function next(): number | null {
    const inside = parts[at]?.inside ?? [];
    const isOpen = said === "number" || said === "stroke" || said === "sign";
    if (isOpen && takesUnit()) return at;
    if (at >= 0 && within + 1 < inside.length && inside[within + 1]?.kind !== "optional") return at;
    return following();
  }

  function following(): number | null {
    const list = candidates();
    const must = list.find((index) => !isOptional(index));
    if (must !== undefined) return must;
    return list.find((index) => !written.has(index)) ?? null;
  }

  return { take, next, current: () => (at < 0 ? null : at), fitting: () => fitting };
}
