import { expect, test } from "vitest";
import { problems } from "./problems.ts";

test("names that nobody declares, declares elsewhere, or that are something else", () => {
  problems(`
system vat
  tank main 500 L
  pump head-1 gives ash-prat at 40 mL/min
                    ^^^^^^^^ error name/undeclared No solution "ash-prat" is declared here. This line is left out. Is ash-part meant?
  pump head-2 gives bench at 40 mL/min
                    ^^^^^ error name/undeclared "bench" is a kit, and a solution is wanted here.
  pump head-3 gives chloride-part at 40 mL/min
                    ^^^^^^^^^^^^^ error name/undeclared "chloride-part" is declared in shared/solutions.marl, which this file doesn't use. This line is left out. Put use "shared/solutions.marl" at the top.
  by-hand ash-part

kit bench

solution ash-part
  supplies alkalinity 1.6 meq/mL

log vat
  2026-11-30 08:00 stopped head-9
                           ^^^^^^ error name/undeclared This system has no pump "head-9". This line is left out. Declare it in the system's section.
  2026-11-30 08:00 removed plugs 3 pieces
                           ^^^^^ error name/undeclared This system has no cohort "plugs".
  2026-11-30 08:00 read temperature 25 degC with bnech
                                                 ^^^^^ error name/undeclared No kit "bnech" is declared here. The readings count all the same. Is bench meant?
  2026-11-30 09:00 read temperature 25 degC with bench
// file: shared/solutions.marl
solution chloride-part
         ^^^^^^^^^^^^^ hint name/unused Nothing uses the solution "chloride-part".
  supplies calcium 40 mg/mL
`);
});

test("a solution that more than one source gives", () => {
  problems(`
system vat
  tank main 500 L
  pump head-1 gives ash-part at 40 mL/min
  by-hand ash-part

solution ash-part
  supplies alkalinity 1.6 meq/mL

log vat
  2026-11-30 08:00 set ash-part 20 mL/day
                       ^^^^^^^^ error name/undeclared "ash-part" is given by more than one source: head-1 and by hand. This line is left out. Write the name of the pump that is meant.
`);
});

test("all of them declared", () => {
  problems(`
use "shared/solutions.marl"

system vat
  tank main 500 L
  cohort plugs 40 pieces uptake 0.1 meq/day each
  pump head-1 gives ash-part at 40 mL/min
  pump head-3 gives chloride-part at 40 mL/min

kit bench

solution ash-part
  supplies alkalinity 1.6 meq/mL

log vat
  2026-11-30 08:00 set ash-part 20 mL/day
  2026-11-30 08:00 stopped head-1
  2026-11-30 08:00 removed plugs 3 pieces
  2026-11-30 08:00 read temperature 25 degC with bench
// file: shared/solutions.marl
solution chloride-part
  supplies calcium 40 mg/mL
`);
});

test("what is given twice, with the way to the first", () => {
  const farm = problems(`
system vat
  tank main 500 L
  hold temperature 24 to 26 degC
  hold temperature 23 to 26 degC
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ error name/twice "hold temperature" is stated twice for the same time. Two that differ can't both hold; the first one counts. Keep one, or write from which date the newer one holds: from 2026-12-01.

kit vat
    ^^^ error name/twice "vat" is declared twice, here as a kit. Two that differ can't both hold; the first one counts. Give one of them another name.

log vat
  2026-11-30 08:00 read temperature 25 degC, temperature 26 degC
                                             ^^^^^^^^^^^^^^^^^^^ error name/twice "temperature" is read twice on this line.
`);
  const related = farm.problems.map((problem) => problem.related.map(({ place }) => place.line));
  expect(related).toEqual([[2], [0], [8]]);
});

test("the same with dates and names of their own", () => {
  problems(`
system vat
  tank main 500 L
  hold temperature 24 to 26 degC
  hold temperature 23 to 26 degC from 2026-11-30

kit bench

log vat
  2026-11-30 08:00 read temperature 25 degC with bench
  2026-11-30 08:00 read temperature 26 degC
`);
});

test("a reagent that may be several", () => {
  problems(`
solution chloride-part
  dissolve calcium-chloride 400 g
           ^^^^^^^^^^^^^^^^ error name/ambiguous-reagent "calcium-chloride" names several salts, which differ in their water. Their strengths differ up to twofold, so the recipe's strength stays unknown. Write calcium-chloride-anhydrous, calcium-chloride-dihydrate or calcium-chloride-hexahydrate, as the label says.
  make up to 5 L

reagent sodium-carbonate
        ^^^^^^^^^^^^^^^^ error name/twice "sodium-carbonate" is the name of a built-in reagent already.
        ^^^^^^^^^^^^^^^^ hint name/unused
  is sodium-bicarbonate

system vat
  tank main 500 L
  by-hand chloride-part
`);
});

test("files that aren't there, outside, or in a circle", () => {
  problems(`
use "solution.marl"
    ^^^^^^^^^^^^^^^ error use/missing-file There is no file "solution.marl" here.
use "../other/solutions.marl"
    ^^^^^^^^^^^^^^^^^^^^^^^^^ error use/outside "../other/solutions.marl" leads out of the farm's folder.
use "farm.marl"
    ^^^^^^^^^^^ info use/cycle "farm.marl" leads back to this file.
`);
});
