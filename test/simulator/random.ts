/** Chance with a seed: the same seed gives the same numbers on every machine. */

export interface Chance {
  /** Evenly between 0 and 1, neither included. */
  readonly uniform: () => number;
  /** Mean 0, standard deviation 1. */
  readonly normal: () => number;
}

/**
 * Marsaglia 2003, "Xorshift RNGs", J. Stat. Softw. 8 (14): 32 bits, shifts 13, 17, 5. Normal deviates by Box &
 * Muller 1958, Ann. Math. Stat. 29, 610–611.
 */
export function chanceFrom(seed: number): Chance {
  // Seeds near each other must not start near each other, and 0 would stay 0.
  let state = Math.imul(seed ^ 0x5bd1e995, 0x9e3779b1) | 1;
  const next = (): number => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return state >>> 0;
  };
  for (let warmUp = 0; warmUp < 16; warmUp++) next();
  const uniform = () => (next() + 0.5) / 4294967296;
  const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
  return { uniform, normal };
}
