/** Where the water goes from a moment on, with uptake as it is now: piecewise steady rates, in closed form. */
import type { Hold } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import { ratesAt } from "./fold.ts";
import { after, type Flow, type Rates } from "./rates.ts";
import { byTracked, type Tracked } from "./tracked.ts";
import type { WaterState } from "./water-state.ts";

export const driftCases = ["undosed", "as-set", "as-planned"] as const;
export type DriftCase = (typeof driftCases)[number];

export interface Drift {
  readonly parameter: Tracked;
  readonly hold: Hold;
  readonly case: DriftCase;
  /** Minute at which the day's mean leaves the band; null where it stays for the days looked ahead. */
  readonly leavesAt: number | null;
  readonly points: readonly { readonly minute: number; readonly value: number }[];
}

/** Flows from some day on; the last lasts. */
export interface FlowPhase {
  /** Days after the moment; null for the last. */
  readonly untilDays: number | null;
  readonly flows: readonly Flow[];
}

export interface Projection {
  /** The value some days ahead; null where it isn't known now, or its uptake isn't. */
  readonly valueAt: (name: Tracked, days: number) => number | null;
}

/** Projects a state through phases of flows. */
export function project(
  state: WaterState,
  constants: SystemConstants,
  phases: readonly FlowPhase[],
): Projection | null {
  const pieces: {
    readonly fromDays: number;
    readonly rates: Rates;
    readonly start: Readonly<Record<Tracked, number>>;
  }[] = [];
  let start = byTracked((name) => state.carried[name]?.value ?? 0);
  let fromDays = 0;
  for (const { untilDays, flows } of phases) {
    const rates = ratesAt(state, state.minute, constants, flows);
    if (!rates) return null;
    pieces.push({ fromDays, rates, start });
    if (untilDays === null) break;
    const before = start;
    const days = Math.max(0, untilDays - fromDays);
    start = byTracked((name) => after(before[name], rates, name, days));
    fromDays = untilDays;
  }
  const valueAt = (name: Tracked, days: number): number | null => {
    const piece = pieces.findLast((candidate) => candidate.fromDays <= days) ?? pieces[0];
    if (!piece || !state.carried[name] || piece.rates.gainPerDay[name] === null) return null;
    return after(piece.start[name], piece.rates, name, days - piece.fromDays);
  };
  return { valueAt };
}

/** Days looked ahead, and the hours between points. */
export const driftDays = 14;
export const driftStepHours = 6;

/**
 * When a value first leaves its band within the days looked ahead: 0 where it is outside now, null where it
 * stays. Between two points the value is monotone but for the ends of phases, so the step in which it leaves
 * is halved until the minute is known.
 */
export function leavesBandAfterDays(
  valueAt: (days: number) => number | null,
  low: number,
  high: number,
): number | null {
  const outside = (days: number): boolean => {
    const value = valueAt(days);
    return value !== null && (value < low - rounding(low) || value > high + rounding(high));
  };
  if (outside(0)) return 0;
  const step = driftStepHours / 24;
  for (let days = step; days <= driftDays + 1e-9; days += step) {
    if (!outside(days)) continue;
    let inside = days - step;
    let beyond = days;
    for (let halving = 0; halving < 20; halving++) {
      const middle = (inside + beyond) / 2;
      if (outside(middle)) beyond = middle;
      else inside = middle;
    }
    return beyond;
  }
  return null;
}

/** A value that stands on the edge of its band is inside, whatever the last bits say. */
const rounding = (edge: number): number => Math.abs(edge) * 1e-9;
