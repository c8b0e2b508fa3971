/** The hydrogen ion concentration at which a water has a given alkalinity. mol/kg, total scale. */
import type { SeaWaterConstants } from "./constants-at.ts";

/** The carbon that is held fixed while the hydrogen ion is sought: all of it, or the CO2 in balance with air. */
export type FixedCarbon = { readonly dic: number } | { readonly co2: number };

/**
 * Alkalinity other than that of carbon: borate + hydroxide − free hydrogen ion − bisulfate − hydrogen fluoride.
 *
 * Dickson 1981, Deep-Sea Res. 28A, 609–623, without the acids of nutrients.
 */
export function otherAlkalinity(hydrogen: number, constants: SeaWaterConstants): number {
  const { KB, KW, KSO4, KF, boron, sulfate, fluoride, totalOverFree } = constants;
  const free = hydrogen / totalOverFree;
  return (
    (boron * KB) / (KB + hydrogen) +
    KW / hydrogen -
    free -
    (sulfate * free) / (KSO4 + free) -
    (fluoride * free) / (KF + free)
  );
}

/** Change of `otherAlkalinity` with the natural logarithm of the hydrogen ion; never above zero. */
function otherAlkalinitySlope(hydrogen: number, constants: SeaWaterConstants): number {
  const { KB, KW, KSO4, KF, boron, sulfate, fluoride, totalOverFree } = constants;
  const free = hydrogen / totalOverFree;
  return -(
    (boron * KB * hydrogen) / (KB + hydrogen) ** 2 +
    KW / hydrogen +
    free +
    (sulfate * KSO4 * free) / (KSO4 + free) ** 2 +
    (fluoride * KF * free) / (KF + free) ** 2
  );
}

/** pH −3 to 18: holds the root of any water that can be asked about. */
const lowestLogarithm = Math.log(1e-18);
const highestLogarithm = Math.log(1e3);
const mostSteps = 100;
/** In ln [H]; 4e-14 in pH. */
const closeEnough = 1e-13;

/**
 * The hydrogen ion at which the carbon given and everything else add up to this alkalinity.
 *
 * Alkalinity only falls as the hydrogen ion rises, so there is one root: Newton steps on ln [H] inside a
 * bracket, halved wherever a step would leave it (Munhoven 2013, Geosci. Model Dev. 6, 1367–1388). Always ends.
 */
export function hydrogenIon(alkalinity: number, carbon: FixedCarbon, constants: SeaWaterConstants): number {
  const { K1, K2 } = constants;
  let low = lowestLogarithm;
  let high = highestLogarithm;
  let x = Math.log(1e-8);
  let excessBefore = Number.POSITIVE_INFINITY;
  for (let step = 0; step < mostSteps; step++) {
    const hydrogen = Math.exp(x);
    let carbonAlkalinity: number;
    let carbonSlope: number;
    if ("dic" in carbon) {
      const denominator = hydrogen * hydrogen + K1 * hydrogen + K1 * K2;
      const bicarbonate = (K1 * hydrogen) / denominator;
      const carbonate = (K1 * K2) / denominator;
      carbonAlkalinity = carbon.dic * (bicarbonate + 2 * carbonate);
      const co2 = (hydrogen * hydrogen) / denominator;
      carbonSlope = -carbon.dic * (bicarbonate * (co2 + carbonate) + 4 * carbonate * co2);
    } else {
      const bicarbonate = (carbon.co2 * K1) / hydrogen;
      const carbonate = (bicarbonate * K2) / hydrogen;
      carbonAlkalinity = bicarbonate + 2 * carbonate;
      carbonSlope = -(bicarbonate + 4 * carbonate);
    }
    const excess = carbonAlkalinity + otherAlkalinity(hydrogen, constants) - alkalinity;
    if (excess > 0) low = x;
    else high = x;
    const newton = x - excess / (carbonSlope + otherAlkalinitySlope(hydrogen, constants));
    if (Math.abs(newton - x) < closeEnough) return Math.exp(newton);
    // Halve where Newton would leave the bracket, or where it no longer gets nearer fast enough.
    const halve = !(newton > low && newton < high) || Math.abs(excess) > excessBefore / 2;
    excessBefore = halve ? Number.POSITIVE_INFINITY : Math.abs(excess);
    x = halve ? (low + high) / 2 : newton;
  }
  return Math.exp(x);
}
