/** The plan on cases worked by hand. */
import { expect, test } from "vitest";
import type { PlanProblem } from "../../../server/dosing/plan/problem.ts";
import { solvePlan } from "../../../server/dosing/plan/solve.ts";
import { alkalinity, calcium, magnesium, meqPerLPerDkh, pump, valueAt } from "./fixtures.ts";

const plan = (parameters: PlanProblem["parameters"], sources: PlanProblem["sources"], volumeL = 1000) => {
  const problem = { volumeL, exchangePerDay: 0, parameters, sources };
  return { problem, ...solvePlan(problem) };
};

const closeTo = (value: number | null | undefined, expected: number): void => {
  expect(Math.abs(value! - expected)).toBeLessThanOrEqual(1e-9 * Math.max(1e-3, Math.abs(expected)));
};

test("a hand gives two parts: need 0.5 dKH a day, 1 dKH below the aim, rise 0.5 dKH a day", () => {
  const hand = { deliveries: { kind: "fixed", count: 12 }, leastDoseL: 0 } as const;
  const need = 0.5 * meqPerLPerDkh;
  // One mole of calcium goes with two equivalents; 40.078 g/mol.
  const needCalcium = (need / 2) * 40.078;
  const { problem, ...answer } = plan(
    [
      alkalinity({
        now: 7 * meqPerLPerDkh,
        low: 7.6 * meqPerLPerDkh,
        high: 8.4 * meqPerLPerDkh,
        aim: 8 * meqPerLPerDkh,
        needPerDay: need,
        risePerDay: 0.5 * meqPerLPerDkh,
      }),
      calcium({ needPerDay: needCalcium }),
      magnesium(),
    ],
    [
      pump("hand ash", { alkalinity: 1600 }, hand),
      pump("hand chloride", { calcium: 0.8 * 40.078 * 1000 }, hand),
    ],
  );
  const [ash, chloride] = answer.sources;
  // 0.5 × 20/56.077 meq/L × 1000 L ÷ 1.6 meq/mL = 111.454 mL; 0.0891631 mmol/L × 1000 L ÷ 0.8 mmol/mL = 111.454 mL.
  const dailyL = (0.5 * 20 * 1000) / 56.077 / 1600;
  expect(dailyL * 1000).toBeCloseTo(111.454, 3);
  closeTo(ash?.maintenanceLPerDay, dailyL);
  closeTo(chloride?.maintenanceLPerDay, dailyL);
  // Wished (8 − 7)/7 + (7.6 − 7)/1 = 0.743 dKH a day, cut to 0.5: 1 dKH takes 2 days and 222.908 mL.
  closeTo(ash?.correctionLPerDay, dailyL);
  closeTo(ash?.correctionTotalL, 2 * dailyL);
  expect(ash!.correctionTotalL * 1000).toBeCloseTo(222.908, 3);
  expect(ash?.serves).toBe("alkalinity");
  closeTo(answer.correctionDays, 2);
  expect(answer.corrections).toHaveLength(1);
  closeTo(answer.corrections[0]?.amount, meqPerLPerDkh);
  closeTo(answer.corrections[0]?.perDay, 0.5 * meqPerLPerDkh);
  expect(answer.corrections[0]?.limitedBy).toBe("alkalinity rise");
  expect(answer.limitedBy).toBe("alkalinity rise");
  closeTo(ash?.totalLPerDay, 2 * dailyL);
  expect(ash?.dosesPerDay).toBe(12);
  closeTo(ash?.litresPerDose, dailyL / 6);
  expect(chloride?.serves).toBeNull();
  expect(chloride?.correctionLPerDay).toBe(0);
  expect(answer.cuts).toEqual([]);
  // Slower, but it arrives: no obstacle.
  expect(answer.obstacles).toEqual([]);
  expect(answer.phases).toHaveLength(2);
  closeTo(answer.phases[0]?.untilDays, 2);
  expect(answer.phases[1]?.untilDays).toBeNull();
  closeTo(answer.phases[1]?.litresPerDay[0], dailyL);
  closeTo(
    valueAt(problem, answer as ReturnType<typeof solvePlan>, problem.parameters[0]!, 2),
    8 * meqPerLPerDkh,
  );
});

