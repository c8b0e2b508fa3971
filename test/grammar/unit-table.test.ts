/** A unit is one row of the table: reading, tidying, working out and the list in the documentation all follow from it. */
import { readFileSync } from "node:fs";
import { resolve } from "node:path";
import { describe, expect, test } from "vitest";
import { readLine } from "../../grammar/line.ts";
import { readUnit, unitTable } from "../../grammar/units.ts";
import { writeStatement } from "../../grammar/write.ts";
import { factorOf } from "../../server/quantity/decimal.ts";
import { measuredUnit } from "../../server/quantity/dimension.ts";

const page = readFileSync(resolve(import.meta.dirname, "../../docs/language.md"), "utf8");

/** Lines that take any unit at their place, as far as their words go. */
const lines = (unit: string) => [`evaporates 2 ${unit}`, `uptake alkalinity 2 ${unit}/day ± 1 ${unit}/day`];

describe.each(unitTable.map((row) => [row.spelling, row] as const))("%s", (spelling, row) => {
  test.each([spelling, ...row.also])("reads as %s and is tidied", (written) => {
    for (const line of lines(written)) {
      const { statement, findings } = readLine("system", line);
      expect(findings).toEqual([]);
      expect(writeStatement(statement!)).toBe(line.replaceAll(written, spelling));
    }
  });

  test("is worked out with its factor, alone and over a time", () => {
    const alone = measuredUnit({ text: spelling, start: 0, end: spelling.length });
    const over = measuredUnit({ text: `${spelling}/day`, start: 0, end: spelling.length + 4 });
    if (!alone.ok || !over.ok) throw new Error(`${spelling} isn't worked out`);
    expect(alone.value!.factor.eq(factorOf(row.factor))).toBe(true);
    expect(alone.value!.dimension).toEqual(row.measures);
    expect(over.value!.factor.eq(factorOf(row.factor))).toBe(true);
  });

  test("stands in the list of units", () => {
    expect(page).toContain(`\`${spelling}\``);
    for (const other of row.also) expect(page).toContain(other);
  });
});

test("no spelling stands for two units, and none is read that the table doesn't hold", () => {
  const spellings = unitTable.flatMap(({ spelling, also }) => [spelling, ...also]);
  expect(new Set(spellings).size).toBe(spellings.length);
  expect(readUnit("furlong")).toEqual({ known: false, part: "furlong" });
  expect(readUnit("mg/furlong")).toEqual({ known: false, part: "furlong" });
});
