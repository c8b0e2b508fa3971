/** Facts have a history: the newest `from` in force wins, and no edit rewrites the past. */
import { describe, expect, it } from "vitest";
import { at, farm, systemIn } from "./fixture.ts";

describe("a fact with dates", () => {
  const bound = farm(`
system vat
  tank main 500 L
  evaporates 10 L/day
  evaporates 12 L/day from 2026-10-10
  evaporates 20 L/day from 2026-10-05 08:30 until 2026-10-20
  hold alkalinity 7 to 8 dKH
  hold alkalinity 7.5 to 8.5 dKH from 2026-11-01
`);
  const { facts } = systemIn(bound);
  const evaporates = (moment: string) => at(facts.evaporatesLPerDay, moment);

  it("holds from its `from` on, the newest winning", () => {
    expect(evaporates("2026-10-05 08:29")).toBe(10);
    expect(evaporates("2026-10-05 08:30")).toBe(20);
    expect(evaporates("2026-10-09 23:59")).toBe(20);
    expect(evaporates("2026-10-10 00:00")).toBe(12);
    expect(evaporates("2026-10-21")).toBe(12);
  });

  it("doesn't change what was held before", () => {
    const low = (moment: string) => at(facts.holds.get("alkalinity"), moment)?.low ?? Number.NaN;
    expect(low("2026-10-31 23:59")).toBeCloseTo((7 * 20) / 56.077, 12);
    expect(low("2026-11-01")).toBeCloseTo((7.5 * 20) / 56.077, 12);
  });

  it("ends just before its `until`, and the one before it is in force again", () => {
    const spell = farm(`
system vat
  tank main 500 L
  air CO2 500 ppm
  air CO2 900 ppm from 2026-10-05 until 2026-10-20 18:00
`);
    const air = (moment: string) => at(systemIn(spell).facts.air, moment)?.value;
    expect(air("2026-10-20 17:59")).toBe(900);
    expect(air("2026-10-20 18:00")).toBe(500);
  });

  it("may have a gap", () => {
    const gap = farm(`
system vat
  tank main 500 L
  flows-through 10 L/day with sea until 2026-10-01
  flows-through 20 L/day with sea from 2026-10-03

saltwater sea
  salinity 35
`);
    const flow = (moment: string) => at(systemIn(gap).facts.flowsThrough, moment)?.litresPerDay;
    expect([flow("2026-09-30"), flow("2026-10-01"), flow("2026-10-02"), flow("2026-10-03")]).toEqual([
      10,
      undefined,
      undefined,
      20,
    ]);
  });
});

describe("mistakes", () => {
  it("two with the same `from` are declared twice, and the first counts", () => {
    const bound = farm(`
system vat
  tank main 500 L
  evaporates 10 L/day
  evaporates 12 L/day
  ^^^^^^^^^^^^^^^^^^^ name/twice, word evaporates, what fact
  evaporates 14 L/day from 2026-10-01
  evaporates 15 L/day from 2026-10-01 00:00
  ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ name/twice, word evaporates, what fact
  tank main 600 L
  ^^^^^^^^^^^^^^^ name/twice, word tank main, what fact
`);
    expect(at(systemIn(bound).facts.evaporatesLPerDay, "2026-09-01")).toBe(10);
  });

  it("`until` before `from`", () => {
    farm(`
system vat
  tank main 500 L
  evaporates 10 L/day from 2026-10-10 until 2026-10-09
                                            ^^^^^^^^^^ system/until-before-from
  evaporates 12 L/day from 2026-10-10 until 2026-10-10
                                            ^^^^^^^^^^ system/until-before-from

solution ash
  dissolve sodium-carbonate 80 g from 2026-10-10 until 2026-10-09
                                                       ^^^^^^^^^^ system/until-before-from
  make up to 1 L

saltwater sea
  salinity 35 from 2026-10-10 until 2026-10-09
                                    ^^^^^^^^^^ system/until-before-from

kit bench
  alkalinity scatter 0.1 dKH from 2026-10-10 until 2026-10-09
                                                   ^^^^^^^^^^ system/until-before-from
`);
  });

  it("an empty band, an aim outside it", () => {
    farm(`
system vat
  tank main 500 L
  hold alkalinity 8.5 to 7.5 dKH
                  ^^^^^^^^^^^^^^ system/empty-hold, parameter alkalinity, low 3.0315, high 2.6749
  hold calcium 410 to 440 mg/L aim 450
                                   ^^^ system/aim-outside, parameter calcium, low 410, high 440, aim 450
  hold magnesium 1300 to 1300 mg/L
                 ^^^^^^^^^^^^^^^^^ system/empty-hold, parameter magnesium, low 1300, high 1300
`);
  });
});

