import { describe, expect, test } from "vitest";
import { countBySeverity } from "../../server/checks/problem.ts";
import type { Rule } from "../../server/checks/rule.ts";
import { type Finding, problemsOf, rules, severityRank } from "../../server/checks/rules.ts";
import { filesOf, walk } from "./walk.ts";

/** Codes and severities are promised to those who read the report; null where the finding decides. */
const promised: Readonly<Record<string, string | null>> = {
  "syntax/unknown-word": "error",
  "syntax/unfinished": "error",
  "syntax/number-form": "error",
  "syntax/date-form": "error",
  "syntax/misplaced": "error",
  "syntax/merge-marks": "error",
  "unit/unknown": "error",
  "unit/dimension": "error",
  "unit/missing": "error",
  "unit/as-caco3": "error",
  "unit/ppm": "info",
  "name/undeclared": "error",
  "name/twice": "error",
  "name/ambiguous-reagent": "error",
  "name/unused": "hint",
  "use/missing-file": "error",
  "use/outside": "error",
  "use/cycle": "info",
  "log/twice": "warning",
  "log/future": "warning",
  "log/out-of-order": "hint",
  "log/no-effect": "info",
  "reading/impossible": "error",
  "reading/unusual": "warning",
  "reading/disregarded": "info",
  "system/no-volume": "error",
  "system/empty-hold": "error",
  "system/aim-outside": "error",
  "system/until-before-from": "error",
  "system/volume-differs": "warning",
  "water/outside-hold": "warning",
  "water/leaves-hold-soon": "warning",
  "water/leaves-hold": "info",
  "water/beyond-limit": "error",
  "water/salinity-is-the-cause": "warning",
  "water/room-air": "warning",
  "water/stale": "warning",
  ...Object.fromEntries(
    ["alkalinity", "calcium", "magnesium", "potassium", "strontium"].flatMap((parameter) => [
      [`overdose/${parameter}-rise`, "warning"],
      [`overdose/${parameter}-dose`, "warning"],
      [`overdose/${parameter}-max`, "error"],
    ]),
  ),
  "overdose/ph": "error",
  "overdose/precipitation": null,
  "plan/held-back": "warning",
  "plan/no-source": "warning",
  "plan/passive-breach": "warning",
  "plan/every-other-day": "info",
  "hazard/caustic": null,
  "quiet/unused": "hint",
  "file/unreadable": "error",
  "file/more": "info",
};

const table = Object.entries(rules) as unknown as [string, Rule][];

describe("the table of rules", () => {
  test("holds the promised codes with their severities, and no other", () => {
    const severities = table.map(([code, { severity }]) => [
      code,
      typeof severity === "string" ? severity : null,
    ]);
    expect(Object.fromEntries(severities)).toEqual(promised);
  });

  test("the severity of precipitation is the finding's grade", () => {
    const place = { file: "a.marl", line: 0, span: null };
    for (const grade of ["info", "warning", "error"] as const) {
      const finding: Finding = {
        code: "overdose/precipitation",
        ...{ place, system: "vat", omega: 9, pH: 9, grade },
      };
      expect(problemsOf([finding])[0]!.severity).toBe(grade);
    }
  });

  test.each(table)("%s: its example brings it about, the twin is silent", (code, { example, sample }) => {
    if (!example) {
      expect(problemsOf([sample!]).map((problem) => problem.code)).toEqual([code]);
      return;
    }
    const found = new Set(walk(filesOf(example.fires)).problems.map((problem) => problem.code));
    expect(found).toEqual(new Set([code, ...(example.also ? [example.also] : [])]));
    expect(walk(filesOf(example.silent)).problems.map(({ message }) => message)).toEqual([]);
  });

  test("sentences end, and speak neither of the parser nor loudly", () => {
    for (const [code, rule] of table) {
      const texts = rule.example
        ? walk(filesOf(rule.example.fires)).problems.map(({ message }) => message)
        : problemsOf([rule.sample!]).map(({ message }) => message);
      for (const text of [...texts, rule.why]) {
        expect(text, code).toMatch(/^["\p{L}\p{N}].*[.?]$/u);
        expect(text, code).not.toMatch(/!|\b(?:token|parse|parser|invalid|illegal|syntax)\b| {2}/i);
      }
    }
  });
});

describe("problems of findings", () => {
  const at = (file: string, line: number, start: number | null): Finding => ({
    code: "syntax/merge-marks",
    place: { file, line, span: start === null ? null : { start, end: start + 7 } },
    system: null,
  });

  test("come in order of file, line, column", () => {
    const findings = [at("b.marl", 0, 0), at("a.marl", 3, 4), at("a.marl", 3, null), at("a.marl", 1, 9)];
    expect(
      problemsOf(findings).map(({ place }) => [place.file, place.line, place.span?.start ?? null]),
    ).toEqual([
      ["a.marl", 1, 9],
      ["a.marl", 3, null],
      ["a.marl", 3, 4],
      ["b.marl", 0, 0],
    ]);
  });

  test("are told once where they are the same, in whatever order they are found", () => {
    const findings = [at("a.marl", 1, 2), at("a.marl", 0, 0), at("a.marl", 1, 2)];
    expect(problemsOf(findings)).toHaveLength(2);
    expect(problemsOf([...findings].reverse())).toEqual(problemsOf(findings));
  });

  test("a line that nobody wrote is a file that can't be read", () => {
    const [problem] = walk(
      new Map([["a.marl", `system vat\n  tank main 500 L\n  tank sump 80 L # ${"x".repeat(30_000)}\n`]]),
    ).problems;
    expect(problem).toMatchObject({ code: "file/unreadable", severity: "error", place: { line: 2 } });
  });

  test("are counted by severity", () => {
    expect(countBySeverity(problemsOf([at("a.marl", 0, 0), at("a.marl", 1, 0)]))).toEqual({
      error: 2,
      warning: 0,
      info: 0,
      hint: 0,
    });
    expect(severityRank("error")).toBeLessThan(severityRank("warning"));
    expect(severityRank("info")).toBeLessThan(severityRank("hint"));
  });
});