test("the wished rate: a seventh of the way to the aim, and into the band within a day", () => {
  const answer = plan([alkalinity({ now: 2.7 })], [pump("ash", { alkalinity: 1000 })]);
  closeTo(answer.corrections[0]?.perDay, 0.3 / 7 + 0.1);
  closeTo(answer.corrections[0]?.days, 0.3 / (0.3 / 7 + 0.1));
  expect(answer.corrections[0]?.limitedBy).toBeNull();
  expect(answer.obstacles).toEqual([]);
  // Within the band: the whole in seven days.
  closeTo(plan([alkalinity({ now: 2.9 })], [pump("ash", { alkalinity: 1000 })]).correctionDays, 7);
});

test("above the aim maintenance runs lower, and is full again when the aim is reached", () => {
  const { problem, ...answer } = plan(
    [alkalinity({ now: 3.3, fallPerDay: 0.13 })],
    [pump("ash", { alkalinity: 1000 })],
  );
  // Wished 0.3/7 + 0.1/1 = 0.143 meq/L a day, at most the fall of 0.13; 0.07 meq/L × 1000 L ÷ 1000 meq/L are left.
  closeTo(answer.sources[0]?.maintenanceLPerDay, 0.07);
  expect(answer.corrections).toEqual([]);
  expect(answer.correctionDays).toBe(0);
  expect(answer.cuts).toHaveLength(1);
  closeTo(answer.cuts[0]?.perDay, 0.13);
  closeTo(answer.cuts[0]?.days, 0.3 / 0.13);
  expect(answer.phases.map(({ untilDays }) => untilDays)).toEqual([answer.cuts[0]!.days, null]);
  closeTo(answer.phases[1]?.litresPerDay[0], 0.2);
  closeTo(valueAt(problem, answer as ReturnType<typeof solvePlan>, problem.parameters[0]!, 30), 3);
});

test("a cut never goes below zero: then uptake alone brings it down", () => {
  const answer = plan([alkalinity({ now: 3.5 })], [pump("ash", { alkalinity: 1000 })]);
  expect(answer.sources[0]?.maintenanceLPerDay).toBe(0);
  closeTo(answer.cuts[0]?.perDay, 0.2);
  closeTo(answer.cuts[0]?.days, 2.5);
  expect(answer.sources[0]).toMatchObject({ dosesPerDay: 0, litresPerDose: 0, everyDays: 1 });
});

test("above max nothing that raises it is given, whatever fall says and whoever needs the other part", () => {
  const answer = plan(
    [alkalinity({ now: 4.001, max: 4, fallPerDay: 0.05 }), calcium()],
    [pump("ash", { alkalinity: 1000 }), pump("lime", { alkalinity: 40, calcium: 800 })],
  );
  expect(answer.sources.map(({ totalLPerDay }) => totalLPerDay)).toEqual([0, 0]);
  expect(answer.obstacles).toContainEqual({
    parameter: "calcium",
    kind: "held-back",
    by: "alkalinity max",
    perDay: 4,
  });
  expect(answer.obstacles.some(({ kind, by }) => kind === "passive-breach" && by === "alkalinity fall")).toBe(
    true,
  );
});

test("what always runs counts in maintenance, and its source comes last for more", () => {
  const answer = plan(
    [alkalinity()],
    [pump("kalk", { alkalinity: 40 }, { alwaysLPerDay: 1 }), pump("ash", { alkalinity: 1000 })],
  );
  // 1 L × 40 meq/L ÷ 1000 L = 0.04 of the 0.2 meq/L; the rest by ash though kalk is declared first.
  closeTo(answer.sources[0]?.maintenanceLPerDay, 1);
  closeTo(answer.sources[1]?.maintenanceLPerDay, 0.16);
  const short = plan(
    [alkalinity()],
    [
      pump("kalk", { alkalinity: 40 }, { alwaysLPerDay: 1 }),
      pump("ash", { alkalinity: 1000 }, { capacityLPerDay: 0.1 }),
    ],
  );
  closeTo(short.sources[1]?.totalLPerDay, 0.1);
  closeTo(short.sources[0]?.totalLPerDay, 2.5);
  expect(short.obstacles).toEqual([]);
});

