/** What a written value counts: shapes that the reading of quantities gives and `culture/` turns into one unit. */
import type { Parameter } from "../../grammar/parameters.ts";
import type { Base } from "../../grammar/units.ts";
import type { Decimal34 } from "./decimal.ts";

/** In mg, mmol, meq; `as CaCO3` is mg or mmol of CaCO3. */
export type Substance = "mass" | "moles" | "equivalents" | "mass as CaCO3" | "moles as CaCO3";

/** A value with the sort of thing it counts. */
export type Amount =
  | {
      readonly sort: "dissolved";
      readonly substance: Substance;
      readonly per: "litre" | "kilogram" | "area" | "whole";
      readonly value: Decimal34;
    }
  | {
      readonly sort: "salinity";
      readonly by: "PSS-78" | SalinityBase;
      readonly value: Decimal34;
      /** A change, not a value: what it is in salinity depends on where it is taken. */
      readonly difference: boolean;
    }
  | { readonly sort: "temperature"; readonly value: Decimal34 }
  | { readonly sort: "pH"; readonly scale: "NBS" | "total"; readonly value: Decimal34 };

/** Salinity by what an instrument shows. */
export type SalinityBase = Extract<Base, `specific gravity ${string}` | "conductivity">;

/** An amount with what stands after `±`, as a difference of the same sort. */
export interface Written {
  readonly amount: Amount;
  readonly uncertainty: Amount | null;
}

/** How the number is to be read. */
export interface Manner {
  /** A change, spread or step: no zero point is taken off a temperature. */
  readonly difference: boolean;
  /** Over a time: the value is per day. */
  readonly rate: boolean;
}

/** What a place in a statement asks for. */
export interface Ask {
  readonly expected: string;
  readonly examples: readonly string[];
  readonly parameter: Parameter;
  readonly pers: readonly ("litre" | "kilogram" | "area" | "whole")[];
  readonly manner: Manner;
}
