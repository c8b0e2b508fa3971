/** A dose that broke a limit, in parts that break none: over the hours of its day, or over several days. */
import { minutesPerDay } from "../../grammar/dates.ts";
import type { SystemConstants } from "./constants.ts";
import { ratesAsSet } from "./fold.ts";
import { limitAt } from "./limits.ts";
import { after } from "./rates.ts";
import type { Split } from "./remedy.ts";
import { broughtPerLitre, type Dosed, dosed } from "./tracked.ts";
import { volumeAt } from "./volume.ts";
import { isStale, type WaterState } from "./water-state.ts";

export interface DoseToSplit {
  readonly minute: number;
  readonly solution: string;
  readonly litres: number;
  /** By parameter, what other doses of the 24 hours before raised it by. */
  readonly others: (name: Dosed) => number;
}

const mostParts = 6;
const mostDays = 7;
/** Doses by hand are given until then, in steps of a quarter of an hour: common practice, no source. */
const lastDoseOfDay = 19 * 60;
const quarter = 15;
const longestStep = 120;
const shortestStep = 30;
/** Two limits that are the same but for the last bits of their conversion are the same. */
const hair = 1e-9;

/** By how much a litre of the solution raises each parameter; empty where that isn't known. */
function raisedPerLitre(constants: SystemConstants, state: WaterState, solution: string, minute: number) {
  const strength = constants.strengthAt(solution, minute);
  const volumeL = volumeAt(constants.facts, state.minute).litres;
  if (!strength || volumeL === null) return [];
  return dosed.flatMap((name) => {
    const perLitre = (broughtPerLitre(strength, name) ?? 0) / volumeL;
    return perLitre > 0 ? [{ name, perLitre }] : [];
  });
}

/** Equal doses on the same day, each within the limits on one dose; null where the day has no room for them. */
export function splitInDay(constants: SystemConstants, state: WaterState, dose: DoseToSplit): Split | null {
  const { minute, solution, litres } = dose;
  const counts = raisedPerLitre(constants, state, solution, minute).flatMap(({ name, perLitre }) => {
    const limit = limitAt(constants.facts, name, "dose", "hand", minute, null);
    return limit ? [Math.ceil((litres * perLitre) / limit.value - hair)] : [];
  });
  const count = Math.max(1, ...counts);
  const ofDay = ((minute % minutesPerDay) + minutesPerDay) % minutesPerDay;
  const room = Math.floor((lastDoseOfDay - ofDay) / (count - 1) / quarter) * quarter;
  const step = Math.min(longestStep, room);
  if (count < 2 || !(count <= mostParts) || step < shortestStep) return null;
  const parts = Array.from({ length: count }, (_, index) => ({
    minute: minute + index * step,
    share: 1 / count,
  }));
  return { over: "day", parts };
}

/**
 * One dose a day, each within the limits on a dose, on a day's rise and on the value; equal ones where they fit.
 * What the corals take in between is counted as at the dose. Null where seven days aren't enough.
 */
export function splitOverDays(
  constants: SystemConstants,
  state: WaterState,
  dose: DoseToSplit,
): Split | null {
  const most = partsOverDays(constants, state, dose, dose.litres);
  if (!most || most.length < 2) return null;
  const equal = partsOverDays(constants, state, dose, dose.litres / most.length);
  const litres = equal?.length === most.length ? equal : most;
  const parts = litres.map((part, day) => ({
    minute: dose.minute + day * minutesPerDay,
    share: part / dose.litres,
  }));
  return { over: "days", parts };
}

/** Litres by day, none above `mostL`; null where they don't come to the whole. */
function partsOverDays(
  constants: SystemConstants,
  state: WaterState,
  { minute, solution, litres, others }: DoseToSplit,
  mostL: number,
): number[] | null {
  const rates = ratesAsSet(state, state.minute, constants);
  if (!rates || !(litres > 0)) return null;
  const limit = (name: Dosed, which: "dose" | "rise" | "max") =>
    limitAt(constants.facts, name, which, "hand", minute, null)?.value ?? Number.POSITIVE_INFINITY;
  const raised = raisedPerLitre(constants, state, solution, minute).map(({ name, perLitre }) => {
    const carried = state.carried[name];
    const gain = rates.gainPerDay[name];
    const knowsRise = gain !== null || name !== "alkalinity";
    return {
      ...{ name, perLitre, dose: limit(name, "dose"), max: limit(name, "max") },
      rise: knowsRise ? limit(name, "rise") - (gain ?? 0) : Number.POSITIVE_INFINITY,
      value: carried && !isStale(carried, minute) ? carried.value : null,
    };
  });
  const parts: number[] = [];
  let left = litres;
  for (let day = 0; day < mostDays; day += 1) {
    const rooms = raised.map(({ name, perLitre, dose, rise, max, value }) => {
      const ofDay = rise - (day === 0 ? others(name) : 0);
      return Math.min(dose, ofDay, value === null ? Number.POSITIVE_INFINITY : max - value) / perLitre;
    });
    const part = Math.min(left, mostL * (1 + hair), ...rooms.map((room) => room * (1 + hair)));
    if (!(part > 0)) return null;
    parts.push(part);
    left -= part;
    if (left <= litres * hair * 10) return parts;
    for (const each of raised)
      if (each.value !== null) each.value = after(each.value + part * each.perLitre, rates, each.name, 1);
  }
  return null;
}
