/** Stock solutions: their strength over time from recipes, saturation or a printed strength. */

import { type Parameter, parameterOf } from "../../grammar/parameters.ts";
import type { Fact, ReagentFact, SolutionFact, Word } from "../../grammar/syntax.ts";
import { isCaustic } from "../chemistry/hazards.ts";
import { isReagent, type ReagentName } from "../chemistry/reagents.ts";
import { saturatedStrength } from "../chemistry/solubility.ts";
import { readStrength } from "../quantity/concentration.ts";
import {
  aboveZero,
  amountOf,
  defaultWater,
  type Line,
  parameterNamed,
  placeOf,
  plain,
  positive,
} from "./binder.ts";
import { defaults } from "./defaults.ts";
import { enter, into } from "./enter.ts";
import { changesOf, type Entry, factAt, type History } from "./history.ts";
import type { Assumption, Solution, Strength } from "./model.ts";
import type { Declaration } from "./names.ts";
import type { Place } from "./place.ts";
import { type PureReagent, reagentNamed } from "./reagent.ts";

/** A section of the solution: one recipe. */
export interface RecipeSection {
  readonly header: Line;
  readonly from: number | null;
  readonly lines: readonly { readonly line: Line; readonly fact: Fact }[];
  /** A line of it can't be read. */
  readonly hasUnreadLine: boolean;
}

interface Recipe {
  /**
   * All its lines could be read and bound. Else its strength is unknown: with an ingredient left out it would
   * pass for weaker than it is, and be overdosed.
   */
  isWhole: boolean;
  readonly from: number;
  readonly header: Line;
  readonly dissolved: Map<
    string,
    Entry<{ readonly reagent: History<PureReagent>; readonly grams: number }>[]
  >;
  readonly saturated: Entry<History<PureReagent>>[];
  readonly makeUpL: Entry<number>[];
  readonly keepDegC: Entry<number>[];
  readonly supplied: Map<string, Entry<Supplied>[]>;
}

interface Supplied {
  readonly parameter: Parameter;
  /** meq or mg in a millilitre. */
  readonly perMl: number;
  readonly as: "carbonate" | "bicarbonate" | "hydroxide" | null;
}

/** Binds one solution with all its recipes. */
export function bindSolution(
  declaration: Declaration,
  title: string | null,
  sections: readonly RecipeSection[],
  reagentFacts: (declaration: Declaration) => readonly { line: Line; fact: ReagentFact }[],
): Solution {
  const recipes = sections
    .map((section) => readRecipe(section, reagentFacts))
    .sort((left, right) => left.from - right.from);
  const assumptions: Assumption[] = [];
  const strengths: Entry<Strength>[] = [];
  for (const [index, recipe] of recipes.entries()) {
    const until = recipes[index + 1]?.from ?? Number.POSITIVE_INFINITY;
    strengths.push(...strengthsOf(recipe, until, declaration.name, assumptions));
  }
  const { ref, name, place } = declaration;
  return { ref, name, title, place, strengths, assumptions: distinct(assumptions) };
}

const distinct = (list: readonly Assumption[]): Assumption[] => [
  ...new Map(list.map((assumption) => [`${assumption.what} ${assumption.value}`, assumption])).values(),
];

function readRecipe(
  section: RecipeSection,
  reagentFacts: (declaration: Declaration) => readonly { line: Line; fact: ReagentFact }[],
): Recipe {
  const recipe: Recipe = {
    isWhole: !section.hasUnreadLine,
    from: section.from ?? Number.NEGATIVE_INFINITY,
    header: section.header,
    dissolved: new Map(),
    saturated: [],
    makeUpL: [],
    keepDegC: [],
    supplied: new Map(),
  };
  const who = mayHandle(section);
  for (const { line, fact } of section.lines) {
    const solutionFact = fact as SolutionFact;
    switch (solutionFact.kind) {
      case "dissolve": {
        const reagent = reagentNamed(line, solutionFact.reagent, reagentFacts);
        reportCaustic(line, solutionFact.reagent, reagent, who);
        const grams = positive(line, solutionFact.mass, "mass");
        if (!reagent || grams === null) {
          recipe.isWhole = false;
          break;
        }
        const history = into(recipe.dissolved, solutionFact.reagent.text);
        enter(line, history, solutionFact, { reagent, grams }, `dissolve ${solutionFact.reagent.text}`);
        break;
      }
      case "saturated": {
        const reagent = reagentNamed(line, solutionFact.reagent, reagentFacts);
        reportCaustic(line, solutionFact.reagent, reagent, who);
        if (reagent) enter(line, recipe.saturated, solutionFact, reagent, "saturated");
        else recipe.isWhole = false;
        break;
      }
      case "make-up": {
        const litres = aboveZero(line, solutionFact.volume, "volume");
        if (litres !== null) enter(line, recipe.makeUpL, solutionFact, litres, "make up to");
        else recipe.isWhole = false;
        break;
      }
      case "keep": {
        const degC = plain(line, solutionFact.temperature, "temperature");
        if (degC !== null) enter(line, recipe.keepDegC, solutionFact, degC, "keep at");
        break;
      }
      case "supplies":
        if (!readSupplied(line, solutionFact, recipe)) recipe.isWhole = false;
        break;
      case "acknowledge":
        break;
    }
  }
  reportUnfinished(section, recipe);
  return recipe;
}

