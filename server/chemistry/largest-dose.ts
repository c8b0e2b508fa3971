/** The largest single delivery of a solution that a system's water takes without breaking a limit. */
import { afterDose, type SolutionStrength, type SystemWater } from "./after-dose.ts";
import { narrow } from "./bracketed-root.ts";
import type { NoAnswer } from "./constants-at.ts";

/** Infinity where there is no limit. */
export type DeliveryLimits = {
  readonly pHNbsMax: number;
  /** Largest change of pH, up or down, that one delivery may make. */
  readonly pHJumpMax: number;
  readonly omegaAragoniteMax: number;
};

export type BindingLimit =
  | "pH max"
  | "pH jump"
  | "omega aragonite"
  /** A larger delivery makes the water one that is no sea water. */
  | "sea water";

export type LargestDose = {
  readonly ok: true;
  readonly volumeL: number;
  /** The limit that a larger delivery breaks first; null where even the most asked about breaks none. */
  readonly bindingLimit: BindingLimit | null;
};

/** Doublings between the smallest dose tried and the largest. */
const doublings = 14;

/**
 * The largest delivery, at most `mostL` litres, after which pH and Ω keep their limits.
 *
 * Doses are tried from small to large in doublings, then the first that breaks a limit is narrowed down by a
 * bracketed root, capped; the answer is on the side that keeps the limits. A limit that the water already
 * breaks admits doses that don't make it worse, and no others.
 */
export function largestDose(
  water: SystemWater,
  solution: SolutionStrength,
  limits: DeliveryLimits,
  mostL: number,
): LargestDose | NoAnswer {
  if (!(mostL >= 0) || mostL === Number.POSITIVE_INFINITY || Object.values(limits).some(Number.isNaN)) {
    return { ok: false, reason: "impossible-figure" };
  }
  const before = afterDose(water, solution, 0);
  if (!before.ok) return before;
  const { pHNbs, omegaAragonite } = before.carbonate;

  /** By how much each limit is broken, in units of its own; the worst first. */
  const worst = (doseL: number): { readonly excess: number; readonly limit: BindingLimit } => {
    const after = afterDose(water, solution, doseL);
    if (!after.ok) return { excess: 1, limit: "sea water" };
    const { carbonate } = after;
    const excesses = [
      { limit: "pH max", excess: carbonate.pHNbs - Math.max(limits.pHNbsMax, pHNbs) },
      { limit: "pH jump", excess: Math.abs(carbonate.pHNbs - pHNbs) - limits.pHJumpMax },
      {
        limit: "omega aragonite",
        excess: carbonate.omegaAragonite - Math.max(limits.omegaAragoniteMax, omegaAragonite),
      },
    ] as const;
    const { limit, excess } = excesses.reduce((most, next) => (next.excess > most.excess ? next : most));
    return { limit, excess: Math.max(excess, -1) }; // finite, where there is no limit
  };

  if (mostL === 0) return { ok: true, volumeL: 0, bindingLimit: null };
  let kept = 0;
  for (let halvings = doublings; halvings >= 0; halvings--) {
    const tried = mostL / 2 ** halvings;
    const found = worst(tried);
    if (found.excess > roundingExcess) {
      const ends = { low: kept, high: tried };
      const bracket = narrow((doseL) => worst(doseL).excess - roundingExcess, ends, mostL * 1e-9);
      const broken = worst(bracket?.high ?? tried);
      return { ok: true, volumeL: bracket?.low ?? kept, bindingLimit: broken.limit };
    }
    kept = tried;
  }
  return { ok: true, volumeL: mostL, bindingLimit: null };
}

/** Below this, in pH or Ω, a limit counts as kept: the digits of the solver. */
const roundingExcess = 1e-10;
