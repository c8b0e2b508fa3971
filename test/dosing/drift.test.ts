/** Where the water goes: 57 points in 14 days for each case, and when the band is left. */
import { describe, expect, it } from "vitest";
import { writeMoment } from "../../grammar/dates.ts";
import type { Tracked } from "../../server/dosing/tracked.ts";
import { finding, found, system } from "./fixture.ts";

const text = (log: string, facts = "") => `
solution ash
  supplies alkalinity 1 meq/mL as carbonate
saltwater mix
  salinity 35
  alkalinity 2 meq/L

system vat
  tank main 1000 L
  hold alkalinity 2.6 to 3.4 meq/L aim 3
  hold salinity 34 to 36
  uptake alkalinity 0.1 meq/L/day
  pump one gives ash at 40 mL/min
${facts}

log vat
  2026-11-01 08:00 read alkalinity 3 meq/L, salinity 35, pH 8.1
${log}
`;

const drift = (
  log: string,
  which: "undosed" | "as-set" | "as-planned",
  facts = "",
  parameter: Tracked = "alkalinity",
) => {
  const one = system(text(log, facts), "2026-11-01 08:00").drifts.find(
    (candidate) => candidate.parameter === parameter && candidate.case === which,
  );
  expect(one).toBeDefined();
  return one!;
};

const set60 = "  2026-11-01 08:00 set one 60 mL/day";

describe("points", () => {
  it("are 57, every six hours from the moment asked", () => {
    for (const which of ["undosed", "as-set", "as-planned"] as const) {
      const { points } = drift(set60, which);
      expect(points).toHaveLength(57);
      expect(points.map(({ minute }, index) => minute - points[0]!.minute - index * 360)).toEqual(
        points.map(() => 0),
      );
      expect(writeMoment(points[0]!.minute)).toBe("2026-11-01T08:00");
      expect(points[0]!.value).toBe(3);
    }
  });

  it("follow the rates", () => {
    const at = (which: "undosed" | "as-set" | "as-planned", index: number) =>
      drift(set60, which).points[index]!.value;
    // Ten days later: 0.1 a day taken, 0.06 a day given as set, 0.1 as planned (it stands at its aim).
    expect(at("undosed", 40)).toBeCloseTo(3 - 1, 12);
    expect(at("as-set", 40)).toBeCloseTo(3 - 0.4, 12);
    expect(at("as-planned", 40)).toBeCloseTo(3, 6);
  });

  it("draw towards the water that flows through", () => {
    const { points } = drift("", "undosed", "  flows-through 100 L/day with mix");
    // C' = −0.1 + 0.1 (2 − C): C = 1 + 2 e^(−0.1 t).
    for (const index of [4, 20, 56])
      expect(points[index]!.value).toBeCloseTo(1 + 2 * Math.exp(-0.025 * index), 12);
  });

  it("leave out what limewater brings only where nothing is dosed", () => {
    const lime =
      "  evaporates 5 L/day\n  top-off lime 100 L\nsolution lime\n  supplies alkalinity 0.04 meq/mL as hydroxide";
    expect(drift("", "undosed", lime).points[4]!.value).toBeCloseTo(2.9, 12);
    expect(drift("", "as-set", lime).points[4]!.value).toBeCloseTo(2.9 + 0.2, 12);
  });

  it("never go below zero", () => {
    const { points } = drift("", "undosed", "  uptake alkalinity 0.5 meq/L/day from 2026-10-01");
    // 3 meq/L at 0.5 a day last six days.
    expect(points[23]!.value).toBeCloseTo(0.125, 12);
    expect(points.slice(24).map(({ value }) => value)).toEqual(Array.from({ length: 33 }, () => 0));
  });

  it("are none where uptake isn't known", () => {
    const unknown = text("").replace("  uptake alkalinity 0.1 meq/L/day\n", "");
    const drifts = system(unknown, "2026-11-01 08:00").drifts.filter(
      ({ parameter }) => parameter === "alkalinity",
    );
    expect(drifts.map(({ points, leavesAt }) => [points.length, leavesAt])).toEqual([
      [0, null],
      [0, null],
      [0, null],
    ]);
  });
});

