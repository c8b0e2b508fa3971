/** Who sees which names: each file its own and, through `use`, those of others. */
import { describe, expect, it } from "vitest";
import { farm, strength } from "./fixture.ts";

const ash = `solution ash
  dissolve sodium-carbonate 84.79 g
  make up to 1 L
`;

describe("names across files", () => {
  it("are seen in the file itself and through `use`, however far", () => {
    farm(`
--- north/system.marl
use "../shelf/shelf.marl"
system vat
  tank main 500 L
  by-hand ash
--- shelf/shelf.marl
use "stock.marl"
--- shelf/stock.marl
${ash}`);
  });

  it("may go round in a circle", () => {
    farm(`
--- a.marl
use "b.marl"
    ^^^^^^^^ use/cycle, path b.marl
system vat
  tank main 500 L
  by-hand ash
--- b.marl
use "a.marl"
    ^^^^^^^^ use/cycle, path a.marl
${ash}
log vat
  2026-11-01 gave ash 5 mL
`);
    farm(`
use "farm.marl"
    ^^^^^^^^^^^ use/cycle, path farm.marl
`);
  });

  it("aren't seen without `use`; the file that has them is named", () => {
    farm(`
--- a.marl
system vat
  tank main 500 L
  by-hand ash
          ^^^ name/undeclared, word ash, wanted solution, elsewhere b.marl
  by-hand ahs
          ^^^ name/undeclared, word ahs, wanted solution
--- b.marl
${ash}`);
  });

  it("are offered where one is near", () => {
    farm(`
solution ash-part
  dissolve sodium-carbonate 84.79 g
  make up to 1 L

system vat
  tank main 500 L
  by-hand ash-patr
          ^^^^^^^^ name/undeclared, word ash-patr, wanted solution, nearest ash-part
  by-hand vat
          ^^^ name/undeclared, word vat, wanted solution, standsFor system
`);
  });

  it("a path leads to a file of the farm", () => {
    farm(`
--- a.marl
use "missing.marl"
    ^^^^^^^^^^^^^^ use/missing-file, path missing.marl
use "../other.marl"
    ^^^^^^^^^^^^^^^ use/outside, path ../other.marl
use "/etc/passwd"
    ^^^^^^^^^^^^^ use/outside, path /etc/passwd
use "C:/farm.marl"
    ^^^^^^^^^^^^^^ use/outside, path C:/farm.marl
use "north/../b.marl"
use "./b.marl"
--- b.marl
${ash}`);
  });
});

describe("a name twice", () => {
  it("in one file, of whatever kind", () => {
    farm(`
${ash}
solution ash
         ^^^ name/twice, word ash, what solution
  dissolve sodium-carbonate 60 g
  make up to 1 L

kit ash
    ^^^ name/twice, word ash, what kit

reagent sodium-carbonate
        ^^^^^^^^^^^^^^^^ name/twice, word sodium-carbonate, what reagent
  is sodium-bicarbonate
`);
  });

  it("in files of which one sees the other, told once", () => {
    farm(`
--- a.marl
use "b.marl"
use "c.marl"
--- b.marl
use "c.marl"
kit bench
    ^^^^^ name/twice, word bench, what kit
--- c.marl
kit bench
`);
  });

  it("is none where the files don't see each other", () => {
    const { model } = farm(`
--- a.marl
${ash}
system north
  tank main 500 L
  by-hand ash
--- b.marl
solution ash
  dissolve sodium-carbonate 60 g
  make up to 1 L

system south
  tank main 500 L
  by-hand ash
`);
    const sodaOf = (system: string) => {
      const [source] = [...model.systems.get(system)!.facts.sources.values()];
      return model.solutions.get(source![0]!.value.solution)?.strengths[0]?.value.alkalinityMeq ?? Number.NaN;
    };
    // 2 × 84.79 / 105.988 and 2 × 60 / 105.988 meq/mL.
    expect(sodaOf("north")).toBeCloseTo(169.58 / 105.988, 10);
    expect(sodaOf("south")).toBeCloseTo(120 / 105.988, 10);
  });

  it("a file that sees both is told", () => {
    farm(`
--- a.marl
kit bench
    ^^^^^ name/twice, word bench, what kit
--- b.marl
kit bench
--- c.marl
use "a.marl"
use "b.marl"
`);
  });
});

describe("recipes of one solution", () => {
  it("count from their own date, in whatever order they stand", () => {
    const recipes = [
      "solution ash\n  dissolve sodium-carbonate 84.79 g\n  make up to 1 L",
      "solution ash from 2026-10-05\n  dissolve sodium-carbonate 60 g\n  make up to 1 L",
      "solution ash from 2026-10-20 18:00\n  dissolve sodium-bicarbonate 60 g\n  make up to 1 L",
    ];
    const [first, second, third] = recipes;
    for (const order of [
      [first, second, third],
      [third, first, second],
      [second, third, first],
    ]) {
      const bound = farm(`${order.join("\n\n")}\n`);
      const alkalinity = (moment: string) => strength(bound, "ash", moment).alkalinityMeq;
      expect(alkalinity("2026-10-04 23:59")).toBeCloseTo(169.58 / 105.988, 10);
      expect(alkalinity("2026-10-05")).toBeCloseTo(120 / 105.988, 10);
      expect(alkalinity("2026-10-20 17:59")).toBeCloseTo(120 / 105.988, 10);
      // M(NaHCO3) = 84.006.
      expect(alkalinity("2026-10-20 18:00")).toBeCloseTo(60 / 84.006, 10);
    }
  });

  it("with the same date are declared twice", () => {
    farm(`
solution ash from 2026-10-05
  dissolve sodium-carbonate 60 g
  make up to 1 L

solution ash from 2026-10-05
         ^^^ name/twice, word ash, what solution
  dissolve sodium-carbonate 61 g
  make up to 1 L
`);
  });

  it("may stand in a file that uses the first", () => {
    const bound = farm(`
--- a.marl
${ash}
--- b.marl
use "a.marl"
solution ash from 2026-10-05
  dissolve sodium-carbonate 60 g
  make up to 1 L

system vat
  tank main 500 L
  by-hand ash
`);
    expect(bound.model.solutions.size).toBe(1);
    expect(strength(bound, "ash", "2026-12-01").alkalinityMeq).toBeCloseTo(120 / 105.988, 10);
  });
});
