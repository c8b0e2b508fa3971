import { describe, test } from "vitest";
import { problems } from "./problems.ts";

describe("doses of the log", () => {
  test("too much at once, in a day, and above the limit", () =>
    void problems(`
system vat
  tank main 1000 L
  hold alkalinity 7.5 to 11 dKH
  uptake alkalinity 0.5 dKH/day
  limit alkalinity dose 0.4 dKH
  limit pH dose 1
  by-hand ash-part
  pump head-1 gives ash-part at 40 mL/min

solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate

log vat
  2026-11-29 08:00 read alkalinity 8 dKH, salinity 35, temperature 25 degC, pH 8.1
  2026-11-29 08:00 set head-1 120 mL/day
  2026-11-29 09:00 gave ash-part 140 mL
                        ^^^^^^^^^^^^^^^ warning overdose/alkalinity-dose This raised alkalinity by 0.63 dKH at once; the limit is 0.4 dKH. A sudden rise stresses coral tissue and can set off precipitation. Split it over several deliveries.
  2026-11-29 12:00 gave ash-part 80 mL
                        ^^^^^^^^^^^^^^ warning overdose/alkalinity-rise With this dose alkalinity rises by 1.03 dKH within a day; the limit is 0.7 dKH a day, by default. Corals follow a slow change of their water, and suffer from a fast one. Spread it over more days.
  2026-11-30 08:00 set head-1 300 mL/day
                       ^^^^^^^^^^^^^^^^^ warning overdose/alkalinity-rise As set from here on, alkalinity rises by 0.85 dKH a day; the limit is 0.7 dKH a day, by default.
  2026-11-30 08:30 set head-1 110 mL/day
  2026-11-30 09:00 read alkalinity 8.5 dKH
`));

  test("the same, spread", () =>
    void problems(`
system vat
  tank main 1000 L
  hold alkalinity 7.5 to 11 dKH
  uptake alkalinity 0.5 dKH/day
  by-hand ash-part
  pump head-1 gives ash-part at 40 mL/min

solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate

log vat
  2026-11-29 08:00 read alkalinity 8 dKH, salinity 35, temperature 25 degC, pH 8.1
  2026-11-29 08:00 set head-1 120 mL/day
  2026-11-29 12:00 gave ash-part 40 mL
  2026-11-30 09:00 read alkalinity 8.5 dKH
`));

  test("pH and precipitation, worse with the dose", () => {
    const vat = (dose: string, marks: string) => `
system vat
  tank main 1000 L
  limit alkalinity dose 20 meq/L
  limit alkalinity max 20 meq/L
  limit pH dose 3
  by-hand caustic-part

solution caustic-part
  supplies alkalinity 10 meq/mL as hydroxide

log vat
  2026-11-20 08:00 read alkalinity 2.5 meq/L, salinity 35, temperature 25 degC, pH 8.1
  2026-11-20 09:00 gave caustic-part ${dose}
${marks}`;
    problems(vat("20 mL", ""));
    problems(
      vat(
        "100 mL",
        `                        ^^^^^^^^^^^^^^^^^^^ warning overdose/precipitation From about Ω 12
                        ^^^^^^^^^^^^^^^^^^^ error overdose/ph This brought pH from 8.10 to 8.98; the limit is 8.6.
`,
      ),
    );
  });
});

describe("the plan", () => {
  const vat = (facts: string, marks = "", set = "67 mL/day") => `
system vat
  tank main 1000 L
  hold alkalinity 6.5 to 9.5 dKH
${marks}${facts}
solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate

log vat
  2026-12-01 07:00 read alkalinity 8 dKH
${set === "" ? "" : `  2026-12-01 07:00 set head-1 ${set}\n`}`;
  const mark = "  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^";

  test("goes", () =>
    void problems(vat("  uptake alkalinity 0.3 dKH/day\n  pump head-1 gives ash-part at 40 mL/min\n")));

  test("is held back by a pump's hours", () =>
    void problems(
      vat(
        "  uptake alkalinity 0.3 dKH/day\n  pump head-1 gives ash-part at 0.03 mL/min\n",
        `${mark} warning plan/held-back head-1 can't give more in its hours. Until then it stays away from its aim. Give the pump more hours\n`,
        "43 mL/day",
      ),
    ));

  test("has no source", () =>
    void problems(`
system vat
  tank main 1000 L
  hold calcium 300 to 500 mg/L
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^ warning plan/no-source No pump or hand dose of this system raises calcium; 3.0 mg/L a day is needed.
  uptake calcium 3 mg/L/day

log vat
  2026-12-01 07:00 read calcium 420 mg/L
`));

  test("can't keep a limit that breaks by itself", () =>
    void problems(
      vat(
        "  uptake alkalinity 0.3 dKH/day\n  limit alkalinity rise 0.1 dKH/day\n  pump head-1 gives ash-part at 40 mL/min always 100 mL/day\n",
        `${mark} warning plan/passive-breach Whatever is planned, the limit on alkalinity rise is passed by 0.05 dKH a day.\n`,
        "",
      ),
    ));

  test("runs a pump every other day", () =>
    void problems(`
system vat
  tank main 1000 L
  hold alkalinity 6.5 to 9.5 dKH
  uptake alkalinity 0.05 dKH/day
  pump head-1 gives ash-part at 40 mL/min least 20 mL
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ info plan/every-other-day head-1 runs every 2 days, 22 mL each time: it repeats no dose under 20 mL.

solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate

log vat
  2026-12-01 07:00 read alkalinity 8 dKH
  2026-12-01 07:00 set head-1 11 mL/day
`));
});
