/** What holds of every plan: checked on random problems with arithmetic of its own, straight from the problem. */
import fc from "fast-check";
import { expect, test } from "vitest";
import type {
  PlanAnswer,
  PlanParameter,
  PlanProblem,
  PlanSource,
} from "../../../server/dosing/plan/problem.ts";
import { solvePlan } from "../../../server/dosing/plan/solve.ts";
import {
  alwaysOf,
  bandOf,
  bringsPerDay,
  keptOf,
  mostADay,
  randomProblem,
  runs,
  valueAt,
  wellEquipped,
} from "./fixtures.ts";

const infinite = Number.POSITIVE_INFINITY;

const brings = (source: PlanSource, { name }: PlanParameter): boolean => (source.strength[name] ?? 0) > 0;
const obstaclesOf = (answer: PlanAnswer, { name }: PlanParameter, kind?: string) =>
  answer.obstacles.filter((one) => one.parameter === name && (kind === undefined || one.kind === kind));
function numbersIn(value: unknown): number[] {
  if (typeof value === "number") return [value];
  return value !== null && typeof value === "object" ? Object.values(value).flatMap(numbersIn) : [];
}

test("every figure is a number ≥ 0, the parts add up, and the same problem gives the same answer", () => {
  fc.assert(
    fc.property(randomProblem, (problem) => {
      const answer = solvePlan(problem);
      expect(solvePlan(structuredClone(problem))).toEqual(answer);
      for (const value of numbersIn(answer))
        if (!(value >= 0 && value < infinite)) throw new Error(`a figure of ${value}`);
      answer.sources.forEach((planned, j) => {
        const source = problem.sources[j]!;
        const total = planned.totalLPerDay ?? source.alwaysLPerDay + planned.correctionLPerDay;
        const delivered = (planned.dosesPerDay * planned.litresPerDose) / planned.everyDays;
        expect(Math.abs(delivered - total)).toBeLessThanOrEqual(1e-9 * Math.max(1, total));
        expect(total).toBeGreaterThanOrEqual(source.alwaysLPerDay);
        expect(total).toBeCloseTo(answer.phases[0]!.litresPerDay[j]!, 9);
        if (total <= source.alwaysLPerDay * (1 + 1e-9)) return;
        expect(planned.litresPerDose).toBeLessThanOrEqual(source.largestDoseL * (1 + 1e-6));
        if (source.deliveries.kind === "fixed") expect(planned.dosesPerDay).toBe(source.deliveries.count);
        else {
          expect(planned.dosesPerDay).toBeLessThanOrEqual(source.deliveries.count);
          expect(planned.litresPerDose).toBeGreaterThanOrEqual(source.leastDoseL * (1 - 1e-6));
        }
      });
      for (const { litresPerDay } of answer.phases) {
        litresPerDay.forEach((litres, j) => {
          const source = problem.sources[j]!;
          expect(litres).toBeLessThanOrEqual(Math.max(source.alwaysLPerDay, mostADay(source)) * (1 + 1e-9));
        });
      }
      const corrected = answer.corrections.map(({ parameter }) => parameter);
      for (const { serves, correctionLPerDay, correctionTotalL } of answer.sources) {
        expect(serves === null).toBe(correctionLPerDay === 0);
        if (serves === null) continue;
        expect(corrected).toContain(serves);
        const { days } = answer.corrections.find(({ parameter }) => parameter === serves)!;
        expect(correctionTotalL).toBeCloseTo(correctionLPerDay * days, 9);
      }
    }),
    runs,
  );
});

