import { expect, test } from "vitest";
import { readLine } from "../../grammar/line.ts";
import { lines } from "./fixture.ts";

test("a misspelt keyword, and the keyword", () => {
  lines(
    "system",
    `
hld alkalinity 7.6 to 8.4 dKH
^^^ unknown-word hld → hold | tank, displace and 15 more
HOLD alkalinity 7.6 to 8.4 dKH
^^^^ unknown-word HOLD → hold | tank, displace and 15 more
hold alkalinity 7.6 to 8.4 dKH
`,
  );
});

test("a misspelt keyword after a date", () => {
  lines(
    "log",
    `
2026-11-24 08:10 red alkalinity 7.9 dKH
                 ^^^ unknown-word red → read | read, set and 12 more
2026-11-24 08:10 hello
                 ^^^^^ unknown-word hello → nothing | read, set and 12 more
2026-11-24 08:10 read alkalinity 7.9 dKH
`,
  );
});

test("a misspelt parameter, and names that are parameters", () => {
  lines(
    "system",
    `
hold alkalinty 7.6 to 8.4 dKH
     ^^^^^^^^^ unknown-word alkalinty → alkalinity | a parameter
hold Alkalinity 7.6 to 8.4 dKH
     ^^^^^^^^^^ unknown-word Alkalinity → alkalinity | a parameter
hold rise 7 to 8
     ^^^^ unknown-word rise → nothing | a parameter
hold 7.6 to 8.4 dKH
     ^^^ unknown-word 7.6 → nothing | a parameter
pump calcium gives magnesium at 40 mL/min
`,
  );
});

test("a parameter is asked for at every item", () => {
  lines(
    "log",
    `
2026-11-24 08:10 read alkalinity 7.9 dKH, calcum 421 mg/L, magnesum 1300 mg/L
                                          ^^^^^^ unknown-word calcum → calcium | a parameter
                                                           ^^^^^^^^ unknown-word magnesum → magnesium | a parameter
2026-11-24 08:10 read alkalinity 7.9 dKH, calcium 421 mg/L, magnesium 1300 mg/L
`,
  );
});

test("a word taken for a unit is the one to blame, where the line breaks off after it", () => {
  lines(
    "system",
    `
hold alkalinity 7.6 too 8.4 dKH
                    ^^^ unknown-word too → to | a unit, to
hold alkalinity 7.6 too
                    ^^^ unknown-word too → to | a unit, to
tank main 240x90x32 cm
             ^^^^^^ unknown-word x90x32 → nothing | a unit, x, times, from, until
hold alkalinity 7.6 dkh to 8.4 dkh
tank main 240 cm x 90 cm x 32 cm
`,
  );
});

test("a misspelt word between the parts", () => {
  lines(
    "system",
    `
pump a gives b at 48 mL/min lest 4 mL
                            ^^^^ unknown-word lest → least | least, between, always, holding, from, until
cohort a 420 pieces uptake 0.9 meq/day eech
                                       ^^^^ unknown-word eech → each | each, magnesium, grows, from, until
limit alkalinity rises 0.6 dKH/day
                 ^^^^^ unknown-word rises → rise | rise, fall, swing, dose, max, min
air co2 520 ppm
    ^^^ unknown-word co2 → CO2 | CO2
pump a gives b at 48 mL/min least 4 mL
cohort a 420 pieces uptake 0.9 meq/day each
limit alkalinity rise 0.6 dKH/day
air CO2 520 ppm
`,
  );
});

test("a forgotten comma, and a word too many", () => {
  lines(
    "log",
    `
2026-11-24 08:10 read alkalinity 7.9 dKH calcium 421 mg/L
                                         ^^^^^^^ unknown-word calcium → nothing | ,, with, disregard, by
2026-11-24 gave a 5 mL by Mia Koch
                              ^^^^ unknown-word Koch → nothing | nothing
2026-11-24 08:10 read alkalinity 7.9 dKH, calcium 421 mg/L
2026-11-24 gave a 5 mL by Mia-Koch
`,
  );
});

test("an unfinished line", () => {
  lines(
    "system",
    `
hold
^^^^ unfinished | a parameter
hold alkalinity 7.6 to 8.4 dKH aim
                               ^^^ unfinished | a quantity
limit alkalinity max
                 ^^^ unfinished | a quantity
feeds 20 g/day protein
               ^^^^^^^ unfinished | a quantity
tank main 240 cm x 90 cm
                      ^^ unfinished | x
displace rock 64 kg at
                    ^^ unfinished | a quantity
note "Lid cracked
     ^^^^^^^^^^^^ unfinished | "
2026-11-24
^^^^^^^^^^ unfinished | note
feeds 20 g/day protein 40 %
displace rock 64 kg at 2.6 kg/L
note "Lid cracked"
`,
  );
});

