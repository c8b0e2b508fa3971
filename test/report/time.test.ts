/** Time: moments asked in every form, bare dates, leap days, ends of years, lines that lie ahead. */
import { describe, expect, test } from "vitest";
import { folder, marl } from "../commands/marl.ts";
import { reportOf } from "./walk.ts";

const vat = (log: string) =>
  `system vat\n  tank main 1000 L\n  hold alkalinity 7 to 9 dKH\n  uptake alkalinity 0.5 dKH/day\n  pump head-1 gives ash at 40 mL/min\n\nsolution ash\n  dissolve sodium-carbonate 84.79 g\n  make up to 1 L\n\nlog vat\n${log}`;
const dKH = 20 / 56.077;
const alkalinity = (log: string, at: string) =>
  reportOf(vat(log), at).systems[0]!.now.alkalinity_meq_per_L.mean! / dKH;

describe("--at", () => {
  const root = () => folder({ "farm.marl": vat("  2026-11-30 12:00 read alkalinity 8 dKH\n") });
  const asked = (...words: string[]) =>
    JSON.parse(marl(root(), ["check", "--format", "json", ...words]).out).at;

  test.each([
    ["2026-12-01", "2026-12-01T12:00"],
    ["2026-12-01T08:00", "2026-12-01T08:00"],
    ["2026-12-01 08:00", "2026-12-01T08:00"],
    ["2026-12-01 8:00", "2026-12-01T08:00"],
    ["2028-02-29", "2028-02-29T12:00"],
  ])("%s is %s", (written, meant) => {
    expect(asked("--at", written)).toBe(meant);
  });

  test("without it, and as `now`, it is the wall clock's minute", () => {
    const before = Date.now();
    for (const words of [[], ["--at", "now"]]) {
      const [date = "", clock = ""] = asked(...words).split("T");
      const [year = 0, month = 0, day = 0] = date.split("-").map(Number);
      const [hour = 0, minute = 0] = clock.split(":").map(Number);
      const apart = new Date(year, month - 1, day, hour, minute).getTime() - before;
      expect(Math.abs(apart)).toBeLessThan(120_000);
    }
  });

  test.each(["2026-02-29", "01.12.2026", "12/1/2026", "2026-12-01T25:00", "tomorrow", ""])(
    "%s is refused with 2",
    (written) => {
      const ended = marl(root(), ["check", "--at", written]);
      expect(ended).toMatchObject({ status: 2, out: "" });
      expect(ended.error).toContain("--at");
    },
  );
});

describe("the log", () => {
  test("a bare date is noon of its day", () => {
    const read = reportOf(vat("  2026-11-30 read alkalinity 8 dKH\n")).systems[0]!.readings[0]!;
    expect(read.at).toBe("2026-11-30T12:00");
    // 20 hours at 0.5 dKH a day.
    expect(alkalinity("  2026-11-30 read alkalinity 8 dKH\n", "2026-12-01T08:00")).toBeCloseTo(
      8 - (20 / 24) * 0.5,
      9,
    );
  });

  test("a leap day has 24 hours and comes between its neighbours", () => {
    const log = "  2028-02-28 08:00 read alkalinity 8 dKH\n";
    expect(alkalinity(log, "2028-03-01T08:00")).toBeCloseTo(8 - 2 * 0.5, 9);
    expect(alkalinity(log.replaceAll("2028", "2027"), "2027-03-01T08:00")).toBeCloseTo(8 - 0.5, 9);
  });

  test("the year's end is a midnight as any other", () => {
    const log = "  2026-12-31 23:30 read alkalinity 8 dKH\n  2027-01-01 00:30 gave ash 223 mL\n";
    const given = (0.223 * 1000 * ((2 * 84.79) / 105.988)) / 1000 / dKH;
    expect(alkalinity(log, "2027-01-01T01:30")).toBeCloseTo(8 + given - (2 / 24) * 0.5, 6);
    expect(alkalinity(log, "2027-01-01T00:00")).toBeCloseTo(8 - (0.5 / 24) * 0.5, 9);
  });

  test("events of one minute go reading first, then what was given, whatever their order in the file", () => {
    const lines = [
      "  2026-11-30 08:00 gave ash 223 mL",
      "  2026-11-30 08:00 read alkalinity 8 dKH",
      "  2026-11-30 08:00 stopped head-1",
    ];
    const values = [lines, [...lines].reverse(), [lines[1]!, lines[2]!, lines[0]!]].map((some) =>
      alkalinity(`${some.join("\n")}\n`, "2026-11-30T09:00"),
    );
    expect(new Set(values).size).toBe(1);
    expect(values[0]).toBeGreaterThan(8.9);
  });

  test("lines ahead of the moment wait silently; more than a day past it and the clock they are told", () => {
    const log =
      "  2026-11-30 08:00 read alkalinity 8 dKH\n  2026-12-01 20:00 read alkalinity 9 dKH\n  2062-12-01 08:00 read alkalinity 9 dKH\n";
    const report = reportOf(vat(log));
    expect(report.systems[0]!.readings).toHaveLength(1);
    expect(
      report.problems
        .filter(({ code }) => code.startsWith("log/"))
        .map(({ line, code }) => `${line} ${code}`),
    ).toEqual(["14 log/future"]);
  });
});
