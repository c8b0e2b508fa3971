/** Reads the reference values of `test/reference/`; each file's `meta` names its source and settings. */
import { readFileSync } from "node:fs";
import { expect } from "vitest";

export function reference<T>(file: string): T {
  return JSON.parse(readFileSync(new URL(`../reference/${file}`, import.meta.url), "utf8")) as T;
}

/** Relative deviation at most `tolerance`; the message names the figure. */
export function near(actual: number, expected: number, tolerance: number, figure: string): void {
  const deviation = Math.abs(actual - expected) / Math.abs(expected);
  expect(deviation <= tolerance, `${figure}: ${actual}, expected ${expected}`).toBe(true);
}

/** Absolute deviation at most `tolerance`. */
export function within(actual: number, expected: number, tolerance: number, figure: string): void {
  expect(Math.abs(actual - expected) <= tolerance, `${figure}: ${actual}, expected ${expected}`).toBe(true);
}

/** Takes the answer out, or fails the test with the reason. */
export function answer<T extends { readonly ok: boolean }>(value: T): Extract<T, { readonly ok: true }> {
  expect(value).toMatchObject({ ok: true });
  return value as Extract<T, { readonly ok: true }>;
}