test("an unfinished event", () => {
  lines(
    "log",
    `
2026-11-24 08:10 read alkalinity 7.9 dKH,
                                        ^ unfinished | a parameter
2026-11-24 renewed 180 L
                       ^ unfinished | with
2026-11-24 renewed 180 L with
                         ^^^^ unfinished | a name
2026-11-24 stopped
           ^^^^^^^ unfinished | a name
2026-11-24 stopped a
`,
  );
});

test("a forgotten word", () => {
  lines(
    "system",
    `
pump a gives b 48 mL/min
               ^^ unknown-word 48 → nothing | at
light 09:00 to 19:00
      ^^^^^ unknown-word 09:00 → nothing | between
air 520 ppm
    ^^^ unknown-word 520 → nothing | CO2
measured 1740 L
         ^^^^ unknown-word 1740 → nothing | volume
feeds 20 g/day 45 %
               ^^ unknown-word 45 → nothing | protein
tank 310 L
     ^^^ unknown-word 310 → nothing | a name
cohort a 420 uptake 0.9 meq/day
             ^^^^^^ misplaced uptake order | pieces, a unit
cohort a 420 corals uptake 0.9 meq/day
             ^^^^^^ unknown-word corals → nothing | pieces, a unit
cohort a 420 peices uptake 0.9 meq/day
             ^^^^^^ unknown-word peices → pieces | pieces, a unit
light between 09:00 and 19:00
measured volume 1740 L
cohort a 420 cm2 uptake 0.9 meq/day
`,
  );
});

test("a keyword is no name, a word that only follows another may be one", () => {
  lines(
    "system",
    `
tank pump 3 L
     ^^^^ misplaced pump keyword-as-name | a name
pump gives b at 48 mL/min
     ^^^^^ unknown-word gives → nothing | a name
tank höhe 5 L
     ^^^^ unknown-word höhe → nothing | a name
tank 🐠 5 L
     ^^ unknown-word 🐠 → nothing | a name
tank volume 5 L
tank pieces 5 L
pump CO2 gives carbonate at 48 mL/min
`,
  );
});

test("words in another order", () => {
  lines(
    "system",
    `
pump a least 0.5 mL gives b at 48 mL/min
       ^^^^^ misplaced least order | gives
pump a gives b at 48 mL/min least 0.5 mL
`,
  );
});

test("a part said twice", () => {
  lines(
    "system",
    `
hold alkalinity 7.6 to 8.4 dKH aim 8 aim 8.1
                                     ^^^ misplaced aim repeated
hold alkalinity 7.6 to 8.4 dKH from 2026-10-01 until 2026-11-01 from 2026-10-02
                                                                ^^^^ misplaced from repeated
pump a gives b at 48 mL/min least 0.5 mL least 0.6 mL least 0.7 mL
                                         ^^^^^ misplaced least repeated
                                                      ^^^^^ misplaced least repeated
uptake calcium 20 mg/L/day as CaCO3 ± 2 as CaCO3
                                        ^^^^^^^^ misplaced as CaCO3 repeated
uptake alkalinity 0.7 dKH/day ± 0.1 ± 0.2
                                    ^ unknown-word ± → nothing | a unit, from, until
hold alkalinity 7.6 to 8.4 dKH aim 8 from 2026-10-01 until 2026-11-01
uptake alkalinity 0.7 dKH/day ± 0.1
`,
  );
});

test("characters from elsewhere", () => {
  lines(
    "system",
    `
🐠 tank
^^ unknown-word 🐠 → nothing | tank, displace and 15 more
tank main 5 L ☃
              ^ unknown-word ☃ → nothing | x, times, from, until
"note"
^^^^^^ unknown-word "note" → nothing | tank, displace and 15 more
tank main 5 L # ☃ 🐠
`,
  );
});

test("words that every object of the host language has are plain words here", () => {
  for (const word of ["constructor", "toString", "hasOwnProperty"]) {
    expect(readLine("system", `  tank main 500 L ${word}`).findings).toMatchObject([
      { code: "syntax/unknown-word", word },
    ]);
    expect(readLine("system", `  tank ${word} 500 L`).statement).toMatchObject({ kind: "tank" });
  }
});