test("what is planned never adds to a breach of a limit", () => {
  fc.assert(
    fc.property(randomProblem, (problem) => {
      const answer = solvePlan(problem);
      const always = alwaysOf(problem);
      for (const parameter of problem.parameters) {
        const { now, max, risePerDay, passivePerDay, needPerDay } = parameter;
        const hair = 1e-9 * bandOf(parameter);
        const anyway = passivePerDay + bringsPerDay(problem, parameter, always);
        const plannedIn = (litresPerDay: readonly number[]): number =>
          bringsPerDay(problem, parameter, litresPerDay) - bringsPerDay(problem, parameter, always);
        // With exchange the passive change is that of the water now, so that only the first phase can be judged.
        for (const { litresPerDay } of problem.exchange ? answer.phases.slice(0, 1) : answer.phases) {
          const room = Math.max(0, (risePerDay ?? infinite) - anyway);
          expect(plannedIn(litresPerDay)).toBeLessThanOrEqual(room + hair);
        }
        if (now === null || max === null) continue;
        if (now >= max) expect(plannedIn(answer.phases[0]!.litresPerDay)).toBeLessThanOrEqual(hair);
        const firstDay = problem.exchange ? Math.min(1, answer.phases[0]!.untilDays ?? 1) : 1;
        const top = Math.max(max, now, now + anyway);
        expect(valueAt(problem, answer, parameter, firstDay)).toBeLessThanOrEqual(
          top + 1e-6 * bandOf(parameter),
        );
        // Water that maintenance doesn't let rise stays under it all the way.
        const drift = bringsPerDay(problem, parameter, answer.phases.at(-1)!.litresPerDay) + passivePerDay;
        if (problem.exchange || needPerDay === null || drift > hair) continue;
        for (const { untilDays } of answer.phases) {
          if (untilDays === null) continue;
          expect(valueAt(problem, answer, parameter, untilDays)).toBeLessThanOrEqual(
            Math.max(max, now) + 1e-6 * bandOf(parameter),
          );
        }
      }
    }),
    runs,
  );
});

test("corrections and cuts reach the aim in the days they state", () => {
  let corrections = 0;
  let cuts = 0;
  fc.assert(
    fc.property(randomProblem, (problem) => {
      fc.pre(!problem.exchange);
      const answer = solvePlan(problem);
      const kept = keptOf(problem, answer);
      for (const parameter of problem.parameters) {
        const { name, now, aim, max, needPerDay } = parameter;
        if (now === null || needPerDay === null || needPerDay < 0) continue;
        const end = answer.phases.at(-1)!.litresPerDay;
        const drift = bringsPerDay(problem, parameter, end) + parameter.passivePerDay;
        const within = 0.01 * bandOf(parameter);
        const correction = answer.corrections.find((one) => one.parameter === name);
        // Where maintenance can't be met (named elsewhere) the water drifts whatever correction does.
        const maintained =
          Math.abs(bringsPerDay(problem, parameter, kept) - needPerDay) < 1e-6 * bandOf(parameter);
        if (correction && maintained && Math.abs(drift) < 1e-6 * bandOf(parameter)) {
          const everythingRan = Math.max(answer.correctionDays, ...answer.cuts.map(({ days }) => days));
          const reached = valueAt(problem, answer, parameter, everythingRan);
          const goal = Math.min(aim, max ?? aim);
          // Cuts of another parameter may have changed what comes of this one in between.
          if (answer.cuts.length === 0) {
            expect(Math.abs(reached - goal)).toBeLessThanOrEqual(within);
            corrections += 1;
            if (
              Math.abs(goal - now - correction.amount) < 1e-9 * bandOf(parameter) &&
              answer.corrections.length === 1
            ) {
              expect(
                Math.abs(valueAt(problem, answer, parameter, correction.days) - goal),
              ).toBeLessThanOrEqual(within);
              const before = valueAt(problem, answer, parameter, correction.days / 2);
              expect(Math.abs(before - (now + goal) / 2)).toBeLessThanOrEqual(within);
            }
          }
        }
        const cut = answer.cuts.find((one) => one.parameter === name);
        if (cut) {
          const when = Math.max(cut.days, answer.correctionDays);
          const others = answer.cuts.some((one) => one.days > cut.days);
          const after = valueAt(problem, answer, parameter, cut.days);
          const broughtLater = valueAt(problem, answer, parameter, when) - after;
          const driftAfter = drift * (when - cut.days);
          if (!others) expect(Math.abs(after + broughtLater - driftAfter - aim)).toBeLessThanOrEqual(within);
          cuts += 1;
        }
      }
    }),
    runs,
  );
  expect(Math.min(corrections, cuts)).toBeGreaterThan(100);
});

