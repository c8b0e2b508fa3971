import { test } from "vitest";
import { lines } from "./fixture.ts";

test("a statement of another section", () => {
  lines(
    "system",
    `
dissolve soda 400 g
^^^^^^^^ misplaced dissolve section → solution
read alkalinity 7.9 dKH
^^^^ misplaced read section → log, saltwater
2026-11-24 read alkalinity 7.9 dKH
           ^^^^ misplaced read section → log, saltwater
alkalinity 8 dKH
^^^^^^^^^^ misplaced alkalinity section → saltwater
alkalinity scatter 0.1 dKH
^^^^^^^^^^ misplaced alkalinity section → kit
2026-11-24 received soda 5 kg
           ^^^^^^^^ misplaced received section → store
note "Of any section"
2026-11-24 note "Of any section"
`,
  );
});

test("a statement of another section in a log", () => {
  lines(
    "log",
    `
pump a gives b at 4 mL/min
^^^^ misplaced pump section → system
2026-11-24 pump a gives b at 4 mL/min
           ^^^^ misplaced pump section → system
2026-11-24 mixed soda 5 L
           ^^^^^ misplaced mixed section → store
`,
  );
});

test("a date before a standing fact", () => {
  lines(
    "system",
    `
2026-11-24 hold alkalinity 7 to 8 dKH
           ^^^^ misplaced hold dated
2026-11-24 log vat
           ^^^ misplaced log dated
hold alkalinity 7 to 8 dKH
`,
  );
});

test("an event without its date", () => {
  lines(
    "log",
    `
gave a 250 mL
^^^^ misplaced gave undated
note "x"
^^^^ misplaced note undated
08:10 gave a 250 mL
^^^^^ unknown-word 08:10 → nothing | a date
soda 250 mL
^^^^ unknown-word soda → nothing | a date
2026-11-24 gave a 250 mL
2026-11-24 note "x"
`,
  );
});

test("mistakes in a solution", () => {
  lines(
    "solution",
    `
supplies alkalinity 1.6 meq/mL as soda
                                  ^^^^ unknown-word soda → nothing | carbonate, bicarbonate, hydroxide
supplies alkalinity 1.6 meq/mL as carbonate as carbonate
                                            ^^ misplaced as repeated
acknowledge "me"
            ^^^^ unknown-word "me" → nothing | caustic
make up 5 L
        ^ unknown-word 5 → nothing | to
keep 18 degC
     ^^ unknown-word 18 → nothing | at
2026-11-01 dissolve soda 5 g
           ^^^^^^^^ misplaced dissolve dated
supplies alkalinity 1.6 meq/mL as carbonate
acknowledge caustic "me"
make up to 5 L
keep at 18 degC
`,
  );
});

test("mistakes in a reagent", () => {
  lines(
    "reagent",
    `
formula purity 99 %
        ^^^^^^ misplaced purity order | a formula
formula
^^^^^^^ unfinished | a formula
is soda pure 99 %
        ^^^^ unknown-word pure → nothing | purity, from, until
formula SrCl2·6H2O purity 99 %
is soda purity 99 %
`,
  );
});

test("mistakes in a kit", () => {
  lines(
    "kit",
    `
alkalinity 8 dKH
           ^ unknown-word 8 → nothing | scatter, tolerance
alkalinty scatter 0.1 dKH
^^^^^^^^^ unknown-word alkalinty → alkalinity | a parameter, note, a date
2026-11-02 checked alkalinity 8.2 dKH aganst 8.0 dKH
                                      ^^^^^^ unknown-word aganst → against | against
alkalinity scatter 0.1 dKH
2026-11-02 checked alkalinity 8.2 dKH against 8.0 dKH
`,
  );
});

test("mistakes in a salt water", () => {
  lines(
    "saltwater",
    `
salnity 35
^^^^^^^ unknown-word salnity → salinity | a parameter, note, a date
volume 20 L
^^^^^^ unknown-word volume → nothing | a parameter, note, a date
2026-11-02 salinity 35
           ^^^^^^^^ misplaced salinity dated
salinity 35
2026-11-02 read salinity 35
`,
  );
});

test("mistakes in a header", () => {
  lines(
    null,
    `
system
^^^^^^ unfinished | a name
system pump
       ^^^^ misplaced pump keyword-as-name | a name
system vat Vat
           ^^^ unknown-word Vat → nothing | a title in quotes
system vat "Vat" "Vat"
                 ^^^^^ misplaced "Vat" repeated
log a "x"
      ^^^ unknown-word "x" → nothing | nothing
store main
      ^^^^ unknown-word main → nothing | nothing
systm vat
^^^^^ unknown-word systm → system | system, solution, reagent, store, saltwater, kit, log, use
use solutions.marl
    ^^^^^^^^^ unknown-word solutions → nothing | a text in quotes
tank a 5 L
^^^^ misplaced tank no-section → system
2026-11-24 gave a 5 mL
           ^^^^ misplaced gave no-section → log
system vat "Vat"
solution a "x" from 2026-01-01
log a
store
use "solutions.marl"
`,
  );
});
