/** Reagents, and what a recipe's line makes of one: its share of the solution, its moles, what it adds. */
import type { ReagentFact, Word } from "../../../grammar/syntax.ts";
import { causticPrecautions } from "../../checks/hazard.ts";
import { molarMassText, parseFormula } from "../../chemistry/formula.ts";
import { isCaustic } from "../../chemistry/hazards.ts";
import { type Composition, isReagent, reagents } from "../../chemistry/reagents.ts";
import { drySalt, saturatedStrength, solutionDensityGPerL } from "../../chemistry/solubility.ts";
import type { Line as BoundLine } from "../../culture/binder.ts";
import { defaults } from "../../culture/defaults.ts";
import { factAt } from "../../culture/history.ts";
import type { Declaration } from "../../culture/names.ts";
import { type PureReagent, reagentNamed } from "../../culture/reagent.ts";
import type { Farm } from "../../farm.ts";
import { toDouble } from "../../quantity/decimal.ts";
import { readPlain } from "../../quantity/plain.ts";
import { amount, digits, papers, percent, type Told } from "./parts.ts";
import type { Spot, StatementOf, Tells } from "./spot.ts";

/** What a word means as a reagent now; null where nobody knows it. */
function meaningOf(farm: Farm, file: string, word: Word, at: number): PureReagent | null {
  const line = (of: string, number: number): BoundLine => ({
    ...{ file: of, line: number, system: null, names: farm.bound.names, used: new Set<string>() },
    report: () => {},
  });
  const factsOf = ({ sections }: Declaration) =>
    sections.flatMap(({ file: own, section }) => {
      const document = farm.documents.get(own);
      const range = document?.sections[section];
      const lines = document?.lines.slice(range?.firstLine, (range?.lastLine ?? 0) + 1) ?? [];
      return lines.flatMap(({ statement }, index) =>
        statement?.kind === "is" || statement?.kind === "formula"
          ? [{ line: line(own, (range?.firstLine ?? 0) + index), fact: statement as ReagentFact }]
          : [],
      );
    });
  return factAt(reagentNamed(line(file, 0), word, factsOf) ?? undefined, at)?.value ?? null;
}

const ions = [
  ["sodium", "sodiumMmolPerG"],
  ["potassium", "potassiumMmolPerG"],
  ["calcium", "calciumMmolPerG"],
  ["magnesium", "magnesiumMmolPerG"],
  ["strontium", "strontiumMmolPerG"],
  ["chloride", "chlorideMmolPerG"],
  ["sulfate", "sulfateMmolPerG"],
] as const satisfies readonly (readonly [keyof PureReagent["weights"], keyof Composition])[];

/** What so many grams bring: `1.57 meq of alkalinity, 36.1 mg of sodium`. */
function broughtText({ composition, purity, weights }: PureReagent, grams: number): string {
  const pure = grams * purity;
  const alkalinity = composition.alkalinityMeqPerG;
  return [
    ...(alkalinity === null ? ["an unknown alkalinity"] : []),
    ...(alkalinity ? [amount(pure * alkalinity, "meq of alkalinity")] : []),
    ...ions.flatMap(([ion, field]) =>
      composition[field] > 0 ? [amount(pure * composition[field] * weights[ion], `mg of ${ion}`)] : [],
    ),
  ].join(", ");
}

const formulaOf = ({ builtIn }: PureReagent): string | null =>
  builtIn !== null && isReagent(builtIn) ? reagents[builtIn].formula : null;

const cautionOf = ({ builtIn }: PureReagent): string[] =>
  builtIn !== null && isReagent(builtIn) && isCaustic(builtIn)
    ? [`Caustic. ${causticPrecautions.split(";").slice(0, 2).join(";")}.`]
    : [];

const purityText = ({ purity }: PureReagent): string =>
  purity === 1 ? "pure" : `${digits(100 * purity, 4)} % pure`;

