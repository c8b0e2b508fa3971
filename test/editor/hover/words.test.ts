/** Hovers on quantities, words of the language, dates, codes, and on what stands on the shelf. */
import { expect, test } from "vitest";
import { hovers, told, toldIn } from "./vat.ts";

test("a quantity in the other units of its kind", () => {
  // × 20 / 56.077 meq/L; / 1.0254 kg/L; × 50.043 mg of CaCO3.
  hovers(
    "  hold alkalinity 7 to |9 dKH aim 8",
    `
9 dKH = 3.21 meq/L = 3130 umol/kg = 161 mg/L as CaCO3.

**Assumed:** The water of vat now – density of the water: 1.0254 kg/L, of salinity 37.7 at 25.0 °C. ↵
**After:** Millero and Poisson 1981 (density).`,
  );
  hovers(
    "  tank main 100 c|m x 100 cm x 45 cm times 2",
    `
100 cm = 1000 mm = 1 m = 39.4 inch = 3.28 ft.`,
  );
  hovers(
    "  pump ash gives soda at 1|0 mL/min least 1 mL holding 4 L",
    `
10 mL/min = 600 mL/h = 14400 mL/day = 14.4 L/day = 3.80 gal/day.`,
  );
  hovers(
    "  hold salinity 3|4 to 36",
    `
34 = 1.0256 SG = 1.0258 SG20 = 51.7 mS/cm at 25 °C.

**After:** PSS-78 (Perkin and Lewis 1980); Millero and Poisson 1981 (density).`,
  );
  hovers(
    "  cohort plates 1 m2 uptake 100 mmol|/m2/day as CaCO3",
    `
100 mmol/m2/day as CaCO3 = 200 meq/m2/day = 10.0 g/m2/day as CaCO3.`,
  );
  hovers(
    "  feeds 10 g/day protein |50 %",
    `
50 % = a share of 0.5.`,
  );
  hovers(
    "  air CO2 5|00 ppm",
    `
500 ppm = 485 uatm over water.

**Assumed:** The water of vat now – temperature of the water: 25.0 °C. ↵
**Assumed:** Common practice – air over the water: moist, at one atmosphere. ↵
**After:** Weiss and Price 1980 (CO2 of air).`,
  );
  hovers(
    "  calcium scatter |2 %",
    `
2 % = a share of 0.02.`,
  );
  hovers(
    "  limit alkalinity rise |0.5 dKH/day",
    `
0.5 dKH/day = 0.178 meq/L/day = 174 umol/kg/day = 8.92 mg/L/day as CaCO3.

**Assumed:** The water of vat now – density of the water: 1.0254 kg/L, of salinity 37.7 at 25.0 °C. ↵
**After:** Millero and Poisson 1981 (density).`,
  );
});

test("a temperature, a pH, a deviation", () => {
  expect(toldIn("system vat\n  hold temperature |24 to 26 degC\n")).toBe("24 degC = 75.2 degF.");
  expect(toldIn("system vat\n  hold pH |8.0 to 8.2 total\n")).toBe(
    `
8.0 total = 8.14 on the NBS scale.

**Assumed:** The water of vat now – water: salinity 35.0, 25.0 °C. ↵
**After:** Takahashi et al. 1982 (NBS scale).`.slice(1),
  );
  expect(toldIn("system vat\n  measured volume 400 L ± |20 L\n")).toBe(
    "400 L = 106 gal.\n\n± 20 L is one standard deviation, 5 %.",
  );
});

test("a change of temperature has no zero point, and a change of pH no scale", () => {
  expect(toldIn("system vat\n  limit temperature swing |1.5 degC\n")).toBe("1.5 degC = 2.7 degF.");
  expect(toldIn("kit meter\n  p|H tolerance 0.06\n")).toBe("pH 0.06.\n\nTaken as two standard deviations.");
});

