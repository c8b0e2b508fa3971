import { describe, expect, test } from "vitest";
import { composition, type ReagentName, reagentElements } from "../../server/chemistry/reagents.ts";
import {
  drySalt,
  saturatedStrength,
  solubilityGPer100GWater,
  waterGPerL,
} from "../../server/chemistry/solubility.ts";
import { near, within } from "./reference.ts";

describe("solubility, g of dry salt in 100 g of water", () => {
  // CRC Handbook, 98th ed., mass % of the saturated solution at 20 °C.
  test.each([
    ["NaHCO3", 8.73],
    ["Na2CO3", 17.9],
    ["CaCl2", 42.13],
    ["MgSO4", 25.1],
    ["NaCl", 26.41],
    ["KCl", 25.39],
    ["SrCl2", 34.43],
  ] as const)("%s: %d mass %%", (salt, massPercent) => {
    near(solubilityGPer100GWater(salt, 20)!, (100 * massPercent) / (100 - massPercent), 1.5e-3, salt);
  });

  test("where sources disagree, the lower: MgCl2 54.3 and not 55.2, NaOH 85 and not 109", () => {
    expect(solubilityGPer100GWater("MgCl2", 20)).toBe(54.3);
    expect(solubilityGPer100GWater("NaOH", 20)).toBe(85.2);
    expect(solubilityGPer100GWater("Na2CO3", 25)).toBe(29.4);
  });

  test("between the temperatures of the table, and only lime less in warmth", () => {
    within(solubilityGPer100GWater("NaHCO3", 18)!, 9.296, 1e-9, "18 °C");
    for (const salt of [
      "NaHCO3",
      "Na2CO3",
      "NaOH",
      "CaCl2",
      "MgCl2",
      "MgSO4",
      "NaCl",
      "KCl",
      "SrCl2",
    ] as const) {
      for (let celsius = 0; celsius < 40; celsius++) {
        expect(solubilityGPer100GWater(salt, celsius + 1)!).toBeGreaterThan(
          solubilityGPer100GWater(salt, celsius)!,
        );
      }
    }
    for (let celsius = 0; celsius < 40; celsius++) {
      expect(solubilityGPer100GWater("Ca(OH)2", celsius + 1)!).toBeLessThan(
        solubilityGPer100GWater("Ca(OH)2", celsius)!,
      );
    }
  });

  test("nothing is said outside the table", () => {
    for (const celsius of [-1, 41, Number.NaN]) {
      expect(solubilityGPer100GWater("NaCl", celsius)).toBeNull();
      expect(solubilityGPer100GWater("Ca(OH)2", celsius)).toBeNull();
      expect(saturatedStrength("sodium-chloride", celsius)).toBeNull();
    }
  });
});

describe("a reagent's dry salt", () => {
  // Anhydrous mass fractions, from the abridged weights of IUPAC/CIAAW 2024.
  test.each([
    ["sodium-carbonate-decahydrate", 0.37041],
    ["sodium-carbonate-monohydrate", 0.85472],
    ["calcium-chloride-dihydrate", 0.75491],
    ["calcium-chloride-hexahydrate", 0.50659],
    ["magnesium-chloride-hexahydrate", 0.46831],
    ["magnesium-sulfate-heptahydrate", 0.48835],
    ["strontium-chloride-hexahydrate", 0.59458],
    ["sodium-bicarbonate", 1],
    ["calcium-hydroxide", 1],
  ] as const)("%s: %d", (reagent, fraction) => {
    within(drySalt(reagent)!.gramsPerGram, fraction, 0.6e-5, reagent);
  });

  test("quicklime turns into more hydrated lime than it weighs", () => {
    within(drySalt("calcium-oxide")!.gramsPerGram, 74.092 / 56.077, 1e-9, "lime");
  });

  test("none where no solubility is known", () => {
    expect(drySalt("potassium-carbonate")).toBeNull();
    expect(saturatedStrength("sodium-sulfate", 20)).toBeNull();
  });
});

describe("a saturated solution", () => {
  test("the water of a litre: 96 g of sodium bicarbonate are 9.96 g in 100 g", () => {
    within(9600 / waterGPerL(96, 20), 9.96, 0.005, "g per 100 g");
  });

  test("holds as much as its own water dissolves", () => {
    for (const reagent of [
      "sodium-bicarbonate",
      "sodium-carbonate-decahydrate",
      "calcium-chloride-dihydrate",
    ] as const) {
      const dry = drySalt(reagent)!;
      const dryGPerL = saturatedStrength(reagent, 20)! * dry.gramsPerGram;
      near(
        (100 * dryGPerL) / waterGPerL(dryGPerL, 20),
        solubilityGPer100GWater(dry.salt, 20)!,
        1e-12,
        reagent,
      );
    }
  });

  test("of sodium bicarbonate at 18 °C: 89.8 g in a litre", () => {
    within(saturatedStrength("sodium-bicarbonate", 18)!, 89.8, 0.05, "g/L");
  });

  // Bates, Bower & Smith 1956, J. Res. NBS 56, 305–312: 0.0203 mol/L at 25 °C.
  test("of lime at 25 °C: 1.504 g/L, 40.6 meq/L, 814 mg/L calcium", () => {
    const gramsPerL = saturatedStrength("calcium-hydroxide", 25)!;
    const gram = composition(reagentElements("calcium-hydroxide"));
    expect(gramsPerL.toFixed(3)).toBe("1.504");
    expect((gramsPerL * gram.alkalinityMeqPerG!).toFixed(1)).toBe("40.6");
    expect((gramsPerL * gram.calciumMmolPerG * 40.078).toFixed(0)).toBe("814");
  });

  test("of lime is stronger in the cold, and the same made from quicklime", () => {
    expect(saturatedStrength("calcium-hydroxide", 10)!).toBeGreaterThan(
      saturatedStrength("calcium-hydroxide", 25)!,
    );
    const equivalents = (reagent: ReagentName) =>
      saturatedStrength(reagent, 22)! * composition(reagentElements(reagent)).alkalinityMeqPerG!;
    near(equivalents("calcium-oxide"), equivalents("calcium-hydroxide"), 1e-12, "meq/L");
  });
});
