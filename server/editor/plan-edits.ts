/** Today's plan as lines of a system's log: what its pumps are to be set to from now on. */
import { ratesSet } from "../checks/mending.ts";
import type { LineEdit } from "../checks/problem.ts";
import type { System } from "../culture/model.ts";
import { planRemedies } from "../dosing/remedies.ts";
import type { Farm } from "../farm.ts";
import { dosesSection } from "../report/sheet-doses.ts";

export interface PlanEdit {
  /** `Set head-1 to 112 mL/day from now on`. */
  readonly title: string;
  readonly edits: readonly LineEdit[];
}

/** The same `set` lines as the fixes of what the plan would mend; none where every pump is set as planned. */
export function planEdits(farm: Farm, system: System): readonly PlanEdit[] {
  const assessment = farm.assessments.get(system.ref);
  if (!assessment) return [];
  const remedies = planRemedies(farm.bound.model, assessment);
  return ratesSet(system.name, remedies, farm.documents).filter(({ edits }) =>
    edits.every(({ file }) => farm.texts.has(file)),
  );
}

/** Why there is nothing to write. */
export function whyNoPlanEdit(farm: Farm, system: System): string {
  const assessment = farm.assessments.get(system.ref);
  if (!assessment?.plan) {
    const [why] = assessment ? dosesSection(farm.bound.model, assessment).lines : [];
    return why ?? "Nothing can be planned.";
  }
  const { set, newest } = planRemedies(farm.bound.model, assessment);
  if (set.length > 0 && newest === null)
    return `${system.name} has no line in a log yet. Record a reading first, then write the plan.`;
  const byHand = assessment.plan.sources.some(({ source }) => source.device === "hand");
  const hand = byHand ? " Doses by hand are written once they are given." : "";
  return set.length > 0
    ? `Every pump of ${system.name} is set as planned.${hand}`
    : `${system.name} has no pump to set.${hand}`;
}
