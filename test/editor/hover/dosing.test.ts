/** Hovers on solutions, recipes, pumps, and on what the log's doses do. */
import { expect, test } from "vitest";
import { hovers, toldIn } from "./vat.ts";

test("a solution: its strength, its partner, what a millilitre does", () => {
  // 1 meq in 1000 L are 0.001 meq/L, 0.0028 dKH. A meq goes with 0.4975 mmol of calcium, 19.94 mg; 20.01 mg are in a mL.
  hovers(
    "  pump ash gives so|da at 10 mL/min least 1 mL holding 4 L",
    `
1 mL of soda brings 1 meq of alkalinity.

In vat 1 mL raises alkalinity by 0.0028 dKH; by its dose limit 71 mL at once.

In balance: 1 mL of it goes with 1.00 mL of chloride.

Caustic. Wear goggles and gloves.

**Assumed:** Aragonitic coral, from memory – magnesium in the skeleton: 0.5 %. ↵
**After:** Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3).`,
  );
  // 734 g / 147.01 g/mol × 40.078 / 10 L = 20.01 g/L.
  hovers(
    "  pump lime gives chlor|ide at 10 mL/min least 1 mL between 20:00 and 08:00",
    `
1 mL of chloride brings 20.0 mg of calcium, 35.4 mg of chloride.

In vat 1 mL raises calcium by 0.020 mg/L.

In balance: 1 mL of it goes with 1.00 mL of soda.

**Assumed:** Aragonitic coral, from memory – magnesium in the skeleton: 0.5 %. ↵
**After:** Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3).`,
  );
  // No system uses it.
  hovers(
    "solution l|ye",
    `
1 mL of lye brings 0.0406 meq of alkalinity, 0.814 mg of calcium.

No system uses it.

Caustic. Wear goggles and gloves.

**After:** Wolf-Gladrow et al. 2007 (alkalinity of salts).`,
  );
});

test("a solution whose recipe can't be read says that its strength isn't known", () => {
  expect(toldIn("solution ha|lf\n  dissolve sodium-carbonate 3 g\n")).toBe(
    `
The strength of half isn't known.

A line of its recipe is missing or can't be read: a reagent and its mass, or the volume that it is made up to.`.slice(
      1,
    ),
  );
});

test("a recipe's line: mass fraction, moles, what it adds", () => {
  // 73.4 g/L in a solution of 998 + 0.64 × 55.4 = 1034 g/L are 7.1 %.
  hovers(
    "  diss|olve calcium-chloride-dihydrate 734 g",
    `
7.1 % by mass, 4.99 mol in 10 L; adds 20.0 mg of calcium, 35.4 mg of chloride to each mL.

CaCl2·2H2O: 147.01 g/mol, pure.

Written: \`dissolve REAGENT mass [from DATE [TIME]] [until DATE [TIME]]\`

**Assumed:** Water and 0.64 of the dry salt, from memory – density of the solution: 1.03 kg/L.`,
  );
  // 100 g × 0.985 / 246.47 g/mol = 0.400 mol; × 24.305 = 9.71 g of magnesium.
  hovers(
    "  disso|lve sack 100 g",
    `
9.7 % by mass, 0.400 mol in 1 L; adds 9.71 mg of magnesium, 38.4 mg of sulfate to each mL.

MgSO4·7H2O: 246.47 g/mol, 98.5 % pure.

Written: \`dissolve REAGENT mass [from DATE [TIME]] [until DATE [TIME]]\`

**Assumed:** Water and 0.64 of the dry salt, from memory – density of the solution: 1.03 kg/L. ↵
**Assumed:** Common practice – storage temperature: 20 °C.`,
  );
  // 20.3 mmol/L at 25 °C: 40.6 meq/L, 814 mg/L of calcium.
  hovers(
    "  satur|ated calcium-hydroxide",
    `
1.50 g (20.3 mmol) in a litre of the clear part at 25 °C, 0.15 % by mass; 0.0406 meq of alkalinity, 0.814 mg of calcium in each mL.

Ca(OH)2: 74.092 g/mol, pure.

Caustic. Wear goggles and gloves; put the reagent slowly into cold stirred water, never water onto it.

Written: \`saturated REAGENT [from DATE [TIME]] [until DATE [TIME]]\`

**After:** Bates et al. 1956 (limewater); Wolf-Gladrow et al. 2007 (alkalinity of salts).`,
  );
});

