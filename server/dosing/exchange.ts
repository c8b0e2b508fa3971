/** How much water to exchange with which salt water, so that a value comes to its aim. */
import { factAt } from "../culture/history.ts";
import type { FarmModel } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import { limitAt } from "./limits.ts";
import type { Exchange } from "./remedy.ts";
import { type Tracked, tracked } from "./tracked.ts";
import { volumeAt } from "./volume.ts";
import { isStale, type WaterState } from "./water-state.ts";

/** More than this share of the water isn't exchanged at once: common practice, no source. */
const largestShare = 0.5;

export interface ExchangeFor {
  readonly model: FarmModel;
  readonly constants: SystemConstants;
  readonly state: WaterState;
  readonly parameter: Tracked;
  /** Where the value should come to, best first: its aim, then the edge that it has passed. */
  readonly targets: readonly number[];
}

/**
 * The share of the water to exchange so that a value becomes another: value × (1 − share) + incoming × share.
 * Null where this water can't bring it there.
 */
export function shareToExchange(value: number, target: number, incoming: number): number | null {
  const share = (value - target) / (value - incoming);
  return Number.isFinite(share) && share > 0 && share <= largestShare ? share : null;
}

/** For each salt water that states the parameter and helps, what to exchange: within a day's limits, and beyond them. */
export function exchangesFor(here: ExchangeFor): readonly Exchange[] {
  const { model, constants, state, parameter, targets } = here;
  const volumeL = volumeAt(constants.facts, state.minute).litres;
  const carried = state.carried[parameter];
  if (volumeL === null || !carried || isStale(carried, state.minute)) return [];
  const { value } = carried;
  return [...model.waters.values()].flatMap(({ ref, values }): Exchange[] => {
    const incoming = factAt(values.get(parameter), state.minute)?.value;
    if (incoming === undefined) return [];
    const target = targets.find((each) => shareToExchange(value, each, incoming) !== null);
    const share = target === undefined ? null : shareToExchange(value, target, incoming);
    if (share === null || target === undefined || spoilsAnother(here, ref, share)) return [];
    const shared = { water: ref, incoming };
    const whole = { ...shared, litres: share * volumeL, reached: target };
    const most = changeOfDay(here, incoming < value ? "fall" : "rise");
    if (Math.abs(value - target) <= most * (1 + 1e-9)) return [{ ...whole, within: "limits" }];
    const ofDay = most / Math.abs(value - incoming);
    const reached = value + ofDay * (incoming - value);
    return [
      { ...shared, litres: ofDay * volumeL, reached, within: "day" },
      { ...whole, within: "beyond" },
    ];
  });
}

/** What the limit on a day's change leaves; what is set already is taken off by the next reading. */
const changeOfDay = ({ constants, state, parameter }: ExchangeFor, which: "rise" | "fall"): number =>
  limitAt(constants.facts, parameter, which, "hand", state.minute, null)?.value ?? Number.POSITIVE_INFINITY;

/** Another parameter that is in its band now would be out of it with so much of this water. */
function spoilsAnother({ constants, state, parameter }: ExchangeFor, water: string, share: number): boolean {
  const { values } = constants.waterAt(water, state.minute);
  return tracked.some((name) => {
    const hold = factAt(constants.facts.holds.get(name), state.minute)?.value;
    const carried = state.carried[name];
    if (name === parameter || !hold || !carried || isStale(carried, state.minute)) return false;
    const isIn = (value: number) => value >= hold.low && value <= hold.high;
    return isIn(carried.value) && !isIn(carried.value * (1 - share) + values[name] * share);
  });
}
