/** Reads a chemical formula as printed on a label, and weighs it exactly. */
import { atomicWeightText, type ElementSymbol, isElement } from "./elements.ts";

/** How many atoms of each element one formula unit holds; thousandths at the finest (`CaSO4·0.5H2O`). */
export type Elements = ReadonlyMap<ElementSymbol, number>;

export type FormulaFailure =
  | "empty"
  | "too-long"
  | "unknown-element"
  | "unexpected-character"
  | "unclosed-bracket"
  | "unopened-bracket"
  | "nothing-to-count"
  | "number-too-large";

export type Formula =
  | { readonly ok: true; readonly elements: Elements }
  /** `at`: offset of the offending character in the text. */
  | { readonly ok: false; readonly at: number; readonly reason: FormulaFailure };

/** Longest formula read, deepest brackets, largest number in it: generous for any salt, small for a machine. */
const longest = 80;
const deepest = 8;
const largestNumber = 999;

const closing: Readonly<Record<string, string>> = { "(": ")", "[": "]" };
const separators = "·.*•";
/** Counts are kept in thousandths, so that decimal coefficients add up exactly. */
const parts = 1000;

type Counts = Map<ElementSymbol, number>;
type Group = { readonly counts: Counts; readonly close: string; readonly at: number };

type Failure = Extract<Formula, { ok: false }>;

function failure(at: number, reason: FormulaFailure): Failure {
  return { ok: false, at, reason };
}

/**
 * The elements of a formula: `NaHCO3`, `Mg(OH)2`, `SrCl2·6H2O`, `CaSO4*0.5H2O`.
 *
 * The hydrate dot may be `·`, `.`, `*` or `•`; brackets `( )` and `[ ]` nest; a part may begin with a
 * coefficient. Subscripts are whole, so `MgCl2.6H2O` is a hexahydrate, never 2.6 chlorine.
 */
export function parseFormula(text: string): Formula {
  if (text.length > longest) return failure(longest, "too-long");
  const total: Counts = new Map();
  let at = 0;
  while (true) {
    const part = readPart(text, at);
    if ("reason" in part) return part;
    for (const [element, count] of part.counts) total.set(element, (total.get(element) ?? 0) + count);
    at = part.end;
    if (at >= text.length) break;
    at += 1; // the hydrate dot
  }
  const elements = new Map([...total].map(([element, count]) => [element, count / parts] as const));
  return { ok: true, elements };
}

/** One part between hydrate dots, from its coefficient to its end. */
function readPart(text: string, start: number): Failure | { counts: Counts; end: number } {
  const coefficient = /^\d+(?:\.\d{1,3})?(?=[A-Z([])/.exec(text.slice(start))?.[0];
  const times = coefficient === undefined ? parts : Math.round(Number(coefficient) * parts);
  if (times > largestNumber * parts) return failure(start, "number-too-large");
  if (times === 0) return failure(start, "nothing-to-count");
  let at = start + (coefficient?.length ?? 0);

  const groups: Group[] = [{ counts: new Map(), close: "", at: start }];
  while (at < text.length) {
    const group = groups.at(-1)!;
    const character = text[at]!;
    if (closing[character] !== undefined) {
      if (groups.length > deepest) return failure(at, "too-long");
      groups.push({ counts: new Map(), close: closing[character], at });
      at += 1;
    } else if (character === ")" || character === "]") {
      if (groups.length === 1) return failure(at, "unopened-bracket");
      if (character !== group.close) return failure(at, "unexpected-character");
      if (group.counts.size === 0) return failure(group.at, "empty");
      const subscript = readSubscript(text, at + 1);
      if ("reason" in subscript) return subscript;
      groups.pop();
      for (const [element, count] of group.counts)
        add(groups.at(-1)!.counts, element, count * subscript.count);
      at = subscript.end;
    } else if (separators.includes(character)) {
      break;
    } else {
      const symbol = readSymbol(text, at);
      if (typeof symbol !== "string") return symbol;
      const subscript = readSubscript(text, at + symbol.length);
      if ("reason" in subscript) return subscript;
      add(group.counts, symbol, subscript.count);
      at = subscript.end;
    }
  }
  if (groups.length > 1) return failure(groups.at(-1)!.at, "unclosed-bracket");
  const counts = groups[0]!.counts;
  if (counts.size === 0) return failure(at, "empty");
  for (const [element, count] of counts) {
    // Nested brackets could multiply up to numbers that are no longer exact.
    if (count * times > largestNumber * largestNumber * parts) return failure(start, "number-too-large");
    counts.set(element, count * times);
  }
  return { counts, end: at };
}

/** The element at this place: two letters where they name one, else one. */
function readSymbol(text: string, at: number): ElementSymbol | Failure {
  const letters = /^[A-Z][a-z]?/.exec(text.slice(at, at + 2))?.[0];
  if (letters === undefined) return failure(at, "unexpected-character");
  return isElement(letters) ? letters : failure(at, "unknown-element");
}

/** The whole number behind an element or bracket; 1 where none stands. */
function readSubscript(text: string, at: number): Failure | { count: number; end: number } {
  const digits = /^\d*/.exec(text.slice(at))![0];
  const count = digits === "" ? 1 : Number(digits);
  if (count > largestNumber) return failure(at, "number-too-large");
  if (count === 0) return failure(at, "nothing-to-count");
  return { count, end: at + digits.length };
}

function add(counts: Counts, element: ElementSymbol, count: number): void {
  counts.set(element, (counts.get(element) ?? 0) + count);
}

/** Decimals of the finest atomic weight, times those of a count: an exact sum fits whole multiples of this. */
const weightDecimals = 4;
const countDecimals = 3;

/** Molar mass in g/mol as exact decimal text: the sum of the atomic weights without any rounding. */
export function molarMassText(elements: Elements): string {
  let sum = 0n;
  for (const [element, count] of elements) {
    const [whole, decimals = ""] = atomicWeightText[element].split(".");
    sum += BigInt(whole + decimals.padEnd(weightDecimals, "0")) * BigInt(Math.round(count * parts));
  }
  const digits = sum.toString().padStart(weightDecimals + countDecimals + 1, "0");
  const point = digits.length - weightDecimals - countDecimals;
  return `${digits.slice(0, point)}.${digits.slice(point)}`.replace(/\.?0+$/, "");
}

/** Molar mass in g/mol: the double nearest to the exact sum. */
export function molarMass(elements: Elements): number {
  return Number(molarMassText(elements));
}