test("limewater meets alkalinity and calcium together; the earlier source is preferred where both would do", () => {
  const lime = pump("lime", { alkalinity: 40, calcium: 800 }, { deliveries: { kind: "at-most", count: 48 } });
  const ash = pump("ash", { alkalinity: 1000 });
  const chloride = pump("chloride", { calcium: 20_000 });
  const first = plan([alkalinity(), calcium()], [lime, ash, chloride]);
  // 0.2 meq/L and 4 mg/L are 5 L of limewater each.
  closeTo(first.sources[0]?.totalLPerDay, 5);
  expect(first.sources[1]?.totalLPerDay).toBe(0);
  expect(first.sources[2]?.totalLPerDay).toBe(0);
  const last = plan([alkalinity(), calcium()], [ash, chloride, lime]);
  closeTo(last.sources[0]?.totalLPerDay, 0.2);
  closeTo(last.sources[1]?.totalLPerDay, 0.2);
  expect(last.sources[2]?.totalLPerDay).toBe(0);
});

test("limewater doesn't raise calcium where alkalinity stands at its aim", () => {
  const answer = plan(
    [alkalinity(), calcium({ now: 410 })],
    [pump("lime", { alkalinity: 40, calcium: 800 }), pump("chloride", { calcium: 20_000 })],
  );
  expect(answer.sources[0]?.correctionLPerDay).toBe(0);
  expect(answer.sources[1]?.serves).toBe("calcium");
  closeTo(answer.sources[1]?.correctionTotalL, 0.5);
  const without = plan(
    [alkalinity(), calcium({ now: 410 })],
    [pump("lime", { alkalinity: 40, calcium: 800 })],
  );
  expect(without.corrections).toEqual([]);
  expect(without.obstacles).toEqual([
    { parameter: "calcium", kind: "held-back", by: "alkalinity", perDay: 10 / 7 },
  ]);
});

test("what a correction brings of another parameter is taken off that one's amount", () => {
  const { problem, ...answer } = plan(
    [alkalinity({ now: 2.9 }), calcium({ now: 410 })],
    [pump("lime", { alkalinity: 40, calcium: 800 }), pump("chloride", { calcium: 20_000 })],
  );
  // 0.1 meq/L by limewater is 2.5 L and brings 2 mg/L of the 10 mg/L calcium.
  expect(answer.sources[0]?.serves).toBe("alkalinity");
  closeTo(answer.sources[0]?.correctionTotalL, 2.5);
  closeTo(answer.corrections[1]?.amount, 8);
  closeTo(answer.sources[1]?.correctionTotalL, 0.4);
  closeTo(valueAt(problem, answer as ReturnType<typeof solvePlan>, problem.parameters[1]!, 7), 420);
});

test("a correction takes the source that overshoots least, though another is declared first", () => {
  const answer = plan(
    [alkalinity({ now: 2.9 }), calcium()],
    [pump("lime", { alkalinity: 40, calcium: 800 }), pump("ash", { alkalinity: 1000 })],
  );
  expect(answer.sources.map(({ serves }) => serves)).toEqual([null, "alkalinity"]);
});

test("a side effect doesn't carry another parameter over its max, however long it takes", () => {
  const answer = plan(
    [alkalinity({ now: 2.5 }), calcium({ now: 439, aim: 439, max: 440 })],
    [pump("lime", { alkalinity: 40, calcium: 800 })],
  );
  expect(answer.corrections).toEqual([]);
  expect(answer.obstacles).toContainEqual(
    expect.objectContaining({ parameter: "alkalinity", kind: "held-back", by: "calcium max" }),
  );
});

