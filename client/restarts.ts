/** How often a server that ends by itself is started again. No VS Code in here. */

const most = 4;
const withinMs = 3 * 60_000;

/** Counts ends; true where it may be started again: not when it has ended too often within a few minutes. */
export function restarts(): (nowMs: number) => boolean {
  let ends: readonly number[] = [];
  return (nowMs) => {
    ends = [...ends.filter((before) => nowMs - before < withinMs), nowMs];
    return ends.length <= most;
  };
}
