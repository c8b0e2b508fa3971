/** Maintenance against another solver, and how little it moves when the inputs move by a hair. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { solve as solveLinear } from "yalps";
import type { PlanParameter, PlanProblem } from "../../../server/dosing/plan/problem.ts";
import { solvePlan } from "../../../server/dosing/plan/solve.ts";
import {
  alkalinity,
  alwaysOf,
  bandOf,
  bringsPerDay,
  calcium,
  keptOf,
  mostADay,
  pump,
  randomProblem,
  real,
  runs,
} from "./fixtures.ts";

const infinite = Number.POSITIVE_INFINITY;

/** The least deviation of one parameter, the deviations of those before it held, by another solver. */
function leastDeviations(problem: PlanProblem, known: readonly PlanParameter[]): number[] {
  const found: number[] = [];
  known.forEach((_, stage) => {
    const constraints: [string, { min?: number; max?: number; equal?: number }][] = [];
    const variables = new Map<string, Map<string, number>>();
    problem.sources.forEach((source, j) => {
      const column = new Map([[`most ${j}`, 1]]);
      constraints.push([`most ${j}`, { max: Math.max(0, mostADay(source) - source.alwaysLPerDay) }]);
      for (const parameter of problem.parameters) {
        const perL = (source.strength[parameter.name] ?? 0) / problem.volumeL / bandOf(parameter);
        column.set(`limit ${parameter.name}`, perL);
        column.set(`need ${parameter.name}`, perL);
      }
      variables.set(`${j}`, column);
    });
    for (const parameter of problem.parameters) {
      const { name, now, max, risePerDay, passivePerDay } = parameter;
      const anyway = passivePerDay + bringsPerDay(problem, parameter, alwaysOf(problem));
      const room =
        Math.min(risePerDay ?? infinite, now === null || max === null ? infinite : max - now) - anyway;
      if (room < infinite)
        constraints.push([`limit ${name}`, { max: Math.max(0, room) / bandOf(parameter) }]);
    }
    known.forEach((parameter, index) => {
      if (index > stage) return;
      const { name } = parameter;
      const always = bringsPerDay(problem, parameter, alwaysOf(problem));
      constraints.push([
        `need ${name}`,
        { equal: (Math.max(0, parameter.needPerDay!) - always) / bandOf(parameter) },
      ]);
      const objective: [string, number][] = index === stage ? [["off", 1]] : [[`held ${name}`, 1]];
      variables.set(`short ${name}`, new Map([[`need ${name}`, 1], ...objective]));
      variables.set(`over ${name}`, new Map([[`need ${name}`, -1], ...objective]));
      if (index < stage) constraints.push([`held ${name}`, { max: found[index]! + 1e-7 }]);
    });
    const options = { precision: 1e-10, checkCycles: true };
    const { status, result } = solveLinear(
      { direction: "minimize", objective: "off", constraints, variables },
      options,
    );
    found.push(status === "optimal" ? result : Number.NaN);
  });
  return found;
}

test("each parameter's deviation is the least that the ones before it allow, by another solver", () => {
  let compared = 0;
  let failed = 0;
  fc.assert(
    fc.property(randomProblem, (problem) => {
      const known = problem.parameters.filter(({ needPerDay }) => needPerDay !== null);
      // The other solver knows neither cuts nor doses that leave gaps nor sources that serve the unknown.
      fc.pre(known.length === problem.parameters.length);
      fc.pre(known.every(({ now, aim }) => now === null || now <= aim));
      fc.pre(problem.sources.every(({ leastDoseL, largestDoseL }) => largestDoseL >= 2 * leastDoseL));
      fc.pre(problem.parameters.every(({ now, max }) => now === null || max === null || now < max));
      const kept = keptOf(problem, solvePlan(problem));
      const least = leastDeviations(problem, known);
      known.forEach((parameter, index) => {
        if (Number.isNaN(least[index]!)) {
          failed += 1;
          return;
        }
        const off = Math.abs(bringsPerDay(problem, parameter, kept) - Math.max(0, parameter.needPerDay!));
        expect(Math.abs(off / bandOf(parameter) - least[index]!)).toBeLessThanOrEqual(1e-4);
        compared += 1;
      });
    }),
    runs,
  );
  expect(compared).toBeGreaterThan(2000);
  expect(failed).toBeLessThan(compared / 50);
});

test("a hair in the inputs moves every rate by a hair: two sources of the same don't change places", () => {
  const hair = real(-1e-6, 1e-6);
  const amount = real(0, 1);
  fc.assert(
    fc.property(
      fc.record({
        need: amount,
        needCalcium: amount,
        now: amount,
        share: amount,
        rise: amount,
        capacity: fc.option(amount, { nil: null }),
        hairs: fc.array(hair, { minLength: 10, maxLength: 10 }),
        secondSwapped: fc.boolean(),
      }),
      ({ need, needCalcium, now, share, rise, capacity, hairs, secondSwapped }) => {
        const build = (by: readonly number[]): PlanProblem => {
          const two = [
            pump(
              "head-1",
              { alkalinity: 1000 * (1 + by[0]!), calcium: 20_000 * share * (1 + by[1]!) },
              {
                capacityLPerDay: capacity && capacity * (1 + by[2]!),
              },
            ),
            pump("head-2", { alkalinity: 1000 * (1 + by[3]!), calcium: 20_000 * share * (1 + by[4]!) }),
          ];
          return {
            volumeL: 1000 * (1 + by[5]!),
            exchangePerDay: 0,
            parameters: [
              alkalinity({
                needPerDay: 0.4 * need * (1 + by[6]!),
                now: 2.6 + 0.4 * now * (1 + by[7]!),
                risePerDay: 0.05 + 0.3 * rise,
              }),
              calcium({ needPerDay: 10 * needCalcium * (1 + by[8]!), now: 415 * (1 + by[9]!) }),
            ],
            sources: [...(secondSwapped ? two.reverse() : two), pump("ash", { alkalinity: 1500 })],
          };
        };
        const exact = solvePlan(build(hairs.map(() => 0)));
        const moved = solvePlan(build(hairs));
        exact.sources.forEach((source, j) => {
          const other = moved.sources[j]!;
          expect(Math.abs(source.maintenanceLPerDay! - other.maintenanceLPerDay!)).toBeLessThan(2e-4);
          expect(Math.abs(source.correctionLPerDay - other.correctionLPerDay)).toBeLessThan(2e-3);
        });
      },
    ),
    runs,
  );
});
