import { expect, test } from "vitest";
import { codeLenses, dosesTitle } from "../../server/editor/code-lens.ts";
import { marked } from "./fixture.ts";

const text = `
solution ash-part
  supplies alkalinity 1.6 meq/mL
solution epsom
  supplies magnesium 40 g/L

system north-house "North é 🪸"
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
  hold magnesium 1280 to 1360 mg/L
  uptake alkalinity 0.6 dKH/day
  uptake magnesium 4 mg/L/day
  pump head-1 gives ash-part at 40 mL/min
  by-hand epsom

system dry
  hold alkalinity 7.5 to 8.5 dKH

system loose
  tank main 500 L

log north-house
log nowhere
`;
const lensesOf = (kinds: readonly ("doses" | "reading")[]) => {
  const { farm } = marked(text);
  return codeLenses(farm, "farm.marl", new Set(kinds)).map(({ kind, span: { line, start, end }, name }) => [
    ...[kind, line, start, end, name],
  ]);
};

test("a lens stands above each system and each log of one", () => {
  expect(lensesOf(["doses", "reading"])).toEqual([
    ["doses", 5, 0, 18, "north-house"],
    ["doses", 14, 0, 10, "dry"],
    ["doses", 17, 0, 12, "loose"],
    ["reading", 20, 0, 15, "north-house"],
  ]);
  expect(lensesOf(["reading"])).toHaveLength(1);
});

test("today's doses, or what is missing for them", () => {
  const { farm } = marked(text);
  // 0.6 dKH × 0.35665 meq/L × 500 L / 1.6 meq/mL; 4 mg/L × 500 L / 40 mg/mL.
  expect(dosesTitle(farm, "north-house")).toBe("Today: head-1 67 mL · by hand epsom 50 mL");
  expect(dosesTitle(farm, "dry")).toBe("Nothing can be planned: its volume isn't known.");
  expect(dosesTitle(farm, "loose")).toBe("Nothing can be planned: nothing is held.");
  expect(dosesTitle(farm, "gone")).toBeNull();
});

test("what a hand has given already today is told beside its dose", () => {
  const of = (log: string) =>
    dosesTitle(marked(text.replace("log north-house\n", `log north-house\n${log}`)).farm, "north-house");
  // Yesterday's, and one to come, are none of today's.
  const others = "  2026-11-30 07:30 gave epsom 40 mL\n  2026-12-01 18:00 gave epsom 9 mL\n";
  expect(of(others)).toBe("Today: head-1 67 mL · by hand epsom 50 mL");
  expect(of(`${others}  2026-12-01 06:10 gave epsom 30 mL\n  2026-12-01 07:30 gave epsom 12 mL\n`)).toBe(
    "Today: head-1 67 mL · by hand epsom 50 mL (42 mL given today at 07:30)",
  );
});
