/** Atomic weights of the elements that salts for sea water are made of, as exact decimal text. */

/**
 * Abridged standard atomic weights, g/mol.
 *
 * IUPAC/CIAAW, Abridged Standard Atomic Weights 2024 (the table of Prohaska et al. 2022, Pure Appl. Chem.
 * 94, 573–600, unchanged for these elements). The second group is from memory of the same table.
 */
export const atomicWeightText = {
  H: "1.0080",
  B: "10.81",
  C: "12.011",
  N: "14.007",
  O: "15.999",
  F: "18.998",
  Na: "22.990",
  Mg: "24.305",
  Si: "28.085",
  P: "30.974",
  S: "32.06",
  Cl: "35.45",
  K: "39.098",
  Ca: "40.078",
  Br: "79.904",
  Sr: "87.62",
  // From memory: elements of trace additives, whose formula is read for its mass only.
  Li: "6.94",
  Al: "26.982",
  V: "50.942",
  Cr: "51.996",
  Mn: "54.938",
  Fe: "55.845",
  Co: "58.933",
  Ni: "58.693",
  Cu: "63.546",
  Zn: "65.38",
  Se: "78.971",
  Rb: "85.468",
  Mo: "95.95",
  I: "126.90",
  Ba: "137.33",
} as const;

/** Symbol of an element whose atomic weight is known here. */
export type ElementSymbol = keyof typeof atomicWeightText;

/** Is this text the symbol of an element known here? */
export function isElement(symbol: string): symbol is ElementSymbol {
  return Object.hasOwn(atomicWeightText, symbol);
}

/** The same atomic weights as numbers, g/mol. */
export const atomicWeight: Readonly<Record<ElementSymbol, number>> = Object.fromEntries(
  Object.entries(atomicWeightText).map(([symbol, weight]) => [symbol, Number(weight)]),
) as Record<ElementSymbol, number>;
