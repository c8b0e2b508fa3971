import { describe, expect, test } from "vitest";
import { readMoment, writeMoment } from "../../grammar/dates.ts";
import { numberReadings, plainNumber } from "../../grammar/numbers.ts";

const readings = (text: string) => {
  const reading = readMoment(text, "noon");
  return reading.known ? writeMoment(reading.moment.minute) : reading.readings;
};

describe("a moment that stands alone", () => {
  test("is read with or without its time, and written in one way", () => {
    expect(readings("2026-12-01T08:00")).toBe("2026-12-01T08:00");
    expect(readings(" 2026-12-01 8:00 ")).toBe("2026-12-01T08:00");
    expect(readings("2026-12-01")).toBe("2026-12-01T12:00");
    const midnight = readMoment("2026-12-01", "midnight");
    expect(midnight).toMatchObject({ known: true, moment: { timeKnown: false, minute: 20_788 * 1440 } });
  });

  test("that is none offers what it may have meant", () => {
    expect(readings("01.12.2026 8:00")).toEqual(["2026-12-01T08:00", "2026-01-12T08:00"]);
    expect(readings("2026-12-01 25:00")).toEqual([]);
    expect(readings("2026-02-30")).toEqual([]);
    expect(readings("0026-02-20")).toEqual([]);
    expect(readings("9998-12-31T24:00")).toBe("9999-01-01T00:00");
    expect(readings("9999-12-31T24:00")).toEqual([]);
    expect(readings("yesterday")).toEqual([]);
    expect(readings("")).toEqual([]);
  });
});

test("plain numbers, and none other", () => {
  expect(["7", "7.90", "-2", "−2", "+2", "007"].map(plainNumber)).toEqual([
    "7",
    "7.90",
    "-2",
    "-2",
    "2",
    "007",
  ]);
  expect(["7,9", ".9", "7.", "1e3", "1 250", "", "x"].map(plainNumber)).toEqual(Array(7).fill(null));
});

test("what a number may have meant", () => {
  const pairs: [string, string[]][] = [
    ["7,9", ["7.9"]],
    ["1,250", ["1.250", "1250"]],
    ["0,250", ["0.250"]],
    ["1250,250", ["1250.250"]],
    ["1,250,000", ["1250000"]],
    ["1.250.000", ["1250000"]],
    ["1.250,5", ["1250.5"]],
    ["1,250.5", ["1250.5"]],
    ["1 250", ["1250"]],
    ["1'250", ["1250"]],
    [".9", ["0.9"]],
    ["-,9", ["-0.9"]],
    ["1e3", ["1000"]],
    ["2.5e-3", ["0.0025"]],
    ["1.234e1", ["12.34"]],
    ["1e400", []],
    ["1,2,3", []],
  ];
  for (const [text, meant] of pairs) expect(numberReadings(text), text).toEqual(meant);
});
