/** Hovers on what a system is made of: tanks, holds, limits, corals, and the short lines. */
import { expect, test } from "vitest";
import { hovers, toldIn } from "./vat.ts";

test("a tank: its volume, its share of the tanks, the system's volume", () => {
  // 10 × 10 × 4.5 dm = 450 L, twice; 900 of 1100 L are 81.8 %.
  hovers(
    "  tank mai|n 100 cm x 100 cm x 45 cm times 2",
    `
main: 900 L, 450 L each, 82 % of the tanks' 1100 L.

1000 L of water, by the tanks' measures.`,
  );
  hovers(
    "  displace ro|ck 100 L",
    `
rock: takes up 100 L, 9.1 % of the tanks' 1100 L.

1000 L of water, by the tanks' measures.`,
  );
});

test("a line's first word also shows how such a line is written", () => {
  hovers(
    "  ta|nk sump 200 L",
    `
sump: 200 L, 18 % of the tanks' 1100 L.

1000 L of water, by the tanks' measures.

Written: \`tank NAME (round q x q | cone q x q | q [x q x q]) [times N] [from DATE [TIME]] [until DATE [TIME]]\``,
  );
});

test("a measured volume stands beside the tanks'", () => {
  expect(toldIn("system vat\n  tank main 500 L\n  mea|sured volume 400 L\n")).toBe(
    "400 L measured; the tanks' measures give 500 L, 25 % more.\n\nWritten: `measured volume q [from DATE [TIME]] [until DATE [TIME]]`",
  );
});

test("a hold: where the water stands in it, and where it goes", () => {
  // Carried: 7.5 dKH at 07:00, 0.28 given (100 meq in 1000 L are 0.1 meq/L), 1.34 − 1.12 a day until 08:00.
  // Taken: 300 + 200 meq by the corals, 57 by the food, 557 meq in 1000 L or 1.56 dKH a day; dosed 400 meq, 1.12 dKH.
  // At salinity 35: 7.77 × 35 / 37.7 × 1.0233 / 1.0254 = 7.20.
  hovers(
    "  hold alkal|inity 7 to 9 dKH aim 8",
    `
**alkalinity 7.8 dKH** now, in its hold of 7 to 9 dKH, 0.2 dKH below its aim of 8 dKH.

Read 7.5 dKH 1 h ago (1 Dec 07:00), carried forward from there.

Undosed falls 1.56 dKH a day, leaves 1 Dec 20:00. ↵
As set falls 0.44 dKH a day, leaves 3 Dec 02:00. ↵
As planned rises 0.03 dKH a day, stays in.

Alkalinity comes up by 0.23 dKH until Tuesday 8 December about 08:00.

At the salinity aim (35) it would be 7.2 dKH; salinity is 37.7 now.

**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day. ↵
**After:** Millero and Poisson 1981 (density).`,
  );
  // Above its hold already: nothing leaves it, the plan can't bring it back.
  hovers(
    "  hold sal|inity 34 to 36",
    `
**salinity 37.7** now, above its hold of 34 to 36, 2.7 above its aim of 35.

Read 38.0 24 h ago (30 Nov 08:00), carried forward from there.

Undosed falls 0.02 a day, stays outside for 14 days. ↵
As set falls 0.01 a day, stays outside for 14 days. ↵
As planned rises 0.02 a day, stays outside for 14 days.

**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day.`,
  );
});

test("a hold of what was never read says what is missing", () => {
  expect(toldIn("system vat\n  tank main 500 L\n  hold magn|esium 1250 to 1350 mg/L\n")).toBe(
    `
magnesium was never read; it is to be held at 1250 to 1350 mg/L.

Read it once, and what is reckoned from there stands here.`.slice(1),
  );
});

test("a hold that doesn't count yet", () => {
  expect(toldIn("system vat\n  tank main 500 L\n  hold calc|ium 400 to 440 mg/L from 2027-01-01\n")).toBe(
    `
calcium 400 to 440 mg/L, aim 420 mg/L

Counts from 2027-01-01 00:00 on, not yet.`.slice(1),
  );
});

test("limits: how near the water comes to them", () => {
  // The plan's rise is the correction: 0.23 dKH in 7 days.
  hovers(
    "  limit alkal|inity rise 0.5 dKH/day",
    `
**alkalinity:** rises 0.03 dKH a day as planned, falls 0.44 dKH a day as set, by the mean of the day; the limit is a rise of 0.5 dKH a day.

**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day.`,
  );
  // 0.2 dKH are 0.0713 meq/L, 71.3 meq in 1000 L, 71.3 mL of soda.
  hovers(
    "  limit alkal|inity dose 0.2 dKH",
    `
One dose may raise alkalinity by 0.2 dKH.

soda: 71 mL as planned raise it by 0.20 dKH; 71 mL are the most at once.`,
  );
  // 11 − 7.77 = 3.2.
  hovers(
    "  limit alkal|inity max 11 dKH",
    `
**alkalinity 7.8 dKH** now, 3.2 dKH below the max of 11 dKH.

Read 1 h ago.

**Assumed:** No estimate from the log yet – the day's course: uptake and doses even through the day.`,
  );
  hovers(
    "  limit p|H swing 0.4",
    `
The limit is 0.4 within a day; fewer than two readings of the last 24 h tell nothing of it.`,
  );
});

