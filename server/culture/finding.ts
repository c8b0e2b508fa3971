/** What the model's making can find wrong: code, place and data; the sentences are made in `checks/`. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { LineFinding } from "../../grammar/syntax.ts";
import type { ReagentName } from "../chemistry/reagents.ts";
import type { QuantityFinding } from "../quantity/finding.ts";
import type { DisplayUnit } from "./model.ts";
import type { Place } from "./place.ts";

/** A finding of a line, put into its file. */
export type Placed<F> = F extends unknown
  ? Omit<F, "span"> & { readonly place: Place; readonly system: string | null }
  : never;

export type NamedKind = "system" | "solution" | "reagent" | "saltwater" | "kit";
/** Names of one system. */
export type OwnKind = "pump" | "cohort" | "source";

type Own = { readonly place: Place; readonly system: string | null } & (
  | {
      readonly code: "name/undeclared";
      readonly word: string;
      readonly wanted: readonly (NamedKind | OwnKind)[];
      readonly nearest: readonly string[];
      /** A file of the farm that declares it and isn't used here. */
      readonly elsewhere: string | null;
      /** What the name stands for here, where it isn't what is wanted. */
      readonly standsFor: string | null;
    }
  | { readonly code: "name/undeclared"; readonly word: string; readonly severalSources: readonly string[] }
  | {
      readonly code: "name/twice";
      readonly word: string;
      readonly what: string;
      readonly first: Place | null;
    }
  | { readonly code: "name/ambiguous-reagent"; readonly word: string; readonly offers: readonly string[] }
  | { readonly code: "name/unused"; readonly word: string; readonly kind: NamedKind }
  | { readonly code: "use/missing-file" | "use/outside" | "use/cycle"; readonly path: string }
  | {
      readonly code: "system/no-volume";
      readonly reason: "no-tank" | "measured-nothing" | "empty-tanks" | "displaced";
      readonly volumeL: number;
    }
  | { readonly code: "system/volume-differs"; readonly measuredL: number; readonly geometricL: number }
  | {
      readonly code: "system/empty-hold";
      readonly parameter: ParameterName;
      readonly low: number;
      readonly high: number;
      readonly unit: DisplayUnit;
    }
  | {
      readonly code: "system/aim-outside";
      readonly parameter: ParameterName;
      readonly low: number;
      readonly high: number;
      readonly aim: number;
      readonly unit: DisplayUnit;
    }
  | { readonly code: "system/until-before-from" }
  | {
      readonly code: "reading/impossible" | "reading/unusual";
      readonly parameter: ParameterName;
      readonly value: number | null;
      readonly written: string;
      readonly writtenUnit: string;
      readonly unit: DisplayUnit;
      readonly range: readonly [number, number];
      /** The same digits with the point one place left, where that is usual. */
      readonly tenth: string | null;
    }
  | { readonly code: "reading/disregarded"; readonly reason: string }
  | {
      readonly code: "hazard/caustic";
      /** As the recipe names it, and the reagent that it is. */
      readonly word: string;
      readonly reagent: ReagentName;
      /** Who may handle it, as the solution's section says; null where it doesn't. */
      readonly who: string | null;
    }
  | { readonly code: "log/twice"; readonly first: Place }
  | { readonly code: "log/out-of-order" }
  | { readonly code: "log/no-effect"; readonly why: string }
  /** A pump asked for more than it can give. */
  | { readonly code: "log/no-effect"; readonly source: string; readonly mostLPerDay: number }
  | { readonly code: "syntax/unfinished"; readonly expected: readonly string[] }
  | {
      readonly code: "syntax/unknown-word";
      readonly word: string;
      readonly expected: readonly string[];
      readonly nearest: readonly string[];
    }
);

export type CultureFinding = Own | Placed<QuantityFinding> | Placed<LineFinding>;