test("an unknown uptake is unknown; its correction is still planned", () => {
  const answer = plan(
    [alkalinity(), calcium({ now: 410, needPerDay: null, passivePerDay: 0 })],
    [pump("ash", { alkalinity: 1000 }), pump("chloride", { calcium: 20_000 })],
  );
  expect(answer.sources[1]).toMatchObject({
    maintenanceLPerDay: null,
    totalLPerDay: null,
    serves: "calcium",
  });
  closeTo(answer.sources[1]?.correctionTotalL, 0.5);
  closeTo(answer.sources[0]?.maintenanceLPerDay, 0.2);
});

test("hours, doses and missing sources are named", () => {
  const hours = plan([alkalinity()], [pump("head-1", { alkalinity: 1000 }, { capacityLPerDay: 0.15 })]);
  expect(hours.limitedBy).toBe("head-1 hours");
  expect(hours.obstacles).toHaveLength(1);
  closeTo(hours.obstacles[0]?.perDay, 0.05);
  const dose = plan(
    [alkalinity()],
    [
      pump(
        "hand ash",
        { alkalinity: 1000 },
        { largestDoseL: 0.03, largestDoseBy: "pH max", deliveries: { kind: "fixed", count: 3 } },
      ),
    ],
  );
  closeTo(dose.sources[0]?.totalLPerDay, 0.09);
  expect(dose.limitedBy).toBe("pH max");
  const unusable = plan(
    [alkalinity()],
    [pump("head-1", { alkalinity: 1000 }, { largestDoseL: 0.0005, largestDoseBy: "alkalinity dose" })],
  );
  expect(unusable.sources[0]?.totalLPerDay).toBe(0);
  expect(unusable.obstacles).toEqual([
    { parameter: "alkalinity", kind: "held-back", by: "head-1 least", perDay: 0.2 },
  ]);
  const none = plan([alkalinity(), calcium({ now: 413 })], [pump("ash", { alkalinity: 1000 })]);
  expect(none.obstacles).toEqual([{ parameter: "calcium", kind: "no-source", by: "no source", perDay: 5 }]);
  expect(plan([magnesium()], []).obstacles).toEqual([]);
});

test("a rise that breaks the limit by itself is named, and nothing planned adds to it", () => {
  const answer = plan(
    [alkalinity({ now: 2.9, risePerDay: 0.1, passivePerDay: 0.15, needPerDay: 0.02 }), calcium()],
    [pump("lime", { alkalinity: 40, calcium: 800 })],
  );
  expect(answer.sources[0]?.totalLPerDay).toBe(0);
  const breach = answer.obstacles.find(({ kind }) => kind === "passive-breach");
  expect(breach?.by).toBe("alkalinity rise");
  closeTo(breach?.perDay, 0.05);
});

test("what is held back is maintained and named, not corrected", () => {
  const answer = plan(
    [alkalinity({ now: 2.7, heldBack: "magnesium under 1150 mg/L" })],
    [pump("ash", { alkalinity: 1000 })],
  );
  closeTo(answer.sources[0]?.maintenanceLPerDay, 0.2);
  expect(answer.corrections).toEqual([]);
  expect(answer.limitedBy).toBe("magnesium under 1150 mg/L");
});

test("a volume that no number of doses can give is cut to the one below, and another source fills in", () => {
  // Doses between 10 and 12 mL: 0.02 to 0.024 L a day are two, 0.03 to 0.036 three; 0.2 meq/L are 0.0275 L.
  const stiff = pump(
    "head-1",
    { alkalinity: (0.2 * 1000) / 0.0275 },
    { leastDoseL: 0.01, largestDoseL: 0.012, largestDoseBy: "pH dose" },
  );
  const alone = plan([alkalinity()], [stiff]);
  closeTo(alone.sources[0]?.totalLPerDay, 0.024);
  expect(alone.sources[0]?.dosesPerDay).toBe(2);
  expect(alone.limitedBy).toBe("pH dose");
  const helped = plan([alkalinity()], [stiff, pump("head-2", { alkalinity: 100 })]);
  closeTo(helped.sources[1]?.totalLPerDay, (0.2 * 1000 * (1 - 0.024 / 0.0275)) / 100);
  expect(helped.obstacles).toEqual([]);
});