const molarMassLine = (pure: PureReagent): string => {
  const formula = formulaOf(pure);
  return `${formula ? `${formula}: ` : ""}${digits(pure.composition.molarMassGPerMol, 5)} g/mol, ${purityText(pure)}.`;
};

/** The lines of the solution's section that the spot stands in. */
const recipeLines = ({ under }: Spot) => {
  const { document, section } = under.line;
  return section === null ? [] : document.lines.slice(section.firstLine, section.lastLine + 1);
};

/** A volume, a mass or a temperature that the recipe states; null where it can't be read. */
function stated(spot: Spot, kind: "make-up" | "keep"): number | null {
  for (const { statement } of recipeLines(spot)) {
    if (statement?.kind !== kind) continue;
    const read =
      statement.kind === "make-up"
        ? readPlain(statement.volume, "volume")
        : statement.kind === "keep"
          ? readPlain(statement.temperature, "temperature")
          : null;
    if (read?.ok) return toDouble(read.value.value);
  }
  return null;
}

function grams({ mass }: StatementOf<"dissolve">): number | null {
  const read = readPlain(mass, "mass");
  return read.ok ? toDouble(read.value.value) : null;
}

export const dissolveTold: Tells = (spot) => {
  const { farm, statement, place, at } = spot;
  if (statement.kind !== "dissolve") return null;
  const pure = meaningOf(farm, place.file, statement.reagent, at);
  const weighed = grams(statement);
  if (!pure || weighed === null || !(weighed > 0)) return null;
  const mol = (weighed * pure.purity) / pure.composition.molarMassGPerMol;
  const litres = stated(spot, "make-up");
  const called = formulaOf(pure) ?? statement.reagent.text;
  const shared = { blocks: [[molarMassLine(pure)], cautionOf(pure)] };
  if (litres === null || !(litres > 0)) {
    return {
      answer: `${amount(mol, `mol of ${called}`)}, in a volume that isn't stated: make up to is missing.`,
      ...shared,
    };
  }
  const temperature = stated(spot, "keep");
  const density = densityGPerL(spot, litres, temperature ?? defaults.storage.value);
  const share = weighed / litres / density;
  const perMl = broughtText(pure, weighed / litres / 1000);
  return {
    answer: `${percent(share)} by mass, ${amount(mol, "mol")} in ${amount(litres, "L")}; adds ${perMl} to each mL.`,
    ...shared,
    assumptions: [
      {
        what: "density of the solution",
        value: `${digits(density / 1000, 3)} kg/L`,
        basis: "water and 0.64 of the dry salt, from memory",
      },
      ...(temperature === null
        ? [{ what: defaults.storage.what, value: defaults.storage.text, basis: defaults.storage.basis }]
        : []),
    ],
    sources: pure.composition.alkalinityMeqPerG ? [papers.alkalinity] : [],
  };
};

/** Density of the whole recipe, all its known salts counted, g/L. */
function densityGPerL(spot: Spot, litres: number, degC: number): number {
  const dry = recipeLines(spot).reduce((sum, { statement }) => {
    if (statement?.kind !== "dissolve") return sum;
    const weighed = grams(statement);
    const pure = meaningOf(spot.farm, spot.place.file, statement.reagent, spot.at);
    if (!pure || weighed === null) return sum;
    const known = pure.builtIn !== null && isReagent(pure.builtIn) ? drySalt(pure.builtIn) : null;
    return sum + weighed * (known?.gramsPerGram ?? 1);
  }, 0);
  return solutionDensityGPerL(dry / litres, degC);
}

const isLime = ({ builtIn }: PureReagent): boolean =>
  builtIn === "calcium-hydroxide" || builtIn === "calcium-oxide";

