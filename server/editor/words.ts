/** What each word of a line is there for: the one view of a line that all editor features share. */
import type { IToken } from "chevrotain";
import type { DocumentLine } from "../../grammar/document.ts";
import { longestLine } from "../../grammar/line.ts";
import { parameterOf } from "../../grammar/parameters.ts";
import type { NamedQuantity, Span, Statement, Word } from "../../grammar/syntax.ts";
import {
  asCaCO3,
  comma,
  cross,
  cut,
  dateWord,
  type Keyword,
  keyword,
  numberWord,
  plusMinus,
  quoted,
  spanOf,
  stroke,
  timeWord,
} from "../../grammar/tokens.ts";
import type { ThingKind } from "./thing-kinds.ts";
import { unreadNames } from "./unread-names.ts";

export { type OwnThing, type ThingKind, thingKinds } from "./thing-kinds.ts";

export type WordRole =
  | "keyword"
  | "name"
  | "parameter"
  | "number"
  | "unit"
  | "moment"
  | "time"
  | "text"
  | "path"
  | "person"
  | "formula"
  | "sign"
  | "unknown";

export interface LineWord extends Span {
  readonly text: string;
  readonly role: WordRole;
  /** Of a name: what it may stand for, best first, and whether this line declares it. */
  readonly name: { readonly kinds: readonly ThingKind[]; readonly declares: boolean } | null;
}

const waters = ["saltwater", "system"] as const;
const setBy = ["pump", "solution"] as const;

/** By the field of a statement that a word stands in, what it names. */
const namedBy: Readonly<Record<string, readonly ThingKind[]>> = {
  solution: ["solution"],
  water: waters,
  reagent: ["reagent"],
  kit: ["kit"],
  cohort: ["cohort"],
  pump: ["pump"],
  system: ["system"],
};

const nameFields = ["name", ...Object.keys(namedBy)];

/** By the kind of a statement, what its `name` is. */
const ownName: Readonly<Record<string, ThingKind>> = {
  tank: "tank",
  displace: "displacement",
  cohort: "cohort",
  pump: "pump",
};

const roleBy: Readonly<Record<string, WordRole>> = {
  parameter: "parameter",
  by: "person",
  path: "path",
  formula: "formula",
};

/**
 * All words of a line from left to right, signs too; the comment isn't one of them. A line that can't be read keeps
 * the names that its beginning calls for.
 */
export function wordsIn(line: DocumentLine): readonly LineWord[] {
  const { text, statement } = line;
  if (text.length > longestLine) return [];
  const { tokens } = cut(text);
  const known = statement ? wordsOfStatement(statement, text) : unreadNames(line, tokens);
  known.sort((left, right) => left.start - right.start);
  const words: LineWord[] = [];
  let next = 0;
  for (const [index, token] of tokens.entries()) {
    const { start, end } = spanOf(token);
    while (next < known.length && known[next]!.start < end) words.push(known[next++]!);
    if ((words.at(-1)?.end ?? 0) > start) continue;
    const role = roleOf(token, tokens[index - 1], statement !== null);
    words.push({ start, end, text: token.image, role, name: null });
  }
  return words;
}

/** The names among a line's words, found without cutting it where it could be read. */
export function namesIn(line: DocumentLine): readonly LineWord[] {
  const { text, statement } = line;
  if (!statement) return text.length > longestLine ? [] : unreadNames(line, cut(text).tokens);
  const names: LineWord[] = [];
  const add = (field: string, word: Word | null | undefined): void => {
    const name = word && nameOf(statement, field);
    if (!name) return;
    const { start, end } = word;
    names.push({ start, end, text: text.slice(start, end), role: "name", name });
  };
  const fields = statement as unknown as Readonly<Record<string, Word | null | undefined>>;
  for (const field of nameFields) add(field, fields[field]);
  if (statement.kind === "set" || statement.kind === "gave")
    for (const { name } of statement.items as readonly NamedQuantity[]) add("name", name);
  return names;
}

