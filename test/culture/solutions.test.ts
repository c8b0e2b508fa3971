/** Strengths of stock solutions against arithmetic by hand, with the IUPAC abridged weights. */
import { describe, expect, it } from "vitest";
import { farm, solutionIn, strength } from "./fixture.ts";

const of = (lines: string, more = "") => {
  const indented = lines
    .trim()
    .split("\n")
    .map((line) => `  ${line.trim()}`);
  return farm(`${more}solution part\n${indented.join("\n")}\n`);
};

describe("a recipe", () => {
  it("of soda ash: 84.79 g in 1 L is 1.6000 meq/mL", () => {
    // 84.79 / 105.988 = 0.79999 mol/L of Na2CO3, two equivalents and one carbon each.
    const part = strength(of("dissolve sodium-carbonate 84.79 g\nmake up to 1 L"), "part");
    expect(part.alkalinityMeq).toBeCloseTo(1.6, 4);
    expect(part.alkalinityMeq).toBeCloseTo((2 * 84.79) / 105.988, 12);
    expect(part.carbonMmol).toBeCloseTo(84.79 / 105.988, 12);
    expect(part.sodiumMg).toBeCloseTo((2 * 22.99 * 84.79) / 105.988, 10);
    expect(part.chlorideMg).toBe(0);
    expect(part.calciumMg).toBe(0);
  });

  it("of calcium chloride dihydrate: 117.6 g in 1 L is 0.8000 mmol/mL", () => {
    // M = 40.078 + 2 × 35.45 + 2 × 18.015 = 147.008; 117.6 / 147.008 = 0.79996.
    const part = strength(of("dissolve calcium-chloride-dihydrate 117.6 g\nmake up to 1 L"), "part");
    expect((part.calciumMg ?? 0) / 40.078).toBeCloseTo(0.8, 4);
    expect(part.calciumMg).toBeCloseTo((40.078 * 117.6) / 147.008, 10);
    expect(part.chlorideMg).toBeCloseTo((2 * 35.45 * 117.6) / 147.008, 10);
    expect(part.alkalinityMeq).toBeCloseTo(0, 12);
    expect(part.carbonMmol).toBe(0);
  });

  it.each([
    // g per meq: NaHCO3 84.006, NaOH 39.997; Mg 24.305 of MgCl2·6H2O 203.295 and of MgSO4·7H2O 246.466.
    ["dissolve sodium-bicarbonate 84.006 g\nmake up to 1 L", "alkalinityMeq", 1],
    ["dissolve sodium-bicarbonate 84.006 g\nmake up to 1 L", "carbonMmol", 1],
    ["dissolve sodium-hydroxide 39.997 g\nmake up to 1 L", "alkalinityMeq", 1],
    ["dissolve sodium-hydroxide 39.997 g\nmake up to 1 L", "carbonMmol", 0],
    ["dissolve magnesium-chloride-hexahydrate 203.295 g\nmake up to 1 L", "magnesiumMg", 24.305],
    ["dissolve magnesium-sulfate-heptahydrate 246.466 g\nmake up to 1 L", "magnesiumMg", 24.305],
    ["dissolve magnesium-sulfate-heptahydrate 246.466 g\nmake up to 1 L", "sulfateMg", 96.056],
    ["dissolve strontium-chloride-hexahydrate 266.61 g\nmake up to 1 L", "strontiumMg", 87.62],
    ["dissolve potassium-chloride 74.548 g\nmake up to 1 L", "potassiumMg", 39.098],
    ["dissolve sodium-carbonate-decahydrate 286.138 g\nmake up to 1 L", "alkalinityMeq", 2],
    ["dissolve calcium-hydroxide 0.74092 g\nmake up to 1 L", "alkalinityMeq", 0.02],
  ] as const)("%s: %s", (lines, field, expected) => {
    expect(strength(of(lines), "part")[field]).toBeCloseTo(expected, 10);
  });

  it("adds up what it dissolves, in whatever units", () => {
    const part = strength(
      of("dissolve sodium-carbonate 0.42394 kg\ndissolve sodium-bicarbonate 42003 mg\nmake up to 5000 mL"),
      "part",
    );
    // (2 × 423.94 / 105.988 + 42.003 / 84.006) / 5.
    expect(part.alkalinityMeq).toBeCloseTo((847.88 / 105.988 + 0.5) / 5, 10);
    expect(part.carbonMmol).toBeCloseTo((423.94 / 105.988 + 0.5) / 5, 10);
  });

  it("changes with its facts", () => {
    const bound = of(`
      dissolve sodium-carbonate 60 g until 2026-10-05
      dissolve sodium-carbonate 80 g from 2026-10-05
      make up to 1 L
      make up to 2 L from 2026-10-10`);
    const alkalinity = (moment: string) => strength(bound, "part", moment).alkalinityMeq;
    expect(alkalinity("2026-10-04")).toBeCloseTo(120 / 105.988, 10);
    expect(alkalinity("2026-10-05")).toBeCloseTo(160 / 105.988, 10);
    expect(alkalinity("2026-10-10")).toBeCloseTo(80 / 105.988, 10);
  });

  it("must be whole", () => {
    farm(`
solution one
^^^^^^^^^^^^ syntax/unfinished
  keep at 20 degC

solution two
^^^^^^^^^^^^ syntax/unfinished
  dissolve sodium-carbonate 80 g

solution three
  dissolve sodium-carbonate 80 g
  make up to 0 L
             ^ syntax/number-form, word 0

solution four
  dissolve sodium-carbonate 80 g
  dissolve sodium-carbonate 81 g
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ name/twice, word dissolve sodium-carbonate, what fact
  make up to 1 L
`);
  });

  it("of a salt that leaves its water open offers each", () => {
    farm(`
solution part
  dissolve calcium-chloride 80 g
           ^^^^^^^^^^^^^^^^ name/ambiguous-reagent, word calcium-chloride, offers calcium-chloride-anhydrous calcium-chloride-dihydrate calcium-chloride-hexahydrate
  dissolve sodium-carbonat 80 g
           ^^^^^^^^^^^^^^^ name/undeclared, word sodium-carbonat, wanted reagent, nearest sodium-carbonate
  dissolve part 80 g
           ^^^^ name/undeclared, word part, wanted reagent, standsFor solution
  make up to 1 L
`);
  });
});