export const saturatedTold: Tells = (spot) => {
  const { farm, statement, place, at } = spot;
  if (statement.kind !== "saturated") return null;
  const pure = meaningOf(farm, place.file, statement.reagent, at);
  if (!pure) return null;
  const temperature = stated(spot, "keep");
  const degC = temperature ?? defaults.storage.value;
  const gramsPerL =
    pure.builtIn !== null && isReagent(pure.builtIn) ? saturatedStrength(pure.builtIn, degC) : null;
  const assumptions =
    temperature === null
      ? [{ what: defaults.storage.what, value: defaults.storage.text, basis: defaults.storage.basis }]
      : [];
  if (gramsPerL === null) {
    return {
      answer: "How much of it dissolves isn't known, so neither is the strength.",
      blocks: [[molarMassLine(pure)], cautionOf(pure)],
      assumptions,
    };
  }
  const clear = { ...pure, purity: 1 };
  const share = gramsPerL / solutionDensityGPerL(gramsPerL, degC);
  return {
    answer: `${amount(gramsPerL, "g")} (${amount((1000 * gramsPerL) / pure.composition.molarMassGPerMol, "mmol")}) in a litre of the clear part at ${digits(degC, 3)} °C, ${percent(share)} by mass; ${broughtText(clear, gramsPerL / 1000)} in each mL.`,
    blocks: [[molarMassLine(pure)], cautionOf(pure)],
    assumptions,
    sources: [
      isLime(pure) ? papers.lime : papers.solubility,
      ...(pure.composition.alkalinityMeqPerG ? [papers.alkalinity] : []),
    ],
  };
};

/** A reagent by its name: what it is and what a gram of it brings. */
export const reagentTold: Tells = (spot) => {
  const { farm, under, place, at } = spot;
  const { word, thing } = under;
  if (thing?.kind !== "reagent" || !word) return null;
  const pure = meaningOf(farm, place.file, { text: thing.name, start: word.start, end: word.end }, at);
  return pure ? reagentText(thing.name, pure) : null;
};

function reagentText(name: string, pure: PureReagent): Told {
  const title = pure.builtIn !== null && isReagent(pure.builtIn) ? reagents[pure.builtIn].title : null;
  return {
    answer: `1 g of ${name} brings ${broughtText(pure, 1)}.`,
    blocks: [[...(title ? [`${title}.`] : []), molarMassLine(pure)], cautionOf(pure)],
    sources: pure.composition.alkalinityMeqPerG ? [papers.alkalinity] : [],
  };
}

/** `is` and `formula` lines: the reagent that they make. */
export const reagentLineTold: Tells = ({ farm, statement, under, place, at }) => {
  if (statement.kind === "formula") {
    const parsed = parseFormula(statement.formula.text);
    if (!parsed.ok) return null;
    const header = under.line.section?.name;
    const pure = header && meaningOf(farm, place.file, header, at);
    const weight = `${statement.formula.text}: ${digits(Number(molarMassText(parsed.elements)), 5)} g/mol`;
    return {
      answer: `${weight}.`,
      blocks: pure && header ? [[`1 g of ${header.text} brings ${broughtText(pure, 1)}.`]] : [],
    };
  }
  const header = under.line.section?.name;
  const pure = header && meaningOf(farm, place.file, header, at);
  return header && pure ? reagentText(header.text, pure) : null;
};

/** What a mass of a reagent is in moles and brings in all, for the store. */
export function massText(
  farm: Farm,
  file: string,
  reagent: Word,
  weighedG: number,
  at: number,
): string | null {
  const pure = meaningOf(farm, file, reagent, at);
  if (!pure) return null;
  const { molarMassGPerMol, alkalinityMeqPerG } = pure.composition;
  const mol = amount((weighedG * pure.purity) / molarMassGPerMol, "mol");
  const equivalents = alkalinityMeqPerG
    ? ` (${amount((weighedG * pure.purity * alkalinityMeqPerG) / 1000, "eq")} of alkalinity)`
    : "";
  return `${mol}${equivalents}, ${purityText(pure)}`;
}
