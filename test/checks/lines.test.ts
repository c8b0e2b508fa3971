import { describe, test } from "vitest";
import { problems } from "./problems.ts";

describe("words", () => {
  test("a misspelt parameter, keyword, unit", () =>
    void problems(`
system vat
  tank main 500 L
  hold temprature 24 to 26 degC
       ^^^^^^^^^^ error syntax/unknown-word "temprature" is no parameter. This line is left out. Is temperature meant?
  evaportes 4 L/day
  ^^^^^^^^^ error syntax/unknown-word "evaportes" has no meaning here. This line is left out. Is evaporates meant?
  uptake salinity 3 /day
         ^^^^^^^^ error syntax/unknown-word "salinity" can't be given here. This line is left out. Here can stand for example alkalinity, calcium, magnesium, potassium or strontium.
`));

  test("the same without slips", () =>
    void problems(`
system vat
  tank main 500 L
  hold temperature 24 to 26 degC
  evaporates 4 L/day
`));

  test("a formula that is none", () =>
    void problems(`
reagent chloride
  formula SrXy2·6H2O
            ^^^^^^^^ error syntax/unknown-word can't be read as part of a chemical formula. This line is left out. Write it like SrCl2·6H2O.

solution part
  dissolve chloride 100 g
  make up to 1 L

system vat
  tank main 500 L
  by-hand part
`));

  test("a line that stops short, a text that isn't closed", () =>
    void problems(`
system vat
  tank main 500 L
  hold temperature 24 to
                      ^^ error syntax/unfinished This line stops short. This line is left out. Next comes a quantity.
  note "by the door
       ^^^^^^^^^^^^ error syntax/unfinished This text in quotes isn't closed. This line is left out. Put a " at its end.
`));

  test("a recipe that lacks its volume, one that lacks everything", () =>
    void problems(`
solution ash-part
^^^^^^^^^^^^^^^^^ error syntax/unfinished This recipe doesn't say to which volume it is made up. Its strength stays unknown, so no dose of it can be worked out. Add a line: make up to, and the volume.
  dissolve sodium-bicarbonate 400 g

solution other-part
^^^^^^^^^^^^^^^^^^^ error syntax/unfinished This recipe doesn't say what is in it. Its strength stays unknown, so no dose of it can be worked out. Add a line that starts with dissolve, saturated or supplies.
  keep at 20 degC

system vat
  tank main 500 L
  by-hand ash-part
  by-hand other-part
`));

  test("two recipes that lack nothing", () =>
    void problems(`
solution ash-part
  dissolve sodium-bicarbonate 400 g
  make up to 5 L

solution other-part
  saturated calcium-hydroxide
            ^^^^^^^^^^^^^^^^^ warning hazard/caustic
  keep at 20 degC

system vat
  tank main 500 L
  by-hand ash-part
  by-hand other-part
`));
});

describe("numbers and dates", () => {
  test("numbers that can be read in more than one way, or not at all", () =>
    void problems(`
system vat
  tank main 500 L
  tank sump 1,250 L
            ^^^^^ error syntax/number-form "1,250" isn't a plain number. This line is left out. Write 1.250 or 1250.
  evaporates 7,9 L/day
             ^^^ error syntax/number-form Write 7.9.
  displace rock -5 L
                ^^ error syntax/number-form "-5" is below zero. This line is left out. Write 5.
  skeleton magnesium 250 %
                     ^^^ error syntax/number-form "250" can't be used here. This line is left out. Write a share as at most 100 %
`));

  test("the plain numbers", () =>
    void problems(`
system vat
  tank main 500 L
  tank sump 1250 L
  evaporates 7.9 L/day
  displace rock 5 L
  skeleton magnesium 2.5 %
`));

  test("days and times that aren't, or may be two", () =>
    void problems(`
system vat
  tank main 500 L

log vat
  2026-11-31 08:00 note "a"
  ^^^^^^^^^^ error syntax/date-form "2026-11-31" isn't a day written like 2026-12-01. This line is left out. Write year, month and day of a day that exists.
  03.04.2026 note "b"
  ^^^^^^^^^^ error syntax/date-form Write 2026-04-03 or 2026-03-04.
  2026-11-30 25:10 note "c"
             ^^^^^ error syntax/date-form "25:10" isn't a time of day written like 08:10. This line is left out. Write hours and minutes, 00:00 to 24:00.
`));

  test("days and times that are", () =>
    void problems(`
system vat
  tank main 500 L

log vat
  2026-04-03 note "b"
  2026-11-30 08:00 note "a"
  2026-11-30 22:10 note "c"
`));
});

