/** The state of a system's water between events: a small value, all that later steps need. */
import { minutesPerDay } from "../../grammar/dates.ts";
import type { ReadValue } from "../culture/model.ts";
import { type ByTracked, byTracked } from "./tracked.ts";

export interface Carried {
  /** meq/L, mg/L, PSS-78. */
  readonly value: number;
  /** When it was read. */
  readonly readAt: number;
  readonly reading: ReadValue;
}

/** Brought at once, a litre of the system's water. */
export interface Brought {
  readonly minute: number;
  readonly alkalinityMeqPerL: number;
  readonly carbonMmolPerL: number;
}

export interface WaterState {
  readonly minute: number;
  readonly carried: ByTracked<Carried | null>;
  /** By source, what it is set to, L/day. */
  readonly set: ReadonlyMap<string, number>;
  readonly stopped: ReadonlySet<string>;
  /** By cohort, what came and went since its count was declared (the entry's `from`). */
  readonly stock: ReadonlyMap<string, { readonly from: number; readonly change: number }>;
  readonly pH: { readonly minute: number; readonly reading: ReadValue } | null;
  /** What was brought at once since the last pH and within a day: what no pH and no air has answered yet. */
  readonly unanswered: readonly Brought[];
  readonly temperature: { readonly minute: number; readonly value: number } | null;
}

export const startState = (minute: number): WaterState => ({
  minute,
  carried: byTracked(() => null),
  set: new Map(),
  stopped: new Set(),
  stock: new Map(),
  pH: null,
  unanswered: [],
  temperature: null,
});

/** A value is carried forward so long after its reading; then it is stale. */
export const carriedMinutes = 7 * minutesPerDay;

export const isStale = (carried: Carried | null, minute: number): boolean =>
  !carried || minute - carried.readAt > carriedMinutes;
