import fc from "fast-check";
import { expect, test } from "vitest";
import { deliverableL, deliveriesOf } from "../../../server/dosing/plan/deliveries.ts";
import { real } from "./fixtures.ts";

const head = { largestDoseL: 0.01, leastDoseL: 0.001, deliveries: { kind: "at-most", count: 24 } } as const;
const byHand = { largestDoseL: 0.01, leastDoseL: 0, deliveries: { kind: "fixed", count: 3 } } as const;

test("a pump gives the fewest equal doses", () => {
  expect(deliveriesOf(head, 0.025)).toEqual({ dosesPerDay: 3, litresPerDose: 0.025 / 3, everyDays: 1 });
  expect(deliveriesOf(head, 0.004)).toEqual({ dosesPerDay: 1, litresPerDose: 0.004, everyDays: 1 });
  expect(deliveriesOf(head, 0)).toEqual({ dosesPerDay: 0, litresPerDose: 0, everyDays: 1 });
});

test("a rounding hair over a whole number of doses isn't one dose more", () => {
  // 0.1 + 0.2 is a hair above 0.3.
  expect(deliveriesOf({ ...head, largestDoseL: 0.1 }, 0.1 + 0.2).dosesPerDay).toBe(3);
  expect(deliveriesOf(head, 0.001 / 3).everyDays).toBe(3);
  expect(deliveriesOf(head, 0.001 * (1 - 1e-15)).everyDays).toBe(1);
});

test("a daily volume under the least dose runs every k-th day", () => {
  const { dosesPerDay, litresPerDose, everyDays } = deliveriesOf(head, 0.0004);
  expect([dosesPerDay, everyDays]).toEqual([1, 3]);
  expect(litresPerDose).toBeCloseTo(0.0012, 12);
});

test("a hand gives its number of doses, however small", () => {
  expect(deliveriesOf(byHand, 0.003)).toEqual({ dosesPerDay: 3, litresPerDose: 0.001, everyDays: 1 });
  expect(deliverableL(byHand, 1)).toBeCloseTo(0.03, 12);
});

test("what fits between no numbers of doses is cut to the largest volume that does", () => {
  const stiff = { ...head, largestDoseL: 0.0012 };
  expect(deliverableL(stiff, 0.0015)).toBeCloseTo(0.0012, 12);
  expect(deliverableL(stiff, 0.0009)).toBeCloseTo(0.0006, 12);
  expect(deliverableL(stiff, 0.0023)).toBe(0.0023);
  expect(deliverableL({ ...head, largestDoseL: 0.0005 }, 0.01)).toBe(0);
});

test("what is deliverable is delivered within its bounds, and is never more than asked", () => {
  const litres = real(1e-5, 0.5);
  fc.assert(
    fc.property(litres, litres, litres, fc.integer({ min: 1, max: 48 }), (wished, least, more, count) => {
      const source = {
        leastDoseL: least,
        largestDoseL: least + more,
        deliveries: { kind: "at-most", count },
      } as const;
      const given = deliverableL(source, wished);
      expect(given).toBeLessThanOrEqual(wished);
      expect(given).toBeGreaterThan(0);
      expect(deliverableL(source, given)).toBeCloseTo(given, 12);
      const { dosesPerDay, litresPerDose, everyDays } = deliveriesOf(source, given);
      expect(dosesPerDay).toBeLessThanOrEqual(count);
      expect(litresPerDose).toBeLessThanOrEqual(source.largestDoseL * (1 + 1e-8));
      expect(litresPerDose).toBeGreaterThanOrEqual(least * (1 - 1e-8));
      expect((dosesPerDay * litresPerDose) / everyDays).toBeCloseTo(given, 12);
      // Wide enough bounds leave no gaps.
      if (more >= least && wished <= count * source.largestDoseL) expect(given).toBe(wished);
    }),
    { numRuns: 2000, seed: 7 },
  );
});
