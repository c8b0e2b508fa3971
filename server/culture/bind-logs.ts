/** The logs of all systems → the events of each in order, doubled lines once, readings converted. */

import type { BoundEvent } from "./bind-events.ts";
import { type BoundLog, bindLog, ownNames } from "./bind-log.ts";
import { lineOf, named } from "./binder.ts";
import { type ConvertedLog, convertReads } from "./convert-reads.ts";
import { compareEvents } from "./event-order.ts";
import type { CultureFinding } from "./finding.ts";
import { bindPart, type House } from "./house.ts";
import { sameAtEnd, sameAtStart } from "./keep.ts";
import type { SystemEvent, SystemFacts } from "./model.ts";
import type { Declaration } from "./names.ts";
import { comparePlaces } from "./place.ts";

/** A system with its facts, before its logs are read. */
export interface Founded {
  readonly declaration: Declaration;
  readonly facts: SystemFacts;
}

export interface Logged {
  readonly events: readonly SystemEvent[];
  readonly logFiles: readonly string[];
  /** References of the solutions and waters that its lines name. */
  readonly refersTo: ReadonlySet<string>;
}

/** Reads every log; corals moved from one system arrive in another, so this is done for all together. */
export function* bindLogs(
  house: House,
  founded: ReadonlyMap<string, Founded>,
): Generator<void, ReadonlyMap<string, Logged>> {
  const { keeper, findings } = house;
  const written = new Map(
    [...founded.keys()].map((ref) => [
      ref,
      { parts: [] as (readonly BoundEvent[])[], files: [] as string[], refersTo: new Set<string>() },
    ]),
  );
  for (const [file, document] of house.files) {
    for (const [index, section] of document.sections.entries()) {
      if (section.kind !== "log" || !section.name) continue;
      const { name, headerLine } = section;
      const header = ["log", house.seen.get(file), name.text, name.start, headerLine];
      const ref = bindPart(house, `log ${index} ${file}`, header, (binder) => {
        return named(lineOf(binder(file, name.text), headerLine), name, ["system"])?.ref;
      });
      const log = ref === undefined ? undefined : written.get(ref);
      const system = ref === undefined ? undefined : founded.get(ref);
      if (!log || !system) continue;
      if (!log.files.includes(file)) log.files.push(file);
      const meanings = JSON.stringify([house.seen.get(file), ref, ownNames(system.facts)]);
      const bound = yield* keeper.keepSteps(
        `lines of log ${index} ${file}`,
        [document, meanings],
        (last: BoundLog | undefined) => bindLog(house, file, index, system.facts, meanings, last),
      );
      for (const part of bound.parts) {
        findings.push(...part.findings);
        for (const used of part.used) house.used.add(used);
        for (const named of part.refersTo) log.refersTo.add(named);
      }
      log.parts.push(bound.events);
    }
  }
  const ordered = new Map(
    [...founded].map(([ref, { declaration }]) => {
      const { parts } = written.get(ref)!;
      const lines = keeper.sameList(`lines of ${ref}`, parts.length === 1 ? parts[0]! : parts.flat());
      return [
        ref,
        keeper.keep(`order of ${ref}`, [lines, declaration.name], (last: Ordered | undefined) =>
          inOrderOnce(lines, declaration.name, last),
        ),
      ] as const;
    }),
  );
  for (const { findings: doubled } of ordered.values()) findings.push(...doubled);
  const arrivals = arrive(house, founded, ordered);
  const logged = new Map<string, Logged>();
  for (const [ref, { events }] of ordered) {
    const arriving = keeper.sameList(`arriving ${ref}`, arrivals.get(ref) ?? []);
    const converted = yield* keeper.keepSteps(`readings ${ref}`, [events], (last: ConvertedLog | undefined) =>
      convertReads(events, last),
    );
    for (const { finding } of converted.found) findings.push(finding);
    const all = keeper.keep(`events ${ref}`, [converted.events, arriving], () =>
      arriving.length === 0 ? converted.events : [...converted.events, ...arriving].sort(compareEvents),
    );
    const logFiles = keeper.sameList(`log files ${ref}`, written.get(ref)!.files);
    logged.set(ref, { events: all, logFiles, refersTo: written.get(ref)!.refersTo });
  }
  return logged;
}