describe("what sea water can't have", () => {
  it("is neither held nor a limit", () => {
    const bound = farm(`
system vat
  tank main 500 L
  hold alkalinity 79 to 84 dKH
                  ^^ reading/impossible, parameter alkalinity, value 28.176, tenth 7.9
  hold salinity 34 to 350
                      ^^^ reading/impossible, parameter salinity, value 350, tenth 35
  limit alkalinity max 110 dKH
                       ^^^^^^^ reading/impossible, parameter alkalinity, value 39.232, tenth 11
  limit calcium rise 2000 mg/L/day
  limit pH max 8.6
`);
    const { holds, limits } = systemIn(bound).facts;
    expect([...holds.values()].flat()).toEqual([]);
    expect([...limits.keys()]).toEqual(["calcium rise", "pH max"]);
  });
});

describe("a band", () => {
  it("aims at its middle, in the parameter's own unit", () => {
    const bound = farm(`
system vat
  tank main 500 L
  hold calcium 10 to 11 mmol/L
  hold alkalinity 7.6 to 8.4 dKH aim 7.8
  hold temperature 76 to 80 degF
`);
    const { holds } = systemIn(bound).facts;
    const hold = (name: "calcium" | "alkalinity" | "temperature") => at(holds.get(name), "2026-12-01")!;
    // M(Ca) = 40.078.
    expect(hold("calcium").aim).toBeCloseTo(10.5 * 40.078, 10);
    expect(hold("alkalinity").aim).toBeCloseTo((7.8 * 20) / 56.077, 12);
    // (78 − 32) × 5/9.
    expect(hold("temperature").aim).toBeCloseTo(46 / 1.8, 12);
    expect(hold("alkalinity").unit.spelling).toBe("dKH");
    expect(hold("alkalinity").unit.perModelUnit).toBeCloseTo(2.80385, 12);
  });

  it("in kilograms is turned with the water that is held", () => {
    const bound = farm(`
system vat
  tank main 500 L
  hold calcium 10 to 11 mmol/kg
  hold alkalinity 2300 to 2500 umol/kg
  hold salinity 34 to 36
  hold temperature 24 to 26 degC
`);
    const { holds } = systemIn(bound).facts;
    // Density of sea water at 35 and 25 °C (t68): 1023.34306 kg/m³ (UNESCO 1983); at t90, 1023.3412.
    expect(at(holds.get("alkalinity"), "2026-12-01")?.low).toBeCloseTo(2.3 * 1.0233412, 6);
    expect(at(holds.get("calcium"), "2026-12-01")?.low).toBeCloseTo(10 * 40.078 * 1.0233412, 3);
  });
});

describe("limits", () => {
  it("are rates, differences or values", () => {
    const bound = farm(`
system vat
  tank main 500 L
  limit alkalinity rise 0.7 meq/L/week
  limit alkalinity dose 0.1 meq/L
  limit calcium max 12 mmol/L
  limit temperature swing 1.8 degF
  limit pH max 8.4 total
  limit salinity rise 0.5
  limit salinity fall 0.001 SG/day
  limit pH swing 0.4
`);
    const limit = (key: string) => at(systemIn(bound).facts.limits.get(key), "2026-12-01");
    expect(limit("alkalinity rise")?.value).toBeCloseTo(0.1, 12);
    expect(limit("alkalinity dose")?.value).toBe(0.1);
    expect(limit("calcium max")?.value).toBeCloseTo(12 * 40.078, 10);
    expect(limit("temperature swing")?.value).toBeCloseTo(1, 12);
    expect(limit("pH max")).toMatchObject({ value: 8.4, scale: "total" });
    expect(limit("salinity rise")?.value).toBe(0.5);
    // Slope of SG 25/25 between 34 and 36: (1.02713 − 1.02561)/2 = 0.00076 (EOS-80).
    expect(limit("salinity fall")?.value).toBeCloseTo(0.001 / 0.00076, 1);
    expect(limit("pH swing")?.value).toBe(0.4);
  });

  it("of another sort are wrong", () => {
    farm(`
system vat
  tank main 500 L
  limit alkalinity rise 0.7 dKH
                            ^^^ unit/dimension
  limit alkalinity dose 0.2 dKH/day
                            ^^^^^^^ unit/dimension
  limit calcium max 500
                    ^^^ unit/missing, number 500
`);
  });
});
