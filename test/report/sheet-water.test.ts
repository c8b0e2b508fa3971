/** The sheet's water: pH on the scale of its band, what is stale or only below something, what isn't carried forward. */
import { expect, test } from "vitest";
import { waterSection } from "../../server/report/sheet-water.ts";
import { farmOf } from "./walk.ts";

function water(lines: string) {
  const farm = farmOf({ "farm.marl": `system vat\n${lines}` }, "2026-12-01T08:00");
  const [assessment] = farm.assessments.values();
  const { table, lines: notes } = waterSection(assessment!);
  return {
    rows: table?.rows.map(([name, now, , , read, ...leaves]) => [name, now, read, ...leaves]),
    notes: notes.slice(1),
  };
}

test("a pH stands beside its band on one scale, and before the dose that came after it", () => {
  // 8.1 on the total scale is 8.24 on NBS.
  expect(
    water(
      "  tank main 1000 L\n  hold pH 7.9 to 8.2\nlog vat\n  2026-12-01 06:00 read pH 8.1 total\n  2026-12-01 07:00 gave lye 10 mL\nsolution lye\n  supplies alkalinity 1 meq/mL as hydroxide\n",
    ),
  ).toEqual({
    rows: [["pH", "8.24", "2 h ago", "", "", ""]],
    notes: ["pH was read before the dose of lye at 07:00."],
  });
});

test("what is stale is no value of now and leaves nothing; what is below something says so", () => {
  expect(
    water(
      "  tank main 1000 L\n  hold alkalinity 7 to 9 dKH\n  hold calcium 400 to 440 mg/L\n  uptake alkalinity 1 dKH/day\nlog vat\n  2026-10-01 08:00 read alkalinity 8 dKH\n  2026-11-30 08:00 read calcium below 300 mg/L\n",
    ),
  ).toEqual({
    rows: [
      ["alkalinity", "stale", "8.0 dKH, 61 days ago", "", "", ""],
      ["calcium", "below 300 mg/L", "24 h ago", "", "", ""],
    ],
    notes: ["Stale, test again: alkalinity."],
  });
});

test("what isn't carried forward stands as it was read, with the reason", () => {
  expect(
    water(
      "  tank main 1000 L\n  hold alkalinity 7 to 9 dKH\nlog vat\n  2026-11-30 08:00 read alkalinity 8 dKH\n",
    ),
  ).toEqual({
    rows: [["alkalinity", "8.0 dKH", "24 h ago", "", "", ""]],
    notes: ["As read, not carried forward, since what the corals take of it isn't known: alkalinity."],
  });
  expect(
    water("  hold alkalinity 7 to 9 dKH\nlog vat\n  2026-11-30 08:00 read alkalinity 8 dKH\n").notes,
  ).toEqual(["As read, not carried forward, since the volume of the water isn't known: alkalinity."]);
});
