/** Plans of 2 000 random systems, written as Marl and taken through the whole walk. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { constantsAt } from "../../server/chemistry/constants-at.ts";
import type { Report } from "../../server/report/report.ts";
import { reportOf } from "./walk.ts";

const runs = { numRuns: 2000, seed: 20_261_201 };
const real = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const digits = (value: number, decimals: number) => value.toFixed(decimals);

interface Drawn {
  readonly litres: number;
  readonly low: number;
  readonly width: number;
  readonly now: number;
  readonly uptake: number;
  readonly calciumNow: number;
  readonly magnesiumNow: number;
  readonly salinity: number;
  readonly rise: number | null;
  readonly fall: number | null;
  readonly sources: readonly string[];
  readonly topOff: boolean;
  readonly exchange: number;
  readonly hoursSince: number;
  /** All of it read at its aim a minute ago: then nothing is to be corrected. */
  readonly atAim: boolean;
}

const drawn: fc.Arbitrary<Drawn> = fc
  .record({
    litres: real(30, 8000),
    low: real(6.5, 9),
    width: real(0.4, 2),
    now: real(-1, 1),
    uptake: real(0, 2.5),
    calciumNow: real(370, 470),
    magnesiumNow: real(1160, 1420),
    salinity: real(32.5, 36.5),
    rise: fc.option(real(0.1, 2)),
    fall: fc.option(real(0.5, 3)),
    sources: fc.subarray(["soda", "bicarbonate", "chloride", "magnesia"], { minLength: 1 }),
    topOff: fc.boolean(),
    exchange: fc.constantFrom(0, 0, 0.02),
    hoursSince: fc.constantFrom(0, 6, 30),
    atAim: fc.constantFrom(true, false, false),
  })
  .map((one) => (one.atAim ? { ...one, now: 0, calciumNow: 420, magnesiumNow: 1310, hoursSince: 0 } : one));

const sourceLine: Readonly<Record<string, string>> = {
  soda: "pump soda-pump gives soda at 40 mL/min least 0.5 mL",
  bicarbonate: "pump bicarbonate-pump gives bicarbonate at 60 mL/min between 20:00 and 08:00",
  chloride: "pump chloride-pump gives chloride at 40 mL/min",
  magnesia: "by-hand magnesia times 3",
};

function marlOf(one: Drawn): string {
  const edges = [Number(digits(one.low, 2)), Number(digits(one.low + one.width, 2))] as const;
  const alkalinity = (edges[0] + edges[1]) / 2 + one.now * one.width;
  const hour = 8 - (one.hoursSince % 24) + (one.hoursSince % 24 > 8 ? 24 : 0);
  const day = one.hoursSince === 0 ? 1 : one.hoursSince <= 8 ? 1 : 30;
  const date = `2026-${day === 1 ? "12-01" : "11-30"} ${String(hour).padStart(2, "0")}:00`;
  return `system vat
  tank main ${digits(one.litres, 1)} L
  hold alkalinity ${digits(one.low, 2)} to ${digits(one.low + one.width, 2)} dKH
  hold calcium 400 to 440 mg/L
  hold magnesium 1260 to 1360 mg/L
  hold salinity 32 to 37
  ${one.rise === null ? "" : `limit alkalinity rise ${digits(one.rise, 2)} dKH/day`}
  ${one.fall === null ? "" : `limit alkalinity fall ${digits(one.fall, 2)} dKH/day`}
  uptake alkalinity ${digits(one.uptake, 3)} dKH/day
  ${one.topOff ? `evaporates ${digits(one.litres / 100, 2)} L/day` : ""}
  ${one.topOff ? "top-off limewater 100 L" : ""}
  ${one.exchange > 0 ? `flows-through ${digits(one.litres * one.exchange, 2)} L/day with new-water` : ""}
${one.sources.map((name) => `  ${sourceLine[name]}`).join("\n")}

solution soda
  dissolve sodium-carbonate 84.79 g
  make up to 1 L
solution bicarbonate
  dissolve sodium-bicarbonate 60 g
  make up to 1 L
solution chloride
  dissolve calcium-chloride-dihydrate 117.6 g
  make up to 1 L
solution magnesia
  dissolve magnesium-chloride-hexahydrate 200 g
  dissolve calcium-chloride-dihydrate 10 g
  make up to 1 L
solution limewater
  saturated calcium-hydroxide
  keep at 25 degC
saltwater new-water
  salinity 35

log vat
  ${date} read alkalinity ${digits(alkalinity, 3)} dKH, calcium ${digits(one.calciumNow, 0)} mg/L
  ${date} read magnesium ${digits(one.magnesiumNow, 0)} mg/L, salinity ${digits(one.salinity, 1)}, pH 8.15
`;
}

/** Every number of an object, with its path. */
function numbersOf(value: unknown, path = ""): [string, number][] {
  if (typeof value === "number") return [[path, value]];
  if (value === null || typeof value !== "object") return [];
  return Object.entries(value).flatMap(([key, inner]) => numbersOf(inner, `${path}.${key}`));
}

const field = {
  alkalinity: "alkalinity_meq_per_L",
  calcium: "calcium_mg_per_L",
  magnesium: "magnesium_mg_per_L",
} as const;
type Planned = keyof typeof field;
const planned = Object.keys(field) as Planned[];

function bandOf(one: Drawn, name: Planned): { low: number; high: number; aim: number } {
  if (name === "alkalinity") {
    const low = Number(digits(one.low, 2)) * dKH;
    const high = Number(digits(one.low + one.width, 2)) * dKH;
    return { low, high, aim: (low + high) / 2 };
  }
  return name === "calcium" ? { low: 400, high: 440, aim: 420 } : { low: 1260, high: 1360, aim: 1310 };
}

