import { expect, test } from "vitest";
import { linesWith, partOf, partTable, statementsWith } from "../../grammar/parts.ts";
import { rowsOf } from "../../grammar/statements.ts";
import { keywords } from "../../grammar/tokens.ts";

test("every keyword starts a statement or has its meaning inside of one", () => {
  expect(keywords.filter((word) => rowsOf(word).length === 0 && !partOf(word))).toEqual([]);
});

test("every part stands in some statement, and a line of the table shows it", () => {
  for (const { word } of partTable) {
    expect(statementsWith(word).length, word).toBeGreaterThan(0);
    expect(linesWith(word).length, word).toBeGreaterThan(0);
  }
});

test("a part's meaning is one sentence", () => {
  for (const { meaning } of partTable) expect(meaning).toMatch(/^[A-Z][^.]*\.$/);
});

test("where a part stands is what the grammar says", () => {
  const words = (word: Parameters<typeof statementsWith>[0]) => statementsWith(word).map((row) => row.word);
  expect(words("aim")).toEqual(["hold"]);
  expect(words("magnesium")).toEqual(["cohort", "skeleton"]);
  expect(words("lot")).toEqual(["received", "checked"]);
});

test("quotes don't show a part", () => {
  expect(linesWith("on" as "in")).toEqual([]);
});