test("a reagent: what a gram brings", () => {
  // 0.985 g / 246.47 g/mol = 4.00 mmol: 97.1 mg of magnesium.
  hovers(
    "  dissolve sa|ck 100 g",
    `
1 g of sack brings 97.1 mg of magnesium, 384 mg of sulfate.

Magnesium sulfate heptahydrate. ↵
MgSO4·7H2O: 246.47 g/mol, 98.5 % pure.`,
  );
  hovers(
    "  formula SrC|l2·6H2O",
    `
SrCl2·6H2O: 266.61 g/mol.

1 g of own brings 329 mg of strontium, 266 mg of chloride.`,
  );
});

test("a pump: today's doses, what is set, what it can give", () => {
  // 557 meq taken and 0.082 meq/L × 1000 L / 7 days more are 569 mL; 10 mL/min are 14.4 L a day.
  hovers(
    "  pump as|h gives soda at 10 mL/min least 1 mL holding 4 L",
    `
ash: 569 mL in 8 doses of about 71 mL of soda today.

Set: 400 mL a day since 30 Nov 08:00.

Can give: 10 mL/min as stated (11 mL/min calibrated on 1 Dec 07:30), at most 14 L a day, at least 1.0 mL a dose. ↵
Its container was filled to 2.0 L on 1 Dec 07:25; about 2.0 L are left by what was set since, 5.0 days as set.

**Assumed:** Common practice – hours of a pump: the whole day.`,
  );
  // 12 h × 600 mL/h = 7.2 L; it stands stopped.
  hovers(
    "  pu|mp lime gives chloride at 10 mL/min least 1 mL between 20:00 and 08:00",
    `
lime: 519 mL in 1 dose of 519 mL of chloride today.

Set: 200 mL a day since 30 Nov 08:00; it gives 0 mL. ↵
It stands stopped: start it, or it gives nothing.

Can give: 10 mL/min, at most 7.2 L a day between 20:00 and 08:00, at least 1.0 mL a dose.

Written: \`pump NAME gives SOLUTION at q [least q] [between TIME and TIME] [always q] [holding q] [from DATE [TIME]] [until DATE [TIME]]\``,
  );
  hovers(
    "  by-h|and salts",
    `
By hand: 0 mL of salts today.

Nothing is set in the log.

Given once a day.

Written: \`by-hand SOLUTION [times N] [always q] [from DATE [TIME]] [until DATE [TIME]]\`

**Assumed:** Common practice – hours of hand doses: 07:00 to 19:00.`,
  );
});

test("gave: what it changed, pH and Ω after it", () => {
  // 100 meq in 1000 L: 0.1 meq/L, 0.28 dKH.
  hovers(
    "  2026-12-01 07:10 ga|ve soda 100 mL by ina",
    `
**Did:** alkalinity +0.28 dKH to 7.8 dKH.

**Right after:** pH 8.20 → 8.25 (NBS), Ω of aragonite 3.8 → 4.3, once mixed in.

Written: \`DATE [TIME] gave NAME q, … [by WHO]\`

**Assumed:** Common practice – pH scale: NBS. ↵
**Assumed:** Right after the dose – carbon: closed, nothing exchanged with the air yet. ↵
**After:** Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron); Takahashi et al. 1982 (NBS scale).`,
  );
  // Lies ahead of the moment.
  hovers(
    "  2026-12-02 08:00 ga|ve soda 10 mL",
    `
**Will do:** alkalinity +0.03 dKH to 7.4 dKH.

**Right after:** pH 8.20 → 8.21 (NBS), Ω of aragonite 3.6 → 3.6, once mixed in. ↵
It starts from the pH read 30 Nov 08:00, before the dose of soda on 1 Dec 07:10; what doses of the 24 h before brought is reckoned in.

Lies ahead: it counts when its time has come.

Written: \`DATE [TIME] gave NAME q, … [by WHO]\`

**Assumed:** Common practice – pH scale: NBS. ↵
**Assumed:** Right after the dose – carbon: closed, nothing exchanged with the air yet. ↵
**After:** Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron); Takahashi et al. 1982 (NBS scale).`,
  );
});

