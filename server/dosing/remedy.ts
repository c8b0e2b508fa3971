/** What would mend a finding, in numbers. Shapes only; the lines of a log are written in `checks/`. */
import type { DisplayUnit } from "../culture/model.ts";
import type { Place } from "../culture/place.ts";
import type { Tracked } from "./tracked.ts";

/** What to write into a log now. */
export interface Remedies {
  readonly at: number;
  /** The newest line of the system's log. */
  readonly newest: Place | null;
  readonly set: readonly RateToSet[];
  /** Today's doses by hand that haven't been given yet. */
  readonly gave: readonly HandDose[];
  readonly exchanges: readonly Exchange[];
}

/** A source of the plan that a `set` line speaks of: what it should give from now on, and what it is set to. */
export interface RateToSet {
  /** A pump's, or the solution's that is given by hand. */
  readonly name: string;
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
  /** Whose limit on a day's change stands in the way, or is broken. */
  readonly limits: readonly Tracked[];
  /** What else is held, or is salinity, and comes to another value. */
  readonly moves: readonly {
    readonly parameter: Tracked;
    readonly unit: DisplayUnit;
    readonly from: number;
    readonly to: number;
  }[];
}

/** One dose in several parts. */
export interface Split {
  readonly over: "day" | "days";
  /** Each with the part of the whole that it is, 0 to 1. */
  readonly parts: readonly { readonly minute: number; readonly share: number }[];
}
