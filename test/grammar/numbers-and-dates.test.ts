import { test } from "vitest";
import { lines } from "./fixture.ts";

test("a number that isn't plain", () => {
  lines(
    "system",
    `
hold alkalinity 7,6 to 8.4 dKH
                ^^^ number-form 7,6 → 7.6
hold calcium 1,250 to 1300 mg/L
             ^^^^^ number-form 1,250 → 1.250, 1250
hold calcium 0,250 to 1300 mg/L
             ^^^^^ number-form 0,250 → 0.250
hold calcium .9 to 1e3 mg/L
             ^^ number-form .9 → 0.9
                   ^^^ number-form 1e3 → 1000
hold calcium 1 250 to 1300 mg/L
             ^^^^^ number-form 1 250 → 1250
hold calcium 7. to 1,250.5 mg/L
             ^^ number-form 7. → 7
                   ^^^^^^^ number-form 1,250.5 → 1250.5
hold temperature -.5 to +3 degC
                 ^^^ number-form -.5 → -0.5
hold alkalinity 7.6 to 8.4 dKH
hold calcium 1250 to 1300 mg/L
hold temperature −0.5 to 3 degC
`,
  );
});

test("a digit, comma, digit is never a list", () => {
  lines(
    "log",
    `
2026-11-24 08:10 read alkalinity 7,9 dKH
                                 ^^^ number-form 7,9 → 7.9
2026-11-24 08:10 read salinity 34.8,35.0
                               ^^^^^^^^^ number-form 34.8,35.0 → nothing
2026-11-24 08:10 gave magnesium-part 1,250 mL
                                     ^^^^^ number-form 1,250 → 1.250, 1250
2026-11-24 08:10 read salinity 34.8,temperature 25.4 degC
2026-11-24 08:10 read salinity 34.8, temperature 25.4 degC
`,
  );
});

test("a date that isn't one, and other orders of a date", () => {
  lines(
    "log",
    `
2026-02-30 gave a 250 mL
^^^^^^^^^^ date-form 2026-02-30 → nothing
24.11.2026 08:10 gave a 250 mL
^^^^^^^^^^ date-form 24.11.2026 → 2026-11-24
11/24/2026 gave a 250 mL
^^^^^^^^^^ date-form 11/24/2026 → 2026-11-24
04/11/2026 gave a 250 mL
^^^^^^^^^^ date-form 04/11/2026 → 2026-11-04, 2026-04-11
04.11.26 gave a 250 mL
^^^^^^^^ date-form 04.11.26 → 2026-11-04, 2026-04-11, 2004-11-26
2026/11/24 gave a 250 mL
^^^^^^^^^^ date-form 2026/11/24 → 2026-11-24
2026-24-11 gave a 250 mL
^^^^^^^^^^ date-form 2026-24-11 → 2026-11-24
2026-1-5 gave a 250 mL
^^^^^^^^ date-form 2026-1-5 → 2026-01-05
20261124 gave a 250 mL
^^^^^^^^ date-form 20261124 → 2026-11-24
2026-02-28 gave a 250 mL
2028-02-29 gave a 250 mL
`,
  );
});

test("a time that isn't one", () => {
  lines(
    "log",
    `
2026-11-24 24:10 gave a 250 mL
           ^^^^^ date-form 24:10 → nothing
2026-11-24 08:60 gave a 250 mL
           ^^^^^ date-form 08:60 → nothing
2026-11-24 8.10 gave a 250 mL
           ^^^^ date-form 8.10 → 08:10
2026-11-24 8:10 pm gave a 250 mL
           ^^^^^^^ date-form 8:10 pm → 20:10
2026-11-24 08:10:30 gave a 250 mL
           ^^^^^^^^ date-form 08:10:30 → 08:10
2026-11-24 24:00 gave a 250 mL
2026-11-24 8:10 gave a 250 mL
`,
  );
});

test("a date where a fact begins or ends", () => {
  lines(
    "system",
    `
hold salinity 34 to 36 from 2026-02-30
                            ^^^^^^^^^^ date-form 2026-02-30 → nothing
hold salinity 34 to 36 from tomorrow
                            ^^^^^^^^ unknown-word tomorrow → nothing | a date
hold salinity 34 to 36 from 24.11.2026 until 04.11.2026
                            ^^^^^^^^^^ date-form 24.11.2026 → 2026-11-24
                                             ^^^^^^^^^^ date-form 04.11.2026 → 2026-11-04, 2026-04-11
pump a gives b at 48 mL/min between 9:00 and 25:00
                                             ^^^^^ date-form 25:00 → nothing
hold salinity 34 to 36 from 2026-11-24 until 2026-12-04 08:00
`,
  );
});
