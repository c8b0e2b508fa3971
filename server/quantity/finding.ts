/** What can be wrong with a quantity: data only, the sentences are made elsewhere. */
import type { Span } from "../../grammar/syntax.ts";

export type QuantityFinding = { readonly span: Span } & (
  | { readonly code: "unit/unknown"; readonly word: string; readonly nearest: readonly string[] }
  | {
      readonly code: "unit/dimension";
      readonly unit: string;
      readonly expected: string;
      readonly examples: readonly string[];
    }
  | {
      readonly code: "unit/missing";
      readonly number: string;
      readonly expected: string;
      readonly examples: readonly string[];
    }
  | { readonly code: "unit/as-caco3"; readonly unit: string; readonly written: boolean }
  | { readonly code: "unit/ppm"; readonly number: string }
  /** More digits or a larger exponent than any quantity has. */
  | { readonly code: "syntax/number-form"; readonly word: string; readonly readings: readonly string[] }
);

/** A value with what is to be told about it, or what is wrong instead. */
export type Reading<T> =
  | { readonly ok: true; readonly value: T; readonly notes: readonly QuantityFinding[] }
  | { readonly ok: false; readonly finding: QuantityFinding };

export const good = <T>(value: T, notes: readonly QuantityFinding[] = []): Reading<T> => ({
  ok: true,
  value,
  notes,
});
export const bad = (finding: QuantityFinding): Reading<never> => ({ ok: false, finding });
