/**
 * The fold over a whole log, kept for the next time: with a state every so many events, and what was found at each. After
 * an edit only the events from the last such state before it are folded, until the water is again what it was.
 */
import { minutesPerDay } from "../../grammar/dates.ts";
import { countUpTo } from "../culture/event-order.ts";
import { isAlike, sameAtStart } from "../culture/keep.ts";
import type { FarmModel, System, SystemEvent } from "../culture/model.ts";
import type { ExchangeWater, SystemConstants } from "./constants.ts";
import type { DosingFinding } from "./finding.ts";
import { type Folded, foldEvent, foldUpTo, withReadingsOf } from "./fold.ts";
import { checkDose, type Given, givenBy } from "./log-doses.ts";
import { startState, type WaterState } from "./water-state.ts";

/** The water before an event. */
interface Checkpoint {
  readonly index: number;
  readonly state: WaterState;
  /** What was given within a day before. */
  readonly given: readonly Given[];
}

export interface FoldedLog {
  readonly needs: Needs;
  /** Those that were folded. */
  readonly events: readonly SystemEvent[];
  /** What an exchange with another system's water brought. */
  readonly incoming: ReadonlyMap<SystemEvent, ExchangeWater["values"]>;
  readonly checkpoints: readonly Checkpoint[];
  /** By event; where nothing was found, always the same list. */
  readonly findings: readonly (readonly DosingFinding[])[];
}

/** What the fold rests on beside the events. */
interface Needs {
  readonly ofSystem: readonly unknown[];
  readonly byRef: ReadonlyMap<string, unknown>;
}

/** Events between two checkpoints, and those folded without a pause. */
const eventsApart = 64;
const eventsAtOnce = 16;

const none: readonly DosingFinding[] = [];

/** Folds a system's events up to a minute; what the time before folded and is still so is taken as it is. */
export function* foldLog(
  model: FarmModel,
  system: System,
  constants: SystemConstants,
  at: number,
  last: FoldedLog | null,
): Generator<void, FoldedLog> {
  const events = system.events.slice(0, countUpTo(system.events, at));
  const start = startState(Math.min(system.events[0]?.minute ?? at, at));
  const needs = needsOf(model, system, constants, start.minute);
  const incoming = incomingOf(model, system, events, constants);
  const before = last && isMet(last.needs, model, needs) ? last : null;
  const isSame = (old: SystemEvent, event: SystemEvent): boolean =>
    isAlike(old, event) && (incoming.size === 0 || isAlike(before?.incoming.get(old), incoming.get(event)));

  const old = before?.events ?? [];
  const shift = events.length - old.length;
  const shorter = Math.min(events.length, old.length);
  let head = sameAtStart(incoming.size === 0 ? old : [], events);
  const unmoved = head;
  while (head < shorter && isSame(old[head]!, events[head]!)) head += 1;
  let tail = events.length;
  while (tail > head && tail - shift > head && isSame(old[tail - shift - 1]!, events[tail - 1]!)) tail -= 1;

  const foundBefore = (index: number, event: SystemEvent): readonly DosingFinding[] => {
    const found = before?.findings[index] ?? none;
    return found.length > 0 ? onLineOf(event, found) : none;
  };
  const findings = before?.findings.slice(0, unmoved) ?? [];
  for (let index = unmoved; index < head; index += 1) findings.push(foundBefore(index, events[index]!));
  const checkpoints = before?.checkpoints.filter(({ index }) => index <= head) ?? [];
  const first = checkpoints.at(-1) ?? { index: 0, state: start, given: [] };
  if (checkpoints.length === 0) checkpoints.push(first);
  const laterBefore = new Map(before?.checkpoints.map((checkpoint) => [checkpoint.index, checkpoint]));

  let state = withReadingsOf(first.state, events.slice(0, first.index));
  let given = first.given;
  for (let index = first.index; index < events.length; index += 1) {
    if (index % eventsAtOnce === 0) yield;
    const here: Checkpoint = { index, state, given: ofLastDay(given, state.minute) };
    const there = index >= tail ? laterBefore.get(index - shift) : undefined;
    if (there && isAlike(there.state, state) && isAlike(there.given, here.given)) {
      for (let rest = index; rest < events.length; rest += 1)
        findings.push(foundBefore(rest - shift, events[rest]!));
      for (const later of before?.checkpoints ?? [])
        if (later.index >= there.index) checkpoints.push({ ...later, index: later.index + shift });
      break;
    }
    if (index - checkpoints.at(-1)!.index >= eventsApart) checkpoints.push(here);
    const event = events[index]!;
    const folded = foldEvent(state, event, constants);
    if (index >= head) {
      const earlier = ofLastDay(given, event.minute);
      findings.push(
        isDose(event) ? someOf(checkDose(system.name, constants, { event, ...folded }, earlier)) : none,
      );
    }
    const gives = givenBy(event);
    if (gives.length > 0) given = [...ofLastDay(given, event.minute), ...gives];
    state = folded.after;
  }
  return { needs, events, incoming, checkpoints, findings };
}

