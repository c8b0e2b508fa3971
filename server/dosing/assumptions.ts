/** Collects what a result takes for granted, each once. */
import type { Default } from "../culture/defaults.ts";
import type { Assumption } from "../culture/model.ts";

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
