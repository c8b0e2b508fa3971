/** The events of a system's logs: names bound, volumes in litres, readings still to be converted. */

import { nearestWords } from "../../grammar/nearest.ts";
import type { Event, LogEvent, Word } from "../../grammar/syntax.ts";
import { writeStatement } from "../../grammar/write.ts";
import { stockCount } from "./bind-cohort.ts";
import { aboveZero, type Line, named, placeOf, positive } from "./binder.ts";
import type { OwnKind } from "./finding.ts";
import { factAt } from "./history.ts";
import type { EventHead, SystemEvent, SystemFacts } from "./model.ts";
import type { Place } from "./place.ts";
import { type PendingRead, takeReadItems } from "./readings.ts";

export type BoundEvent = Exclude<SystemEvent, { kind: "read" }> | PendingRead;

/** What an event may name in its system. */
export interface OwnNames {
  readonly facts: SystemFacts;
}

/** Binds one event line; null where it can't count. */
export function bindEvent(line: Line, event: Event, own: OwnNames): BoundEvent | null {
  const head: EventHead = {
    minute: event.at.minute,
    timeKnown: event.at.timeKnown,
    place: placeOf(line, null),
    text: writeStatement(event),
    by: event.by?.text ?? null,
  };
  switch (event.kind) {
    case "read": {
      const pending = takeReadItems(line, event.items);
      if (!pending) return null;
      const kit = event.kit && named(line, event.kit, ["kit"]);
      if (event.disregard) {
        const reason = event.disregard.text;
        line.report({
          code: "reading/disregarded",
          place: placeOf(line, event.disregard),
          system: line.system,
          reason,
        });
      }
      return {
        ...head,
        kind: "read",
        pending,
        system: line.system,
        disregard: event.disregard,
        kit: kit?.ref ?? null,
      };
    }
    case "set":
      return bindSet(line, event.items, own, head);
    case "gave": {
      const doses = event.items.map(({ name, quantity, start, end }) => {
        const solution = named(line, name, ["solution"]);
        const litres = positive(line, quantity, "volume");
        return solution && litres !== null
          ? { solution: solution.ref, litres, place: placeOf(line, { start, end }) }
          : null;
      });
      return isWhole(doses) ? { ...head, kind: "gave", doses } : null;
    }
    case "renewed": {
      const litres = positive(line, event.volume, "volume");
      const water = named(line, event.water, ["saltwater", "system"]);
      return litres !== null && water ? { ...head, kind: "renewed", litres, water: water.ref } : null;
    }
    case "topped": {
      const litres = positive(line, event.volume, "volume");
      const solution = event.solution && named(line, event.solution, ["solution"]);
      if (litres === null || (event.solution && !solution)) return null;
      return { ...head, kind: "topped", litres, solution: solution?.ref ?? null };
    }
    case "stocked":
    case "removed":
    case "moved":
      return bindStock(line, event, own, head);
    case "filled":
    case "level": {
      const pump = pumpNamed(line, event.pump, own);
      const litres = positive(line, event.volume, "volume");
      return pump !== null && litres !== null ? { ...head, kind: event.kind, pump, litres } : null;
    }
    case "calibrated": {
      const pump = pumpNamed(line, event.pump, own);
      const litres = positive(line, event.volume, "volume");
      const days = aboveZero(line, event.time, "time");
      return pump !== null && litres !== null && days !== null
        ? { ...head, kind: "calibrated", pump, flowLPerDay: litres / days }
        : null;
    }
    case "stopped":
    case "started": {
      const pump = pumpNamed(line, event.pump, own);
      return pump === null ? null : { ...head, kind: event.kind, pump };
    }
    case "note":
      return { ...head, kind: "note" };
    default:
      // The grammar keeps events of a store or kit out of a log.
      return null;
  }
}

