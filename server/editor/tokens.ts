/** What each word is, for colouring: the standard types of editors, from the words and the comment of each line. */
import type { Span } from "../../grammar/syntax.ts";
import { linesAtOnce } from "../culture/keep.ts";
import type { Farm } from "../farm.ts";
import { type LineInFarm, lineIn } from "./cursor.ts";
import { type LookUp, lookUp } from "./things.ts";
import { type LineWord, type ThingKind, type WordRole, wordsIn } from "./words.ts";

export const tokenTypes = [
  ...["comment", "keyword", "number", "string", "operator", "type", "property", "parameter"],
  ...["namespace", "class", "struct", "interface", "variable", "function", "enumMember", "macro"],
] as const;
export type TokenType = (typeof tokenTypes)[number];

export const tokenModifiers = ["declaration", "defaultLibrary"] as const;
export type TokenModifier = (typeof tokenModifiers)[number];

export interface Token extends Span {
  readonly line: number;
  readonly type: TokenType;
  readonly modifiers: readonly TokenModifier[];
}

const typeOfThing: Readonly<Record<ThingKind, TokenType>> = {
  system: "namespace",
  solution: "class",
  reagent: "enumMember",
  saltwater: "struct",
  kit: "interface",
  tank: "variable",
  displacement: "variable",
  cohort: "variable",
  pump: "function",
};

const typeOfRole: Readonly<Record<Exclude<WordRole, "name" | "unknown">, TokenType>> = {
  keyword: "keyword",
  parameter: "property",
  number: "number",
  unit: "type",
  moment: "macro",
  time: "macro",
  text: "string",
  path: "string",
  person: "parameter",
  formula: "string",
  sign: "operator",
};

/** The tokens of some lines in order, none over another, pausing now and then. */
export function* tokens(
  farm: Farm,
  file: string,
  first = 0,
  last = Number.POSITIVE_INFINITY,
): Generator<void, readonly Token[]> {
  const found: Token[] = [];
  const names = lookUp(farm);
  const count = farm.documents.get(file)?.lines.length ?? 0;
  for (let number = first; number <= last && number < count; number += 1) {
    if (number % linesAtOnce === 0) yield;
    addTokens(lineIn(farm, file, number)!, names, found);
  }
  return found;
}

const plain: readonly TokenModifier[] = [];

function addTokens(line: LineInFarm, names: LookUp, found: Token[]): void {
  const { number } = line;
  const { comment } = line.line;
  const add = ({ start, end }: Span, type: TokenType, modifiers = plain): void => {
    found.push({ line: number, start, end, type, modifiers });
  };
  for (const word of wordsIn(line.line)) {
    const { role } = word;
    if (role !== "name" && role !== "unknown") add(word, typeOfRole[role]);
    else addName(line, word, names, add);
  }
  if (comment) add(comment, "comment");
}

/** A word that can't be read is coloured only where it is a name that somebody knows. */
function addName(
  line: LineInFarm,
  word: LineWord,
  names: LookUp,
  add: (span: Span, type: TokenType, modifiers: readonly TokenModifier[]) => void,
): void {
  const { role, name } = word;
  const thing = name && names.thingOf(line, word);
  const kind = thing?.kind ?? (role === "name" ? name?.kinds[0] : undefined);
  if (!kind) return;
  const modifiers: TokenModifier[] = [];
  if (name?.declares) modifiers.push("declaration");
  if (thing?.builtIn) modifiers.push("defaultLibrary");
  add(word, typeOfThing[kind], modifiers);
}

/** A change to a list of numbers, as the protocol has it. */
export interface NumbersEdit {
  readonly start: number;
  readonly deleteCount: number;
  readonly data: readonly number[];
}

/** What makes one list of numbers out of another: what differs between the beginnings and the ends that they share. */
export function numbersEdits(before: readonly number[], after: readonly number[]): readonly NumbersEdit[] {
  const most = Math.min(before.length, after.length);
  let start = 0;
  while (start < most && before[start] === after[start]) start += 1;
  let end = 0;
  while (end < most - start && before[before.length - 1 - end] === after[after.length - 1 - end]) end += 1;
  const deleteCount = before.length - end - start;
  const data = after.slice(start, after.length - end);
  return deleteCount === 0 && data.length === 0 ? [] : [{ start, deleteCount, data }];
}
