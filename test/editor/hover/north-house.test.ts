/** Hovers on a whole farm, kept in `fixtures/north-house`, at one moment. */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { hover } from "../../../server/editor/hover.ts";
import { plainText } from "../../../server/editor/markdown.ts";
import { walk } from "../../checks/walk.ts";

const folder = join(import.meta.dirname, "../fixtures/north-house");
const names = ["north-house.marl", "solutions.marl"];
const files = new Map(names.map((name) => [name, readFileSync(join(folder, name), "utf8")]));
const farm = walk(files, "2026-12-01T08:00");

/** What is told where `mark` stands in a file, at its `|`, without markup. */
function told(file: string, mark: string): string | null {
  const lines = (files.get(file) ?? "").split("\n");
  const text = mark.replace("|", "");
  const line = lines.findIndex((each) => each.includes(text));
  if (line < 0) throw new Error(`${text} isn't there`);
  const column = lines[line]!.indexOf(text) + mark.indexOf("|");
  const found = hover(farm, { file, line, column });
  return found && plainText(found.markdown);
}

test("the system: where it goes, and balanced doses of both parts in mL a day", () => {
  // Taken: 471 + 192 meq by the corals, 103 meq by the food: 766 meq in 1740 L, 0.440 meq/L, 1.23 dKH a day. Set are
  // 310 mL × 1.572 meq = 487 meq, 0.79 dKH. Planned are 766 / 1.572 = 487 mL to hold and 0.6 dKH × 0.3567 × 1740 /
  // 1.572 = 237 mL to correct; to hold calcium, 663 meq × 19.94 mg / 31.79 mg = 416 mL.
  expect(
    told("north-house.marl", "system north-|house"),
  ).toBe(`Dose today: ash-part 724 mL/day (head-1) · chloride-part 553 mL/day (head-2) · magnesium-part 87 mL/day (by hand)

Of that to hold: ash-part 487 mL/day · chloride-part 416 mL/day · magnesium-part 1.9 mL/day; the rest corrects.

alkalinity 4.9 dKH, below 7.6 to 8.4, read 7 days ago; as set falls 0.45 dKH a day, stays outside for 14 days; as planned rises 0.60 dKH a day, back in its hold on 5 Dec 19:00
calcium 409.7 mg/L, below 410 to 440, read 7 days ago; as set falls 2.1 mg/L a day, stays outside for 14 days; as planned rises 2.5 mg/L a day, back in its hold on 1 Dec 11:00
magnesium 1313 mg/L, in 1280 to 1360, read 7 days ago; as set falls 0.02 mg/L a day, stays in; as planned rises 1.1 mg/L a day, stays in
salinity 34.9, in 34 to 35.5, read 7 days ago; as set rises 0.01 a day, stays in; as planned rises 0.05 a day, stays in
temperature 25.4 °C, in 24.5 to 26.5, read 7 days ago
pH 8.12, in 7.9 to 8.4, read 7 days ago

A day, by the cohorts: alkalinity 1.23 dKH, calcium 7.6 mg/L, magnesium 0.02 mg/L. That lays down 33 g of skeleton (as CaCO3) a day.
Of the alkalinity, 0.17 dKH a day goes into turning the food's nitrogen to nitrate.
In balance: 1 mL of ash-part with 0.99 mL of chloride-part.

Warning: Alkalinity is 4.9 dKH by now; its band is 7.6 to 8.4 dKH. (and 2 more)

1740 L of water, measured; 1788 L by the tanks' measures.

Assumed: Common practice – pH scale: NBS; alkalinity fall: 1.0 dKH/day; alkalinity min: 6 dKH; calcium rise: 25 mg/L/day; calcium max: 500 mg/L; magnesium rise: 75 mg/L/day; magnesium max: 1600 mg/L; alkalinity dose by pump: 0.2 dKH; pH max: 8.6 (NBS); pH dose: 0.1; hours of a pump: the whole day; hours of hand doses: 07:00 to 19:00.
Assumed: Aragonitic coral, from memory – magnesium in the skeleton: 0.5 %.
Assumed: Only reckoned to be below, never read so low – alkalinity, for pH and Ω: not below its limit.
Assumed: No estimate from the log yet – the day's course: uptake and doses even through the day.
After: Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3); Middelburg et al. 2020 (nitrification); Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron).`);
});

