/** One farm kept walked: changes come in at any time, the newest answer goes out, long walks leave room for others. */
import { advanceBySystem, type Farm, type FileChange, type Moment, type Progress } from "../farm.ts";

export interface FarmWalk {
  /** Takes in changes; the walk begins as soon as what already arrived is read. */
  readonly change: (changes: Iterable<readonly [string, FileChange]>) => void;
  /** Looks again at the moment that it is. */
  readonly lookAgain: () => void;
  /** The farm after everything that came in so far. */
  readonly settled: () => Promise<Farm>;
  /** The last answer, which may be older than what came in; null before the first. */
  readonly last: () => Farm | null;
}

export interface WalkListener {
  readonly moment: () => Moment;
  /** After each walk that wasn't overtaken by another change. */
  readonly walked: (farm: Farm, before: Farm | null, changed: ReadonlySet<string>) => void;
  readonly progress: (progress: Progress | null) => void;
}

/** Longer than this nothing else is kept waiting, ms. */
export const longestSlice = 8;

/** Lets everything that waits have its turn. */
export const turn = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

export function walkFarm({ moment, walked, progress }: WalkListener): FarmWalk {
  let farm: Farm | null = null;
  let pending = new Map<string, FileChange>();
  let arrivals = 0;
  let running: Promise<Farm> | null = null;

  /** One walk over all that has come in; null where something else came in on the way. */
  async function walkOnce(): Promise<Farm | null> {
    const seen = arrivals;
    const changes = pending;
    const steps = advanceBySystem(farm, changes, moment());
    let began = performance.now();
    for (;;) {
      const step = steps.next();
      if (step.done) {
        pending = new Map([...pending].filter(([file, change]) => changes.get(file) !== change));
        return step.value;
      }
      if (performance.now() - began < longestSlice) continue;
      progress(step.value);
      await turn();
      if (arrivals !== seen) return null;
      began = performance.now();
    }
  }

  async function run(): Promise<Farm> {
    await turn();
    for (;;) {
      const seen = arrivals;
      const changed = new Set(pending.keys());
      const next = await walkOnce();
      if (!next) continue;
      const before = farm;
      farm = next;
      if (arrivals !== seen) continue;
      running = null;
      progress(null);
      walked(next, before, changed);
      return next;
    }
  }

  const start = (): Promise<Farm> => {
    running ??= run();
    return running;
  };
  return {
    change: (changes) => {
      // A map of its own: a walk on its way keeps the one that it began with.
      pending = new Map([...pending, ...changes]);
      arrivals += 1;
      void start();
    },
    lookAgain: () => {
      arrivals += 1;
      void start();
    },
    settled: () => running ?? (farm ? Promise.resolve(farm) : start()),
    last: () => farm,
  };
}
