/**
 * Two bookkeepings of the same water. Where a truth is exactly what the files declare, and tests show it exactly,
 * what the product carries from one weekly test to the next must come out where the simulation does.
 */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { bindFarm } from "../../server/culture/farm-model.ts";
import { assess } from "../../server/dosing/assess.ts";
import { lagoon } from "./lagoon.ts";
import { calciumMgPerL, dkh, magnesiumMgPerL } from "./mass-balance.ts";
import { raceways } from "./raceways.ts";
import { minuteOf, simulate } from "./simulate.ts";
import { bicarbonatePart, limewater } from "./stock-room.ts";
import type { Cohort, Kit, Truth } from "./truth.ts";
import { writeLog } from "./write-log.ts";

const exactly = { scatter: 0, bias: 0, step: 0.0001 } as const;
const exactKit: Kit = {
  name: "bench",
  alkalinityDkh: exactly,
  calciumMgPerL: exactly,
  magnesiumMgPerL: exactly,
  salinity: exactly,
  temperatureDegC: exactly,
  pH: exactly,
};

/** A truth without noise, tested once a week. `meqPerDayEach`, growth and magnesium of each cohort as declared. */
function declared(
  truth: Truth,
  volumeL: number,
  cohorts: readonly (readonly [meqPerDayEach: number, growthPerWeek: number, magnesiumFraction: number])[],
  proteinGPerDay: number,
): Truth {
  return {
    ...truth,
    volumeL,
    cohorts: truth.cohorts.map((cohort, index): Cohort => {
      const [meqPerDayEach = 0, growthPerWeek = 0, magnesiumFraction = 0] = cohorts[index] ?? [];
      return { ...cohort, meqPerDayEach, growthPerWeek, magnesiumFraction };
    }),
    // Protein is 16 % nitrogen (14.007 g/mol), and food nitrogen takes an equivalent a mole on its way to nitrate.
    otherLossMeqPerDay: ((proteinGPerDay * 0.16) / 14.007) * 1000,
    evaporation: { litresPerDay: Math.round(truth.evaporation.litresPerDay), dayToDay: 0 },
    pumps: truth.pumps.map((pump) => ({ ...pump, delivers: 1 })),
    unexplained: { alkalinityMeqPerL: 0, calciumMmolPerL: 0, magnesiumMmolPerL: 0 },
    kit: exactKit,
    // Pumps are set on days of the weekly test: a setting on any other day would bring a test with it.
    habits: { ...truth.habits, daysMissed: 1, setOnDays: [27, 48, 69] },
    happenings: truth.happenings.filter(({ what }) => what !== "disregarded"),
  };
}

const asDeclared = {
  raceways: declared(
    raceways,
    1640,
    [
      [0.55, 0.012, 0.005],
      [1.4, 0.008, 0.005],
      [300, 0.006, 0.005],
      [16, 0, 0.15],
    ],
    8 * 0.45,
  ),
  lagoon: declared(
    {
      ...lagoon,
      // Saturated limewater holds about a fiftieth more at 22 °C than at 25 °C (handbook tables).
      topOff: {
        ...limewater,
        alkalinityMeqPerMl: 2 * 0.0203 * 1.022,
        calciumMmolPerMl: 0.0203 * 1.022,
      },
      pumps: lagoon.pumps.map((pump) => ({
        ...pump,
        solution: { ...bicarbonatePart, alkalinityMeqPerMl: (60 * 0.998) / 84.006 },
      })),
    },
    Math.PI * 90 * 90 * 0.05 + 220 - 50,
    [
      [60, 0.004, 0.15],
      [0.15, 0, 0.13],
      [24, 0, 0.13],
    ],
    6 * 0.5,
  ),
};

const example = (path: string) => readDocument(readFileSync(`examples/${path}`, "utf8"));

/** The product's water a minute before each weekly test, beside the truth. */
function weekByWeek(truth: Truth) {
  const { events, course } = simulate(truth, 1);
  const { system: name } = truth;
  const log = writeLog(events, { system: name, uses: "system.marl", remarks: [] });
  const { model } = bindFarm(
    new Map([
      ["farm.marl", example("farm.marl")],
      ["solutions.marl", example("solutions.marl")],
      [`${name}/system.marl`, example(`${name}/system.marl`)],
      [`${name}/log.marl`, readDocument(log)],
    ]),
    new Map(),
  );
  const [system] = model.systems.values();
  if (!system) throw new Error(`No system ${name}.`);
  const weeks: { carried: readonly number[]; truly: readonly number[] }[] = [];
  for (let day = 13; day <= truth.days; day += 7) {
    // Whole days after the test, so that it doesn't matter that the product knows no day and night.
    const minute = minuteOf(truth, day, "07:00");
    const { state } = assess(model, system, minute, minute);
    const water = course.find((moment) => moment.minute === minute)?.water;
    const { alkalinity, calcium, magnesium, salinity } = state.carried;
    if (!water || !alkalinity || !calcium || !magnesium || !salinity)
      throw new Error(`Nothing known on day ${day}.`);
    expect((minute - alkalinity.readAt) / 1440).toBeGreaterThan(6.9);
    weeks.push({
      carried: [dkh(alkalinity.value), calcium.value, magnesium.value, salinity.value],
      truly: [dkh(water.alkalinityMeqPerL), calciumMgPerL(water), magnesiumMgPerL(water), water.salinity],
    });
  }
  return weeks;
}

/** dKH, mg/L, mg/L, PSS-78: what a week of bookkeeping may leave. */
const allowed = {
  raceways: { alkalinity: 0.01, calcium: 0.1, magnesium: 0.01, salinity: 0.001 },
  // The simulation's float valve lets in less limewater by what the pump brings; the product counts all that
  // evaporates. Of what limewater takes up from the air the product counts nothing as salt.
  lagoon: { alkalinity: 0.06, calcium: 0.45, magnesium: 0.01, salinity: 0.06 },
} as const;

describe("what is carried through a week agrees with an independent simulation", () => {
  test.each(["raceways", "lagoon"] as const)("%s", (name) => {
    const weeks = weekByWeek(asDeclared[name]);
    expect(weeks.length).toBe(12);
    for (const [index, [parameter, most]] of Object.entries(allowed[name]).entries()) {
      const apart = weeks.map(({ carried, truly }) => Math.abs(carried[index]! - truly[index]!));
      expect(Math.max(...apart), parameter).toBeLessThan(most);
    }
  });
});