/** A distance to the aim of less than this share of the band is left alone: no test shows it. */
const nothingToMend = 0.0051;

test("where every parameter has a source of its own, all end at their aims and stay there", () => {
  let sideEffects = 0;
  let together = 0;
  fc.assert(
    fc.property(wellEquipped, (problem) => {
      const answer = solvePlan(problem);
      expect(answer.obstacles).toEqual([]);
      expect(answer.corrections.every(({ limitedBy }) => limitedBy?.endsWith(" rise") ?? true)).toBe(true);
      const end = Math.max(answer.correctionDays, ...answer.cuts.map(({ days }) => days));
      for (const parameter of problem.parameters) {
        const { name, now, aim } = parameter;
        const reached = valueAt(problem, answer, parameter, end);
        expect(Math.abs(reached - aim)).toBeLessThanOrEqual(0.01 * bandOf(parameter));
        expect(Math.abs(valueAt(problem, answer, parameter, end + 1) - reached)).toBeLessThanOrEqual(
          0.01 * bandOf(parameter),
        );
        const correction = answer.corrections.find((one) => one.parameter === name);
        if (correction && aim - now! - correction.amount > 0.01 * bandOf(parameter)) sideEffects += 1;
        for (const { litresPerDay } of answer.phases) {
          const change = bringsPerDay(problem, parameter, litresPerDay) + parameter.passivePerDay;
          expect(change).toBeLessThanOrEqual((parameter.risePerDay ?? infinite) + 1e-9 * bandOf(parameter));
          expect(-change).toBeLessThanOrEqual((parameter.fallPerDay ?? infinite) + 1e-9 * bandOf(parameter));
        }
        if (now! - aim > nothingToMend * bandOf(parameter))
          expect(answer.cuts.map((one) => one.parameter)).toContain(name);
      }
      if (answer.cuts.length > 0 && answer.corrections.length > 0) together += 1;
    }),
    runs,
  );
  expect(Math.min(sideEffects, together)).toBeGreaterThan(100);
});

test("below the aim with nothing in the way, it is corrected, at the wished rate if no limit is named", () => {
  let seen = 0;
  fc.assert(
    fc.property(randomProblem, (problem) => {
      const answer = solvePlan(problem);
      for (const parameter of problem.parameters) {
        const { name, now, aim, low, max, heldBack } = parameter;
        if (
          now === null ||
          now >= Math.min(aim, max ?? aim) - nothingToMend * bandOf(parameter) ||
          obstaclesOf(answer, parameter).length > 0
        )
          continue;
        expect(heldBack).toBeNull();
        // What rises by itself close under its greatest value needn't be brought all the way.
        const rising =
          parameter.passivePerDay +
          Math.max(
            ...answer.phases.map(({ litresPerDay }) => bringsPerDay(problem, parameter, litresPerDay)),
          );
        if (max !== null && rising > 0 && aim > max - rising - 0.001 * bandOf(parameter)) continue;
        // What comes in beyond the need does its part by itself; worked cases have that.
        const kept = bringsPerDay(problem, parameter, answer.phases.at(-1)!.litresPerDay);
        if (parameter.needPerDay !== null && kept - parameter.needPerDay > 1e-9 * bandOf(parameter)) continue;
        const own = answer.corrections.find((one) => one.parameter === name);
        const brought = answer.sources.reduce(
          (sum, { correctionTotalL }, j) =>
            sum + ((problem.sources[j]!.strength[name] ?? 0) * correctionTotalL) / problem.volumeL,
          0,
        );
        // A side effect may leave so little open that nothing more is given for it.
        const open = own ? 1e-9 : nothingToMend;
        expect(brought).toBeGreaterThanOrEqual(
          (Math.min(aim, max ?? aim) - now) * (1 - 1e-6) - open * bandOf(parameter),
        );
        if (!own) continue;
        // What side effects leave to be given isn't crammed into less than 7/8 of a day.
        const wished = Math.min((aim - now) / 7 + Math.max(0, low - now), (own.amount * 8) / 7);
        if (own.limitedBy === null) expect(Math.abs(own.perDay - wished)).toBeLessThanOrEqual(1e-6 * wished);
        else expect(own.perDay).toBeLessThan(wished);
        expect(own.days).toBeCloseTo(own.amount / own.perDay, 6);
        seen += 1;
      }
    }),
    runs,
  );
  expect(seen).toBeGreaterThan(200);
});

