/** A daily volume as deliveries: how many, how large, on which days. Doesn't choose the times of day. */
import type { PlanSource } from "./problem.ts";

export interface Deliveries {
  readonly dosesPerDay: number;
  readonly litresPerDose: number;
  /** 1, or k where it runs every k-th day only. */
  readonly everyDays: number;
}

type Deliverer = Pick<PlanSource, "largestDoseL" | "leastDoseL" | "deliveries">;

/** So near to a whole number or a bound a quotient is taken to be there: the rest is rounding. */
const hair = 1e-9;

const roundedUp = (quotient: number): number => Math.max(1, Math.ceil(quotient * (1 - hair) - hair));

/**
 * A pump gives the fewest equal doses that are each at most `largestDoseL`, every k-th day where a day's
 * volume is below `leastDoseL`; a hand gives its number of equal doses. Meant for volumes that
 * `deliverableL` lets through; beyond them the doses come out too large or too small rather than missing.
 */
export function deliveriesOf(source: Deliverer, litresPerDay: number): Deliveries {
  if (!(litresPerDay > 0) || !Number.isFinite(litresPerDay))
    return { dosesPerDay: 0, litresPerDose: 0, everyDays: 1 };
  const count = Math.max(1, Math.floor(source.deliveries.count) || 1);
  if (source.deliveries.kind === "fixed") {
    return { dosesPerDay: count, litresPerDose: litresPerDay / count, everyDays: 1 };
  }
  const days =
    litresPerDay >= source.leastDoseL * (1 - hair) ? 1 : roundedUp(source.leastDoseL / litresPerDay);
  if (days > 1 && Number.isFinite(days)) {
    return { dosesPerDay: 1, litresPerDose: days * litresPerDay, everyDays: days };
  }
  const doses = Math.min(count, dosesNeeded(source, litresPerDay));
  return { dosesPerDay: doses, litresPerDose: litresPerDay / doses, everyDays: 1 };
}

/** The largest volume a day, L, at most the one wished, that can be given in doses neither too small nor too large. */
export function deliverableL(source: Deliverer, litresPerDay: number): number {
  if (!(litresPerDay > 0)) return 0;
  const { largestDoseL, leastDoseL, deliveries } = source;
  const most = largestDoseL * Math.max(0, Math.floor(deliveries.count));
  const wished = litresPerDay <= most * (1 + hair) ? litresPerDay : most;
  if (deliveries.kind === "fixed" || !(wished > 0)) return Math.max(0, wished) || 0;
  if (largestDoseL < leastDoseL * (1 - hair)) return 0;
  if (wished < leastDoseL * (1 - hair)) {
    const days = roundedUp(leastDoseL / wished);
    if (!Number.isFinite(days)) return 0;
    return days * wished <= largestDoseL * (1 + hair) ? wished : largestDoseL / days;
  }
  const doses = dosesNeeded(source, wished);
  return wished / doses >= leastDoseL * (1 - hair) ? wished : (doses - 1) * largestDoseL;
}

const dosesNeeded = (source: Deliverer, litresPerDay: number): number =>
  source.largestDoseL > 0 ? roundedUp(litresPerDay / source.largestDoseL) : Number.POSITIVE_INFINITY;