describe("a saturated solution", () => {
  it("limewater at 25 °C is 40.6 meq/L with 814 mg/L of calcium", () => {
    // 0.0203 mol/L of Ca(OH)2: Bates, Bower & Smith 1956, J. Res. NBS 56, 305–312.
    const part = strength(of("saturated calcium-hydroxide\nkeep at 25 degC"), "part");
    expect(1000 * (part.alkalinityMeq ?? 0)).toBeCloseTo(40.6, 3);
    expect(1000 * (part.calciumMg ?? 0)).toBeCloseTo(0.0203 * 40078, 1);
    expect(part.carbonMmol).toBe(0);
  });

  it("is weaker the warmer it is kept, as lime is", () => {
    const kept = (degC: number) =>
      strength(of(`saturated calcium-hydroxide\nkeep at ${degC} degC`), "part").alkalinityMeq ?? 0;
    expect(kept(10)).toBeGreaterThan(kept(20));
    expect(kept(20)).toBeGreaterThan(kept(30));
  });

  it("is no stronger for a purer excess of solid", () => {
    const lime = "reagent lime\n  is calcium-hydroxide purity 90 %\n\n";
    const own = strength(of("saturated lime\nkeep at 25 degC", lime), "part");
    expect(own.alkalinityMeq).toBeCloseTo(0.0406, 6);
  });

  it("takes 20 °C for granted where nothing is said, and tells", () => {
    const bound = of("saturated calcium-hydroxide");
    expect(solutionIn(bound, "part").assumptions).toEqual([
      { what: "storage temperature of part", value: "20 °C", basis: "common practice" },
    ]);
  });

  it("without a known solubility has no strength, and tells", () => {
    const bound = of("saturated potassium-carbonate");
    expect(solutionIn(bound, "part").strengths).toEqual([]);
    expect(solutionIn(bound, "part").assumptions.map(({ value }) => value)).toContain("unknown");
  });
});