test("set: what it brings a day against what is taken", () => {
  // 400 meq in 1000 L are 0.4 meq/L, 1.12 dKH; 200 mL × 20.01 mg = 4.0 mg/L. Taken: 457 meq, 1.28 dKH.
  hovers(
    "  2026-11-30 08:00 se|t ash 400 mL/day, lime 200 mL/day",
    `
**From then on:** alkalinity falls 0.16 dKH a day, 1.28 dKH taken; calcium falls 4.0 mg/L a day, 8.0 mg/L taken.

ash: 400 mL a day of soda bring alkalinity 1.12 dKH. ↵
lime: 200 mL a day of chloride bring calcium 4.0 mg/L.

Written: \`DATE [TIME] set NAME q, … [by WHO]\`

**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day.`,
  );
  hovers(
    "  2026-12-01 07:40 stop|ped lime",
    `
**From then on:** alkalinity falls 0.44 dKH a day, 1.56 dKH taken; calcium falls 10.0 mg/L a day, 10.0 mg/L taken.

Before it: alkalinity falls 0.44 dKH a day, 1.56 dKH taken; calcium falls 6.0 mg/L a day, 10.0 mg/L taken.

Written: \`DATE [TIME] stopped PUMP [by WHO]\`

**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day.`,
  );
});

test("renewed: the new values", () => {
  // Alkalinity 8 − 0.16 / 2 = 7.92; 0.9 × 7.92 + 0.1 × 9 = 8.03. Salinity 0.9 × 38 + 3.5 = 37.7.
  hovers(
    "  2026-11-30 20:00 ren|ewed 100 L with fresh",
    `
10 % of the water renewed: 100 L of 1000 L, with fresh.

alkalinity 8.0 dKH, up 0.11 dKH; in the new water 9.0 dKH ↵
calcium 419 mg/L, up 1.2 mg/L; in the new water 430 mg/L ↵
salinity 37.7, down 0.30; in the new water 35.0

Written: \`DATE [TIME] renewed volume with WATER [by WHO]\``,
  );
  hovers(
    "  2026-12-01 07:50 top|ped 10 L",
    `
10 L of fresh water: makes up for what evaporated; nothing else changes.

Written: \`DATE [TIME] topped volume [with SOLUTION] [by WHO]\``,
  );
});

test("stock and containers", () => {
  // 300 meq instead of 200: 0.3 meq/L are 0.84 dKH, 0.28 more.
  hovers(
    "  2026-12-01 07:20 stoc|ked plugs 50 pieces",
    `
plugs: 150 pieces after this, 100 pieces before.

Takes 0.84 dKH of alkalinity a day then, 0.28 dKH more than before.

Written: \`DATE [TIME] stocked COHORT N (pieces | unit) [by WHO]\``,
  );
  // 2000 mL / 400 mL a day.
  hovers(
    "  2026-12-01 07:25 fi|lled ash to 2 L",
    `
ash: 2.0 L, 50 % of what it holds; lasts 5 days at 400 mL a day as set.

Written: \`DATE [TIME] filled PUMP to volume [by WHO]\``,
  );
  // 44 mL / 4 min.
  hovers(
    "  2026-12-01 07:30 calib|rated ash 44 mL in 4 min",
    `
ash: 11 mL/min; stated are 10 mL/min, so it gives 10 % more.

Written: \`DATE [TIME] calibrated PUMP volume in q [by WHO]\``,
  );
});

test("without a volume what a dose does isn't known", () => {
  expect(
    toldIn(
      "system vat\nlog vat\n  2026-12-01 07:00 ga|ve soda 3 mL\nsolution soda\n  supplies alkalinity 1 meq/mL\n",
    ),
  ).toBe(
    `
What it did isn't known: the volume of the water isn't.

Written: \`DATE [TIME] gave NAME q, … [by WHO]\``.slice(1),
  );
});