/** The water at the minute up to which a log was folded, and the day before it. */
export function foldedAt({ events, checkpoints }: FoldedLog, constants: SystemConstants, at: number): Folded {
  const from = checkpoints.findLast(({ state }) => state.minute <= at - minutesPerDay) ?? checkpoints[0]!;
  const start = withReadingsOf(from.state, events.slice(0, from.index));
  return foldUpTo(start, events.slice(from.index), at, constants);
}

/** All that was found in a log. */
export const foundIn = ({ findings }: FoldedLog): readonly DosingFinding[] =>
  findings.filter((found) => found !== none).flat();

const ofLastDay = (given: readonly Given[], minute: number): readonly Given[] =>
  given.filter((each) => each.minute > minute - minutesPerDay);

type DoseEvent = Parameters<typeof checkDose>[2]["event"];

const isDose = (event: SystemEvent): event is DoseEvent =>
  event.kind === "gave" || event.kind === "topped" || event.kind === "set" || event.kind === "started";

const someOf = (found: readonly DosingFinding[]) => (found.length > 0 ? found : none);

/** Findings of an event, on the line where it stands now. */
function onLineOf({ place }: SystemEvent, findings: readonly DosingFinding[]): readonly DosingFinding[] {
  const { file, line } = place;
  const moved = findings.some((finding) => finding.place.line !== line || finding.place.file !== file);
  return moved
    ? findings.map((finding) => ({ ...finding, place: { ...finding.place, file, line } }))
    : findings;
}

function needsOf(model: FarmModel, system: System, constants: SystemConstants, start: number): Needs {
  const { facts, firstEvent } = constants;
  const flowing = facts.flowsThrough.map(({ value }) => model.systems.get(value.water));
  return {
    ofSystem: [system.name, facts, firstEvent, start, ...flowing],
    byRef: new Map([...system.refersTo].map((ref) => [ref, contentOf(model, ref)])),
  };
}

const contentOf = (model: FarmModel, ref: string): unknown =>
  model.solutions.get(ref)?.strengths ?? model.waters.get(ref)?.values;

/** What is named for the first time changes nothing that was folded before. */
function isMet(needs: Needs, model: FarmModel, now: Needs): boolean {
  return (
    isAlike(needs.ofSystem, now.ofSystem) &&
    [...needs.byRef].every(([ref, content]) => isAlike(content, contentOf(model, ref)))
  );
}

function incomingOf(
  model: FarmModel,
  { refersTo }: System,
  events: readonly SystemEvent[],
  constants: SystemConstants,
): FoldedLog["incoming"] {
  const incoming = new Map<SystemEvent, ExchangeWater["values"]>();
  if (![...refersTo].some((ref) => model.systems.has(ref))) return incoming;
  for (const event of events)
    if (event.kind === "renewed" && model.systems.has(event.water))
      incoming.set(event, constants.waterAt(event.water, event.minute).values);
  return incoming;
}
