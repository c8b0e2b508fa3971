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
  /** After each walk that wasn't overtaken by another change, with the files that changed since the last. */
  readonly walked: (farm: Farm, changed: ReadonlySet<string>) => void;
  /** A walk that didn't come to its end; the next change tries again. */
  readonly failed: (error: unknown) => void;
  readonly progress: (progress: Progress | null) => void;
}

/** Longer than this nothing else is kept waiting, ms. */
export const longestSlice = 8;

/** Lets everything that waits have its turn. */
export const turn = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

export function walkFarm({ moment, walked, failed, progress }: WalkListener): FarmWalk {
  let farm: Farm | null = null;
  let pending = new Map<string, FileChange>();
  let arrivals = 0;
  let running: Promise<Farm> | null = null;

  /** One walk over all that has come in so far. What comes in on the way is left for the next. */
  async function walkOnce(): Promise<Farm> {
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
      began = performance.now();
    }
  }

  /** Walks until nothing has come in meanwhile: a walk that was overtaken is the start of the next, and not told of. */
  async function run(): Promise<Farm> {
    await turn();
    const changed = new Set<string>();
    for (;;) {
      const seen = arrivals;
      for (const file of pending.keys()) changed.add(file);
      farm = await walkOnce();
      if (arrivals !== seen) continue;
      walked(farm, changed);
      return farm;
    }
  }

  const start = (): Promise<Farm> => {
    running ??= run().finally(() => {
      running = null;
      progress(null);
    });
    return running;
  };
  return {
    change: (changes) => {
      // A map of its own: a walk on its way keeps the one that it began with.
      pending = new Map([...pending, ...changes]);
      arrivals += 1;
      start().catch(failed);
    },
    lookAgain: () => {
      arrivals += 1;
      start().catch(failed);
    },
    settled: () => running ?? (farm ? Promise.resolve(farm) : start()),
    last: () => farm,
  };
}
