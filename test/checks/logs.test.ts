import { expect, test } from "vitest";
import { problems } from "./problems.ts";

test("lines doubled, dated ahead, out of order", () => {
  const farm = problems(`
system vat
  tank main 500 L
  cohort plugs 40 pieces uptake 0.1 meq/day each

log vat
  2026-11-30 08:00 removed plugs 3 pieces
  2026-11-30 08:00 removed plugs 3 pieces
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ warning log/twice Another line of the log says the same at the same minute. A merge may have doubled it, so both count as one.
  2026-11-29 08:00 removed plugs 2 pieces
  ^^^^^^^^^^^^^^^^ hint log/out-of-order This line is earlier than one above it.
  2062-12-01 08:00 removed plugs 2 pieces
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ warning log/future This line is dated 2062-12-01, more than a day ahead.
`);
  expect(farm.problems.find(({ code }) => code === "log/twice")?.related[0]?.place.line).toBe(5);
});

test("the same in order", () => {
  problems(`
system vat
  tank main 500 L
  cohort plugs 40 pieces uptake 0.1 meq/day each

log vat
  2026-11-29 08:00 removed plugs 2 pieces
  2026-11-30 08:00 removed plugs 3 pieces
  2026-12-01 08:00 removed plugs 2 pieces
`);
});

test("counts that don't go with the cohort", () => {
  problems(`
system vat
  tank main 500 L
  cohort plugs 40 pieces uptake 0.1 meq/day each

system vat-2
  tank main 500 L

log vat
  2026-11-29 08:00 removed plugs 0.2 m2
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ info log/no-effect This line can't be counted in full: cohort plugs is counted in pieces.
  2026-11-30 08:00 moved plugs 3 pieces to vat-2
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ info log/no-effect This line can't be counted in full: vat-2 has no cohort plugs
`);
});

test("readings that can't be, are rare, or are set aside", () => {
  problems(`
system vat
  tank main 500 L

log vat
  2026-11-29 08:00 read alkalinity 79 dKH, calcium 42 mg/L
                        ^^^^^^^^^^^^^^^^^ error reading/impossible Sea water can't have 79 dKH of alkalinity. It stays in the report and is left out of every estimate. Is this 7.9?
                                           ^^^^^^^^^^^^^^^ warning reading/unusual 42 mg/L is unusual for calcium; usual is 300 to 600 mg/L.
  2026-11-29 09:00 read pH 2.9, salinity 71, temperature 77 degC
                        ^^^^^^ error reading/impossible Sea water can't have a pH of 2.9. It stays in the report and is left out of every estimate. Check the number and its unit; possible is 4 to 11.
                                ^^^^^^^^^^^ error reading/impossible Sea water can't have a salinity of 71.
                                             ^^^^^^^^^^^^^^^^^^^ error reading/impossible Sea water can't have a temperature of 77 degC.
  2026-11-29 10:00 read alkalinity 9.9 dKH disregard "reagent out of date"
                                                     ^^^^^^^^^^^^^^^^^^^^^ info reading/disregarded The readings of this line are disregarded: "reagent out of date".
`);
});

test("readings that can be", () => {
  problems(`
system vat
  tank main 500 L

log vat
  2026-11-29 08:00 read alkalinity 7.9 dKH, calcium 421 mg/L
  2026-11-29 09:00 read pH 8.1, salinity 35, temperature 77 degF
  2026-11-29 10:00 read alkalinity 7.9 dKH
`);
});