describe("places", () => {
  test("lines in the wrong section, at the margin, with a date too many or too few", () =>
    void problems(`
system vat
  tank main 500 L
  dissolve sodium-carbonate 400 g
  ^^^^^^^^ error syntax/misplaced A line that starts with "dissolve" belongs in a solution section. This line is left out. Move it under the header of a solution.
  2026-11-30 tank sump 80 L
             ^^^^ error syntax/misplaced states a fact, and doesn't start with a date. This line is left out. Write the date at the end instead: from 2026-11-30.
evaporates 4 L/day
^^^^^^^^^^ error syntax/misplaced "evaporates" stands at the margin, where sections begin. This line is left out. Indent the line by two spaces.

log vat
  read temperature 25 degC
  ^^^^ error syntax/misplaced A line with "read" says what happened, and starts with its date. This line is left out. Put the date in front
`));

  test("words twice, in the wrong order, or reserved", () =>
    void problems(`
system vat
  tank main 500 L
  tank pump 80 L
       ^^^^ error syntax/misplaced "pump" is a word of the language and can't be a name. This line is left out. Choose another name, for example pump-1.
  hold temperature 24 to 26 degC aim 25 aim 25.5
                                        ^^^ error syntax/misplaced "aim" stands on this line twice. This line is left out. Keep one of the two.
`));

  test("a line before any section", () =>
    void problems(`
  tank main 500 L
  ^^^^ error syntax/misplaced This line stands before any section. This line is left out. Put it under the header of a system.
`));

  test("all of them where they belong", () =>
    void problems(`
system vat
  tank main 500 L
  tank pump-1 80 L from 2026-11-30
  hold temperature 24 to 26 degC aim 25
  evaporates 4 L/day

log vat
  2026-11-30 read temperature 25 degC
`));

  test("an unfinished merge is one problem", () =>
    void problems(`
system vat
  tank main 500 L
<<<<<<< ours
^^^^^^^ error syntax/merge-marks Here an unfinished merge left its marks.
  tank sump 80 L
=======
  tank settler 80 L
>>>>>>> theirs
`));
});

describe("units", () => {
  test("missing, unknown, of something else", () =>
    void problems(`
system vat
  tank main 500 L
  tank sump 80
            ^^ error unit/missing 80 stands without a unit, where a volume is wanted.
  evaporates 4 L
               ^ error unit/dimension L doesn't measure a volume over time. This line is left out. Write it in mL/min or L/day.
  hold temperature 24 to 26 mg/L
                            ^^^^ error unit/dimension mg/L doesn't measure temperature. This line is left out. Write it in degC or degF.
  limit alkalinity rise 0.5 dKH
                            ^^^ error unit/dimension dKH doesn't measure alkalinity over time. This line is left out. Write it in dKH/day or meq/L/day.
  evaporates 4 L/dya
               ^^^^^ error unit/unknown "dya" is no unit. This line is left out.
  limit pH max 8.6 dKH
                   ^^^ error unit/dimension dKH doesn't measure pH. This line is left out. Write it without a unit, or in total.
`));

  test("as CaCO3 missing, and where it can't be", () =>
    void problems(`
saltwater mix
  alkalinity 140 mg/L
                 ^^^^ error unit/as-caco3 Alkalinity in mg/L says nothing without what it is counted as. So many mg or mmol are more or less alkalinity, depending on the substance that they count. This line is left out. Write mg/L as CaCO3, or use meq or dKH.
  strontium 8 mg/L as CaCO3
                   ^^^^^^^^ error unit/as-caco3 As CaCO3 can't follow mg/L here. Only alkalinity, and calcium and magnesium in mg/L, are told so.
  calcium 425 ppm
              ^^^ info unit/ppm 425 ppm is read as 425 mg/L.

system vat
  tank main 500 L
  flows-through 20 L/day with mix
  cohort plugs 40 pieces uptake 0.4 mmol/day each
                                    ^^^^^^^^ error unit/as-caco3 Alkalinity in mmol/day says nothing without what it is counted as.
`));

  test("the right units", () =>
    void problems(`
saltwater mix
  alkalinity 140 mg/L as CaCO3
  strontium 8 mg/L
  calcium 425 mg/kg

system vat
  tank main 500 L
  tank sump 80 L
  evaporates 4 L/day
  hold temperature 24 to 26 degC
  flows-through 20 L/day with mix
  cohort plugs 40 pieces uptake 0.4 mmol/day as CaCO3 each
`));
});
