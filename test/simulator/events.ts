/** What a technician writes down: events of a log, numbers as they were read off, minutes since 1970-01-01. */

export type ReadParameter = "alkalinity" | "calcium" | "magnesium" | "salinity" | "temperature" | "pH";

export type LogEvent = { readonly minute: number; readonly by: string | null } & (
  | {
      readonly did: "read";
      readonly values: readonly {
        readonly of: ReadParameter;
        readonly shows: number;
        readonly step: number;
      }[];
      readonly kit: string | null;
      readonly disregard: string | null;
    }
  | { readonly did: "set"; readonly pumps: readonly { readonly name: string; readonly mlPerDay: number }[] }
  | { readonly did: "gave"; readonly solution: string; readonly millilitres: number }
  | { readonly did: "renewed"; readonly litres: number; readonly water: string }
  | {
      readonly did: "stocked" | "removed";
      readonly cohort: string;
      readonly amount: number;
      readonly countedIn: "pieces" | "m2";
    }
  | { readonly did: "filled"; readonly pump: string; readonly litres: number }
  | { readonly did: "stopped" | "started"; readonly pump: string }
  | { readonly did: "note"; readonly text: string }
);