test("words inside a line", () => {
  hovers(
    "  hold alkalinity 7 to 9 dKH a|im 8",
    `
The value to steer for; without it, the middle of the band.

Stands in: hold.

\`\`\`marl
hold alkalinity 7.8 to 8.6 dKH aim 8.2
\`\`\``,
  );
  hovers(
    "  pump ash gives soda at 10 mL/min least 1 mL hold|ing 4 L",
    `
The volume of the pump's own container when full.

Stands in: pump.

\`\`\`marl
pump line-1 gives soda at 31.5 mL/min least 0.8 mL between 20:00 and 08:00 holding 10 L
\`\`\``,
  );
  hovers(
    "  2026-12-01 07:10 gave soda 100 mL b|y ina",
    `
Who did it: a name or initials, at the end of an event.

\`\`\`marl
2026-10-25 10:00 gave epsom 120 mL, soda 30 mL by ina
\`\`\``,
  );
});

test("a word on a line that can't be read yet", () => {
  expect(toldIn("system vat\n  ho|ld\n")).toContain(
    "The band to keep a parameter in, and where in it to aim.",
  );
});

test("a date: its weekday, and how long ago", () => {
  hovers(
    "  2026-11-3|0 08:00 read salinity 38",
    `
Monday 30 November 2026 08:00, yesterday.`,
  );
  hovers(
    "  2026-12-0|2 08:00 gave soda 10 mL",
    `
Wednesday 2 December 2026 08:00, tomorrow.`,
  );
});

test("a problem's code in a comment", () => {
  expect(toldIn("system vat # quiet: water/st|ale\n")).toBe(
    "No recent reading.\n\nA value is carried forward 7 days at most; after that doses are kept up and nothing is corrected.",
  );
  expect(toldIn("system vat # quiet: wat|er/none\n")).toBeNull();
});

test("what stands on the shelf", () => {
  hovers(
    'saltwater fre|sh "New salt water"',
    `
fresh: salinity 35.0, alkalinity 9.0 dKH, calcium 430 mg/L.

What isn't stated is taken as in sea water of its salinity.`,
  );
  hovers(
    "kit ben|ch",
    `
bench: tests scatter by alkalinity 0.10 dKH, calcium 2 % (one standard deviation).

bench read alkalinity 0.40 dKH too high when it was checked on 11 Nov; that isn't taken off in any estimate yet.`,
  );
  hovers(
    "  2026-11-11 ch|ecked alkalinity 8.4 dKH against 8.0 dKH",
    `
alkalinity: 0.40 dKH (5 %) too high.

That isn't taken off in any estimate yet.

Written: \`DATE [TIME] checked PARAMETER q against q [lot "text"] [by WHO]\``,
  );
  hovers(
    "  2026-11-20 rec|eived sack 25 kg",
    `
25 kg of sack: 99.9 mol, 98.5 % pure.

Written: \`DATE [TIME] received REAGENT mass [lot "text"] [by WHO]\``,
  );
  hovers(
    "  2026-11-21 09:00 mi|xed soda 4 L",
    `
4.0 L of soda: 10 days at 400 mL a day as set now.

1 mL brings 1 meq of alkalinity.

Written: \`DATE [TIME] mixed SOLUTION volume [by WHO]\``,
  );
  hovers(
    'use "she|lf.marl"',
    `
shelf.marl declares solution soda, solution chloride, solution salts, solution lye, reagent sack, reagent own, saltwater fresh and kit bench.`,
  );
  hovers(
    "lo|g vat",
    `
Last read 1 Dec 07:00, 1 h ago: alkalinity 7.5 dKH ± 0.1 with bench

11 lines, 3 readings of them, since 30 Nov 08:00; 1 ahead.

Written: \`log NAME\``,
  );
});

test("where there is nothing to tell", () => {
  expect(told("  2026-12-01 07:10 gave soda 100 mL by in|a")).toBeNull();
  expect(told('system vat "V|at"')).toBeNull();
  expect(toldIn("# a com|ment\n")).toBeNull();
  expect(toldIn("|\n")).toBeNull();
  expect(toldIn("log nowhere|\n")).toBeNull();
});