type StockEvent = Extract<BoundEvent, { readonly cohort: string }>;

interface Ordered {
  readonly lines: readonly BoundEvent[];
  /** The lines themselves, where they are in order and none is doubled. */
  readonly events: readonly BoundEvent[];
  /** Corals that went to another system. */
  readonly moves: readonly StockEvent[];
  readonly findings: readonly CultureFinding[];
}

/** Events in canonical order. Two lines alike in minute and tidy text are one: a merge may have doubled them. */
function inOrderOnce(lines: readonly BoundEvent[], system: string, last: Ordered | undefined): Ordered {
  const compare = (left: BoundEvent, right: BoundEvent) =>
    compareEvents(left as SystemEvent, right as SystemEvent) || comparePlaces(left.place, right.place);
  const isDouble = (left: BoundEvent, right: BoundEvent) =>
    left.minute === right.minute && left.text === right.text;
  // Where the lines were in order before, only those around the edit are looked at.
  const before = last?.events === last?.lines ? (last?.lines ?? []) : [];
  const head = sameAtStart(before, lines);
  const tail = sameAtEnd(before, lines, Math.min(before.length, lines.length) - head);
  let isInOrder = true;
  for (let index = Math.max(1, head); index < Math.min(lines.length, lines.length - tail + 1); index += 1) {
    const [left, right] = [lines[index - 1]!, lines[index]!];
    isInOrder &&= compare(left, right) < 0 && !isDouble(left, right);
  }
  const isMove = (event: BoundEvent): event is StockEvent => event.kind === "moved";
  if (isInOrder) {
    const edited = [before, lines].some((list) => list.slice(head, list.length - tail).some(isMove));
    const moves = last && before.length > 0 && !edited ? last.moves : lines.filter(isMove);
    return { lines, events: lines, moves, findings: [] };
  }
  const findings: CultureFinding[] = [];
  const events: BoundEvent[] = [];
  for (const event of [...lines].sort(compare)) {
    const kept = events.at(-1);
    if (kept && isDouble(kept, event))
      findings.push({ code: "log/twice", place: event.place, system, first: kept.place });
    else events.push(event);
  }
  return { lines, events, moves: events.filter(isMove), findings };
}

/** Corals moved to a system arrive in its cohort of the same name. */
function arrive(
  { keeper, findings }: House,
  founded: ReadonlyMap<string, Founded>,
  ordered: ReadonlyMap<string, Ordered>,
): ReadonlyMap<string, readonly StockEvent[]> {
  const stocked = keeper.keep("stocked", [], () => new WeakMap<StockEvent, StockEvent>());
  const arrivals = new Map<string, StockEvent[]>();
  for (const [ref, { declaration, facts }] of founded) {
    for (const event of ordered.get(ref)!.moves) {
      const target = event.system === null ? undefined : founded.get(event.system);
      if (event.system === null || !target) continue;
      const here = facts.cohorts.get(event.cohort)?.[0]?.value.count.by;
      const there = target.facts.cohorts.get(event.cohort)?.[0]?.value.count.by;
      if (there !== undefined && there === here) {
        const arrival: StockEvent = stocked.get(event) ?? { ...event, kind: "stocked" };
        stocked.set(event, arrival);
        arrivals.set(event.system, [...(arrivals.get(event.system) ?? []), arrival]);
        continue;
      }
      const why =
        there === undefined
          ? `${target.declaration.name} has no cohort ${event.cohort}, so what they take there isn't counted`
          : `${target.declaration.name} counts ${event.cohort} in ${there === "pieces" ? "pieces" : "an area"}, so what they take there isn't counted`;
      findings.push({ code: "log/no-effect", place: event.place, system: declaration.name, why });
    }
  }
  return arrivals;
}
