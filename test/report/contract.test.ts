/** Field names and kinds of the report object: whoever reads the JSON relies on them. */
import { expect, test } from "vitest";
import { farmOf, reportOf } from "./walk.ts";

const text = `system vat "Vat"
  tank main 1000 L
  hold alkalinity 7.6 to 8.4 dKH aim 8.0
  hold salinity 34 to 36
  uptake alkalinity 0.5 dKH/day
  by-hand ash times 12

solution ash
  dissolve sodium-carbonate 84.79 g
  make up to 1 L

log vat
  2026-11-30 08:00 read alkalinity 7.9 dKH, calcium 420 mg/L, nitrate below 2 mg/L
  2026-11-30 08:30 read salinity 35, temperature 25 degC, pH 8.1
  2026-11-30 09:00 read alkalinity 9.9 dKH disregard "bubbles"
`;

/** The shape of a value: keys for an object, the shape of its first element for a list. */
function shape(value: unknown): unknown {
  if (Array.isArray(value)) return value.length > 0 ? [shape(value[0])] : [];
  if (value === null) return null;
  if (typeof value === "object")
    return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, shape(inner)]));
  return typeof value;
}

const mean = { mean: "number", sd: null };

test("the report object has the contract's fields", () => {
  const report = reportOf(text);
  expect(shape({ ...report, problems: report.problems.slice(0, 1), systems: [] })).toEqual({
    marl: "number",
    at: "string",
    problems: [
      {
        file: "string",
        line: "number",
        column: "number",
        endLine: "number",
        endColumn: "number",
        severity: "string",
        code: "string",
        message: "string",
        system: "string",
      },
    ],
    assumptions: [{ system: "string", what: "string", value: "string", basis: "string" }],
    solutions: [
      {
        name: "string",
        file: "string",
        per_mL: {
          alkalinity_meq: "number",
          calcium_mg: "number",
          magnesium_mg: "number",
          potassium_mg: "number",
          strontium_mg: "number",
          sodium_mg: "number",
          chloride_mg: "number",
          sulfate_mg: "number",
          carbon_mmol: "number",
        },
        saturation: null,
        heat_rise_degC: null,
        hazards: null,
        signal: null,
        remaining_mL: null,
        days_left: null,
      },
    ],
    systems: [],
  });
});

test("a system has the contract's fields", () => {
  const [system] = reportOf(text).systems;
  const { readings, drift, ...rest } = system!;
  expect(shape(rest)).toEqual({
    name: "string",
    title: "string",
    file: "string",
    volume_L: "number",
    geometric_volume_L: "number",
    now: {
      stale: "boolean",
      alkalinity_meq_per_L: mean,
      calcium_mg_per_L: mean,
      magnesium_mg_per_L: { mean: null, sd: null },
      salinity: mean,
    },
    uptake: {
      basis: "string",
      alkalinity_meq_per_L_per_day: mean,
      calcium_mg_per_L_per_day: mean,
      magnesium_mg_per_L_per_day: mean,
      other_alkalinity_loss_meq_per_L_per_day: mean,
      calcification_g_CaCO3_per_day: "number",
    },
    plan: {
      limited_by: null,
      corrections: [{ parameter: "string", unit: "string", amount: "number", days: "number" }],
      correction_days: "number",
      doses: [
        {
          solution: "string",
          by: "string",
          maintenance_mL_per_day: "number",
          correction_mL_per_day: "number",
          correction_total_mL: "number",
          total_mL_per_day: "number",
          doses_per_day: "number",
          mL_per_dose: "number",
          every_days: "number",
          times: null,
        },
      ],
      after: { alkalinity_meq_per_L: "number", calcium_mg_per_L: "number", magnesium_mg_per_L: null },
      daily_swing: null,
      pH_total_after_largest_dose: "number",
      omega_aragonite_after_largest_dose: "number",
      salinity_gain_per_month: "number",
      fresh_water_swap_to_hold_salinity_L_per_week: "number",
    },
    worst_case: null,
  });
  expect(drift.map((one) => `${one.parameter} ${one.unit} ${one.case}`)).toEqual([
    "alkalinity meq/L undosed",
    "alkalinity meq/L as-set",
    "alkalinity meq/L as-planned",
    "salinity  undosed",
    "salinity  as-set",
    "salinity  as-planned",
  ]);
  expect(drift[0]?.points).toHaveLength(57);
  expect(shape(drift[0])).toMatchObject({
    leaves_hold_at: "string",
    earliest: null,
    latest: null,
    points: [{ at: "string", mean: "number", low: null, high: null }],
  });
  expect(readings).toHaveLength(3);
});

test("readings: what a line doesn't hold is null, the carbonate system stands in the later entry", () => {
  const [first, second, third] = reportOf(text).systems[0]!.readings;
  expect(first).toMatchObject({
    at: "2026-11-30T08:00",
    file: "farm.marl",
    line: 13,
    disregarded: false,
    calcium_mg_per_L: 420,
    magnesium_mg_per_L: null,
    salinity: null,
    pH: null,
    pH_scale: null,
    nitrate_mg_per_L: null,
    below: { nitrate: 2 },
    carbonate: null,
    surprise: null,
    pending: false,
  });
  // 7.9 dKH × 20 / 56.077 meq/L.
  expect(first?.alkalinity_meq_per_L).toBeCloseTo((7.9 * 20) / 56.077, 12);
  expect(second).toMatchObject({ pH: 8.1, pH_scale: "NBS", alkalinity_meq_per_L: null });
  expect(Object.keys(second?.carbonate ?? {})).toEqual([
    "pH_total",
    "density_kg_per_L",
    "dic_umol_per_kg",
    "bicarbonate_umol_per_kg",
    "carbonate_umol_per_kg",
    "co2_umol_per_kg",
    "pCO2_uatm",
    "omega_aragonite",
    "omega_calcite",
  ]);
  expect(third).toMatchObject({ disregarded: true, carbonate: null });
});

test("a problem of the farm as a whole has no line, columns count UTF-16 units", () => {
  const astral = 'system vat "𝒱at" \n  tank main 10 ltr # 🪸\n';
  const [problem] = reportOf(astral).problems.filter(({ code }) => code === "unit/unknown");
  expect(problem).toMatchObject({ line: 2, column: 16, endLine: 2, endColumn: 19 });
  expect(farmOf({}, "2026-12-01").problems).toEqual([]);
});
