/** What the plan couldn't do as wished, and what is worth knowing about how it doses. */
import { factAt } from "../culture/history.ts";
import type { System } from "../culture/model.ts";
import type { DosingFinding } from "./finding.ts";
import { heldNow, noRecentReading, type Plan, type Situation, salinityFirst } from "./make-plan.ts";
import type { PlanObstacle } from "./plan/problem.ts";

export function planFindings(situation: Situation, system: System, plan: Plan): DosingFinding[] {
  return [...obstacleFindings(situation, system, plan), ...rareDoses(situation, system, plan)];
}

function obstacleFindings(situation: Situation, system: System, plan: Plan): DosingFinding[] {
  const { constants, state } = situation;
  const holds = heldNow(situation);
  return plan.answer.obstacles.flatMap((obstacle): DosingFinding[] => {
    if (isToldElsewhere(obstacle, plan)) return [];
    const { parameter, kind, by, perDay } = obstacle;
    const place = factAt(constants.facts.holds.get(parameter), state.minute)?.place;
    const unit = holds.find((hold) => hold.parameter === parameter)?.unit;
    return place && unit
      ? [{ code: `plan/${kind}`, place, system: system.name, parameter, by, perDay, unit }]
      : [];
  });
}

/** A test that is missing, salinity that is the cause, and water that is beyond a limit already, have problems of their own. */
function isToldElsewhere({ parameter, kind, by }: PlanObstacle, plan: Plan): boolean {
  if (by === noRecentReading || by === salinityFirst) return true;
  const problem = plan.problem.parameters.find(({ name }) => name === parameter);
  if (kind !== "passive-breach" || !problem || problem.now === null) return false;
  const { now, max, min } = problem;
  return (
    (by === `${parameter} max` && max !== null && now > max) ||
    (by === `${parameter} min` && min !== null && now < min)
  );
}

/** Sources that don't run every day, because a day's volume is less than they repeat well. */
function rareDoses({ constants, state }: Situation, system: System, plan: Plan): DosingFinding[] {
  return plan.answer.sources.flatMap(({ everyDays, litresPerDose }, index): DosingFinding[] => {
    const entry = plan.sources[index];
    const place = entry && factAt(constants.facts.sources.get(entry.key), state.minute)?.place;
    if (everyDays <= 1 || !place) return [];
    const { by, solution } = entry.source;
    const leastL = plan.problem.sources[index]?.leastDoseL ?? 0;
    return [
      {
        code: "plan/every-other-day",
        place,
        system: system.name,
        source: by,
        solution,
        everyDays,
        litresPerDose,
        leastL,
      },
    ];
  });
}
