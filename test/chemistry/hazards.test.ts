/**
 * Against classifications as published: supplier data sheets and CLP Annex VI for sodium hydroxide, a compiled data
 * sheet for calcium hydroxide and oxide, CLP Annex VI for calcium chloride, a REACH dossier for magnesium sulfate.
 * From memory: sodium carbonate and bicarbonate, magnesium chloride.
 */
import { describe, expect, test } from "vitest";
import { hazardStatements, hazards, isCaustic } from "../../server/chemistry/hazards.ts";
import { type ReagentName, reagents } from "../../server/chemistry/reagents.ts";

describe("classification", () => {
  test.each([
    ["sodium-hydroxide", "Danger", "H290 H314"],
    ["sodium-carbonate", "Warning", "H319"],
    ["sodium-carbonate-monohydrate", "Warning", "H319"],
    ["sodium-carbonate-decahydrate", "Warning", "H319"],
    ["calcium-hydroxide", "Danger", "H315 H318 H335"],
    ["calcium-oxide", "Danger", "H315 H318 H335"],
    ["calcium-chloride-anhydrous", "Warning", "H319"],
    ["calcium-chloride-dihydrate", "Warning", "H319"],
    ["sodium-bicarbonate", null, ""],
    ["magnesium-chloride-hexahydrate", null, ""],
    ["magnesium-sulfate-heptahydrate", null, ""],
  ] as const)("%s: %s %s", (name, signal, statements) => {
    expect(hazards[name]?.signal).toBe(signal);
    expect(hazards[name]?.statements.join(" ")).toBe(statements);
  });

  test("caustic are the hydroxides, the oxide and the sodium carbonates, and no other", () => {
    expect((Object.keys(reagents) as ReagentName[]).filter(isCaustic).sort()).toEqual([
      "calcium-hydroxide",
      "calcium-oxide",
      "sodium-carbonate",
      "sodium-carbonate-decahydrate",
      "sodium-carbonate-monohydrate",
      "sodium-hydroxide",
    ]);
  });

  test("only those that boil and spurt heat strongly: sodium hydroxide and calcium oxide", () => {
    const strong = Object.entries(hazards).filter(([, hazard]) => hazard.heat === "strong");
    expect(strong.map(([name]) => name).sort()).toEqual(["calcium-oxide", "sodium-hydroxide"]);
  });

  test("a signal word stands where there are statements, and nowhere else; all of it has a source", () => {
    for (const [name, { statements, signal, source }] of Object.entries(hazards)) {
      expect(signal !== null, name).toBe(statements.length > 0);
      expect(source.length, name).toBeGreaterThan(10);
      for (const code of statements) expect(hazardStatements[code], name).toMatch(/^(?:causes|may) /);
    }
  });
});
