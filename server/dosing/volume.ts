/** How much water a system holds. */
import { factAt } from "../culture/history.ts";
import type { SystemFacts } from "../culture/model.ts";
import type { Place } from "../culture/place.ts";

export interface Volume {
  /** Net water; null where nothing says it, or nothing is left of it. */
  readonly litres: number | null;
  /** From the tanks' measures less what is displaced; null without a tank. */
  readonly geometricL: number | null;
  readonly measuredL: number | null;
  /** The displacement that takes up most, to point at where nothing is left. */
  readonly largestDisplacement: Place | null;
  readonly measuredPlace: Place | null;
}

/** Volume at a minute: measured by dilution where it was, else from the tanks. */
export function volumeAt(facts: SystemFacts, minute: number): Volume {
  const inForce = <T>(histories: Iterable<Parameters<typeof factAt<T>>[0] & object>) =>
    [...histories].flatMap((history) => factAt(history, minute) ?? []);
  const tanks = inForce<number>(facts.tanks.values());
  const displaced = inForce<number>(facts.displacements.values());
  const measured = factAt(facts.measuredVolume, minute);
  const sum = (entries: readonly { value: number }[]) =>
    entries.reduce((total, { value }) => total + value, 0);
  const geometricL = tanks.length > 0 ? sum(tanks) - sum(displaced) : null;
  const chosen = measured?.value ?? geometricL;
  const largest = displaced.reduce<(typeof displaced)[number] | null>(
    (most, next) => (!most || next.value > most.value ? next : most),
    null,
  );
  return {
    litres: chosen !== null && chosen > 0 ? chosen : null,
    geometricL,
    measuredL: measured?.value ?? null,
    largestDisplacement: largest?.place ?? null,
    measuredPlace: measured?.place ?? null,
  };
}
