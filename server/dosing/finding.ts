/** What the state of the water, the log's doses and the plan show: code, place and data, no sentences. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { CultureFinding } from "../culture/finding.ts";
import type { DisplayUnit } from "../culture/model.ts";
import type { Place } from "../culture/place.ts";
import type { Remedies, Split } from "./remedy.ts";
import type { Dosed } from "./tracked.ts";

interface Mendable {
  /** What would mend it at the moment asked; added when all else is known. */
  readonly remedies?: Remedies;
}

interface OfParameter {
  readonly parameter: ParameterName;
  readonly unit: DisplayUnit;
}

type Own = { readonly place: Place; readonly system: string } & (
  | (OfParameter &
      Mendable & {
        readonly code: "water/outside-hold";
        readonly value: number;
        /** What was read; `value` is what has become of it since. */
        readonly read: number;
        readonly low: number;
        readonly high: number;
      })
  | (OfParameter &
      Mendable & {
        readonly code: "water/leaves-hold-soon" | "water/leaves-hold";
        readonly at: number;
        readonly edge: number;
        readonly takenPerDay: number | null;
        readonly dosedPerDay: number;
        /** What the plan gives a day; `set`: by the name that a `set` line gives the source, null of a hand. */
        readonly planned: readonly {
          readonly set: string | null;
          readonly solution: string;
          readonly litresPerDay: number;
          readonly isLimited: boolean;
        }[];
      })
  | (OfParameter &
      Mendable & {
        readonly code: "water/beyond-limit";
        readonly which: "max" | "min";
        readonly value: number;
        /** What was read; `value` is what has become of it since. */
        readonly read: number;
        readonly limit: number;
      })
  | (OfParameter & {
      readonly code: "water/salinity-is-the-cause";
      readonly value: number;
      readonly scaled: number;
      readonly salinity: number;
      readonly salinityAim: number;
      /** True where the value lies in its band only because salinity is off. */
      readonly hidden: boolean;
    })
  | {
      readonly code: "water/room-air";
      readonly pH: number;
      readonly pCO2Uatm: number;
      readonly roomPpm: number;
      readonly pHWithRoom: number;
      readonly pHWithOutdoor: number;
    }
  | {
      readonly code: "water/stale";
      readonly parameters: readonly { readonly name: ParameterName; readonly readAt: number | null }[];
    }
  | (OfParameter &
      Mendable & {
        readonly code: `overdose/${Dosed}-rise` | `overdose/${Dosed}-dose` | `overdose/${Dosed}-max`;
        readonly solution: string | null;
        readonly value: number;
        readonly limit: number;
        readonly limitStated: boolean;
        /** The dose in parts that break no limit; null where that can't be, or it is a rate that was set. */
        readonly split: Split | null;
      })
  | {
      readonly code: "overdose/ph";
      readonly before: number;
      readonly after: number;
      readonly limit: number;
      readonly of: "max" | "dose";
    }
  | {
      readonly code: "overdose/precipitation";
      readonly omega: number;
      readonly pH: number;
      readonly grade: "info" | "warning" | "error";
    }
  | {
      readonly code: "plan/held-back" | "plan/no-source" | "plan/passive-breach";
      readonly parameter: ParameterName;
      readonly by: string;
      readonly perDay: number | null;
      readonly unit: DisplayUnit;
      /** Of what nothing gives: solutions of the farm that hold it, by reference; added when all else is known. */
      readonly solutions?: readonly string[];
    }
  | {
      readonly code: "plan/every-other-day";
      readonly source: string;
      readonly solution: string;
      readonly everyDays: number;
      readonly litresPerDose: number;
      readonly leastL: number;
    }
  | { readonly code: "log/future"; readonly minute: number }
);

export type DosingFinding = CultureFinding | Own;
