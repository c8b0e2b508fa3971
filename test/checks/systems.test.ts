import { describe, expect, test } from "vitest";
import { problems } from "./problems.ts";

describe("systems that can't be", () => {
  test("without water", () =>
    void problems(`
system vat
       ^^^ error system/no-volume This system has neither a tank nor a measured volume. Without its volume no dose can be worked out.

system vat-2
  tank main 100 L
  displace rock 120 L
  ^^^^^^^^^^^^^^^^^^^ error system/no-volume What is displaced takes up 20 L more than the tanks hold.

system vat-3
  tank main 100 L
  displace rock 100 L
  ^^^^^^^^^^^^^^^^^^^ error system/no-volume What is displaced takes up all that the tanks hold.
`));

  test("measured far from their sizes", () =>
    void problems(`
system vat
  tank main 500 L
  measured volume 410 L
  ^^^^^^^^^^^^^^^^^^^^^ warning system/volume-differs 410 L are measured, and the sizes of the tanks make 500 L.

system vat-2
  tank main 450 L
  measured volume 410 L
`));

  test("bands that hold nothing, facts that never hold", () =>
    void problems(`
system vat
  tank main 500 L
  hold alkalinity 8.4 to 7.6 dKH
                  ^^^^^^^^^^^^^^ error system/empty-hold The band of alkalinity is empty: 8.4 to 7.6 dKH.
  hold calcium 410 to 440 mg/L aim 450
                                   ^^^ error system/aim-outside Calcium is to aim at 450 mg/L, outside its band of 410 to 440 mg/L.
  evaporates 4 L/day from 2026-11-01 until 2026-10-01
                                           ^^^^^^^^^^ error system/until-before-from This ends before it begins, or at the same moment.
`));
});

const dosedWell = `
  uptake alkalinity 0.2 dKH/day
  pump head-1 gives ash-part at 40 mL/min

solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate
`;

describe("the water now", () => {
  test("outside its band, with digits that show it", () =>
    void problems(`
system vat
  tank main 500 L
  hold temperature 24.5 to 26.5 degC
  hold pH 8 to 8.4
  hold salinity 34 to 36

log vat
  2026-12-01 07:00 read temperature 26.52 degC, pH 7.91, salinity 33.4
                        ^^^^^^^^^^^^^^^^^^^^^^ warning water/outside-hold Temperature is 26.52 °C; its band is 24.5 to 26.5 °C.
                                                ^^^^^^^ warning water/outside-hold pH is 7.91; its band is 8 to 8.4. The band is what these corals are kept in. Check the meter's buffers and the CO2
                                                         ^^^^^^^^^^^^^ warning water/outside-hold Salinity is 33.4; its band is 34 to 36.
`));

  test("beyond its limit, by default and as stated", () =>
    void problems(`
system vat
  tank main 500 L
  limit calcium min 380 mg/L

log vat
  2026-12-01 07:00 read alkalinity 12.6 dKH, calcium 371 mg/L, magnesium 1300 mg/L
                        ^^^^^^^^^^^^^^^^^^^ error water/beyond-limit Alkalinity is 12.6 dKH, above its limit of 12 dKH.
                                             ^^^^^^^^^^^^^^^^ error water/beyond-limit Calcium is 371 mg/L, below its limit of 380 mg/L.
`));

  test("about to leave its band", () =>
    void problems(`
system vat
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ warning water/leaves-hold-soon Alkalinity leaves its band on Wednesday 2 December about 19:00 (7.5 dKH). Corals take 0.20 dKH a day, nothing is dosed. Set head-1 to
${dosedWell}
log vat
  2026-12-01 07:00 read alkalinity 7.8 dKH
`));

  test("about to leave its band on a source by hand", () =>
    void problems(`
system vat
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ info water/leaves-hold of ash-part a day by hand.
  uptake alkalinity 0.1 dKH/day
  by-hand ash-part

solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate

log vat
  2026-12-01 07:00 read alkalinity 8 dKH
`));

  test("a name that two files share is told without its file", () => {
    const part = "solution part\n  supplies alkalinity 1.6 meq/mL as bicarbonate\n";
    const farm = problems(`
// file: a/farm-a.marl
use "part.marl"

system vat
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ info water/leaves-hold of part a day by hand.
  uptake alkalinity 0.1 dKH/day
  by-hand part

log vat
  2026-12-01 07:00 read alkalinity 8 dKH
// file: a/part.marl
${part}
// file: b/farm-b.marl
system vat-b
  tank main 500 L
  by-hand part

${part}`);
    expect(farm.problems[0]?.message).not.toContain("a/part.marl");
    expect([...farm.bound.model.solutions.keys()]).toEqual(["part a/part.marl", "part b/farm-b.marl"]);
  });

  test("kept where it is", () =>
    void problems(`
system vat
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
${dosedWell}
log vat
  2026-12-01 07:00 read alkalinity 8 dKH
  2026-12-01 07:00 set head-1 22 mL/day
`));

  test("not read for long", () =>
    void problems(`
system vat
       ^^^ warning water/stale No reading of alkalinity in the last 7 days (alkalinity on 2026-11-20). A value is carried forward 7 days at most; after that doses are kept up and nothing is corrected. Test alkalinity.
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
${dosedWell}
log vat
  2026-11-20 07:00 read alkalinity 8 dKH
  2026-11-20 07:00 set head-1 22 mL/day
`));

  test("never read", () =>
    void problems(`
system vat
       ^^^ warning water/stale No reading of alkalinity in the last 7 days (alkalinity never).
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
${dosedWell}
log vat
  2026-11-30 07:00 set head-1 22 mL/day
`));

  test("off because salinity is", () =>
    void problems(`
system vat
  tank main 500 L
  hold calcium 410 to 440 mg/L
  hold salinity 34 to 36
  uptake calcium 0 mg/L/day
  by-hand part

solution part
  supplies calcium 40 mg/mL

log vat
  2026-12-01 07:00 read calcium 395 mg/L, salinity 32.5
                        ^^^^^^^^^^^^^^^^ warning water/outside-hold Calcium is 395 mg/L; its band is 410 to 440 mg/L.
                        ^^^^^^^^^^^^^^^^ warning water/salinity-is-the-cause Calcium (395 mg/L) is outside its band because salinity is 32.5; at the aim of 35.0 it would be 426 mg/L.
                                          ^^^^^^^^^^^^^ warning water/outside-hold Salinity is 32.5
`));

  test("with much CO2 from the room", () =>
    void problems(`
system vat
  tank main 500 L
  hold pH 8 to 8.4
  air CO2 1100 ppm

log vat
  2026-12-01 07:00 read alkalinity 8 dKH, salinity 35, temperature 25 degC, pH 7.82
                                                                            ^^^^^^^ warning water/outside-hold
                                                                            ^^^^^^^ warning water/room-air pH is 7.82 with 1278 µatm of CO2 in the water. In balance with the room's air (1100 ppm) it would be 7.89, with outdoor air 8.24.
`));
});
