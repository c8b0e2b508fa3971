/** A farm as text, assessed at a moment. */
import { expect } from "vitest";
import { bindFarm } from "../../server/culture/farm-model.ts";
import { type Assessment, assess } from "../../server/dosing/assess.ts";
import type { DosingFinding } from "../../server/dosing/finding.ts";
import type { Tracked } from "../../server/dosing/tracked.ts";
import { documentsOf, filesOf, minute } from "../culture/fixture.ts";

/** The clock of all tests, past everything in them. */
export const clock = "2027-06-01 00:00";

const texts = new WeakMap<Assessment, Map<string, string>>();

/** Assesses the first system of a farm, or the one named. The farm itself must have nothing wrong with it. */
export function system(text: string, moment: string, name?: string): Assessment {
  const bound = bindFarm(documentsOf(text), new Map());
  const harmless = ["name/unused", "reading/disregarded", "hazard/caustic"];
  const wrong = bound.findings.filter(({ code }) => !harmless.includes(code));
  expect(wrong.map(({ code, place }) => `${code} in line ${place.line + 1}`)).toEqual([]);
  const found = [...bound.model.systems.values()].find((one) => name === undefined || one.name === name);
  expect(found).toBeDefined();
  const assessment = assess(bound.model, found!, minute(moment), minute(clock));
  texts.set(assessment, filesOf(text));
  return assessment;
}

/** The value now, carried forward. */
export function now(assessment: Assessment, parameter: Tracked): number {
  const carried = assessment.state.carried[parameter];
  expect(carried, parameter).not.toBeNull();
  return carried!.value;
}

/** Codes of the findings of these families, each with the words that it points at. */
export const found = (assessment: Assessment, ...families: string[]): string[] =>
  assessment.findings
    .filter(({ code }) => families.some((family) => code.startsWith(family)))
    .map(({ code, place }) => {
      const line = texts.get(assessment)?.get(place.file)?.split("\n")[place.line] ?? "";
      return `${code}: ${place.span ? line.slice(place.span.start, place.span.end) : line.trim()}`;
    });

type Of<C> = DosingFinding extends infer F
  ? F extends { readonly code: infer Codes }
    ? C extends Codes
      ? F
      : never
    : never
  : never;

/** The first finding of a code. */
export function finding<C extends DosingFinding["code"]>({ findings }: Assessment, code: C): Of<C> {
  const one = findings.find((candidate) => candidate.code === code);
  expect(one, code).toBeDefined();
  return one as Of<C>;
}
