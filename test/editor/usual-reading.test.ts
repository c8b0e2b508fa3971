import { expect, test } from "vitest";
import { readLineFor, usualReadings } from "../../server/editor/usual-reading.ts";
import { marked } from "./fixture.ts";

const usual = (log: string) => {
  const { farm } = marked(`system vat\n  tank main 500 L\n\nkit bench\nkit probe\n\nlog vat\n${log}`);
  const system = farm.bound.model.systems.get("vat")!;
  return {
    all: usualReadings(farm, system, farm.moment.at),
    line: readLineFor(farm, system, farm.moment.at),
  };
};

test("what is read most often comes first, as it was last written", () => {
  const { all, line } = usual(`
  2026-11-27 08:00 read pH 8.1 total with probe by mk
  2026-11-28 08:00 read calcium 2 g/L, alkalinity 140 mg/L as CaCO3 with bench by mk
  2026-11-29 08:00 read alkalinity 7.9 dKH, calcium below 420 mg/L with bench by ro
  2026-11-30 08:00 read pH 8.1 total with probe
  2026-11-30 09:00 read alkalinity 141 ppm as CaCO3, calcium 421 mg/L with probe by ro
`);
  expect(all.map(({ items }) => items.map(({ parameter }) => parameter))).toEqual([
    ["alkalinity", "calcium"],
    ["pH"],
  ]);
  expect(line).toEqual({
    moment: "2026-12-01 08:00",
    items: [
      { parameter: "alkalinity", unit: "ppm as CaCO3", last: "141 ppm as CaCO3" },
      { parameter: "calcium", unit: "mg/L", last: "421 mg/L" },
    ],
    kit: "bench",
    by: ["ro", "mk"],
  });
  expect(all[1]).toEqual({
    items: [{ parameter: "pH", unit: "total", last: "8.1 total" }],
    kit: "probe",
    by: ["mk"],
  });
});

test("only the last ten lines count, and only those before the moment that weren't disregarded", () => {
  const days = [...Array(10).keys()].map((day) => `  2026-11-${11 + day} 08:00 read pH 8.1\n`).join("");
  const others = `  2026-11-01 read calcium 420 mg/L\n  2026-11-30 read calcium 9 mg/L disregard "x"\n  2026-12-05 read calcium 420 mg/L\n`;
  expect(usual(days + others).all.map(({ items }) => items[0]!.parameter)).toEqual(["pH"]);
});

test("what was never read has no line", () => {
  expect(usual('  2026-11-30 note "new"\n').line).toBeNull();
});
