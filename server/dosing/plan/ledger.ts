/** What the corrections planned so far leave free: litres, room under the limits, distances to the aims. */
import { type CutPlan, subsetsOf, wishedRate } from "./cuts.ts";
import { type Room, roomBeside } from "./limits.ts";
import { negligible, type PlanNumbers, rounding, supplyOf } from "./numbers.ts";

export interface Ledger {
  /** Litres a day free at every stage of the cuts. */
  readonly freeLitres: number[];
  readonly rooms: Room[];
  /** What each parameter rises a day at most without corrections, ≥ 0. */
  readonly rising: readonly number[];
  /**
   * What comes in a day beyond the need though it isn't dosed for: it does a part of the correction by itself.
   * Negative where maintenance falls short: the correction makes that good while it runs.
   */
  readonly surplus: readonly number[];
  /** In all, by parameter; what raises and what lowers kept apart, as they may end on different days. */
  readonly broughtUp: number[];
  readonly broughtDown: number[];
  /** Sources that serve a correction already. */
  readonly serving: boolean[];
}

/**
 * The rate takes 7/8 of a day where the aim is the band's lower edge, never less. What side effects of other
 * corrections leave to be given isn't crammed into less either.
 */
const shortestDays = 7 / 8;

export function openLedger(numbers: PlanNumbers, cuts: CutPlan): Ledger {
  const stages = subsetsOf(cuts.wished).map((running) => ({
    states: cuts.states(running),
    litres: cuts.during(running).litres,
  }));
  const anyway = numbers.parameters.map((_, p) =>
    stages.map(({ states, litres }) => states[p]!.passivePerDay + supplyOf(numbers, p, litres)),
  );
  // `max` bounds what a correction brings in all, not its rate: it may be over within the day.
  const rooms = anyway.map((changes, p) => {
    const up = roomBeside(numbers, p, null, Math.max(...changes));
    const downs = stages.map(({ states }, index) => roomBeside(numbers, p, states[p]!.now, changes[index]!));
    const least = downs.reduce((best, room) => (room.down < best.down ? room : best));
    return { ...up, down: least.down, downBy: least.downBy };
  });
  return {
    freeLitres: numbers.ceilingL.map((most, j) => most - Math.max(...stages.map(({ litres }) => litres[j]!))),
    rooms,
    surplus: surplusOf(numbers, cuts),
    rising: anyway.map((changes) => Math.max(0, ...changes)),
    broughtUp: numbers.parameters.map(() => 0),
    broughtDown: numbers.parameters.map(() => 0),
    serving: numbers.sources.map(() => false),
  };
}

/** By how much maintenance misses the need, once all cuts are over. */
function surplusOf(numbers: PlanNumbers, cuts: CutPlan): number[] {
  const { litres } = cuts.during(new Set());
  return numbers.parameters.map(({ needPerDay }, p) => {
    const beyond = needPerDay === null ? 0 : supplyOf(numbers, p, litres) - needPerDay;
    return Math.abs(beyond) > rounding * numbers.dayScale[p]! ? beyond : 0;
  });
}

export function enter(
  numbers: PlanNumbers,
  ledger: Ledger,
  { litres, days }: { readonly litres: readonly number[]; readonly days: number },
): void {
  numbers.parameters.forEach((_, p) => {
    const perDay = supplyOf(numbers, p, litres);
    const room = ledger.rooms[p]!;
    ledger.rooms[p] = {
      ...room,
      up: Math.max(0, room.up - Math.max(0, perDay)),
      down: Math.max(0, room.down - Math.max(0, -perDay)),
    };
    ledger.broughtUp[p]! += Math.max(0, perDay) * days;
    ledger.broughtDown[p]! += Math.min(0, perDay) * days;
  });
  litres.forEach((value, j) => {
    if (value > 0) ledger.serving[j] = true;
  });
}

/**
 * How far below its aim a parameter stands after the corrections so far; or below its greatest value, less
 * what it rises within a day without them, where that is lower.
 */
export function openAmount(numbers: PlanNumbers, ledger: Ledger, p: number): number {
  const { now, aim, max } = numbers.parameters[p]!;
  if (now === null) return 0;
  const reach = max === null ? aim : Math.min(aim, max - ledger.rising[p]!);
  return reach - now - ledger.broughtUp[p]! - ledger.broughtDown[p]!;
}

/** The rate that a correction should have beside what comes in anyway; 0 where none should be planned. */
export function wishedPerDay(numbers: PlanNumbers, ledger: Ledger, p: number): number {
  const { aim, now, low, heldBack } = numbers.parameters[p]!;
  const amount = openAmount(numbers, ledger, p);
  const possible = now !== null && heldBack === null && numbers.raises[p]!.includes(true);
  if (!possible || amount <= negligible(numbers, p)) return 0;
  const whole = Math.min(wishedRate(aim - now, low - now), amount / shortestDays);
  return Math.max(0, whole - ledger.surplus[p]!);
}