/** Who may handle what is caustic in a recipe, as the section says. */
function mayHandle({ lines }: RecipeSection): string | null {
  for (const { fact } of lines) if (fact.kind === "acknowledge") return fact.who.text;
  return null;
}

/** A reagent that is caustic under any of the meanings that its name has over time. */
function reportCaustic(line: Line, word: Word, reagent: History<PureReagent> | null, who: string | null) {
  const names = (reagent ?? []).flatMap(({ value }) => value.builtIn ?? []).filter(isReagent);
  const caustic = names.findLast(isCaustic);
  if (!caustic) return;
  line.report({
    code: "hazard/caustic",
    place: placeOf(line, word),
    system: null,
    word: word.text,
    reagent: caustic,
    who,
  });
}

function readSupplied(
  line: Line,
  fact: Extract<SolutionFact, { kind: "supplies" }>,
  recipe: Recipe,
): boolean {
  const dissolves = (row: Parameter) => row.measure === "alkalinity" || row.measure === "dissolved";
  const parameter = parameterNamed(line, fact.parameter, dissolves);
  const read =
    parameter &&
    amountOf(line, fact.strength, parameter, readStrength(fact.strength, parameter), defaultWater);
  if (!parameter || !read || read.value < 0) return false;
  const history = into(recipe.supplied, parameter.name);
  const millilitresPerL = 1000;
  enter(
    line,
    history,
    fact,
    { parameter, perMl: read.value / millilitresPerL, as: fact.as },
    `supplies ${parameter.name}`,
  );
  return true;
}

/** A recipe that names nothing, or no volume to make up to, has no strength. */
function reportUnfinished(section: RecipeSection, recipe: Recipe): void {
  const kinds = new Set(section.lines.map(({ fact }) => fact.kind));
  const named = kinds.has("dissolve") || kinds.has("saturated") || kinds.has("supplies");
  const expected = !named
    ? ["dissolve", "saturated", "supplies"]
    : kinds.has("dissolve") && !kinds.has("make-up")
      ? ["make up to"]
      : [];
  if (expected.length === 0) return;
  const place: Place = { file: section.header.file, line: recipe.header.line, span: null };
  section.header.report({ code: "syntax/unfinished", place, system: null, expected });
}

/** The strengths of a recipe from its own `from` on, one entry for each change of its facts. */
function strengthsOf(
  recipe: Recipe,
  until: number,
  name: string,
  assumptions: Assumption[],
): Entry<Strength>[] {
  const histories: History<unknown>[] = [
    ...recipe.dissolved.values(),
    recipe.saturated,
    recipe.makeUpL,
    recipe.keepDegC,
    ...recipe.supplied.values(),
    ...[...recipe.dissolved.values()].flat().map(({ value }) => value.reagent),
    ...recipe.saturated.map(({ value }) => value),
  ];
  const starts = [
    recipe.from,
    ...changesOf(histories).filter((minute) => minute > recipe.from && minute < until),
  ];
  const entries: Entry<Strength>[] = [];
  for (const [index, from] of starts.entries()) {
    const minute = Number.isFinite(from) ? from : (starts[index + 1] ?? Number.MAX_SAFE_INTEGER) - 1;
    const strength = strengthAt(recipe, minute, name, assumptions);
    const place = { file: recipe.header.file, line: recipe.header.line, span: null };
    if (strength) entries.push({ from, until: starts[index + 1] ?? until, value: strength, place });
  }
  return entries;
}

const nothing: Strength = {
  alkalinityMeq: 0,
  calciumMg: 0,
  magnesiumMg: 0,
  potassiumMg: 0,
  strontiumMg: 0,
  sodiumMg: 0,
  chlorideMg: 0,
  sulfateMg: 0,
  carbonMmol: 0,
};