test("a correction too is cut to what doses can give", () => {
  // Doses between 10 and 12 mL; in the band, 0.1 meq/L in 7 days are 0.0275 L a day.
  const stiff = pump(
    "head-1",
    { alkalinity: ((0.1 / 7) * 1000) / 0.0275 },
    { leastDoseL: 0.01, largestDoseL: 0.012, largestDoseBy: "pH dose" },
  );
  const answer = plan([alkalinity({ now: 2.9, needPerDay: 0 })], [stiff]);
  closeTo(answer.sources[0]?.correctionLPerDay, 0.024);
  closeTo(answer.correctionDays, (7 * 0.0275) / 0.024);
  expect(answer.limitedBy).toBe("pH dose");
});

test("corrections that run together share the room under a limit", () => {
  const answer = plan(
    [alkalinity({ now: 2.9 }), calcium({ now: 410, risePerDay: 1 })],
    [pump("lime", { alkalinity: 40, calcium: 800 }), pump("chloride", { calcium: 20_000 })],
  );
  // Limewater brings 2 mg/L in 7 days with the alkalinity; 1 − 2/7 mg/L a day are left of the 10/7 wished.
  closeTo(answer.corrections[1]?.perDay, 1 - 2 / 7);
  closeTo(answer.corrections[1]?.days, 8 / (1 - 2 / 7));
  expect(answer.corrections[1]?.limitedBy).toBe("calcium rise");
});

test("what side effects leave of a correction isn't crammed into less than 7/8 of a day", () => {
  const answer = plan(
    [alkalinity({ now: 2.7 }), calcium({ now: 413.5 })],
    [pump("lime", { alkalinity: 40, calcium: 800 }), pump("chloride", { calcium: 20_000 })],
  );
  // 0.3 meq/L by limewater bring 6 of the 6.5 mg/L; at the full 6.5/7 mg/L a day the rest would take half a day.
  closeTo(answer.corrections[1]?.amount, 0.5);
  closeTo(answer.corrections[1]?.days, 7 / 8);
});

test("a correction leaves the hours that maintenance needs when a cut ends before it", () => {
  const answer = plan(
    [alkalinity({ now: 2.7, risePerDay: 0.03 }), calcium({ now: 441 })],
    [
      pump("lime", { alkalinity: 40, calcium: 800 }, { capacityLPerDay: 5.1 }),
      pump("ash", { alkalinity: 1000 }, { capacityLPerDay: 0.22 }),
    ],
  );
  // While calcium is cut to nothing ash alone keeps alkalinity with 0.2 of its 0.22 L; afterwards 5 L of
  // limewater do. So 0.02 L of ash and 0.1 L of limewater are free throughout: 0.02 + 0.004 meq/L a day.
  closeTo(answer.sources[0]?.maintenanceLPerDay, 0);
  closeTo(answer.corrections[0]?.perDay, 0.024);
  expect(answer.corrections[0]?.limitedBy).toBe("lime hours");
  expect(answer.phases).toHaveLength(3);
  closeTo(answer.phases[1]?.litresPerDay[0], 5.1);
});

test("figures that aren't numbers don't get through", () => {
  const odd = [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, -1, 0, 1e300];
  for (const value of odd) {
    const answer = plan(
      [
        alkalinity({ now: value, risePerDay: value, max: value }),
        calcium({ now: 400, needPerDay: value, aim: value }),
      ],
      [
        pump(
          "ash",
          { alkalinity: value, calcium: 3 },
          { largestDoseL: value, capacityLPerDay: value, alwaysLPerDay: value },
        ),
      ],
      value,
    );
    const { problem: _, ...figures } = answer;
    expect(
      JSON.stringify(figures, (__, x) => (typeof x === "number" && !(x >= 0 && x < Infinity) ? "BAD" : x)),
    ).not.toContain("BAD");
  }
});

