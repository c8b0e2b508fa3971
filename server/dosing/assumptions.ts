/** Collects what a result takes for granted, each once. */

import { minutesPerDay } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import { type Default, defaults } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { Assumption, DisplayUnit, ReadEvent, System, SystemEvent } from "../culture/model.ts";
import { isRead, seenIn } from "../culture/readings.ts";

export interface Assuming {
  /** Lists a default as used and gives its value. */
  readonly use: (entry: Default) => number;
  /** True where it wasn't listed before. */
  readonly add: (assumption: Assumption) => boolean;
  readonly all: () => readonly Assumption[];
}

export function assuming(): Assuming {
  const list = new Map<string, Assumption>();
  const add = (assumption: Assumption) => {
    const key = `${assumption.what}\n${assumption.value}`;
    const isNew = !list.has(key);
    if (isNew) list.set(key, assumption);
    return isNew;
  };
  return {
    use: ({ what, value, text, basis }) => {
      add({ what, value: text, basis });
      return value;
    },
    add,
    all: () => [...list.values()],
  };
}

/** Lists the salinity and temperature with which what is written for a kilogram was turned, where they are defaults. */
export function assumeDensity({ facts, events }: System, at: number, assumed: Assuming): void {
  const perKilogram = ({ unit }: { readonly unit: DisplayUnit }) => unit.spelling.includes("/kg");
  const held = [...facts.holds.values()].flatMap((history) => factAt(history, at)?.value ?? []);
  for (const parameter of ["salinity", "temperature"] as const) {
    const isDefault =
      hasReadBefore(events, at, parameter, ({ values }) => Object.values(values).some(perKilogram)) ||
      (!facts.holds.has(parameter) && held.some(perKilogram));
    if (isDefault) assumed.use(defaults[parameter]);
  }
}

/** True where such a line was read before any value of a parameter that could belong to it. */
function hasReadBefore(
  events: readonly SystemEvent[],
  at: number,
  parameter: ParameterName,
  isSuch: (event: ReadEvent) => boolean,
): boolean {
  let first = at;
  for (const event of events) {
    if (event.minute > at) break;
    if (!isRead(event) || seenIn([event], parameter).length === 0) continue;
    first = event.minute - minutesPerDay - 1;
    break;
  }
  for (const event of events) {
    if (event.minute > first) return false;
    if (isRead(event) && isSuch(event)) return true;
  }
  return false;
}