test("corrections don't push a weightier parameter above its aim", () => {
  fc.assert(
    fc.property(randomProblem, (problem) => {
      const answer = solvePlan(problem);
      problem.parameters.forEach((parameter, p) => {
        const weightierOnly = new Set(problem.parameters.slice(p + 1).map(({ name }) => name as string));
        const brought = (which: (serves: string) => boolean): number =>
          answer.sources.reduce(
            (sum, { serves, correctionTotalL }, j) =>
              serves !== null && which(serves)
                ? sum +
                  ((problem.sources[j]!.strength[parameter.name] ?? 0) * correctionTotalL) / problem.volumeL
                : sum,
            0,
          );
        const lighter = brought((serves) => weightierOnly.has(serves));
        const before = brought((serves) => !weightierOnly.has(serves));
        const { now, aim, heldBack } = parameter;
        const open = now === null || heldBack !== null ? 0 : Math.max(0, aim - now - before);
        expect(lighter).toBeLessThanOrEqual(open + 1e-6 * bandOf(parameter));
      });
    }),
    runs,
  );
});

/** Whether a little more of a source would break its own bound or a limit of anything that it brings. */
function couldGiveMore(problem: PlanProblem, kept: readonly number[], j: number): boolean {
  const source = problem.sources[j]!;
  const { deliveries, largestDoseL, leastDoseL } = source;
  if (kept[j]! >= mostADay(source) * (1 - 1e-6)) return false;
  // Between what n doses can give and what n + 1 can there may be nothing.
  if (deliveries.kind === "at-most" && largestDoseL < 2 * leastDoseL) return false;
  return problem.parameters.every((parameter) => {
    if (!brings(source, parameter)) return true;
    const { now, max, risePerDay, passivePerDay } = parameter;
    if (now !== null && max !== null && now >= max) return false;
    const room = Math.min(risePerDay ?? infinite, now === null || max === null ? infinite : max - now);
    return passivePerDay + bringsPerDay(problem, parameter, kept) < room - 1e-6 * bandOf(parameter);
  });
}

test("maintenance keeps a parameter flat, unless an obstacle is named, and a named obstacle is real", () => {
  let flat = 0;
  let short = 0;
  fc.assert(
    fc.property(randomProblem, (problem) => {
      const answer = solvePlan(problem);
      const kept = keptOf(problem, answer);
      const always = alwaysOf(problem);
      problem.parameters.forEach((parameter, p) => {
        const { needPerDay, now, aim } = parameter;
        if (needPerDay === null || (now !== null && now > aim)) return;
        const within = 0.01 * bandOf(parameter);
        const surplus = bringsPerDay(problem, parameter, kept) - Math.max(0, needPerDay);
        if (surplus < -within) {
          short += 1;
          expect(obstaclesOf(answer, parameter).map(({ kind }) => kind)).toSatisfy(
            (kinds: string[]) => kinds.includes("held-back") || kinds.includes("no-source"),
          );
          const able = problem.sources.filter(
            (source, j) => brings(source, parameter) && couldGiveMore(problem, kept, j),
          );
          // The weightiest has nobody to give way to.
          if (p === 0) expect(able).toEqual([]);
          for (const source of able) {
            expect(
              problem.parameters.some(
                (other, q) => q < p && other.needPerDay !== null && brings(source, other),
              ),
            ).toBe(true);
          }
        } else if (surplus > within) {
          // Too much only by what always runs, or by a source that a weightier parameter needs.
          problem.sources.forEach((source, j) => {
            if (!brings(source, parameter) || kept[j]! <= always[j]! * (1 + 1e-9)) return;
            expect(problem.parameters.some((other, q) => q < p && brings(source, other))).toBe(true);
          });
        } else flat += 1;
      });
    }),
    runs,
  );
  expect(Math.min(flat, short)).toBeGreaterThan(300);
});
