/** What a built-in reagent is, and what a gram of it brings into the water. */
import { molarMass, molarMassText, parseFormula } from "../../chemistry/formula.ts";
import {
  composition,
  isReagent,
  type ReagentName,
  reagentElements,
  reagents,
} from "../../chemistry/reagents.ts";

export interface ReagentTopic {
  readonly kind: "reagent";
  readonly reagent: ReagentName;
  readonly title: string;
  readonly formula: string;
  readonly molarMassGPerMol: number;
  readonly gramBrings: readonly { readonly what: string; readonly amount: string }[];
}

const massOf = (formula: string): number => {
  const parsed = parseFormula(formula);
  return parsed.ok ? molarMass(parsed.elements) : 0;
};

/** Digits in what a gram brings. */
const digits = 4;

export function reagentTopic(word: string): ReagentTopic | null {
  if (!isReagent(word)) return null;
  const { title, formula } = reagents[word];
  const elements = reagentElements(word);
  const gram = composition(elements);
  const mg = (what: string, mmol: number, ion: string) => ({ what, value: mmol * massOf(ion), unit: "mg" });
  const brings = [
    { what: "alkalinity", value: gram.alkalinityMeqPerG ?? 0, unit: "meq" },
    mg("calcium", gram.calciumMmolPerG, "Ca"),
    mg("magnesium", gram.magnesiumMmolPerG, "Mg"),
    mg("potassium", gram.potassiumMmolPerG, "K"),
    mg("strontium", gram.strontiumMmolPerG, "Sr"),
    mg("sodium", gram.sodiumMmolPerG, "Na"),
    mg("chloride", gram.chlorideMmolPerG, "Cl"),
    mg("sulfate", gram.sulfateMmolPerG, "SO4"),
    { what: "inorganic carbon", value: gram.carbonMmolPerG, unit: "mmol" },
  ];
  return {
    kind: "reagent",
    reagent: word,
    title,
    formula,
    molarMassGPerMol: Number(molarMassText(elements)),
    gramBrings: brings
      .filter(({ value }) => Math.abs(value) > 1e-9)
      .map(({ what, value, unit }) => ({ what, amount: `${value.toPrecision(digits)} ${unit}` })),
  };
}
