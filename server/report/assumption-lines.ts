/** What was taken for granted, in lines. */
import type { Assumption } from "../culture/model.ts";

/** One line for each thing that assumptions rest on, with all that rests on it. */
export function assumptionLines(assumptions: readonly Assumption[]): string[] {
  const byBasis = new Map<string, string[]>();
  for (const { what, value, basis } of assumptions)
    byBasis.set(basis, [...(byBasis.get(basis) ?? []), `${what}: ${value}`]);
  return [...byBasis].map(
    ([basis, items]) => `${basis.charAt(0).toUpperCase()}${basis.slice(1)} – ${items.join("; ")}.`,
  );
}
