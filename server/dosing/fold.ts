/** The log as a fold: a state, an event, the next state. What comes in between is carried forward in closed form. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { countUpTo } from "../culture/event-order.ts";
import { factAt } from "../culture/history.ts";
import type { ReadEvent, ReadValue, SystemEvent } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import { after, type Flow, flowsSet, type Rates, ratesWith, topOffFlow } from "./rates.ts";
import { type ByTracked, broughtPerLitre, byTracked, type Tracked, tracked } from "./tracked.ts";
import { meanUptake, type Uptake, uptakeAt } from "./uptake.ts";
import { volumeAt } from "./volume.ts";
import { type Carried, carriedMinutes, startState, type WaterState } from "./water-state.ts";

/** A dose of the log, or a change of what pumps give, with the water before and after it. */
export interface DoseInLog {
  readonly event: Extract<SystemEvent, { kind: "gave" | "topped" | "set" | "stopped" | "started" }>;
  readonly before: WaterState;
  readonly after: WaterState;
}

/** A time between two events, with the state that it began with. */
export interface Span {
  readonly state: WaterState;
  readonly from: number;
  readonly to: number;
}

export interface Folded {
  readonly state: WaterState;
  /** The spans of the 24 hours before the moment asked. */
  readonly lastDay: readonly Span[];
}

/** One event: the water carried to it, and what it does. */
export function foldEvent(
  state: WaterState,
  event: SystemEvent,
  constants: SystemConstants,
): { readonly before: WaterState; readonly after: WaterState } {
  const before = carryTo(state, event.minute, constants);
  return { before, after: happen(before, event, constants) };
}

/**
 * Folds events, the last of a log, onto a state before the 24 hours that end at a minute, or before the whole log;
 * and carries the water to that minute.
 */
export function foldUpTo(
  start: WaterState,
  events: readonly SystemEvent[],
  at: number,
  constants: SystemConstants,
): Folded {
  let state = start;
  const dayBefore = at - minutesPerDay;
  const lastDay: Span[] = [];
  const watch = (from: number, to: number) => {
    const since = Math.max(from, dayBefore);
    if (to > since) lastDay.push({ state, from: since, to });
  };
  // Before the log begins the stock is as declared.
  watch(dayBefore, state.minute);
  for (const event of events) {
    watch(state.minute, event.minute);
    state = foldEvent(state, event, constants).after;
  }
  watch(state.minute, at);
  return { state: carryTo(state, at, constants), lastDay };
}

/** Folds all events up to a minute, and carries the water to it. Later events wait silently. */
export function foldEvents(constants: SystemConstants, events: readonly SystemEvent[], at: number): Folded {
  const start = startState(Math.min(events[0]?.minute ?? at, at));
  return foldUpTo(start, events.slice(0, countUpTo(events, at)), at, constants);
}

/** Uptake over the 24 hours before a moment, piece by piece between events and changes of facts. */
export function uptakeOfLastDay(constants: SystemConstants, lastDay: readonly Span[], now: Uptake): Uptake {
  const { facts, changes, firstEvent } = constants;
  const pieces = lastDay.flatMap(({ state, from, to }) => {
    const edges = [from, ...changes.filter((change) => change > from && change < to), to];
    return edges.slice(1).flatMap((end, index) => {
      const middle = (edges[index]! + end) / 2;
      const { litres } = volumeAt(facts, middle);
      const days = (end - edges[index]!) / minutesPerDay;
      return litres === null ? [] : [{ uptake: uptakeAt(facts, state, middle, litres, firstEvent), days }];
    });
  });
  return meanUptake(pieces, now);
}

/** The water carried to a later minute, piece by piece between the changes of its facts. */
function carryTo(state: WaterState, minute: number, constants: SystemConstants): WaterState {
  if (minute <= state.minute) return state;
  let { carried } = state;
  let from = state.minute;
  for (const change of changesBetween(state, minute, constants)) {
    carried = carryPiece({ ...state, minute: from, carried }, change, constants);
    from = change;
  }
  carried = carryPiece({ ...state, minute: from, carried }, minute, constants);
  return { ...state, minute, carried };
}

