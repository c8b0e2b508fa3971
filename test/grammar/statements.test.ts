import { expect, test } from "vitest";
import { formOf } from "../../grammar/form.ts";
import { expectedAfter } from "../../grammar/line.ts";
import { rowsOf, statementTable } from "../../grammar/statements.ts";
import { sectionKinds } from "../../grammar/syntax.ts";
import { reads, tidies } from "./fixture.ts";

const sectionsOf = (row: (typeof statementTable)[number]) => (row.form === "header" ? [null] : row.sections);

test("every example of the table reads in each of its sections", () => {
  for (const row of statementTable) {
    expect(row.examples.length, row.rule).toBeGreaterThan(0);
    for (const section of sectionsOf(row)) for (const line of row.examples) reads(section, line);
  }
});

test("every example of the table is tidy, so that it teaches the tidy form", () => {
  for (const row of statementTable)
    for (const section of sectionsOf(row))
      for (const line of row.examples) expect(tidies(section, line)).toBe(line);
});

test("every kind of section has a header", () => {
  for (const kind of sectionKinds) expect(rowsOf(kind).map((row) => row.form)).toEqual(["header"]);
});

test("a statement's meaning is one sentence", () => {
  for (const { meaning } of statementTable) expect(meaning).toMatch(/^[A-Z][^.]*\.$/);
});

test("what can come next, for someone who is writing the line", () => {
  expect(expectedAfter("system", "hold ")).toEqual(["a parameter"]);
  expect(expectedAfter("system", "hold alkalinity 7.6 dKH ")).toEqual(["to"]);
  expect(expectedAfter("system", "pump a gives b at 5 mL/min least 1 mL ")).toEqual([
    ...["between", "always", "holding", "from", "until"],
  ]);
  expect(expectedAfter("log", "2026-11-24 stopped a ")).toEqual(["by"]);
  expect(expectedAfter("log", "2026-11-24 ")).toContain("read");
  expect(expectedAfter("log", "")).toContain("system");
});

test("the form of a statement, from the grammar that reads it", () => {
  const forms = (word: string) => rowsOf(word).map(formOf);
  expect(forms("hold")).toEqual(["hold PARAMETER q to q [aim q] [from DATE [TIME]] [until DATE [TIME]]"]);
  expect(forms("tank")).toEqual([
    "tank NAME (round q x q | cone q x q | q [x q x q]) [times N] [from DATE [TIME]] [until DATE [TIME]]",
  ]);
  expect(forms("pump")).toEqual([
    "pump NAME gives SOLUTION at q [least q] [between TIME and TIME] [always q] [holding q] [from DATE [TIME]] [until DATE [TIME]]",
  ]);
  expect(forms("read")).toEqual([
    'DATE [TIME] read PARAMETER [below] q, … [with KIT] [disregard "text"] [by WHO]',
  ]);
  expect(forms("stocked")).toEqual(["DATE [TIME] stocked COHORT N (pieces | unit) [by WHO]"]);
  expect(forms("solution")).toEqual(['solution NAME ["title"] [from DATE [TIME]]']);
  expect(forms("store")).toEqual(["store"]);
  for (const row of statementTable) expect(formOf(row), row.rule).toMatch(/\w/);
});
