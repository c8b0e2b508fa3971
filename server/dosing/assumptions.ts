/** Collects what a result takes for granted, each once. */

import { type Default, defaults } from "../culture/defaults.ts";
import { factAt } from "../culture/history.ts";
import type { Assumption, DisplayUnit, ReadEvent, System } from "../culture/model.ts";
import { nearestKnown, seenIn } from "../culture/readings.ts";

export interface Assuming {
  /** Lists a default as used and gives its value. */
  readonly use: (entry: Default) => number;
  readonly add: (assumption: Assumption) => void;
  readonly all: () => readonly Assumption[];
}

export function assuming(): Assuming {
  const list = new Map<string, Assumption>();
  const add = (assumption: Assumption) => {
    const key = `${assumption.what}\n${assumption.value}`;
    if (!list.has(key)) list.set(key, assumption);
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
  const reads = events.filter((event): event is ReadEvent => event.kind === "read" && event.minute <= at);
  const inKilograms = reads.filter(({ values }) => Object.values(values).some(perKilogram));
  const held = [...facts.holds.values()].flatMap((history) => factAt(history, at)?.value ?? []);
  for (const parameter of ["salinity", "temperature"] as const) {
    const seen = seenIn(reads, parameter);
    const isDefault =
      inKilograms.some(({ minute }) => nearestKnown(seen, minute, 0).from === "default") ||
      (!facts.holds.has(parameter) && held.some(perKilogram));
    if (isDefault) assumed.use(defaults[parameter]);
  }
}
