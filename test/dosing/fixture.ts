/** A farm as text, assessed at a moment. */
import { expect } from "vitest";
import { bindFarm } from "../../server/culture/farm-model.ts";
import { type Assessment, assess } from "../../server/dosing/assess.ts";
import type { DosingFinding } from "../../server/dosing/finding.ts";
import type { Tracked } from "../../server/dosing/tracked.ts";
import { documentsOf, minute } from "../culture/fixture.ts";

/** The clock of all tests, past everything in them. */
export const clock = "2027-06-01 00:00";

/** Assesses the first system of a farm, or the one named. The farm itself must have nothing wrong with it. */
export function system(text: string, moment: string, name?: string): Assessment {
  const bound = bindFarm(documentsOf(text));
  const wrong = bound.findings.filter(({ code }) => !["name/unused", "reading/disregarded"].includes(code));
  expect(wrong.map(({ code, place }) => `${code} in line ${place.line + 1}`)).toEqual([]);
  const found = [...bound.model.systems.values()].find((one) => name === undefined || one.name === name);
  expect(found).toBeDefined();
  return assess(bound.model, found!, minute(moment), minute(clock));
}

/** The value now, carried forward. */
export function now(assessment: Assessment, parameter: Tracked): number {
  const carried = assessment.state.carried[parameter];
  expect(carried, parameter).not.toBeNull();
  return carried!.value;
}

/** Codes of the dosing findings of these families, each with the line that it points at. */
export const found = ({ findings }: Assessment, ...families: string[]): string[] =>
  findings
    .filter(({ code }) => families.some((family) => code.startsWith(family)))
    .map(({ code, place }) => `${code} line ${place.line + 1}`);

export function finding<C extends DosingFinding["code"]>(
  { findings }: Assessment,
  code: C,
): Extract<DosingFinding, { code: C }> {
  const one = findings.find((candidate) => candidate.code === code);
  expect(one, code).toBeDefined();
  return one as Extract<DosingFinding, { code: C }>;
}
