/** Edges of time, of limits and of what is known, through the whole walk. */
import { describe, expect, test } from "vitest";
import { reportOn } from "../../server/report/report.ts";
import { farmOf, reportOf } from "./walk.ts";

const codes = (text: string, at?: string): string[] => reportOf(text, at).problems.map(({ code }) => code);

const ash = "\nsolution ash\n  dissolve sodium-carbonate 84.79 g\n  make up to 1 L\n";
const dKH = 20 / 56.077;
const vat = (facts: string, log: string) => `system vat\n  tank main 1000 L\n${facts}${ash}\nlog vat\n${log}`;

describe("limits", () => {
  test.each(["6 dKH", "12 dKH"])("a reading on the very edge of a default limit is inside: %s", (value) => {
    expect(codes(vat("", `  2026-12-01 08:00 read alkalinity ${value}\n`))).not.toContain(
      "water/beyond-limit",
    );
  });

  test.each(["5.99 dKH", "12.01 dKH"])("one just beyond isn't: %s", (value) => {
    expect(codes(vat("", `  2026-12-01 08:00 read alkalinity ${value}\n`))).toContain("water/beyond-limit");
  });
});

test("reckoned below min is told as outside its hold, read below it as beyond the limit", () => {
  const facts = "  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.5 dKH/day\n";
  const reckoned = codes(vat(facts, "  2026-11-25 08:00 read alkalinity 7.8 dKH\n"));
  expect(reckoned).toContain("water/outside-hold");
  expect(reckoned).not.toContain("water/beyond-limit");
  expect(codes(vat(facts, "  2026-12-01 08:00 read alkalinity 5.5 dKH\n"))).toContain("water/beyond-limit");
});

describe("the moment asked", () => {
  const log = "  2026-12-01 07:00 read alkalinity 2350 umol/kg\n  2026-12-01 09:00 read salinity 30\n";

  test("a salinity read later doesn't change what is known now", () => {
    const at = (moment: string) =>
      reportOf(vat("", log), moment).systems[0]!.readings[0]!.alkalinity_meq_per_L!;
    // EOS-80 at 25 °C: 1023.341 kg/m³ at salinity 35, 1019.568 at 30 (UNESCO 1983).
    expect(at("2026-12-01T08:00")).toBeCloseTo(2.35 * 1.023341, 5);
    expect(at("2026-12-01T10:00")).toBeCloseTo(2.35 * 1.019568, 5);
  });

  test("uptake is the mean of the 24 hours before it", () => {
    const facts = "  cohort plugs 100 pieces uptake 1 meq/day each\n";
    const text = vat(
      facts,
      "  2026-11-01 08:00 read salinity 35\n  2026-12-01 07:00 stocked plugs 100 pieces\n",
    );
    const { uptake } = reportOf(text).systems[0]!;
    // 23 hours of 100 pieces, one of 200, in 1000 L.
    expect(uptake.alkalinity_meq_per_L_per_day.mean).toBeCloseTo((23 * 0.1 + 0.2) / 24, 12);
  });
});

describe("what isn't known", () => {
  const held = "  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.5 dKH/day\n  by-hand ash\n";

  test("an old reading doesn't shrink the doses: without a recent one alkalinity counts as at its aim", () => {
    const old = reportOf(vat(held, "  2026-11-20 08:00 read alkalinity 8 dKH\n"));
    const never = reportOf(vat(held, "  2026-11-20 08:00 read salinity 35\n"));
    const dose = (report: typeof old) => report.systems[0]!.plan!.doses[0]!.maintenance_mL_per_day!;
    expect(dose(old)).toBeCloseTo(111.454, 2);
    expect(dose(never)).toBeCloseTo(111.454, 2);
    expect(old.systems[0]!.now.stale).toBe(true);
    expect(old.systems[0]!.plan!.limited_by).toBe("no recent reading");
    expect(old.assumptions).toContainEqual({
      system: "vat",
      what: "alkalinity, for pH and Ω",
      value: "at its aim",
      basis: "no recent reading",
    });
  });

  test("without an uptake neither maintenance nor what it leaves behind is a number", () => {
    const facts = held.replace(/ {2}uptake.*\n/, "");
    const { plan, uptake } = reportOf(vat(facts, "  2026-12-01 07:00 read alkalinity 7.5 dKH\n")).systems[0]!;
    expect(uptake.basis).toBe("none");
    expect(plan!.doses[0]).toMatchObject({ maintenance_mL_per_day: null, total_mL_per_day: null });
    expect(plan!.doses[0]!.correction_mL_per_day).toBeGreaterThan(0);
    expect(plan).toMatchObject({
      salinity_gain_per_month: null,
      fresh_water_swap_to_hold_salinity_L_per_week: null,
    });
  });

  test("the food's nitrogen takes no more alkalinity than is stated for all, and that is told", () => {
    const facts = "  uptake alkalinity 0.5 dKH/day\n  feeds 50 g/day protein 45 %\n";
    const report = reportOf(vat(facts, "  2026-12-01 07:00 read alkalinity 8 dKH\n"));
    const { uptake } = report.systems[0]!;
    // 50 g × 45 % × 16 % ÷ 14.007 g/mol = 0.257 meq/L; stated are 0.178.
    expect(uptake.other_alkalinity_loss_meq_per_L_per_day.mean).toBeCloseTo((0.5 * 20) / 56.077, 12);
    expect(uptake.calcification_g_CaCO3_per_day).toBe(0);
    expect(report.assumptions.map(({ what }) => what)).toContain("alkalinity that the food takes");
  });

  test("water of another system that was never read there is told as assumed", () => {
    const other = "\nsystem other\n  tank main 500 L\n  hold calcium 380 to 390 mg/L\n";
    const text = `${vat("  flows-through 50 L/day with other\n", "  2026-12-01 07:00 read calcium 420 mg/L\n")}${other}`;
    expect(reportOf(text).assumptions).toContainEqual({
      system: "vat",
      what: "calcium of other",
      value: "as it is to be held",
      basis: "never read",
    });
  });
});

