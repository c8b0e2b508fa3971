/** What would mend a finding, in numbers. Shapes only; the lines of a log are written in `checks/`. */
import type { Place } from "../culture/place.ts";

/** What to write into a log now. */
export interface Remedies {
  readonly at: number;
  /** The newest line of the system's log. */
  readonly newest: Place | null;
  readonly set: readonly PumpRate[];
  /** Today's doses by hand that haven't been given yet. */
  readonly gave: readonly HandDose[];
  readonly exchanges: readonly Exchange[];
}

/** A pump of the plan: what it should give from now on, and what it is set to. */
export interface PumpRate {
  readonly pump: string;
  readonly litresPerDay: number;
  readonly setLPerDay: number;
  /** A limit stands in the way of more, so that it is rounded down. */
  readonly isLimited: boolean;
}

export interface HandDose {
  readonly solution: string;
  readonly litres: number;
  readonly isLimited: boolean;
}

/** A part of the water that is drained and filled with a salt water. */
export interface Exchange {
  /** Reference of the salt water. */
  readonly water: string;
  readonly litres: number;
  /** What the water brings, and what the system's comes to. */
  readonly incoming: number;
  readonly reached: number;
  /** `day`: as far as the limits on a day's change allow; `beyond`: further than that at once. */
  readonly within: "limits" | "day" | "beyond";
}

/** One dose in several parts. */
export interface Split {
  readonly over: "day" | "days";
  /** Each with the part of the whole that it is, 0 to 1. */
  readonly parts: readonly { readonly minute: number; readonly share: number }[];
}