function bindSet(
  line: Line,
  items: Extract<LogEvent, { kind: "set" | "gave" }>["items"],
  own: OwnNames,
  head: EventHead,
): BoundEvent | null {
  const rates = items.map(({ name, quantity, start, end }) => {
    const source = sourceNamed(line, name, own, head.minute);
    const litresPerDay = positive(line, quantity, "flow");
    return source !== null && litresPerDay !== null
      ? { source, litresPerDay, place: placeOf(line, { start, end }) }
      : null;
  });
  return isWhole(rates) ? { ...head, kind: "set", rates } : null;
}

/** A line of several parts counts whole or not at all. */
const isWhole = <T>(parts: readonly (T | null)[]): parts is readonly T[] =>
  parts.every((part) => part !== null);

/** A pump by its name, or the one source that gives a solution at that moment, else at any. */
function sourceNamed(line: Line, word: Word, own: OwnNames, minute: number): string | null {
  if (own.facts.sources.has(word.text)) return word.text;
  const visible = line.names.visible.get(line.file)?.get(word.text);
  if (visible?.kind !== "solution") return pumpNamed(line, word, own);
  line.used.add(visible.ref);
  const all = [...own.facts.sources].flatMap(([key, history]) => {
    const giving = history.some(({ value }) => value.solution === visible.ref);
    return giving ? [{ key, givesNow: factAt(history, minute)?.value.solution === visible.ref }] : [];
  });
  const now = all.filter(({ givesNow }) => givesNow);
  const giving = (now.length > 0 ? now : all).map(({ key }) => key);
  const [only] = giving;
  if (giving.length === 1 && only !== undefined) return only;
  if (giving.length === 0) return undeclared(line, word, ["pump", "source"], [...own.facts.sources.keys()]);
  const severalSources = giving.map((key) => (key.startsWith("hand ") ? "by hand" : key));
  line.report({
    code: "name/undeclared",
    place: placeOf(line, word),
    system: line.system,
    word: word.text,
    severalSources,
  });
  return null;
}

function pumpNamed(line: Line, word: Word, own: OwnNames): string | null {
  if (own.facts.sources.has(word.text)) return word.text;
  const pumps = [...own.facts.sources.keys()].filter((key) => !key.startsWith("hand "));
  return undeclared(line, word, ["pump"], pumps);
}

function undeclared(line: Line, word: Word, wanted: readonly OwnKind[], known: readonly string[]): null {
  line.report({
    code: "name/undeclared",
    place: placeOf(line, word),
    system: line.system,
    word: word.text,
    wanted,
    nearest: nearestWords(word.text, known),
    elsewhere: null,
    standsFor: null,
  });
  return null;
}

type StockEvent = Extract<LogEvent, { kind: "stocked" | "removed" | "moved" }>;

function bindStock(line: Line, event: StockEvent, own: OwnNames, head: EventHead): BoundEvent | null {
  const cohort = own.facts.cohorts.get(event.cohort.text)?.[0];
  if (!cohort) return undeclared(line, event.cohort, ["cohort"], [...own.facts.cohorts.keys()]);
  const target = event.kind === "moved" ? named(line, event.system, ["system"]) : null;
  if (event.kind === "moved" && !target) return null;
  if (event.count.by !== cohort.value.count.by) {
    const why = `cohort ${event.cohort.text} is counted in ${cohort.value.count.by === "pieces" ? "pieces" : "an area"}`;
    line.report({ code: "log/no-effect", place: placeOf(line, null), system: line.system, why });
    return null;
  }
  const count = stockCount(line, event.count);
  if (count === null) return null;
  return { ...head, kind: event.kind, cohort: event.cohort.text, count, system: target?.ref ?? null };
}

/** The same event on another line. What it says of its own line is all that it says of where it stands. */
export function onLine(event: BoundEvent, line: number): BoundEvent {
  const placed = <T extends { readonly place: Place }>(part: T): T => ({
    ...part,
    place: { ...part.place, line },
  });
  if (event.kind === "gave") return { ...placed(event), doses: event.doses.map(placed) };
  if (event.kind === "set") return { ...placed(event), rates: event.rates.map(placed) };
  return placed(event);
}
