/** The share of the water to exchange, against mixing by hand: value × (1 − share) + incoming × share. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { shareToExchange } from "../../server/dosing/exchange.ts";

test.each([
  // A quarter of 12 with 8 is 3 × 12/4 + 8/4 = 11.
  [12, 11, 8, 0.25],
  // Half of 30 with 40 is 35.
  [30, 35, 40, 0.5],
  [480, 450, 330, 0.2],
])("from %d to %d with %d: %d", (value, target, incoming, share) => {
  expect(shareToExchange(value, target, incoming)).toBeCloseTo(share, 12);
});

test("none where the water doesn't help, half isn't enough, or nothing is to be done", () => {
  expect(shareToExchange(12, 11, 13)).toBeNull();
  expect(shareToExchange(12, 11, 12)).toBeNull();
  expect(shareToExchange(12, 9, 8)).toBeNull();
  expect(shareToExchange(12, 12, 8)).toBeNull();
  expect(shareToExchange(12, 13, 8)).toBeNull();
});

test("whatever is mixed so comes to the target", () => {
  const amount = fc.double({ min: 0.1, max: 2000, noNaN: true });
  let found = 0;
  fc.assert(
    fc.property(amount, amount, amount, (value, target, incoming) => {
      const share = shareToExchange(value, target, incoming);
      if (share === null) return;
      found += 1;
      expect(share).toBeLessThanOrEqual(0.5);
      expect(Math.abs(value * (1 - share) + incoming * share - target)).toBeLessThan(1e-9 * value + 1e-9);
    }),
  );
  expect(found).toBeGreaterThan(5);
});
