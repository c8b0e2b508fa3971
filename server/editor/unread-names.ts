/**
 * Names on lines that can't be read: a slip at a line's end must not hide what the line speaks of. Goes by the word
 * that the line begins with; whether such a name stands for anything is asked of the farm.
 */
import type { IToken } from "chevrotain";
import type { DocumentLine } from "../../grammar/document.ts";
import { type SectionKind, sectionKinds } from "../../grammar/syntax.ts";
import {
  dateWord,
  isReserved,
  keyword,
  nameWord,
  numberWord,
  spanOf,
  timeWord,
} from "../../grammar/tokens.ts";
import { type ThingKind, thingKinds } from "./thing-kinds.ts";
import type { LineWord } from "./words.ts";

const solution = ["solution"] as const;
const reagent = ["reagent"] as const;
const pump = ["pump"] as const;
const cohort = ["cohort"] as const;
const waters = ["saltwater", "system"] as const;

/** By a statement's first word, what the names behind it may stand for. */
const namedAfter: ReadonlyMap<string, readonly ThingKind[]> = new Map<string, readonly ThingKind[]>([
  ...["pump", "gave", "topped", "by-hand", "top-off", "mixed", "discarded"].map(
    (word) => [word, solution] as const,
  ),
  ...["dissolve", "saturated", "is", "received", "counted"].map((word) => [word, reagent] as const),
  ...["filled", "level", "calibrated", "stopped", "started"].map((word) => [word, pump] as const),
  ...["stocked", "removed"].map((word) => [word, cohort] as const),
  ...["renewed", "flows-through"].map((word) => [word, waters] as const),
  ["moved", ["cohort", "system"]],
  ["set", ["pump", "solution"]],
  ["read", ["kit"]],
]);

/** By a statement's first word, what the word behind it gives a name to. */
const declaredAfter: ReadonlyMap<string, ThingKind> = new Map<string, ThingKind>([
  ["tank", "tank"],
  ["displace", "displacement"],
  ["cohort", "cohort"],
  ["pump", "pump"],
]);

const isSection = (word: string): word is SectionKind => (sectionKinds as readonly string[]).includes(word);

/** What may be names on a line that can't be read, given its words. */
export function unreadNames({ text, findings }: DocumentLine, tokens: readonly IToken[]): LineWord[] {
  const words = tokens.filter(({ tokenType }) => tokenType !== dateWord && tokenType !== timeWord);
  const [first, ...rest] = words;
  if (!first) return [];
  // Where the first word is the slip, the line is taken for what it is nearest to.
  const [slip] = findings;
  const isSlip = slip?.code === "syntax/unknown-word" && slip.span.start === first.startOffset;
  const start = isSlip ? (slip.nearest.find(isSection) ?? slip.nearest[0]) : first.image;
  const named = (token: IToken, name: NonNullable<LineWord["name"]>): LineWord => {
    const span = spanOf(token);
    const role = name.declares ? "name" : "unknown";
    return { ...span, text: text.slice(span.start, span.end), role, name };
  };
  if (start !== undefined && isSection(start)) {
    const [name] = rest;
    if (!name || !isName(name) || start === "store") return [];
    const isLog = start === "log";
    return [named(name, { kinds: [isLog ? "system" : start], declares: !isLog })];
  }
  const declared = start === undefined ? undefined : declaredAfter.get(start);
  const kinds = start === undefined ? thingKinds : (namedAfter.get(start) ?? []);
  return rest.flatMap((token, index): LineWord[] => {
    const before = words[index]!;
    // Behind a number stands its unit, behind `by` a person.
    if (!isName(token) || before.tokenType === numberWord || before.tokenType === keyword.by) return [];
    if (index === 0 && declared) return [named(token, { kinds: [declared], declares: true })];
    return kinds.length > 0 ? [named(token, { kinds, declares: false })] : [];
  });
}

const isName = ({ image, tokenType }: IToken): boolean =>
  (tokenType.CATEGORIES?.includes(nameWord) ?? false) && !isReserved(image);
