/** Whether salinity, not dosing, puts a parameter outside its band. */
import { densityOf } from "../culture/binder.ts";

export interface SalinityJudgement {
  /** The value at the salinity aim. */
  readonly scaled: number;
  /** It is outside its band and would be inside at the salinity aim. */
  readonly isTheCause: boolean;
  /** It is inside its band only because salinity is off. */
  readonly hidesIt: boolean;
}

interface Band {
  readonly low: number;
  readonly high: number;
  readonly aim: number;
}

const inside = (value: number, { low, high }: Band): boolean => value >= low && value <= high;

/**
 * A dissolved parameter, per litre, at the salinity aim: in proportion, per kilogram. Null where salinity is
 * inside its own band: then nothing is scaled.
 */
export function judgeSalinity(
  value: number,
  band: Band,
  salinity: number,
  salinityBand: Band,
  temperatureDegC: number,
): SalinityJudgement | null {
  if (inside(salinity, salinityBand) || salinity <= 0) return null;
  const density = (at: number) => densityOf({ salinity: at, temperatureDegC });
  const scaled = (value * (salinityBand.aim / salinity) * density(salinityBand.aim)) / density(salinity);
  return {
    scaled,
    isTheCause: !inside(value, band) && inside(scaled, band),
    hidesIt: inside(value, band) && !inside(scaled, band),
  };
}
