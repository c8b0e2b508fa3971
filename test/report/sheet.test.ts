/** The dose sheet on strange farms: it fits, and it never loses a dose. */
import { describe, expect, test } from "vitest";
import { wholeFarm } from "../../server/report/scope.ts";
import { sheetOf } from "../../server/report/sheet.ts";
import { textSheet, textWidth } from "../../server/report/text.ts";
import { farmOf } from "./walk.ts";

const sheet = (text: string): string =>
  textSheet(sheetOf(farmOf({ "farm.marl": text }, "2026-12-01T08:00"), wholeFarm), false);
const tooLong = (text: string): string[] => text.split("\n").filter((line) => line.length > textWidth);

const solution = (name: string) =>
  `\nsolution ${name}\n  dissolve sodium-carbonate 84.79 g\n  make up to 1 L\n`;
const read = "\nlog vat\n  2026-12-01 07:00 read alkalinity 7.0 dKH\n";

describe("names of any length", () => {
  const long = "a".repeat(60);
  const text = sheet(
    `system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.5 dKH/day\n  pump p${long} gives s${long} at 40 mL/min\n  pump q${long} gives s${long} at 40 mL/min\n${solution(`s${long}`)}${read}`,
  );

  test("are cut, figures aren't", () => {
    expect(tooLong(text.replace(/^ {4}2026.*$/gm, ""))).toEqual([]);
    expect(text).toMatch(
      /saaa.*…\s+paaa.*…\s+267 mL\s+\d+ doses? of \d+ mL\s+111 mL\s+156 mL for \d\.\d days/,
    );
  });

  test("a set line that would be too long becomes one a pump", () => {
    expect(text.match(/^ {4}2026-12-01 08:00 set /gm)).toHaveLength(2);
  });
});

test("when a correction ends, the line that sets the pump back stands ready", () => {
  const text = sheet(
    `system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  limit alkalinity rise 0.5 dKH/day\n  uptake alkalinity 0.5 dKH/day\n  pump head-1 gives ash at 40 mL/min\n${solution("ash")}\nlog vat\n  2026-12-01 08:00 read alkalinity 7.0 dKH\n`,
  );
  // 1 dKH at 0.5 a day: two days.
  expect(text).toContain(
    "2026-12-01 08:00 set head-1 222 mL/day\n    2026-12-03 08:00 set head-1 111 mL/day",
  );
});

test("what is given by hand stands with what was given today, and in the log's lines where its rate is set", () => {
  const facts =
    "system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.5 dKH/day\n  by-hand ash\n";
  const log = "\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH\n";
  const given = sheet(`${facts}${solution("ash")}${log}  2026-12-01 07:30 gave ash 90 mL\n`);
  expect(given).toMatch(/ash +by hand +\d+ mL +1 dose of \d+ mL; 90 mL given today at 07:30/);
  expect(given).not.toContain(" set ash");
  const set = sheet(`${facts}${solution("ash")}${log}  2026-12-01 07:30 set ash 90 mL/day\n`);
  expect(set).toContain("2026-12-01 08:00 set ash 111 mL/day");
});

test("nothing is given of what is above its limit, though the uptake isn't known", () => {
  const text = sheet(
    `system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  by-hand ash\n${solution("ash")}\nlog vat\n  2026-12-01 07:00 read alkalinity 12.6 dKH\n`,
  );
  expect(text).toMatch(/ash +by hand +0 mL/);
  expect(text).toContain("Nothing that raises alkalinity is given while it is above its limit.");
});

test("a long unit is never cut: a column that others make up for goes instead", () => {
  const reading = "2026-12-01 07:00 read calcium 1060 mg/L as CaCO3, alkalinity 7.9 dKH, temperature 25 degC";
  const text = sheet(
    `system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  hold calcium 1000 to 1100 mg/L as CaCO3 aim 1061\n  uptake alkalinity 1.5 dKH/day\n  by-hand ash\n${solution("ash")}\nlog vat\n  ${reading}\n`,
  );
  expect(text).toMatch(/calcium\s+10\d\d mg\/L as CaCO3\s/);
  expect(text).not.toMatch(/…/);
  expect(tooLong(text)).toEqual([]);
});

test("a pump that stands stopped is told beside the plan", () => {
  const pump = "  pump head-1 gives ash at 40 mL/min\n";
  const log = `${read}  2026-12-01 07:30 stopped head-1\n`;
  const text = sheet(
    `system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.5 dKH/day\n${pump}${solution("ash")}${log}`,
  );
  expect(text).toContain("head-1 stands stopped in the log");
});

test("tiny doses and tiny vats keep their digits", () => {
  const text = sheet(
    `system vat\n  tank main 900 mL\n  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.7 dKH/day\n  pump head-1 gives ash at 40 mL/min least 0.01 mL\n${solution("ash")}\nlog vat\n  2026-12-01 07:00 read alkalinity 8 dKH\n`,
  );
  expect(text).toContain("900 mL of water");
  // 0.7 × 20/56.077 meq/L × 0.9 L ÷ 1.6 meq/mL = 0.14 mL.
  expect(text).toContain("set head-1 0.14 mL/day");
});

test("nothing held, no source, no volume: the sheet says why there is no plan", () => {
  expect(sheet("system vat\n  tank main 10 L\n")).toContain("Nothing can be planned: nothing is held.");
  expect(sheet("system vat\n  tank main 10 L\n  hold alkalinity 7 to 9 dKH\n")).toContain(
    "nothing that is held has a source",
  );
  expect(sheet("system vat\n  hold alkalinity 7 to 9 dKH\n")).toContain("its volume isn't known");
});
