/** From the plan's problem to its answer: maintenance, cuts, corrections, then how each source gives its litres. */

import { type Correction, corrections } from "./correction.ts";
import { type CutPlan, type CutStage, cutPlan, cutStages } from "./cuts.ts";
import { deliveriesOf } from "./deliveries.ts";
import { servesUnknownOnly } from "./maintenance.ts";
import { type PlanNumbers, planNumbers, rounding, supplyOf } from "./numbers.ts";
import { limitedBy, obstacles } from "./obstacles.ts";
import type { PlanAnswer, PlannedSource, PlanPhase, PlanProblem } from "./problem.ts";

/**
 * Total and deterministic: the same problem gives the same answer to the last bit, and no figure in it is
 * negative or not a number.
 */
export function solvePlan(problem: PlanProblem): PlanAnswer {
  const numbers = planNumbers(problem);
  const cuts = cutPlan(numbers);
  const planned = corrections(numbers, cuts);
  const given = planned.filter(({ perDay }) => perDay > 0);
  const broughtInAll = numbers.parameters.map((_, p) =>
    given.reduce((sum, { litres, days }) => sum + supplyOf(numbers, p, litres) * days, 0),
  );
  const { stages, endDays } = cutStages(numbers, cuts, broughtInAll);
  return {
    sources: numbers.sources.map((_, j) => plannedSource(numbers, cuts, given, j)),
    corrections: given.map(({ parameter, distance, amount, perDay, days, limitedBy: by }) => ({
      parameter: numbers.parameters[parameter]!.name,
      distance,
      amount,
      perDay,
      days,
      limitedBy: by,
    })),
    cuts: [...endDays]
      .sort(([a], [b]) => a - b)
      .map(([p, days]) => {
        const { name, now, aim } = numbers.parameters[p]!;
        return { parameter: name, perDay: (now! - aim) / days, days };
      }),
    correctionDays: Math.max(0, ...given.map(({ days }) => days)),
    phases: phases(cuts, stages, given),
    obstacles: obstacles(numbers, cuts, planned),
    limitedBy: limitedBy(numbers, cuts, planned),
  };
}

function plannedSource(
  numbers: PlanNumbers,
  cuts: CutPlan,
  given: readonly Correction[],
  j: number,
): PlannedSource {
  const source = numbers.sources[j]!;
  const kept = cuts.during(cuts.wished).litres[j]!;
  const correction = given.find(({ litres }) => litres[j]! > 0);
  const correctionLPerDay = correction?.litres[j] ?? 0;
  const unknown = servesUnknownOnly(numbers, j);
  return {
    key: source.key,
    maintenanceLPerDay: unknown ? null : kept,
    correctionLPerDay,
    serves: correction ? numbers.parameters[correction.parameter]!.name : null,
    correctionTotalL: correction ? correctionLPerDay * correction.days : 0,
    totalLPerDay: unknown ? null : kept + correctionLPerDay,
    ...deliveriesOf(source, kept + correctionLPerDay),
  };
}

/** Breakpoints where a cut or a correction ends; between them every source runs evenly. */
function phases(cuts: CutPlan, stages: readonly CutStage[], given: readonly Correction[]): PlanPhase[] {
  const ends = [...stages.slice(1).map(({ fromDays }) => fromDays), ...given.map(({ days }) => days)]
    .sort((a, b) => a - b)
    .filter((end, index, all) => index === 0 || end > all[index - 1]! * (1 + rounding));
  const after = (days: number): number[] => {
    // Ends that are the same but for rounding were merged into the earliest of them.
    const moment = days * (1 + 2 * rounding);
    const stage = stages.findLast(({ fromDays }) => fromDays <= moment) ?? stages[0]!;
    const running = given.filter((correction) => correction.days > moment);
    return cuts
      .during(stage.running)
      .litres.map((kept, j) => running.reduce((sum, { litres }) => sum + litres[j]!, kept));
  };
  return [0, ...ends].map((from, index) => ({ untilDays: ends[index] ?? null, litresPerDay: after(from) }));
}
