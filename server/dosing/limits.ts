/** The limits in force: the file's own, else the defaults, which are listed where they are used. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { LimitKind } from "../../grammar/syntax.ts";
import { type Default, defaultLimits } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { SystemFacts } from "../culture/model.ts";
import type { Place } from "../culture/place.ts";
import type { Assuming } from "./assumptions.ts";

export interface LimitInForce {
  readonly value: number;
  readonly scale: "NBS" | "total" | null;
  /** Null for a default. */
  readonly place: Place | null;
}

/** A limit at a minute; null where neither the file nor a default sets one. */
export function limitAt(
  facts: SystemFacts,
  parameter: ParameterName,
  which: LimitKind,
  device: "pump" | "hand",
  minute: number,
  assumed: Assuming | null,
): LimitInForce | null {
  const stated = factAt(facts.limits.get(`${parameter} ${which}`), minute);
  if (stated) return { value: stated.value.value, scale: stated.value.scale, place: stated.place };
  const table: Readonly<Record<string, Default>> = defaultLimits;
  const entry = table[`${parameter} ${which}`] ?? table[`${parameter} ${which} by ${device}`];
  if (!entry) return null;
  assumed?.use(entry);
  return { value: entry.value, scale: parameter === "pH" ? "NBS" : null, place: null };
}
