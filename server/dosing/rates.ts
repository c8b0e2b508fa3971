/** What changes a system's water from one moment to the next: supply, uptake, exchange. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { defaults } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { Source } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import {
  type ByTracked,
  broughtPerLitre,
  byTracked,
  salinityPerGramInLitre,
  type Tracked,
} from "./tracked.ts";
import type { Uptake } from "./uptake.ts";
import type { WaterState } from "./water-state.ts";

/** Litres a day of a solution. */
export interface Flow {
  readonly solution: string;
  readonly litresPerDay: number;
}

/** Steady rates: C' = gain + exchange × (incoming − C), a day. Gain is null where it isn't known. */
export interface Rates {
  readonly gainPerDay: ByTracked<number | null>;
  readonly exchangePerDay: number;
  readonly incoming: ByTracked<number>;
}

/** The sources in force at a minute, in order of declaration. */
export function sourcesAt(
  constants: SystemConstants,
  minute: number,
): readonly { readonly key: string; readonly source: Source }[] {
  return [...constants.facts.sources].flatMap(([key, history]) => {
    const entry = factAt(history, minute);
    return entry ? [{ key, source: entry.value }] : [];
  });
}

/** Minutes a day in which a source may run; hours may run over midnight. */
export function hoursOpen(source: Source): number {
  if (source.device === "hand") return defaults.handHours.value;
  if (!source.hours) return minutesPerDay;
  const { from, to } = source.hours;
  const length = to > from ? to - from : to + minutesPerDay - from;
  return Math.min(length, minutesPerDay);
}

/** What a pump can give a day within its hours, L; null by hand. */
export const capacityLPerDay = (source: Source): number | null =>
  source.flowLPerDay === null ? null : (source.flowLPerDay * hoursOpen(source)) / minutesPerDay;

/** What a source gives a day as things are set: what always runs at least, what it can at most, nothing while it is stopped. */
export function litresSet(state: WaterState, key: string, source: Source): number {
  if (state.stopped.has(key)) return 0;
  const asked = Math.max(state.set.get(key) ?? 0, source.alwaysLPerDay);
  return Math.min(asked, capacityLPerDay(source) ?? asked);
}

/** All flows as set. */
export const flowsSet = (constants: SystemConstants, state: WaterState, minute: number): Flow[] =>
  sourcesAt(constants, minute).map(({ key, source }) => ({
    solution: source.solution,
    litresPerDay: litresSet(state, key, source),
  }));

/** What the top-off container brings: what evaporates, with its solution; none where it holds fresh water. */
export function topOffFlow(constants: SystemConstants, minute: number): Flow | null {
  const topOff = factAt(constants.facts.topOff, minute)?.value;
  const evaporates = factAt(constants.facts.evaporatesLPerDay, minute)?.value;
  return topOff?.solution && evaporates ? { solution: topOff.solution, litresPerDay: evaporates } : null;
}

/** The rates with these flows, at a minute. A flow of unknown strength leaves its parameters out, it is told elsewhere. */
export function ratesWith(
  constants: SystemConstants,
  minute: number,
  litres: number,
  uptake: Uptake,
  flows: readonly Flow[],
): Rates {
  const through = factAt(constants.facts.flowsThrough, minute)?.value;
  const supply = (name: Tracked): number =>
    flows.reduce((sum, { solution, litresPerDay }) => {
      const strength = constants.strengthAt(solution, minute);
      return sum + litresPerDay * ((strength && broughtPerLitre(strength, name)) ?? 0);
    }, 0);
  return {
    gainPerDay: byTracked((name) => {
      const taken = takenPerDay(uptake, name);
      return taken === null ? null : (supply(name) - taken) / litres;
    }),
    exchangePerDay: through ? through.litresPerDay / litres : 0,
    incoming: through ? constants.waterAt(through.water, minute).values : byTracked(() => 0),
  };
}

/**
 * What is taken out a day, meq, mg, or salinity × litres for the skeleton laid down. Nobody states what corals
 * take of potassium and strontium, so an unknown uptake of those carries forward as none.
 */
function takenPerDay(uptake: Uptake, name: Tracked): number | null {
  if (name === "salinity") return (uptake.calcificationGPerDay ?? 0) * salinityPerGramInLitre;
  if (name === "potassium" || name === "strontium") return uptake.perDay[name] ?? 0;
  return uptake.perDay[name];
}

/** A value after some days at steady rates: the closed form of C' = gain + exchange × (incoming − C), never below zero. */
export function after(value: number, rates: Rates, name: Tracked, days: number): number {
  const gain = rates.gainPerDay[name] ?? 0;
  const exchange = rates.exchangePerDay;
  if (exchange === 0) return Math.max(0, value + gain * days);
  const settled = rates.incoming[name] + gain / exchange;
  return Math.max(0, settled + (value - settled) * Math.exp(-exchange * days));
}