describe("what is reckoned, not read", () => {
  const lye = "\nsolution lye\n  dissolve sodium-hydroxide 64 g\n  make up to 1 L\n";
  const system = (facts: string, log: string) =>
    `system vat\n  tank main 1000 L\n  hold alkalinity 7.6 to 8.4 dKH\n  uptake alkalinity 0.7 meq/L/day\n${facts}${lye}\nlog vat\n${log}`;

  test("an old reading above max still forbids what raises it", () => {
    for (const minute of ["08:00", "07:59"]) {
      const report = reportOf(
        system("  by-hand lye times 12\n", `  2026-11-24 ${minute} read alkalinity 17 meq/L\n`),
      );
      expect(report.systems[0]!.plan!.doses[0]!.total_mL_per_day).toBe(0);
      expect(report.problems.map(({ code }) => code)).toContain("water/beyond-limit");
    }
  });

  test("alkalinity reckoned down to nothing doesn't switch the limits on pH off", () => {
    const { plan } = reportOf(system("  by-hand lye times 2\n", "  2026-11-26 08:00 read alkalinity 8 dKH\n"))
      .systems[0]!;
    expect(plan!.pH_total_after_largest_dose).not.toBeNull();
    expect(plan!.limited_by).not.toBeNull();
    expect(plan!.doses[0]!.mL_per_dose).toBeLessThan(60);
  });

  test("a note in the log changes nothing of what growing corals take", () => {
    const facts = "  cohort plugs 300 pieces uptake 0.6 meq/day each grows 8 %/week\n";
    const text = (notes: string) => vat(facts, `  2026-11-24 09:00 read alkalinity 11 dKH\n${notes}`);
    const notes = [25, 26, 28, 30].map((day) => `  2026-11-${day} 11:00 note "looked at"\n`).join("");
    const now = (some: string) => reportOf(text(some)).systems[0]!.now.alkalinity_meq_per_L.mean!;
    expect(Math.abs(now("") - now(notes))).toBeLessThan(1e-5);
    // ∫ 0.18 × 1.08^(t/7) dt over 6 d 23 h.
    const days = 6 + 23 / 24;
    const taken = (0.18 * 7 * (1.08 ** (days / 7) - 1)) / Math.log(1.08);
    expect(now("")).toBeCloseTo(11 * dKH - taken, 4);
  });

  test("a pump set to more than it can give counts as giving what it can, and that is told", () => {
    const facts = "  pump p gives ash at 0.2 mL/min between 22:00 and 00:00\n  uptake alkalinity 0 dKH/day\n";
    const report = reportOf(
      vat(facts, "  2026-11-30 08:00 read alkalinity 8 dKH\n  2026-11-30 08:00 set p 480 mL/day\n"),
    );
    // 0.2 mL/min × 120 min = 24 mL of 1.6 meq/mL in 1000 L.
    expect(report.systems[0]!.now.alkalinity_meq_per_L.mean).toBeCloseTo(
      8 * dKH + (24 * (2 * 84.79)) / 105.988 / 1000,
      9,
    );
    expect(report.problems.find(({ code }) => code === "log/no-effect")?.message).toContain("24 mL a day");
  });
});

describe("a line counts whole or not at all", () => {
  test.each([
    "read alkalinity 7 cm, calcium 420 mg/L",
    "read alkalinty 7 dKH, calcium 420 mg/L",
    "read alkalinity 130 mg/L, calcium 420 mg/L",
  ])("%s", (line) => {
    const report = reportOf(vat("", `  2026-12-01 07:00 ${line}\n`));
    expect(report.systems[0]!.readings).toEqual([]);
    expect(report.problems.filter(({ severity }) => severity === "error")).toHaveLength(1);
  });

  test("a disregarded slip is no error any more", () => {
    const report = reportOf(vat("", '  2026-12-01 07:00 read alkalinity 79 dKH disregard "slip"\n'));
    expect(report.problems.map(({ code }) => code).filter((code) => code.startsWith("reading/"))).toEqual([
      "reading/disregarded",
    ]);
    expect(report.systems[0]!.readings).toMatchObject([{ disregarded: true }]);
  });
});

test("of one system are told the problems of all files that its own files use", () => {
  const farm = farmOf(
    {
      "vat.marl": `use "shared.marl"\n\n${vat("", "  2026-12-01 07:00 read salinity 35 with bench\n")}`,
      "shared.marl": "kit bench\n  salinity scatter 1 dKH\n",
      "other.marl": "system other\n  tank main 10 ltr\n",
    },
    "2026-12-01T08:00",
  );
  const { problems } = reportOn(farm, { paths: [""], system: "vat" });
  expect(
    problems.map(({ file, code }) => `${file} ${code}`).filter((text) => !/unused|caustic/.test(text)),
  ).toEqual(["shared.marl unit/dimension"]);
});
