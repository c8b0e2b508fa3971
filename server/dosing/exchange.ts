/** How much water to exchange with which salt water, so that a value comes to its aim. */
import { shownIn } from "../culture/display.ts";
import { factAt } from "../culture/history.ts";
import type { FarmModel } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import { limitAt } from "./limits.ts";
import type { Exchange } from "./remedy.ts";
import { type ByTracked, type Tracked, tracked } from "./tracked.ts";
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
    const water = constants.waterAt(ref, state.minute).values;
    const ofDay = shareOfDay(here, water);
    const exchange = (of: number, within: Exchange["within"], limits: readonly Tracked[]): Exchange => ({
      ...{ water: ref, incoming, litres: of * volumeL, within, limits },
      reached: value + of * (incoming - value),
      moves: otherMoves(here, water, of),
    });
    const broken = ofDay.filter(({ most }) => share > most * (1 + 1e-9)).map(({ name }) => name);
    if (broken.length === 0) return [exchange(share, "limits", [])];
    const most = Math.min(...ofDay.map((each) => each.most));
    const first = ofDay.filter((each) => each.most <= most * (1 + 1e-9)).map(({ name }) => name);
    return [...(most > 0 ? [exchange(most, "day", first)] : []), exchange(share, "beyond", broken)];
  });
}

/** Everything known now that an exchange is judged by: what it is for, what is held, and salinity. */
function judged({ constants, state, parameter }: ExchangeFor) {
  return tracked.flatMap((name) => {
    const carried = state.carried[name];
    const hold = factAt(constants.facts.holds.get(name), state.minute)?.value ?? null;
    const counts = name === parameter || name === "salinity" || hold !== null;
    return counts && carried && !isStale(carried, state.minute) ? [{ name, carried, hold }] : [];
  });
}

/**
 * The largest share that keeps the limit on a day's change, for each that is judged. What is set already is taken off
 * by the next reading.
 */
function shareOfDay(here: ExchangeFor, water: ByTracked<number>) {
  const { constants, state } = here;
  return judged(here).flatMap(({ name, carried: { value } }) => {
    const which = water[name] < value ? "fall" : "rise";
    const limit = limitAt(constants.facts, name, which, "hand", state.minute, null);
    const whole = Math.abs(value - water[name]);
    return limit && whole > 0 ? [{ name, most: Math.max(0, limit.value) / whole }] : [];
  });
}

function otherMoves(here: ExchangeFor, water: ByTracked<number>, share: number): Exchange["moves"] {
  const { constants, state, parameter } = here;
  return judged(here).flatMap(({ name, carried }) => {
    if (name === parameter) return [];
    const unit = shownIn(constants.facts, name, state.minute, carried.reading);
    const to = carried.value * (1 - share) + water[name] * share;
    return [{ parameter: name, unit, from: carried.value, to }];
  });
}

/** Another parameter that is in its band now would be out of it with so much of this water. */
function spoilsAnother(here: ExchangeFor, water: string, share: number): boolean {
  const { values } = here.constants.waterAt(water, here.state.minute);
  return judged(here).some(({ name, carried, hold }) => {
    if (name === here.parameter || !hold) return false;
    const isIn = (value: number) => value >= hold.low && value <= hold.high;
    return isIn(carried.value) && !isIn(carried.value * (1 - share) + values[name] * share);
  });
}