test("a cohort: its share, its skeleton, each piece", () => {
  // 150 pieces × 2 meq = 300 of 500 meq. A meq lays down 100.086 / 2 = 50.04 mg of CaCO3.
  hovers(
    "  cohort pl|ugs 100 pieces uptake 2 meq/day each",
    `
plugs: 60 % of what the corals take: 0.84 dKH (300 meq) of alkalinity and 15.0 g of skeleton (as CaCO3) a day.

150 pieces: 100 pieces as declared, 50 pieces came since. ↵
Each piece: 2 meq of alkalinity and 100 mg of skeleton a day.

**After:** Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3).`,
  );
  // 1 m2 × 100 mmol as CaCO3 × 2 = 200 meq.
  hovers(
    "  cohort pla|tes 1 m2 uptake 100 mmol/m2/day as CaCO3",
    `
plates: 40 % of what the corals take: 0.56 dKH (200 meq) of alkalinity and 10.0 g of skeleton (as CaCO3) a day.

1 m2. ↵
Each m2: 200 meq of alkalinity and 10.0 g of skeleton a day.

**After:** Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3).`,
  );
});

test("short lines of a system", () => {
  // 500 ppm × (1 − 0.031 atm of vapour over water of 25 °C) = 485 µatm.
  hovers(
    "  ai|r CO2 500 ppm",
    `
pCO2 485 µatm over water of 25.0 °C; in balance with it the water has pH 8.16 (NBS).

Outdoor air has about 425 ppm (from memory).

Written: \`air CO2 q [from DATE [TIME]] [until DATE [TIME]]\`

**After:** Weiss and Price 1980 (CO2 of air); Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron); Takahashi et al. 1982 (NBS scale).`,
  );
  hovers(
    "  light between 08:0|0 and 18:00",
    `
10 h of light, 14 h of dark.`,
  );
  // 10 of 1000 L; 37.7 × 1000 / 990 − 37.7 = 0.38.
  hovers(
    "  evap|orates 10 L/day",
    `
1 % of the water a day.

Not made up, salinity would rise by 0.38 in a day.

Written: \`evaporates volume [from DATE [TIME]] [until DATE [TIME]]\``,
  );
  // 5 g × 0.16 / 14.007 g/mol = 57.1 mmol of nitrogen, 57.1 meq; 0.0571 meq/L are 0.16 dKH.
  hovers(
    "  fe|eds 10 g/day protein 50 %",
    `
5 g of protein a day; turning its nitrogen to nitrate takes 57.1 meq of alkalinity a day, 0.16 dKH of the water.

Written: \`feeds q protein q [from DATE [TIME]] [until DATE [TIME]]\`

**Assumed:** Common practice – nitrogen in protein: 16 %. ↵
**After:** Middelburg et al. 2020 (nitrification).`,
  );
  hovers(
    "  top-of|f 150 L",
    `
150 L of fresh water: 15 days at 10 L a day.

Written: \`top-off [SOLUTION] volume [from DATE [TIME]] [until DATE [TIME]]\``,
  );
});

const exchanging = (line: string): string =>
  `
system vat
  tank main 1000 L
  hold pH 8 to 8.4
  limit pH max 8.5
  limit temperature swing 2 degC
  uptake alkalinity 100 meq/day
  skeleton magnesium 4 %
  evaporates 5 L/day
  top-off lye 50 L
  flows-through 100 L/day with sea
log vat
  2026-11-30 09:00 read alkalinity 3 meq/L, pH 8.2, temperature 24.5 degC
  2026-11-30 21:00 read temperature 26 degC
solution lye
  supplies alkalinity 0.04 meq/mL as hydroxide
saltwater sea
  salinity 35
`.replace(line.replace("|", ""), line);

const answer = (line: string): string | undefined => toldIn(exchanging(line))?.split("\n")[0];

test("a system with exchange, a top-off solution and a stated uptake", () => {
  // A tenth of the water a day; 50 L at 5 L a day.
  expect(answer("flo|ws-through")).toBe("10 % of the water a day; all of it once in 10 days.");
  expect(answer("top-o|ff")).toBe("50 L of lye: 10 days at 5.0 L a day.");
  // 100 meq in 1000 L are 0.1 meq/L, 0.28 dKH: without a hold alkalinity is told as the trade does.
  expect(answer("uptake alk|alinity")).toBe(
    "A day, as `uptake` says: alkalinity 0.28 dKH, calcium 1.9 mg/L, magnesium 0.05 mg/L. That lays down 5.0 g of skeleton (as CaCO3) a day.".replaceAll(
      "`",
      "\\`",
    ),
  );
  // (1 − 0.04) / 2 × 40.078 mg and 0.04 / 2 × 24.305 mg.
  expect(answer("skel|eton")).toBe(
    "For each meq of alkalinity the skeleton takes 19.2 mg of calcium and 0.49 mg of magnesium.",
  );
  expect(answer("limit p|H max")).toBe("**pH 8.20** now, 0.30 below the max of 8.5.");
  expect(answer("limit temp|erature swing")).toBe(
    "**temperature** swung 1.50 °C in the 2 readings of the last 24 h; the limit is 2 °C.",
  );
  expect(toldIn(exchanging("system va|t"))).toContain(
    "The top-off brings 5.0 L of lye a day by itself; the plan gives the rest.",
  );
});