function strengthAt(
  recipe: Recipe,
  minute: number,
  name: string,
  assumptions: Assumption[],
): Strength | null {
  if (!recipe.isWhole) {
    const basis = "a line of its recipe can't be read";
    assumptions.push({ what: `strength of ${name}`, value: "unknown", basis });
    return null;
  }
  const supplied = inForce(recipe.supplied, minute);
  const parts = inForce(recipe.dissolved, minute);
  if (supplied.length > 0) {
    if (parts.length > 0 || factAt(recipe.saturated, minute)) {
      const basis = "a printed strength goes instead of a recipe";
      assumptions.push({ what: `strength of ${name}`, value: "as `supplies` says", basis });
    }
    return suppliedStrength(supplied, name, assumptions);
  }
  const makeUpL = factAt(recipe.makeUpL, minute)?.value;
  let strength: Strength | null = null;
  if (parts.length > 0) {
    if (!makeUpL) return null;
    let sum = nothing;
    for (const { reagent, grams } of parts) {
      const now = factAt(reagent, minute)?.value;
      if (!now) return null;
      sum = added(sum, now, grams / makeUpL);
    }
    strength = sum;
  }
  const stated = factAt(recipe.saturated, minute);
  const saturated = factAt(stated?.value, minute)?.value;
  if (!saturated) return stated ? null : strength;
  const kept = factAt(recipe.keepDegC, minute)?.value;
  if (kept === undefined)
    assumptions.push({
      what: `storage temperature of ${name}`,
      value: defaults.storage.text,
      basis: defaults.storage.basis,
    });
  const gramsPerL =
    saturated.builtIn && saturatedStrength(saturated.builtIn as ReagentName, kept ?? defaults.storage.value);
  if (!gramsPerL) {
    assumptions.push({ what: `strength of ${name}`, value: "unknown", basis: "no solubility known" });
    return null;
  }
  // Only what dissolves counts: the purity of the excess solid doesn't weaken the clear part.
  return added(strength ?? nothing, { ...saturated, purity: 1 }, gramsPerL);
}

const inForce = <T>(histories: ReadonlyMap<string, History<T>>, minute: number): T[] =>
  [...histories.values()].flatMap((history) => factAt(history, minute)?.value ?? []);

/** A strength with so many grams of a reagent in each litre added. */
function added(strength: Strength, reagent: PureReagent, gramsPerL: number): Strength {
  const gramsPerMl = (gramsPerL * reagent.purity) / 1000;
  const { composition, weights } = reagent;
  const plus = (before: number | null, perG: number | null, gPerMol = 1) =>
    before === null || perG === null ? null : before + gramsPerMl * perG * gPerMol;
  return {
    alkalinityMeq: plus(strength.alkalinityMeq, composition.alkalinityMeqPerG),
    calciumMg: plus(strength.calciumMg, composition.calciumMmolPerG, weights.calcium),
    magnesiumMg: plus(strength.magnesiumMg, composition.magnesiumMmolPerG, weights.magnesium),
    potassiumMg: plus(strength.potassiumMg, composition.potassiumMmolPerG, weights.potassium),
    strontiumMg: plus(strength.strontiumMg, composition.strontiumMmolPerG, weights.strontium),
    sodiumMg: plus(strength.sodiumMg, composition.sodiumMmolPerG, weights.sodium),
    chlorideMg: plus(strength.chlorideMg, composition.chlorideMmolPerG, weights.chloride),
    sulfateMg: plus(strength.sulfateMg, composition.sulfateMmolPerG, weights.sulfate),
    carbonMmol: plus(
      strength.carbonMmol,
      composition.alkalinityMeqPerG === null ? null : composition.carbonMmolPerG,
    ),
  };
}

/** Moles of dissolved inorganic carbon that come with an equivalent of alkalinity. */
const carbonPerEquivalent = { carbonate: 0.5, bicarbonate: 1, hydroxide: 0 } as const;

/** A bought solution: what its label doesn't name counts as none; its other salts are unknown. */
function suppliedStrength(supplied: readonly Supplied[], name: string, assumptions: Assumption[]): Strength {
  const of = (parameter: string) => supplied.find((entry) => entry.parameter.name === parameter)?.perMl ?? 0;
  const alkaline = supplied.find((entry) => entry.parameter === parameterOf("alkalinity"));
  if (alkaline && !alkaline.as)
    assumptions.push({ what: `alkalinity of ${name}`, value: "as carbonate", basis: "common practice" });
  return {
    alkalinityMeq: of("alkalinity"),
    calciumMg: of("calcium"),
    magnesiumMg: of("magnesium"),
    potassiumMg: of("potassium"),
    strontiumMg: of("strontium"),
    sodiumMg: null,
    chlorideMg: null,
    sulfateMg: null,
    carbonMmol: (alkaline?.perMl ?? 0) * carbonPerEquivalent[alkaline?.as ?? "carbonate"],
  };
}