describe("a bought solution", () => {
  it.each([
    ["supplies alkalinity 1.6 meq/mL", 0.8],
    ["supplies alkalinity 1.6 meq/mL as carbonate", 0.8],
    ["supplies alkalinity 1.6 meq/mL as bicarbonate", 1.6],
    ["supplies alkalinity 1.6 meq/mL as hydroxide", 0],
  ])("%s", (line, carbon) => {
    const part = strength(of(line), "part");
    expect(part.alkalinityMeq).toBeCloseTo(1.6, 12);
    expect(part.carbonMmol).toBeCloseTo(carbon, 12);
    expect(part.calciumMg).toBe(0);
    expect(part.sodiumMg).toBeNull();
  });

  it("tells what it takes for granted", () => {
    expect(solutionIn(of("supplies alkalinity 1.6 meq/mL"), "part").assumptions).toHaveLength(1);
    expect(solutionIn(of("supplies alkalinity 1.6 meq/mL as hydroxide"), "part").assumptions).toEqual([]);
  });

  it.each([
    ["supplies calcium 72 g/L", "calciumMg", 72],
    ["supplies calcium 1.8 mmol/mL", "calciumMg", 1.8 * 40.078],
    ["supplies magnesium 48 mg/mL", "magnesiumMg", 48],
    ["supplies potassium 1 mol/L", "potassiumMg", 39.098],
    ["supplies strontium 5 mg/mL", "strontiumMg", 5],
    // 80.0688 mg of CaCO3, M = 100.086, two equivalents: 1.6 meq.
    ["supplies alkalinity 80.0688 mg/mL as CaCO3", "alkalinityMeq", 1.6],
    ["supplies alkalinity 1.6 mmol/mL", "alkalinityMeq", 1.6],
  ] as const)("%s", (line, field, expected) => {
    expect(strength(of(line), "part")[field]).toBeCloseTo(expected, 10);
  });

  it("supplies what dissolves", () => {
    farm(`
solution part
  supplies salinity 35
           ^^^^^^^^ syntax/unknown-word, word salinity
  supplies alkalinity 80 g/L
                         ^^^ unit/as-caco3
  supplies calcium 72 mg
                      ^^ unit/dimension
`);
  });
});

describe("a reagent of the farm's own", () => {
  it("has its purity, through every name that it is called", () => {
    const bound = farm(`
reagent sack
  is drum purity 98 %
reagent drum
  is sodium-carbonate purity 99 %

solution part
  dissolve sack 100 g
  make up to 1 L
`);
    // 100 g × 0.98 × 0.99.
    expect(strength(bound, "part").alkalinityMeq).toBeCloseTo((2 * 97.02) / 105.988, 10);
  });

  it.each(["SrCl2·6H2O", "SrCl2.6H2O", "SrCl2*6H2O"])("by its formula %s", (formula) => {
    const bound = farm(`
reagent jar
  formula ${formula} purity 98 %

solution part
  dissolve jar 10 g
  make up to 1 L
`);
    expect(strength(bound, "part").strontiumMg).toBeCloseTo((9.8 * 87.62) / 266.61, 8);
    expect(strength(bound, "part").alkalinityMeq).toBeCloseTo(0, 12);
  });

  it("of other elements is read for its mass, its alkalinity unknown", () => {
    const bound = farm(`
reagent acetate
  formula Ca(CH3COO)2

solution part
  dissolve acetate 158.166 g
  make up to 1 L
`);
    const part = strength(bound, "part");
    expect(part.calciumMg).toBeCloseTo(40.078, 2);
    expect(part.alkalinityMeq).toBeNull();
    expect(part.carbonMmol).toBeNull();
  });

  it("must lead to something", () => {
    farm(`
reagent circle
  is ring
     ^^^^ syntax/unknown-word, word ring
reagent ring
  is circle
     ^^^^^^ syntax/unknown-word, word circle
reagent itself
  is itself
     ^^^^^^ syntax/unknown-word, word itself
reagent nothing
^^^^^^^^^^^^^^^ syntax/unfinished
  reorder-below 5 kg
reagent strange
  formula Xx2
          ^^^ syntax/unknown-word, word Xx2
reagent pure
  is sodium-carbonate purity 101 %
                             ^^^ syntax/number-form, word 101
reagent double
  is sodium-carbonate
  formula Na2CO3
  ^^^^^^^^^^^^^^ name/twice, word formula, what fact

solution part
  dissolve circle 10 g
  dissolve nothing 10 g
  make up to 1 L
`);
  });

  it("is of the purity that it had at the time", () => {
    const facts = [
      "  is sodium-carbonate purity 90 % until 2026-10-01",
      "  is sodium-carbonate purity 99 % from 2026-10-01",
    ];
    for (const order of [facts, [...facts].reverse()]) {
      const bound = farm(
        `reagent sack\n${order.join("\n")}\n\nsolution part\n  dissolve sack 100 g\n  make up to 1 L\n`,
      );
      const alkalinity = (moment: string) => strength(bound, "part", moment).alkalinityMeq;
      expect(alkalinity("2026-09-30")).toBeCloseTo((2 * 90) / 105.988, 10);
      expect(alkalinity("2026-10-01")).toBeCloseTo((2 * 99) / 105.988, 10);
    }
  });
});
