/** The built-in reagents, and what one gram of a reagent brings into the water. */
import type { ElementSymbol } from "./elements.ts";
import { type Elements, molarMass, parseFormula } from "./formula.ts";

export type Reagent = { readonly title: string; readonly formula: string };

/** Reagents that need no declaration. */
export const reagents = {
  "sodium-carbonate": { title: "Sodium carbonate, anhydrous (soda ash)", formula: "Na2CO3" },
  "sodium-carbonate-monohydrate": { title: "Sodium carbonate monohydrate", formula: "Na2CO3·H2O" },
  "sodium-carbonate-decahydrate": { title: "Sodium carbonate decahydrate", formula: "Na2CO3·10H2O" },
  "sodium-bicarbonate": { title: "Sodium bicarbonate", formula: "NaHCO3" },
  "sodium-hydroxide": { title: "Sodium hydroxide", formula: "NaOH" },
  "sodium-chloride": { title: "Sodium chloride", formula: "NaCl" },
  "sodium-sulfate": { title: "Sodium sulfate, anhydrous", formula: "Na2SO4" },
  "potassium-carbonate": { title: "Potassium carbonate, anhydrous", formula: "K2CO3" },
  "potassium-bicarbonate": { title: "Potassium bicarbonate", formula: "KHCO3" },
  "potassium-chloride": { title: "Potassium chloride", formula: "KCl" },
  "calcium-hydroxide": { title: "Calcium hydroxide (hydrated lime)", formula: "Ca(OH)2" },
  "calcium-oxide": { title: "Calcium oxide (quicklime)", formula: "CaO" },
  "calcium-chloride-anhydrous": { title: "Calcium chloride, anhydrous", formula: "CaCl2" },
  "calcium-chloride-dihydrate": { title: "Calcium chloride dihydrate", formula: "CaCl2·2H2O" },
  "calcium-chloride-hexahydrate": { title: "Calcium chloride hexahydrate", formula: "CaCl2·6H2O" },
  "magnesium-chloride-anhydrous": { title: "Magnesium chloride, anhydrous", formula: "MgCl2" },
  "magnesium-chloride-hexahydrate": { title: "Magnesium chloride hexahydrate", formula: "MgCl2·6H2O" },
  "magnesium-sulfate-anhydrous": { title: "Magnesium sulfate, anhydrous", formula: "MgSO4" },
  "magnesium-sulfate-heptahydrate": { title: "Magnesium sulfate heptahydrate", formula: "MgSO4·7H2O" },
  "strontium-chloride-anhydrous": { title: "Strontium chloride, anhydrous", formula: "SrCl2" },
  "strontium-chloride-hexahydrate": { title: "Strontium chloride hexahydrate", formula: "SrCl2·6H2O" },
} as const satisfies Readonly<Record<string, Reagent>>;

export type ReagentName = keyof typeof reagents;

export function isReagent(name: string): name is ReagentName {
  return Object.hasOwn(reagents, name);
}

/** Names that leave the hydrate open, hence the strength up to twofold; and the names to offer instead. */
export const ambiguousReagents: ReadonlyMap<string, readonly ReagentName[]> = new Map(
  ["calcium-chloride", "magnesium-chloride", "magnesium-sulfate", "strontium-chloride"].map((bare) => [
    bare,
    (Object.keys(reagents) as ReagentName[]).filter((name) => name.startsWith(`${bare}-`)),
  ]),
);

/** What one gram of a pure reagent holds. */
export type Composition = {
  readonly molarMassGPerMol: number;
  readonly sodiumMmolPerG: number;
  readonly potassiumMmolPerG: number;
  readonly calciumMmolPerG: number;
  readonly magnesiumMmolPerG: number;
  readonly strontiumMmolPerG: number;
  readonly chlorideMmolPerG: number;
  /** All sulfur; it is sulfate wherever the alkalinity is known. */
  readonly sulfateMmolPerG: number;
  /** All carbon; it is dissolved inorganic carbon wherever the alkalinity is known. */
  readonly carbonMmolPerG: number;
  /** Null where the formula isn't made of the ions of which alkalinity is the balance. */
  readonly alkalinityMeqPerG: number | null;
};

/**
 * Charge of the ion as which each element counts in the explicit conservative expression of alkalinity, and
 * its oxidation number there: carbon as carbonate, sulfur as sulfate, chlorine as chloride.
 *
 * Wolf-Gladrow, Zeebe, Klaas, Körtzinger & Dickson 2007, Mar. Chem. 106, 287–300.
 */
const conservative: Partial<Record<ElementSymbol, { readonly charge: number; readonly oxidation: number }>> =
  {
    Na: { charge: 1, oxidation: 1 },
    K: { charge: 1, oxidation: 1 },
    Ca: { charge: 2, oxidation: 2 },
    Mg: { charge: 2, oxidation: 2 },
    Sr: { charge: 2, oxidation: 2 },
    Cl: { charge: -1, oxidation: -1 },
    S: { charge: -2, oxidation: 6 },
    C: { charge: 0, oxidation: 4 },
    H: { charge: 0, oxidation: 1 },
    O: { charge: 0, oxidation: -2 },
  };

/**
 * Equivalents of alkalinity per mole: Na⁺ + K⁺ + 2Ca²⁺ + 2Mg²⁺ + 2Sr²⁺ − Cl⁻ − 2SO4²⁻, or null where the
 * formula holds any other element, or its oxidation numbers show that its carbon, sulfur or chlorine is not
 * in those ions (acetate, thiosulfate, hypochlorite): then nothing may be said.
 */
function equivalentsPerMole(elements: Elements): number | null {
  let charge = 0;
  let oxidation = 0;
  for (const [element, count] of elements) {
    const ion = conservative[element];
    if (ion === undefined) return null;
    charge += ion.charge * count;
    oxidation += ion.oxidation * count;
  }
  return Math.abs(oxidation) < 1e-9 ? charge : null;
}

/** What one gram of a pure substance of this formula brings: mmol of each ion, and meq of alkalinity. */
export function composition(elements: Elements): Composition {
  const molarMassGPerMol = molarMass(elements);
  const mmolPerG = (element: ElementSymbol) => (1000 * (elements.get(element) ?? 0)) / molarMassGPerMol;
  const equivalents = equivalentsPerMole(elements);
  return {
    molarMassGPerMol,
    sodiumMmolPerG: mmolPerG("Na"),
    potassiumMmolPerG: mmolPerG("K"),
    calciumMmolPerG: mmolPerG("Ca"),
    magnesiumMmolPerG: mmolPerG("Mg"),
    strontiumMmolPerG: mmolPerG("Sr"),
    chlorideMmolPerG: mmolPerG("Cl"),
    sulfateMmolPerG: mmolPerG("S"),
    carbonMmolPerG: mmolPerG("C"),
    alkalinityMeqPerG: equivalents === null ? null : (1000 * equivalents) / molarMassGPerMol,
  };
}

/** Elements of a built-in reagent. */
export function reagentElements(name: ReagentName): Elements {
  const formula = parseFormula(reagents[name].formula);
  // The table above is ours, and a test reads every formula in it.
  return formula.ok ? formula.elements : new Map();
}
