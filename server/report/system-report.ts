/** One system's part of the report object. */
import { writeMoment } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import type { FarmModel, ReadValue } from "../culture/model.ts";
import type { Assessment } from "../dosing/assess.ts";
import type { ReadingWithCarbonate } from "../dosing/carbonate-of-reading.ts";
import type { Plan } from "../dosing/make-plan.ts";
import type { Drift } from "../dosing/projection.ts";
import { type Tracked, unitOf } from "../dosing/tracked.ts";

export type SystemReport = ReturnType<typeof systemReport>;

export function systemReport(model: FarmModel, assessment: Assessment) {
  const { system, volume, plan } = assessment;
  return {
    name: system.name,
    title: system.title,
    file: system.place.file,
    volume_L: volume.litres,
    geometric_volume_L: volume.geometricL,
    readings: assessment.readings.map(readingReport),
    now: nowReport(assessment),
    uptake: uptakeReport(assessment),
    drift: assessment.drifts.map(driftReport),
    plan: plan ? planReport(model, assessment, plan) : null,
    worst_case: null,
  };
}

function readingReport({ event, carbonate }: ReadingWithCarbonate) {
  const { values } = event;
  const of = (name: ParameterName): number | null => {
    const value = values[name];
    return value && !value.below ? value.value : null;
  };
  const below = Object.entries(values as Record<string, ReadValue>).flatMap(([name, value]) =>
    value.below ? [[name, value.value]] : [],
  );
  return {
    at: writeMoment(event.minute),
    file: event.place.file,
    line: event.place.line + 1,
    disregarded: event.disregarded,
    alkalinity_meq_per_L: of("alkalinity"),
    calcium_mg_per_L: of("calcium"),
    magnesium_mg_per_L: of("magnesium"),
    potassium_mg_per_L: of("potassium"),
    strontium_mg_per_L: of("strontium"),
    salinity: of("salinity"),
    temperature_degC: of("temperature"),
    pH: of("pH"),
    pH_scale: values.pH?.scale ?? null,
    nitrate_mg_per_L: of("nitrate"),
    phosphate_mg_per_L: of("phosphate"),
    /** What a test showed to be less than a value, by parameter. */
    below: Object.fromEntries(below),
    carbonate: carbonate && {
      pH_total: carbonate.state.pHTotal,
      density_kg_per_L: carbonate.densityKgPerL,
      dic_umol_per_kg: carbonate.state.dicUmolPerKg,
      bicarbonate_umol_per_kg: carbonate.state.bicarbonateUmolPerKg,
      carbonate_umol_per_kg: carbonate.state.carbonateUmolPerKg,
      co2_umol_per_kg: carbonate.state.co2UmolPerKg,
      pCO2_uatm: carbonate.state.pCO2Uatm,
      omega_aragonite: carbonate.state.omegaAragonite,
      omega_calcite: carbonate.state.omegaCalcite,
    },
    surprise: null,
    pending: false,
  };
}

/** A mean whose spread isn't known before there is an estimate from the log. */
const mean = (value: number | null | undefined) => ({ mean: value ?? null, sd: null });

function nowReport({ state, staleParameters }: Assessment) {
  const of = (name: Tracked) => mean(state.carried[name]?.value);
  return {
    stale: staleParameters.length > 0,
    alkalinity_meq_per_L: of("alkalinity"),
    calcium_mg_per_L: of("calcium"),
    magnesium_mg_per_L: of("magnesium"),
    salinity: of("salinity"),
  };
}

function uptakeReport({ uptakeOfLastDay: uptake, volume }: Assessment) {
  const perLitre = (amount: number | null | undefined) =>
    amount === null || amount === undefined || volume.litres === null ? null : amount / volume.litres;
  return {
    basis: uptake?.basis ?? "none",
    alkalinity_meq_per_L_per_day: mean(perLitre(uptake?.perDay.alkalinity)),
    calcium_mg_per_L_per_day: mean(perLitre(uptake?.perDay.calcium)),
    magnesium_mg_per_L_per_day: mean(perLitre(uptake?.perDay.magnesium)),
    other_alkalinity_loss_meq_per_L_per_day: mean(perLitre(uptake?.otherLossMeqPerDay)),
    calcification_g_CaCO3_per_day: uptake?.calcificationGPerDay ?? null,
  };
}

function driftReport(drift: Drift) {
  return {
    parameter: drift.parameter,
    unit: unitOf(drift.parameter),
    case: drift.case,
    leaves_hold_at: drift.leavesAt === null ? null : writeMoment(drift.leavesAt),
    earliest: null,
    latest: null,
    points: drift.points.map(({ minute, value }) => ({
      at: writeMoment(minute),
      mean: value,
      low: null,
      high: null,
    })),
  };
}

const millilitres = (litres: number | null): number | null => (litres === null ? null : litres * 1000);

function planReport(model: FarmModel, { afterPlan, salt }: Assessment, { answer, sources, peak }: Plan) {
  return {
    limited_by: answer.limitedBy,
    corrections: answer.corrections.map(({ parameter, amount, days }) => ({
      parameter,
      unit: unitOf(parameter),
      amount,
      days,
    })),
    correction_days: answer.correctionDays,
    doses: sources.map(({ source }, index) => {
      const planned = answer.sources[index]!;
      return {
        solution: model.solutions.get(source.solution)?.name ?? source.solution,
        by: source.by,
        maintenance_mL_per_day: millilitres(planned.maintenanceLPerDay),
        correction_mL_per_day: millilitres(planned.correctionLPerDay),
        correction_total_mL: millilitres(planned.correctionTotalL),
        total_mL_per_day: millilitres(planned.totalLPerDay),
        doses_per_day: planned.dosesPerDay,
        mL_per_dose: millilitres(planned.litresPerDose),
        every_days: planned.everyDays,
        times: null,
      };
    }),
    after: {
      alkalinity_meq_per_L: afterPlan?.alkalinity ?? null,
      calcium_mg_per_L: afterPlan?.calcium ?? null,
      magnesium_mg_per_L: afterPlan?.magnesium ?? null,
    },
    daily_swing: null,
    pH_total_after_largest_dose: peak?.pHTotal ?? null,
    omega_aragonite_after_largest_dose: peak?.omegaAragonite ?? null,
    salinity_gain_per_month: salt?.salinityGainPerMonth ?? null,
    fresh_water_swap_to_hold_salinity_L_per_week: salt?.freshWaterSwapLPerWeek ?? null,
  };
}
