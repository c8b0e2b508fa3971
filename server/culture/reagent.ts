/** What a reagent's name in a recipe stands for: a built-in salt, or one of the farm's own. */
import { nearestWords } from "../../grammar/nearest.ts";
import type { QuantityText, ReagentFact, Word } from "../../grammar/syntax.ts";
import { atomicWeight } from "../chemistry/elements.ts";
import { parseFormula } from "../chemistry/formula.ts";
import {
  ambiguousReagents,
  type Composition,
  composition,
  isReagent,
  reagentElements,
  reagents,
} from "../chemistry/reagents.ts";
import { type Line, named, placeOf, shareQuantity } from "./binder.ts";
import { enter } from "./enter.ts";
import { addEntry, changesOf, type Entry, entryOf, factAt, type History } from "./history.ts";
import type { Declaration } from "./names.ts";
import { resolve } from "./names.ts";

export interface PureReagent {
  readonly composition: Composition;
  /** Mass fraction of the salt. */
  readonly purity: number;
  /** The built-in reagent behind it; null for a formula of the farm's own. */
  readonly builtIn: string | null;
  /** g/mol of the ions that masses are told of. */
  readonly weights: typeof ionWeights;
}

const ionWeights = {
  sodium: atomicWeight.Na,
  potassium: atomicWeight.K,
  calcium: atomicWeight.Ca,
  magnesium: atomicWeight.Mg,
  strontium: atomicWeight.Sr,
  chloride: atomicWeight.Cl,
  sulfate: atomicWeight.S + 4 * atomicWeight.O,
} as const;

/** A reagent may be called by another name of the farm's, and that by another, so often. */
const longestChain = 8;

type FactsOf = (declaration: Declaration) => readonly { readonly line: Line; readonly fact: ReagentFact }[];

/** The reagent that a word names, over time; null after reporting. */
export function reagentNamed(
  line: Line,
  word: Word,
  factsOf: FactsOf,
  chain = longestChain,
): History<PureReagent> | null {
  const offers = ambiguousReagents.get(word.text);
  const visible = line.names.visible.get(line.file)?.get(word.text);
  if (visible?.kind === "reagent") {
    named(line, word, ["reagent"]);
    return chain > 0 ? ownReagent(visible, factsOf, chain) : null;
  }
  if (isReagent(word.text)) {
    const pure = {
      composition: composition(reagentElements(word.text)),
      purity: 1,
      builtIn: word.text,
      weights: ionWeights,
    };
    return [entryOf({ from: null, until: null }, pure, placeOf(line, word))];
  }
  if (offers) {
    line.report({
      code: "name/ambiguous-reagent",
      place: placeOf(line, word),
      system: line.system,
      word: word.text,
      offers,
    });
    return null;
  }
  const result = resolve(line.names, line.file, line.line, word, ["reagent"], line.system);
  if ("finding" in result && result.finding.code === "name/undeclared" && "nearest" in result.finding) {
    const nearest = [...result.finding.nearest, ...nearestWords(word.text, Object.keys(reagents))];
    line.report({ ...result.finding, nearest });
  }
  return null;
}

/** Works out a reagent of the farm's own: of its `is` and `formula` lines the newest in force counts. */
function ownReagent(declaration: Declaration, factsOf: FactsOf, chain: number): History<PureReagent> | null {
  const lines: Entry<History<PureReagent>>[] = [];
  for (const { line, fact } of factsOf(declaration)) {
    const named =
      fact.kind === "is"
        ? reagentNamed(silent(line), fact.reagent, factsOf, chain - 1)
        : fact.kind === "formula"
          ? byFormula(line, fact.formula.text)
          : null;
    if (!named || (fact.kind !== "is" && fact.kind !== "formula")) continue;
    const purity = purityOf(line, fact.purity);
    if (purity === null) continue;
    const impure = named.map((entry) => ({
      ...entry,
      value: { ...entry.value, purity: entry.value.purity * purity },
    }));
    addEntry(lines, entryOf(fact, impure, placeOf(line, null)));
  }
  const changes = changesOf([lines, ...lines.map(({ value }) => value)]);
  const history = [Number.NEGATIVE_INFINITY, ...changes].flatMap((from, index) => {
    const until = changes[index] ?? Number.POSITIVE_INFINITY;
    const minute = Number.isFinite(from) ? from : Math.min(until, Number.MAX_SAFE_INTEGER) - 1;
    const found = factAt(factAt(lines, minute)?.value, minute);
    return found ? [{ ...found, from, until }] : [];
  });
  return history.length > 0 ? history : null;
}

