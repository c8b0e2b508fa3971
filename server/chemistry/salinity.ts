/** Practical salinity from what hydrometers, refractometers and conductivity meters read, and back. */
import { risingRoot } from "./bracketed-root.ts";
import { celsiusIpts68, densityKgPerL } from "./sea-water.ts";

export type SalinityReading =
  | { readonly ok: true; readonly salinity: number }
  | { readonly ok: false; readonly reason: "not-a-number" | "below-fresh-water" | "beyond-any-sea-water" };

/** Highest salinity looked for; far past what is possible in a culture system, so that the range can be told. */
const highestSalinity = 120;
/** Salinity is found to this width. */
const salinityWidth = 1e-11;

/** Temperatures, °C, of the specific gravity scales in use: sample and fresh water both at this temperature. */
export const specificGravityScales = {
  "25/25 °C": 25,
  "20/20 °C": 20,
  "60/60 °F": (60 - 32) / 1.8,
} as const;

export type SpecificGravityScale = keyof typeof specificGravityScales;

/** Density of sea water at one temperature over that of fresh water at another (EOS-80), no unit. */
export function specificGravity(salinity: number, sampleDegC: number, referenceDegC: number): number {
  return densityKgPerL(salinity, sampleDegC) / densityKgPerL(0, referenceDegC);
}

/** Practical salinity of water with this specific gravity, by inverting EOS-80 (Millero & Poisson 1981). */
export function salinityFromSpecificGravity(gravity: number, scale: SpecificGravityScale): SalinityReading {
  const celsius = specificGravityScales[scale];
  return invert((salinity) => specificGravity(salinity, celsius, celsius), gravity);
}

/** Conductivity of standard sea water (35, 15 °C IPTS-68), mS/cm: Culkin & Smith 1980, IEEE J. Ocean. Eng. 5, 22–23. */
export const standardConductivityMsPerCm = 42.914;

/** Where the practical salinity scale holds. */
export const practicalSalinityRange = { salinity: [2, 42], celsius: [-2, 35] } as const;

const a = [0.008, -0.1692, 25.3851, 14.0941, -7.0261, 2.7081] as const;
const b = [0.0005, -0.0056, -0.0066, -0.0375, 0.0636, -0.0144] as const;
const k = 0.0162;

/** Conductivity of standard sea water at this temperature over that at 15 °C, no unit; temperature on IPTS-68. */
function standardRatio(celsius68: number): number {
  const t = celsius68;
  return 0.6766097 + t * (2.00564e-2 + t * (1.104259e-4 + t * (-6.9698e-7 + t * 1.0031e-9)));
}

function polynomial(coefficients: readonly number[], x: number): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}

/**
 * Practical salinity from the conductivity ratio C(S, t, 0)/C(35, 15, 0), temperature on IPTS-68, no pressure.
 *
 * PSS-78: Perkin & Lewis 1980, IEEE J. Ocean. Eng. 5, 9–16; UNESCO 1983, Tech. Pap. Mar. Sci. 44
 * (coefficients from memory, held to printed and outside values in the tests).
 * Range: `practicalSalinityRange`.
 */
export function practicalSalinityAtIpts68(conductivityRatio: number, celsius68: number): number {
  const root = Math.sqrt(conductivityRatio / standardRatio(celsius68));
  const apart = celsius68 - 15;
  return polynomial(a, root) + (apart / (1 + k * apart)) * polynomial(b, root);
}

/** Practical salinity from conductivity in mS/cm at a temperature in °C (ITS-90); PSS-78, no pressure. */
export function salinityFromConductivity(
  conductivityMsPerCm: number,
  temperatureDegC: number,
): SalinityReading {
  if (!Number.isFinite(conductivityMsPerCm) || !Number.isFinite(temperatureDegC)) return notANumber;
  const ratio = conductivityMsPerCm / standardConductivityMsPerCm;
  if (ratio < 0) return belowFreshWater;
  const salinity = practicalSalinityAtIpts68(ratio, celsiusIpts68(temperatureDegC));
  if (!Number.isFinite(salinity)) return notANumber;
  if (salinity > highestSalinity) return beyondAnySeaWater;
  // The polynomial dips a hair below zero just above pure water, outside its range.
  return { ok: true, salinity: Math.max(0, salinity) };
}

/** Conductivity in mS/cm of water of this salinity at a temperature in °C (ITS-90), or undefined for none. */
export function conductivityFromSalinity(salinity: number, temperatureDegC: number): number | undefined {
  const celsius68 = celsiusIpts68(temperatureDegC);
  const ratio = risingRoot(
    (tried) => practicalSalinityAtIpts68(tried, celsius68) - salinity,
    { low: 1e-5, high: 8 },
    1e-13,
  );
  return ratio === undefined ? undefined : ratio * standardConductivityMsPerCm;
}

const notANumber = { ok: false, reason: "not-a-number" } as const;
const belowFreshWater = { ok: false, reason: "below-fresh-water" } as const;
const beyondAnySeaWater = { ok: false, reason: "beyond-any-sea-water" } as const;

/** The salinity at which a rising property of sea water takes a value. */
function invert(property: (salinity: number) => number, value: number): SalinityReading {
  if (!Number.isFinite(value)) return notANumber;
  if (value < property(0)) return belowFreshWater;
  if (value >= property(highestSalinity)) return beyondAnySeaWater;
  const ends = { low: 0, high: highestSalinity };
  const salinity = risingRoot((tried) => property(tried) - value, ends, salinityWidth);
  return salinity === undefined ? notANumber : { ok: true, salinity };
}