/** The words of a line that name a parameter, found the same way. */
export function parametersIn(line: DocumentLine): readonly Span[] {
  const { statement } = line;
  if (!statement) return wordsIn(line).filter(({ role }) => role === "parameter");
  if (statement.kind === "read") return statement.items.map(({ parameter }) => parameter);
  return "parameter" in statement ? [statement.parameter] : [];
}

/** The word that a cursor stands in or touches; where it stands between two, the one that isn't a sign. */
export function wordAt(words: readonly LineWord[], column: number): LineWord | null {
  const touched = words.filter(({ start, end }) => start <= column && column <= end);
  return touched.find(({ role }) => role !== "sign") ?? touched[0] ?? null;
}

function roleOf(token: IToken, before: IToken | undefined, isRead: boolean): WordRole {
  const { tokenType, image } = token;
  if (keyword[tokenType.LABEL as Keyword] === tokenType) return "keyword";
  if ([comma, stroke, plusMinus, cross].includes(tokenType)) return "sign";
  if (tokenType === asCaCO3) return "unit";
  if (tokenType === numberWord) return "number";
  if (tokenType === dateWord) return "moment";
  if (tokenType === timeWord) return before?.tokenType === dateWord ? "moment" : "time";
  if (tokenType === quoted) return "text";
  if (parameterOf(image)) return "parameter";
  return isRead ? "keyword" : "unknown";
}

function wordsOfStatement(statement: Statement, text: string): LineWord[] {
  const words: LineWord[] = [];
  const add = ({ start, end }: Span, role: WordRole, name: LineWord["name"] = null): void => {
    words.push({ start, end, text: text.slice(start, end), role, name });
  };
  const walk = (value: unknown, field: string): void => {
    if (Array.isArray(value)) for (const each of value) walk(each, field);
    if (typeof value !== "object" || value === null || Array.isArray(value)) return;
    const part = value as Readonly<Record<string, unknown>> & Span;
    if ("minute" in part) add(part, "timeKnown" in part ? "moment" : "time");
    else if ("borrowedUnit" in part) addQuantity(part as never, add);
    else if (typeof part.text === "string" && typeof part.start === "number") {
      const name = nameOf(statement, field);
      if (name) add(part, "name", name);
      else add(part, roleBy[field] ?? (/^["“”„]/.test(text[part.start] ?? "") ? "text" : "number"));
    } else for (const [key, each] of Object.entries(part)) walk(each, key);
  };
  walk(statement, "");
  return words;
}

function nameOf(statement: Statement, field: string): LineWord["name"] {
  if (field !== "name") {
    const kinds = namedBy[field];
    return kinds ? { kinds, declares: false } : null;
  }
  if (statement.kind === "header") {
    const { section } = statement;
    if (section === "log") return { kinds: ["system"], declares: false };
    return section === "store" ? null : { kinds: [section], declares: true };
  }
  if (statement.kind === "set") return { kinds: setBy, declares: false };
  if (statement.kind === "gave") return { kinds: namedBy.solution!, declares: false };
  const own = ownName[statement.kind];
  return own ? { kinds: [own], declares: true } : null;
}

interface QuantityParts extends Span {
  readonly number: Span;
  readonly unit: Span | null;
  readonly borrowedUnit: boolean;
  readonly asCaCO3: Span | null;
  readonly uncertainty: { readonly number: Span; readonly unit: Span | null } | null;
}

/** A borrowed unit stands with the number that it was borrowed from. */
function addQuantity(quantity: QuantityParts, add: (span: Span, role: WordRole) => void): void {
  add(quantity.number, "number");
  if (quantity.unit && !quantity.borrowedUnit) add(quantity.unit, "unit");
  const { asCaCO3: calcite, start, end, uncertainty } = quantity;
  if (calcite && calcite.start >= start && calcite.end <= end) add(calcite, "unit");
  if (!uncertainty) return;
  add(uncertainty.number, "number");
  if (uncertainty.unit) add(uncertainty.unit, "unit");
}