test("a trace of alkalinity in the calcium part is no reason to give litres of it where alkalinity runs short", () => {
  const scarce = pump("head-1", { alkalinity: 1600 }, { capacityLPerDay: 0.05 });
  const traced = pump("head-2", { calcium: 32_000, alkalinity: 0.6 });
  const { sources, obstacles } = plan([alkalinity(), calcium()], [scarce, traced]);
  closeTo(sources[0]?.maintenanceLPerDay, 0.05);
  // 4 mg/L × 1000 L ÷ 32 mg/mL = 125 mL, not more.
  closeTo(sources[1]?.maintenanceLPerDay, 0.125);
  expect(obstacles).toMatchObject([{ parameter: "alkalinity", kind: "held-back", by: "head-1 hours" }]);
});

test("what comes in beyond the need does its part of a correction by itself", () => {
  // Limewater in the top-off brings 1 mg/L a day more than is taken; 14 mg/L below the aim, inside the band.
  const low = calcium({ now: 406, low: 400, high: 440, aim: 420, needPerDay: -1, passivePerDay: 1 });
  const part = pump("head-2", { calcium: 32_000 });
  const { corrections, sources } = plan([low], [part]);
  // Wished 14/7 = 2 mg/L a day, of which 1 comes by itself: 1 mg/L for 7 days.
  closeTo(corrections[0]?.perDay, 1);
  closeTo(corrections[0]?.days, 7);
  closeTo(corrections[0]?.amount, 7);
  closeTo(sources[0]?.correctionLPerDay, 1 / 32);
});

test("with flow-through a correction is over sooner, since exchange closes a part of the distance", () => {
  const exchangePerDay = 0.05;
  // Need at the aim 4; 14 mg/L lower, 5 % of the water a day brings 0.7 mg/L more of it.
  const low = calcium({
    now: 406,
    low: 400,
    high: 440,
    aim: 420,
    needPerDay: 4,
    passivePerDay: -4 + 14 * exchangePerDay,
  });
  const problem = {
    volumeL: 1000,
    exchangePerDay,
    parameters: [low],
    sources: [pump("head-2", { calcium: 32_000 })],
  };
  const { corrections, phases } = solvePlan(problem);
  closeTo(corrections[0]?.perDay, 2);
  closeTo(corrections[0]?.days, Math.log1p((exchangePerDay * 14) / 2) / exchangePerDay);
  // D' = −2 − 0.05 D from 14, by small steps.
  let left = 14;
  const steps = 20_000;
  for (let step = 0; step < steps; step += 1)
    left -= ((2 + exchangePerDay * left) * phases[0]!.untilDays!) / steps;
  expect(Math.abs(left)).toBeLessThan(0.001);
});

test("where a smallest dose leaves maintenance short, a correction makes that good while it runs", () => {
  // Doses of 40 to 42 mL: ten give at most 420, eleven at least 440; 437.5 mL are needed.
  const source = pump(
    "p",
    { alkalinity: 1600 },
    { largestDoseL: 0.042, leastDoseL: 0.04, deliveries: { kind: "at-most", count: 288 } },
  );
  const low = alkalinity({ now: 2.5, low: 2.7, high: 3, aim: 2.85, needPerDay: 0.7, passivePerDay: -0.7 });
  const answer = plan([low], [source]);
  expect(answer.sources[0]!.maintenanceLPerDay).toBeLessThanOrEqual(0.42 + 1e-12);
  const { days } = answer.corrections[0]!;
  closeTo(valueAt(answer.problem, answer, low, days), 2.85);
  closeTo(answer.corrections[0]!.distance, 0.35);
});

test("an aim above max is told: the water is brought up to max, and max is named", () => {
  const low = calcium({ now: 415, low: 400, high: 440, aim: 430, max: 425 });
  const { corrections, limitedBy, obstacles } = plan([low], [pump("head-2", { calcium: 32_000 })]);
  closeTo(corrections[0]?.distance, 10);
  expect(limitedBy).toBe("calcium max");
  expect(obstacles).toContainEqual({
    parameter: "calcium",
    kind: "held-back",
    by: "calcium max",
    perDay: null,
  });
});

test("a value at max is kept there", () => {
  const full = calcium({ now: 425, low: 400, high: 440, aim: 425, max: 425 });
  const { sources } = plan([full], [pump("head-2", { calcium: 32_000 })]);
  closeTo(sources[0]?.maintenanceLPerDay, 0.125);
});