/**
 * The minutes at which a fact changes or a value ceases to be carried. Growth is taken at the middle of a piece,
 * so where corals grow no piece is longer than a day: then that is good to a hundred-thousandth
 * of what they take.
 */
function changesBetween(state: WaterState, minute: number, { changes, grows }: SystemConstants): number[] {
  const ends = tracked.flatMap((name) => {
    const carried = state.carried[name];
    return carried ? [carried.readAt + carriedMinutes] : [];
  });
  const days: number[] = [];
  const last = Math.min(minute, Math.max(...ends));
  if (grows) for (let day = state.minute + minutesPerDay; day < last; day += minutesPerDay) days.push(day);
  const within = [...changes, ...ends, ...days].filter((change) => change > state.minute && change < minute);
  return [...new Set(within)].sort((left, right) => left - right);
}

function carryPiece(state: WaterState, to: number, constants: SystemConstants): ByTracked<Carried | null> {
  if (tracked.every((name) => !state.carried[name])) return state.carried;
  const rates = ratesAsSet(state, (state.minute + to) / 2, constants);
  if (!rates) return state.carried;
  return byTracked((name) => {
    const carried = state.carried[name];
    if (!carried) return null;
    const until = Math.min(to, carried.readAt + carriedMinutes);
    if (until <= state.minute) return carried;
    return { ...carried, value: after(carried.value, rates, name, (until - state.minute) / minutesPerDay) };
  });
}

/** Rates with everything as it is set; null where the system's volume isn't known. */
export function ratesAsSet(state: WaterState, minute: number, constants: SystemConstants): Rates | null {
  const topOff = topOffFlow(constants, minute);
  const flows = flowsSet(constants, state, minute);
  return ratesAt(state, minute, constants, topOff ? [...flows, topOff] : flows);
}

/** Rates with given flows; null where the system's volume isn't known. */
export function ratesAt(
  state: WaterState,
  minute: number,
  constants: SystemConstants,
  flows: readonly Flow[],
): Rates | null {
  const { litres } = volumeAt(constants.facts, minute);
  if (litres === null) return null;
  const uptake = uptakeAt(constants.facts, state, minute, litres, constants.firstEvent);
  return ratesWith(constants, minute, litres, uptake, flows);
}

/** What an event does to the water, at its moment. */
function happen(state: WaterState, event: SystemEvent, constants: SystemConstants): WaterState {
  switch (event.kind) {
    case "read":
      return readInto(state, event);
    case "set": {
      const set = new Map(state.set);
      for (const { source, litresPerDay } of event.rates) set.set(source, litresPerDay);
      return { ...state, set };
    }
    case "gave":
      return event.doses.reduce(
        (next, { solution, litres }) => give(next, solution, litres, constants),
        state,
      );
    case "topped":
      return event.solution ? give(state, event.solution, event.litres, constants) : state;
    case "renewed":
      return renew(state, event.water, event.litres, constants);
    case "stocked":
    case "removed":
    case "moved":
      return restock(state, event.cohort, event.kind === "stocked" ? event.count : -event.count, constants);
    case "stopped":
      return { ...state, stopped: new Set([...state.stopped, event.pump]) };
    case "started":
      return { ...state, stopped: new Set([...state.stopped].filter((pump) => pump !== event.pump)) };
    default:
      return state;
  }
}

/** What a reading says of a parameter, where it counts. */
const usable = (event: ReadEvent, name: keyof ReadEvent["values"]): ReadValue | null => {
  const value = event.values[name];
  return value && !event.disregarded && !value.impossible && !value.below ? value : null;
};

/** A reading stands as read. */
function readInto(state: WaterState, event: ReadEvent): WaterState {
  const carried = byTracked((name: Tracked): Carried | null => {
    const reading = usable(event, name);
    return reading ? { value: reading.value, readAt: event.minute, reading } : state.carried[name];
  });
  const pH = usable(event, "pH");
  const temperature = usable(event, "temperature");
  return {
    ...state,
    carried,
    pH: pH ? { minute: event.minute, reading: pH } : state.pH,
    unanswered: pH ? [] : state.unanswered,
    temperature: temperature ? { minute: event.minute, value: temperature.value } : state.temperature,
  };
}

