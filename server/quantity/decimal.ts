/** Decimal arithmetic for what people write, and the one door from there to doubles. */
import { Decimal } from "decimal.js";

/** A private clone, so that nobody else's settings change our digits. */
export const Decimal34 = Decimal.clone({ precision: 34, rounding: Decimal.ROUND_HALF_EVEN });
export type Decimal34 = InstanceType<typeof Decimal34>;

/** A factor of the unit table: a decimal, or a fraction. */
export const factorOf = (factor: string | readonly [string, string]): Decimal34 =>
  typeof factor === "string" ? new Decimal34(factor) : new Decimal34(factor[0]).div(factor[1]);

/**
 * The boundary: what was written, as a double for thermodynamics. Null where no finite double is near it, so
 * that an absurd number of digits can't become Infinity further on.
 */
export function toDouble(value: Decimal34): number | null {
  const double = value.toNumber();
  return Number.isFinite(double) ? double : null;
}
