/** The one table of what is tested and held: how a value is measured, what sea water can have, what is usual. */

export type ParameterName =
  | "alkalinity"
  | "calcium"
  | "magnesium"
  | "potassium"
  | "strontium"
  | "salinity"
  | "temperature"
  | "pH"
  | "nitrate"
  | "phosphate";

/** How values of a parameter are written, and the one unit that ranges below and results are in. */
export type Measure = "alkalinity" | "dissolved" | "salinity" | "temperature" | "pH";

export interface Parameter {
  readonly name: ParameterName;
  readonly measure: Measure;
  /** The unit of `possible` and `usual`. */
  readonly unit: "meq/L" | "mg/L" | "degC" | "";
  /** Outside this, sea water can't be: the reading is left out of every estimate. */
  readonly possible: readonly [low: number, high: number] | null;
  /** Outside this, a value is asked about. Common practice, no source. */
  readonly usual: readonly [low: number, high: number] | null;
  /** The formula whose molar mass turns moles into mass; null where mass means nothing. */
  readonly formula: string | null;
}

export const parameterTable: readonly Parameter[] = [
  {
    name: "alkalinity",
    measure: "alkalinity",
    unit: "meq/L",
    possible: [0, 20],
    usual: [1.4, 5.4],
    formula: null,
  },
  {
    name: "calcium",
    measure: "dissolved",
    unit: "mg/L",
    possible: [0, 1000],
    usual: [300, 600],
    formula: "Ca",
  },
  {
    name: "magnesium",
    measure: "dissolved",
    unit: "mg/L",
    possible: [0, 3000],
    usual: [900, 1800],
    formula: "Mg",
  },
  {
    name: "potassium",
    measure: "dissolved",
    unit: "mg/L",
    possible: [0, 1500],
    usual: [250, 600],
    formula: "K",
  },
  {
    name: "strontium",
    measure: "dissolved",
    unit: "mg/L",
    possible: [0, 100],
    usual: [2, 25],
    formula: "Sr",
  },
  { name: "salinity", measure: "salinity", unit: "", possible: [0, 60], usual: [25, 42], formula: null },
  {
    name: "temperature",
    measure: "temperature",
    unit: "degC",
    possible: [-2, 45],
    usual: [15, 33],
    formula: null,
  },
  { name: "pH", measure: "pH", unit: "", possible: [4, 11], usual: [7.4, 8.9], formula: null },
  { name: "nitrate", measure: "dissolved", unit: "mg/L", possible: null, usual: [0, 100], formula: "NO3" },
  { name: "phosphate", measure: "dissolved", unit: "mg/L", possible: null, usual: [0, 3], formula: "PO4" },
];

const parameterByName = new Map<string, Parameter>(parameterTable.map((row) => [row.name, row]));

export const parameterOf = (name: string): Parameter | undefined => parameterByName.get(name);