describe("the band is left", () => {
  const leaves = (...asked: Parameters<typeof drift>) => {
    const { leavesAt } = drift(...asked);
    return leavesAt === null ? null : writeMoment(leavesAt);
  };

  it("when the line crosses its edge", () => {
    // 0.4 meq/L above the low edge: 4 days at 0.1, 10 days at 0.04, never as planned.
    expect(leaves(set60, "undosed")).toBe("2026-11-05T08:00");
    expect(leaves(set60, "as-set")).toBe("2026-11-11T08:00");
    expect(leaves(set60, "as-planned")).toBeNull();
  });

  it("to the minute, between two points", () => {
    // 0.4 / 0.03 = 13.3333 days, 8 hours past 14 November.
    expect(leaves("  2026-11-01 08:00 set one 70 mL/day", "as-set")).toBe("2026-11-14T16:00");
    // Upwards: 0.4 / (0.25 − 0.1) = 2 days 16 hours.
    expect(leaves("  2026-11-01 08:00 set one 250 mL/day", "as-set")).toBe("2026-11-04T00:00");
    // 1 + 2 e^(−0.1 t) = 2.6 at t = 10 ln 1.25 = 2.231436 days = 2 days 5 h 33 min 16 s.
    expect(leaves("", "undosed", "  flows-through 100 L/day with mix")).toBe("2026-11-03T13:33");
  });

  it("not at all within 14 days", () => {
    expect(leaves("  2026-11-01 08:00 set one 80 mL/day", "as-set")).toBeNull();
    expect(leaves("  2026-11-01 08:00 set one 100 mL/day", "as-set")).toBeNull();
  });

  it("at once where it is outside", () => {
    expect(leaves("  2026-11-01 08:00 gave ash 500 mL", "as-set")).toBe("2026-11-01T08:00");
  });
});

describe("what is told", () => {
  const hold = "hold alkalinity 2.6 to 3.4 meq/L aim 3";

  it("leaving within three days is a warning, within seven a note", () => {
    const at = (rate: number) =>
      system(text(`  2026-11-01 08:00 set one ${rate} mL/day`), "2026-11-01 08:00");
    expect(found(at(250), "water/leaves")).toEqual([`water/leaves-hold-soon: ${hold}`]);
    expect(found(at(20), "water/leaves")).toEqual([`water/leaves-hold: ${hold}`]);
    expect(found(at(50), "water/leaves")).toEqual([]);
    expect(found(at(100), "water/leaves")).toEqual([]);
    const soon = finding(at(250), "water/leaves-hold-soon");
    expect(soon).toMatchObject({ edge: 3.4, takenPerDay: 0.1, dosedPerDay: 0.25 });
    expect(finding(at(20), "water/leaves-hold").edge).toBe(2.6);
  });

  it("outside the band points at the reading that shows it, else at the hold", () => {
    const read = system(text("  2026-11-01 09:00 read alkalinity 2.5 meq/L"), "2026-11-01 09:00");
    expect(found(read, "water/outside")).toEqual(["water/outside-hold: alkalinity 2.5 meq/L"]);
    const carried = system(text(""), "2026-11-05 09:00");
    expect(found(carried, "water/outside")).toEqual([`water/outside-hold: ${hold}`]);
    expect(found(system(text(""), "2026-11-05 07:00"), "water/outside")).toEqual([]);
  });

  it("beyond a limit", () => {
    const facts = "  limit alkalinity max 3.2 meq/L\n  limit alkalinity min 2.8 meq/L";
    const at = (alkalinity: number) =>
      found(
        system(text(`  2026-11-01 08:30 read alkalinity ${alkalinity} meq/L`, facts), "2026-11-01 08:30"),
        "water/beyond",
      );
    expect(at(3.21)).toEqual(["water/beyond-limit: alkalinity 3.21 meq/L"]);
    expect(at(3.2)).toEqual([]);
    expect(at(2.79)).toEqual(["water/beyond-limit: alkalinity 2.79 meq/L"]);
    expect(at(2.8)).toEqual([]);
  });

  it("stale after seven days, and then no more of a band that is left", () => {
    expect(found(system(text(""), "2026-11-08 08:00"), "water/stale", "water/leaves")).toEqual([]);
    expect(found(system(text(""), "2026-11-08 08:01"), "water/stale", "water/leaves")).toEqual([
      "water/stale: vat",
    ]);
  });

  it("lines more than a day past the moment and the clock", () => {
    const log = '  2027-06-01 23:00 note "a"\n  2027-06-02 00:01 note "b"';
    expect(found(system(text(log), "2026-11-01 08:00"), "log/")).toEqual([
      'log/future: 2027-06-02 00:01 note "b"',
    ]);
    // Up to a day past the moment asked it is no slip.
    expect(found(system(text(log), "2027-06-01 00:01"), "log/")).toEqual([]);
  });

  it("a system without water", () => {
    const empty = "system vat\n  hold alkalinity 2 to 3 meq/L\n";
    expect(found(system(empty, "2026-11-01"), "system/")).toEqual(["system/no-volume: vat"]);
    const full = "system vat\n  tank main 100 L\n  displace rock 60 L\n  displace sand 50 L\n";
    expect(found(system(full, "2026-11-01"), "system/")).toEqual(["system/no-volume: displace rock 60 L"]);
    const measured = "system vat\n  tank main 100 L\n  measured volume 89 L\n";
    expect(found(system(measured, "2026-11-01"), "system/")).toEqual([
      "system/volume-differs: measured volume 89 L",
    ]);
    expect(found(system(measured.replace("89", "92"), "2026-11-01"), "system/")).toEqual([]);
  });
});
