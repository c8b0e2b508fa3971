/** A root of a function of one number between two ends, in a capped number of steps. */

export type Bracket = { readonly low: number; readonly high: number };

/** Enough to halve any bracket of doubles down to its last digits. */
const mostSteps = 120;

/**
 * The narrowed bracket around a root of `f` between `low` and `high`, where f(low) ≤ 0 < f(high); or
 * undefined where the ends don't bracket one. `width` is the width to reach.
 *
 * False position in the Illinois form (Dowell & Jarratt 1971, BIT 11, 168–174), with a halving wherever it
 * narrows the bracket by less than half in three steps. `low` always keeps f ≤ 0, so it is the safe end.
 */
export function narrow(f: (x: number) => number, ends: Bracket, width: number): Bracket | undefined {
  let { low, high } = ends;
  let atLow = f(low);
  let atHigh = f(high);
  if (!(atLow <= 0 && atHigh > 0 && Number.isFinite(atLow) && Number.isFinite(atHigh))) return undefined;
  let kept: "low" | "high" | undefined;
  let widthBefore = high - low;
  for (let step = 1; step <= mostSteps && high - low > width; step++) {
    let x = low + ((high - low) * -atLow) / (atHigh - atLow);
    if (step % 3 === 0) {
      if (high - low > widthBefore / 2) x = low + (high - low) / 2;
      widthBefore = high - low;
    }
    // A step short of either end by less than the width wanted would creep: step across it.
    x = Math.min(Math.max(x, low + width / 2), high - width / 2);
    const value = f(x);
    if (value > 0) {
      high = x;
      atHigh = value;
      if (kept === "low") atLow /= 2;
      kept = "low";
    } else if (value <= 0) {
      low = x;
      atLow = value;
      if (kept === "high") atHigh /= 2;
      kept = "high";
    } else return undefined;
  }
  return { low, high };
}

/** The root of a rising function between two ends; undefined where the ends don't bracket one. */
export function risingRoot(f: (x: number) => number, ends: Bracket, width: number): number | undefined {
  const bracket = narrow(f, ends, width);
  return bracket && (bracket.low + bracket.high) / 2;
}
