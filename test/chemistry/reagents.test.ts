import { describe, expect, test } from "vitest";
import { parseFormula } from "../../server/chemistry/formula.ts";
import {
  ambiguousReagents,
  composition,
  isReagent,
  type ReagentName,
  reagentElements,
  reagents,
} from "../../server/chemistry/reagents.ts";
import { answer } from "./reference.ts";

const built = (name: ReagentName) => composition(reagentElements(name));
const of = (formula: string) => composition(answer(parseFormula(formula)).elements);

describe("built-in reagents", () => {
  test("every formula is read and every alkalinity known", () => {
    for (const name of Object.keys(reagents) as ReagentName[]) {
      expect(parseFormula(reagents[name].formula)).toMatchObject({ ok: true });
      expect(built(name).alkalinityMeqPerG, name).not.toBeNull();
    }
  });

  test("a bare name that leaves the hydrate open is no reagent, and offers those that are", () => {
    expect(ambiguousReagents.size).toBe(4);
    for (const [bare, offered] of ambiguousReagents) {
      expect(isReagent(bare)).toBe(false);
      expect(offered.length).toBeGreaterThanOrEqual(2);
    }
    expect(ambiguousReagents.get("calcium-chloride")).toEqual([
      "calcium-chloride-anhydrous",
      "calcium-chloride-dihydrate",
      "calcium-chloride-hexahydrate",
    ]);
    expect(isReagent("constructor")).toBe(false);
  });
});

describe("composition of a gram", () => {
  // Grams per milliequivalent, from the abridged weights of IUPAC/CIAAW 2024.
  test.each([
    ["NaHCO3", 0.084006],
    ["Na2CO3", 0.052994],
    ["NaOH", 0.039997],
    ["Ca(OH)2", 0.037046],
    ["CaCO3", 0.050043],
  ])("%s takes %d g for a meq", (formula, grams) => {
    expect(1 / of(formula).alkalinityMeqPerG!).toBeCloseTo(grams, 9);
  });

  test("quicklime brings two equivalents for each calcium, and no carbon", () => {
    const lime = built("calcium-oxide");
    expect(lime.alkalinityMeqPerG! / lime.calciumMmolPerG).toBeCloseTo(2, 12);
    expect(lime.carbonMmolPerG).toBe(0);
  });

  test("carbon per alkalinity: carbonate 1 : 2, bicarbonate 1 : 1, hydroxide none", () => {
    const perEquivalent = (name: ReagentName) => built(name).carbonMmolPerG / built(name).alkalinityMeqPerG!;
    expect(perEquivalent("sodium-carbonate")).toBeCloseTo(0.5, 12);
    expect(perEquivalent("potassium-carbonate")).toBeCloseTo(0.5, 12);
    expect(perEquivalent("sodium-bicarbonate")).toBeCloseTo(1, 12);
    expect(perEquivalent("sodium-hydroxide")).toBe(0);
    expect(perEquivalent("calcium-hydroxide")).toBe(0);
  });

  test("neutral salts bring ions and no alkalinity", () => {
    expect(built("calcium-chloride-dihydrate").alkalinityMeqPerG).toBe(0);
    expect(built("magnesium-sulfate-heptahydrate").alkalinityMeqPerG).toBe(0);
    expect(built("sodium-chloride").alkalinityMeqPerG).toBe(0);
    expect(built("magnesium-sulfate-heptahydrate").sulfateMmolPerG).toBeCloseTo(1000 / 246.466, 9);
    expect(built("strontium-chloride-hexahydrate").strontiumMmolPerG).toBeCloseTo(1000 / 266.61, 9);
    expect(built("sodium-chloride").chlorideMmolPerG).toBeCloseTo(
      built("sodium-chloride").sodiumMmolPerG,
      12,
    );
    expect(built("potassium-chloride").potassiumMmolPerG).toBeCloseTo(1000 / 74.548, 9);
  });

  test("acids take alkalinity", () => {
    expect(of("HCl").alkalinityMeqPerG! * 36.458).toBeCloseTo(-1000, 9);
    expect(of("H2SO4").alkalinityMeqPerG).toBeLessThan(0);
  });

  test("alkalinity is unknown, not 0, where anything else is in it; its mass is known", () => {
    for (const formula of ["H3BO3", "NaBr", "NaNO3", "Na3PO4"]) {
      expect(of(formula).alkalinityMeqPerG, formula).toBeNull();
      expect(of(formula).molarMassGPerMol, formula).toBeGreaterThan(0);
    }
  });

  test("alkalinity is unknown where carbon, sulfur or chlorine isn't carbonate, sulfate, chloride", () => {
    for (const formula of ["NaCH3COO", "Na2S2O3", "NaClO", "Na2SO3", "C6H12O6"]) {
      expect(of(formula).alkalinityMeqPerG, formula).toBeNull();
    }
  });
});
