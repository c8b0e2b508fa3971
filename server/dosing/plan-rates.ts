/** A plan beside what is set: which of its sources a `set` line speaks of, and which a limit holds down. */
import type { Source, Strength } from "../culture/model.ts";
import type { Plan } from "./make-plan.ts";
import { litresSet } from "./rates.ts";
import { broughtPerLitre, isTracked } from "./tracked.ts";
import type { WaterState } from "./water-state.ts";

/** A limit held down what is given of a parameter that this solution brings. */
export function isLimited(
  { answer, problem }: Pick<Plan, "answer" | "problem">,
  strength: Strength,
): boolean {
  const corrected = answer.corrections.filter(({ limitedBy }) => limitedBy !== null);
  // Without a correction it is maintenance; a correction that waits for something else leaves that as it is.
  const maintained = answer.obstacles.filter(
    ({ kind, parameter, by }) =>
      kind === "held-back" &&
      problem.parameters.every(({ name, heldBack }) => name !== parameter || heldBack !== by),
  );
  return [...corrected, ...maintained].some(
    ({ parameter }) => isTracked(parameter) && (broughtPerLitre(strength, parameter) ?? 0) > 0,
  );
}

/** A hand whose rate the log or `always` sets counts as giving it every day; else it gives what is written as given. */
export const isSetByHand = (state: WaterState, key: string, source: Source): boolean =>
  source.device === "hand" && litresSet(state, key, source) > 0;

/**
 * The name by which a `set` line speaks of a source: a pump's own, or the solution of a hand that is set. Null of a
 * hand that isn't, or whose solution something else gives too.
 */
export function nameToSet(
  plan: Pick<Plan, "sources">,
  state: WaterState,
  { key, source }: Plan["sources"][number],
): string | null {
  if (source.device === "pump") return source.by;
  if (!isSetByHand(state, key, source)) return null;
  const name = source.solution.split(" ")[0] ?? source.solution;
  const isShared = plan.sources.some(
    (other) => other.key !== key && (other.source.solution === source.solution || other.source.by === name),
  );
  return isShared ? null : name;
}