function byFormula(line: Line, formula: string): History<PureReagent> | null {
  const parsed = parseFormula(formula);
  if (!parsed.ok) return null;
  const pure = {
    composition: composition(parsed.elements),
    purity: 1,
    builtIn: builtInOf(formula),
    weights: ionWeights,
  };
  return [entryOf({ from: null, until: null }, pure, placeOf(line, null))];
}

/** The built-in reagent with the same formula, so that solubilities are found. */
function builtInOf(formula: string): string | null {
  const plain = (text: string) => text.replace(/[.*•]/g, "·");
  return (
    Object.entries(reagents).find(([, reagent]) => plain(reagent.formula) === plain(formula))?.[0] ?? null
  );
}

function purityOf(line: Line, purity: QuantityText | null): number | null {
  return purity ? shareQuantity(silent(line), purity) : 1;
}

/** The section's own lines are reported once, where they are checked, not at every mention. */
const silent = (line: Line): Line => ({ ...line, report: () => {} });

/** The reagents that one is called in turn end in one that is known, and soon. */
function endsWell(line: Line, reagent: Word, factsOf: FactsOf, chain = longestChain): boolean {
  const own = line.names.visible.get(line.file)?.get(reagent.text);
  if (own?.kind !== "reagent") return true;
  if (chain <= 0) return false;
  return factsOf(own).every(
    (next) => next.fact.kind !== "is" || endsWell(next.line, next.fact.reagent, factsOf, chain - 1),
  );
}

/** Checks the lines of a reagent's own section. */
export function checkReagent(declaration: Declaration, header: Line, factsOf: FactsOf): void {
  const lines = factsOf(declaration);
  if (!lines.some(({ fact }) => fact.kind === "is" || fact.kind === "formula")) {
    const place = placeOf(header, null);
    header.report({ code: "syntax/unfinished", place, system: null, expected: ["is", "formula"] });
  }
  const said: Entry<ReagentFact["kind"]>[] = [];
  for (const { line, fact } of lines) {
    if ((fact.kind === "is" || fact.kind === "formula") && fact.purity) shareQuantity(line, fact.purity);
    if (fact.kind === "is" || fact.kind === "formula") enter(line, said, fact, fact.kind, fact.kind);
    if (fact.kind === "is" && !endsWell(line, fact.reagent, factsOf)) {
      line.report({
        code: "syntax/unknown-word",
        place: placeOf(line, fact.reagent),
        system: null,
        word: fact.reagent.text,
        expected: ["a reagent that isn't called by this one's name again"],
        nearest: [],
      });
    } else if (fact.kind === "is") reagentNamed(line, fact.reagent, factsOf);
    if (fact.kind !== "formula") continue;
    const parsed = parseFormula(fact.formula.text);
    if (!parsed.ok) {
      const start = fact.formula.start + parsed.at;
      const span = { start: Math.min(start, fact.formula.end - 1), end: fact.formula.end };
      line.report({
        code: "syntax/unknown-word",
        place: placeOf(line, span),
        system: null,
        word: fact.formula.text.slice(parsed.at) || fact.formula.text,
        expected: ["a chemical formula, for example SrCl2·6H2O"],
        nearest: [],
      });
    }
  }
}