test("a reading: expected, carbonate system", () => {
  expect(
    told("north-house.marl", "read alkalini|ty 7.9 dKH"),
  ).toBe(`alkalinity 7.9 dKH = 2.82 meq/L = 2750 umol/kg = 141 mg/L as CaCO3; in its hold of 7.6 to 8.4 dKH.

Tests with bench scatter by 0.10 dKH (one standard deviation).
bench read alkalinity 0.20 dKH too high when it was checked on 2 Nov; that isn't taken off in any estimate yet.

Carbonate system: pH 7.98 (total), pCO2 572 µatm, DIC 2450 µmol/kg, Ω 3.7 of aragonite (with pH read 24 Nov 08:10).

Assumed: Common practice – pH scale: NBS.
Assumed: The water of north-house then – density of the water: 1.0231 kg/L, of salinity 34.8 at 25.4 °C.
After: Lueker et al. 2000, Dickson 1990 and Millero 1995 (constants), Mucci 1983 (Ω), Uppström 1974 (boron); Takahashi et al. 1982 (NBS scale); Millero and Poisson 1981 (density).`);
  expect(
    told("north-house.marl", "2026-11-27 08:05 read alkalini|ty 9.9 dKH"),
  ).toBe(`alkalinity 9.9 dKH = 3.53 meq/L = 3450 umol/kg = 177 mg/L as CaCO3; above its hold of 7.6 to 8.4 dKH.

Expected 6.9 dKH, 3.0 dKH less than was read.
Tests with bench scatter by 0.10 dKH (one standard deviation).
bench read alkalinity 0.20 dKH too high when it was checked on 2 Nov; that isn't taken off in any estimate yet.

Without pH read within the hour, pCO2, DIC and Ω can't be told.

Disregarded: it counts in no estimate.

Assumed: The water of north-house then – density of the water: 1.0231 kg/L, of salinity 34.9 at 25.4 °C.
Assumed: No estimate from the log yet – the day's course: uptake and doses even through the day.
After: Millero and Poisson 1981 (density).`);
});

test("a solution and a recipe's line with their cautions", () => {
  // 420 g × 0.992 / 105.99 g/mol = 3.931 mol in 5 L; 2 × 0.786 meq/mL.
  expect(
    told("solutions.marl", "solution ash-p|art"),
  ).toBe(`1 mL of ash-part brings 1.57 meq of alkalinity, 36.1 mg of sodium.

In north-house 1 mL raises alkalinity by 0.0025 dKH.

In balance: 1 mL of it goes with 0.99 mL of chloride-part.

Caustic. Wear goggles and gloves.

Assumed: Aragonitic coral, from memory – magnesium in the skeleton: 0.5 %.
After: Wolf-Gladrow et al. 2007 (alkalinity of salts); Smith and Key 1975, Chisholm and Gattuso 1991 (2 meq a mol of CaCO3).`);
  expect(
    told("solutions.marl", "disso|lve soda-sack"),
  ).toBe(`8.0 % by mass, 3.93 mol in 5 L; adds 1.57 meq of alkalinity, 36.1 mg of sodium to each mL.

Na2CO3: 105.99 g/mol, 99.2 % pure.

Caustic. Wear goggles and gloves; put the reagent slowly into cold stirred water, never water onto it.

Written: dissolve REAGENT mass [from DATE [TIME]] [until DATE [TIME]]

Assumed: Water and 0.64 of the dry salt, from memory – density of the solution: 1.05 kg/L.
After: Wolf-Gladrow et al. 2007 (alkalinity of salts).`);
});