/** A state after some events, with its readings as they are told in these: their lines may have moved since. */
export function withReadingsOf(state: WaterState, events: readonly SystemEvent[]): WaterState {
  const found = (name: keyof ReadEvent["values"], minute: number): ReadValue | null => {
    for (let index = countUpTo(events, minute) - 1; events[index]?.minute === minute; index -= 1) {
      const event = events[index]!;
      const reading = event.kind === "read" ? usable(event, name) : null;
      if (reading) return reading;
    }
    return null;
  };
  const carried = byTracked((name: Tracked): Carried | null => {
    const old = state.carried[name];
    return old && { ...old, reading: found(name, old.readAt) ?? old.reading };
  });
  const { pH } = state;
  return { ...state, carried, pH: pH && { ...pH, reading: found("pH", pH.minute) ?? pH.reading } };
}

const isCarried = (carried: Carried | null, minute: number): carried is Carried =>
  carried !== null && minute - carried.readAt <= carriedMinutes;

/** What a solution brings at once; the water it comes with makes up for evaporation later. */
export function give(
  state: WaterState,
  solution: string,
  litres: number,
  constants: SystemConstants,
): WaterState {
  const strength = constants.strengthAt(solution, state.minute);
  const volume = volumeAt(constants.facts, state.minute).litres;
  if (!strength || volume === null) return state;
  const { alkalinityMeq, carbonMmol } = strength;
  const counts = alkalinityMeq !== null && carbonMmol !== null && alkalinityMeq !== 0;
  const perLitre = (1000 * litres) / volume;
  const brought = {
    minute: state.minute,
    alkalinityMeqPerL: perLitre * (alkalinityMeq ?? 0),
    carbonMmolPerL: perLitre * (carbonMmol ?? 0),
  };
  return {
    ...state,
    unanswered: counts ? [...ofLastDay(state), brought] : state.unanswered,
    carried: byTracked((name) => {
      const carried = state.carried[name];
      if (!isCarried(carried, state.minute)) return carried;
      const brought = (litres * (broughtPerLitre(strength, name) ?? 0)) / volume;
      return { ...carried, value: Math.max(0, carried.value + brought) };
    }),
  };
}

const ofLastDay = ({ unanswered, minute }: WaterState) =>
  unanswered.filter((brought) => minute - brought.minute <= minutesPerDay);

/** Drained, then filled. */
function renew(state: WaterState, water: string, litres: number, constants: SystemConstants): WaterState {
  const volume = volumeAt(constants.facts, state.minute).litres;
  if (volume === null) return state;
  const share = Math.min(1, litres / volume);
  const incoming = constants.waterAt(water, state.minute).values;
  return {
    ...state,
    unanswered: ofLastDay(state).map(({ minute, alkalinityMeqPerL, carbonMmolPerL }) => ({
      minute,
      alkalinityMeqPerL: alkalinityMeqPerL * (1 - share),
      carbonMmolPerL: carbonMmolPerL * (1 - share),
    })),
    carried: byTracked((name) => {
      const carried = state.carried[name];
      if (!isCarried(carried, state.minute)) return carried;
      return { ...carried, value: carried.value * (1 - share) + incoming[name] * share };
    }),
  };
}

function restock(state: WaterState, cohort: string, change: number, constants: SystemConstants): WaterState {
  const entry = factAt(constants.facts.cohorts.get(cohort), state.minute);
  // What came and went before a count was made is in it.
  if (!entry) return state;
  const before = state.stock.get(cohort);
  const counted = before && before.from === entry.from ? before.change : 0;
  const { count } = entry.value;
  const declared = count.by === "pieces" ? count.number : count.squareMetres;
  // No more can go than are there: what comes later adds to none.
  const left = Math.max(-declared, counted + change);
  return { ...state, stock: new Map(state.stock).set(cohort, { from: entry.from, change: left }) };
}