const inTheWay = (report: Report, name: string) =>
  report.problems.some(
    ({ code, message }) =>
      /^plan\/(held-back|no-source|passive-breach)$/.test(code) && message.toLowerCase().includes(name),
  );

type SystemReport = Report["systems"][number];

const meansOf = (system: SystemReport, name: Planned): number[] =>
  system.drift
    .find((each) => each.parameter === name && each.case === "as-planned")!
    .points.map(({ mean }) => mean);

/** Changes of the day's mean from each point to the one a day later: four points a day. */
const changesOf = (means: readonly number[]): number[] =>
  means.slice(4).map((mean, index) => mean - means[index]!);

const dKH = 20 / 56.077;
const litresPerMl = 1 / 1000;

function expectNumbers(system: SystemReport): void {
  const plan = system.plan!;
  for (const [path, value] of numbersOf(plan)) {
    if (path === ".salinity_gain_per_month") expect(Number.isFinite(value)).toBe(true);
    else expect(value, path).toBeGreaterThanOrEqual(0);
  }
  for (const dose of plan.doses) {
    const total = dose.total_mL_per_day!;
    expect(total).toBeCloseTo(dose.maintenance_mL_per_day! + dose.correction_mL_per_day!, 6);
    expect((dose.doses_per_day * dose.mL_per_dose!) / dose.every_days).toBeCloseTo(total, 6);
  }
}

/** Limits on one delivery: alkalinity by pump 0.2 dKH, a pH step of 0.1, pH 8.6 NBS, Ω 12 (defaults). */
function expectDeliveries(one: Drawn, system: SystemReport): void {
  const plan = system.plan!;
  const strengths: Readonly<Record<string, number>> = {
    soda: (2 * 84.79) / 105.988,
    bicarbonate: 60 / 84.006,
  };
  for (const { solution, mL_per_dose } of plan.doses) {
    const rise =
      ((strengths[solution] ?? 0) * 1000 * mL_per_dose! * litresPerMl) / Number(digits(one.litres, 1));
    expect(rise, `${solution} dose`).toBeLessThanOrEqual(0.2 * dKH * (1 + 1e-9));
  }
  if (plan.pH_total_after_largest_dose === null) return;
  const water = constantsAt(Number(digits(one.salinity, 1)), 25);
  if (!water.ok) throw new Error("no such water");
  const before = 8.15 - water.nbsLessTotal;
  // The salt of a dose moves the constants a little.
  expect(plan.pH_total_after_largest_dose).toBeLessThanOrEqual(before + 0.1 + 1e-3);
  expect(plan.omega_aragonite_after_largest_dose).toBeLessThanOrEqual(12 + 1e-6);
}

/** Rise, fall and max of alkalinity, where nothing stands in the way. */
function expectLimits(one: Drawn, report: Report, system: SystemReport, hundredth: number): void {
  if (inTheWay(report, "alkalinity")) return;
  const means = meansOf(system, "alkalinity");
  const rise = Number(digits(one.rise ?? 0.7, 2)) * dKH;
  const fall = Number(digits(one.fall ?? 1, 2)) * dKH;
  for (const change of changesOf(means)) {
    expect(change, "rise").toBeLessThanOrEqual(rise + hundredth / 10);
    expect(-change, "fall").toBeLessThanOrEqual(fall + hundredth / 10);
  }
  if (!one.topOff)
    expect(Math.max(...means), "max").toBeLessThanOrEqual(Math.max(means[0]!, 12 * dKH) + 1e-9);
}

test("plans keep every limit, reach the aim in the stated days, stay there, and are the same twice", () => {
  let corrected = 0;
  let flat = 0;
  let limited = 0;
  let index = 0;
  fc.assert(
    fc.property(drawn, (one) => {
      const text = marlOf(one);
      const report = reportOf(text);
      const [system] = report.systems;
      const plan = system!.plan!;
      const wrong = report.problems.filter(
        ({ code }) => /^(syntax|unit|name|use|system)\//.test(code) && code !== "name/unused",
      );
      expect(wrong).toEqual([]);
      expectNumbers(system!);
      expectDeliveries(one, system!);
      // Reading it all again costs as much again, so every fifth will do.
      index += 1;
      if (index % 5 === 0) expect(reportOf(text)).toEqual(report);
      for (const name of planned) {
        const band = bandOf(one, name);
        const hundredth = (band.high - band.low) / 100;
        const means = meansOf(system!, name);
        if (name === "alkalinity") {
          expectLimits(one, report, system!, hundredth);
          if (!inTheWay(report, name)) limited += 1;
        }
        if (inTheWay(report, name)) continue;
        // What runs in with the top-off beyond the need goes on rising, whatever is planned.
        const settled = Math.abs(means.at(-1)! - means.at(-5)!) <= hundredth / 10;
        const correction = plan.corrections.find(({ parameter }) => parameter === name);
        if (correction && settled && plan.correction_days <= 14) {
          const after = plan.after[field[name]]!;
          expect(Math.abs(after - band.aim), `${name} after`).toBeLessThanOrEqual(hundredth);
          corrected += 1;
        }
        const now = system!.now[field[name]].mean!;
        // Calcium goes before magnesium, also where only the magnesium part brings some.
        const forCalcium = name === "magnesium" && !one.sources.includes("chloride");
        if (
          forCalcium ||
          one.topOff ||
          plan.corrections.length > 0 ||
          Math.abs(now - band.aim) > hundredth / 4
        )
          continue;
        for (const change of changesOf(means))
          expect(Math.abs(change), `${name} flat`).toBeLessThanOrEqual(hundredth);
        flat += 1;
      }
    }),
    runs,
  );
  expect(corrected).toBeGreaterThan(300);
  expect(flat).toBeGreaterThan(200);
  expect(limited).toBeGreaterThan(500);
});
