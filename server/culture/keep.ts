/**
 * What one walk keeps for the next. Each part of the walk says what it is worked out from; where those are the same
 * values as the last time, so is the result. Nothing is ever changed by keeping: a walk begins with the last one's
 * results and hands on those that it asked for, so that what nobody asks for any more is gone.
 */

/** Results by key, each with what it was worked out from. */
export type Kept = ReadonlyMap<string, { readonly inputs: readonly unknown[]; readonly result: unknown }>;

export interface Keeper {
  /** The last result under a key where its inputs are the same values, else the work's; it may start from the last. */
  readonly keep: <T>(key: string, inputs: readonly unknown[], work: (before: T | undefined) => T) => T;
  /** The same for work that can be interrupted. */
  readonly keepSteps: <T>(
    key: string,
    inputs: readonly unknown[],
    work: (before: T | undefined) => Generator<void, T>,
  ) => Generator<void, T>;
  /** The last list under a key where it holds the same values, so that the list itself is the same value. */
  readonly sameList: <T>(key: string, list: readonly T[]) => readonly T[];
  /** What was asked for so far, for the next walk. */
  readonly kept: Kept;
}

export function keeper(before: Kept | null): Keeper {
  const kept = new Map<string, { readonly inputs: readonly unknown[]; readonly result: unknown }>();
  const keep = <T>(key: string, inputs: readonly unknown[], work: (last: T | undefined) => T): T => {
    const last = before?.get(key);
    const result = last && holdSame(last.inputs, inputs) ? (last.result as T) : work(last?.result as T);
    kept.set(key, { inputs, result });
    return result;
  };
  return {
    keep,
    *keepSteps<T>(
      key: string,
      inputs: readonly unknown[],
      work: (last: T | undefined) => Generator<void, T>,
    ) {
      const last = before?.get(key);
      const isSame = last && holdSame(last.inputs, inputs);
      const result = isSame ? (last.result as T) : yield* work(last?.result as T | undefined);
      kept.set(key, { inputs, result });
      return result;
    },
    sameList: (key, list) => keep(key, list, () => list),
    kept,
  };
}

const holdSame = (left: readonly unknown[], right: readonly unknown[]): boolean =>
  left.length === right.length && sameAtStart(left, right) === left.length;

/** Work is interrupted after so many lines or events: of the slowest, some milliseconds' worth. */
export const linesAtOnce = 64;

/**
 * Finds in a list what stood there before an edit: at the same index counted from its start, else from its end. Nothing
 * that moved otherwise is found; it is worked out again.
 */
export function fromEitherEnd<T>(
  before: readonly T[],
  length: number,
  index: number,
  isIt: (candidate: T) => boolean,
): T | undefined {
  const same = before[index];
  if (same !== undefined && isIt(same)) return same;
  const moved = before[index + before.length - length];
  return moved !== undefined && isIt(moved) ? moved : undefined;
}

/** How many values at the start of two lists are the same. */
export function sameAtStart(left: readonly unknown[], right: readonly unknown[]): number {
  const most = Math.min(left.length, right.length);
  let count = 0;
  while (count < most && left[count] === right[count]) count += 1;
  return count;
}

/** How many values at the end of two lists are the same, no more than so many. */
export function sameAtEnd(left: readonly unknown[], right: readonly unknown[], most: number): number {
  let count = 0;
  while (count < most && left[left.length - 1 - count] === right[right.length - 1 - count]) count += 1;
  return count;
}

/** Does interruptible work in one go. */
export function inOneGo<T>(steps: Generator<unknown, T>): T {
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** True where two plain values say the same, wherever they stand: `place` doesn't count. */
export function isAlike(left: unknown, right: unknown): boolean {
  if (Object.is(left, right)) return true;
  if (typeof left !== "object" || typeof right !== "object" || !left || !right) return false;
  if (left instanceof Map || left instanceof Set)
    return left.constructor === right.constructor && isAlike([...left], [...(right as Set<unknown>)]);
  if (Array.isArray(left))
    return (
      Array.isArray(right) &&
      left.length === right.length &&
      left.every((value, index) => isAlike(value, right[index]))
    );
  const keys = Object.keys(left);
  return (
    keys.length === Object.keys(right).length &&
    keys.every(
      (key) =>
        key === "place" ||
        isAlike((left as Record<string, unknown>)[key], (right as Record<string, unknown>)[key]),
    )
  );
}
