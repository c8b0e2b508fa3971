/** What a parameter is: its ranges, the units it may be written in, and what is taken where a file says nothing. */
import {
  type Measure,
  type Parameter,
  type ParameterName,
  parameterOf,
} from "../../../grammar/parameters.ts";
import { type Default, defaultLimits, defaults } from "../../culture/defaults.ts";
import { inOwnUnit, mayBeWritten } from "./units.ts";

export interface ParameterTopic {
  readonly kind: "parameter";
  readonly parameter: ParameterName;
  /** The unit of the ranges; empty for a bare number. */
  readonly unit: string;
  /** Outside this, sea water can't be. */
  readonly possible: readonly [low: number, high: number] | null;
  /** Outside this, a value is asked about. */
  readonly usual: readonly [low: number, high: number] | null;
  /** True where a number may stand without a unit. */
  readonly bare: boolean;
  readonly units: readonly { readonly unit: string; readonly is: string | null }[];
  readonly limits: readonly { readonly limit: string; readonly value: string; readonly basis: string }[];
  /** What is taken where nothing says it. */
  readonly otherwise: { readonly what: string; readonly value: string; readonly basis: string } | null;
}

/** Spellings to try, usual ones first; those that the parameter's reader takes are shown. */
const spellings: Readonly<Record<Measure, readonly string[]>> = {
  alkalinity: [
    ...["dKH", "meq/L", "mmol/L", "umol/L", "meq/kg", "mmol/kg", "umol/kg"],
    ...["mg/L as CaCO3", "mg/kg as CaCO3", "ppm as CaCO3"],
  ],
  dissolved: [
    ...["mg/L", "mg/kg", "ppm", "g/L", "mmol/L", "umol/L", "mmol/kg", "umol/kg"],
    ...["mg/L as CaCO3", "ppm as CaCO3"],
  ],
  salinity: ["ppt", "SG", "SG20", "SG60F", "mS/cm"],
  temperature: ["degC", "degF"],
  pH: ["total"],
};

export const defaultLimitsOf = (
  parameter: ParameterName,
): readonly (readonly [limit: string, row: Default])[] =>
  Object.entries(defaultLimits as Readonly<Record<string, Default>>)
    .filter(([key]) => key.startsWith(`${parameter} `))
    .map(([key, row]) => [key.slice(parameter.length + 1), row]);

const otherwise: Readonly<Partial<Record<ParameterName, Default>>> = {
  salinity: defaults.salinity,
  temperature: defaults.temperature,
  pH: defaults.pHScale,
};

export function parameterTopic(word: string): ParameterTopic | null {
  const row = parameterOf(word);
  return row ? topicOf(row) : null;
}

function topicOf({ name, unit, possible, usual, measure }: Parameter): ParameterTopic {
  const taken = otherwise[name];
  return {
    kind: "parameter",
    parameter: name,
    unit,
    possible,
    usual,
    bare: mayBeWritten(name, null),
    units: spellings[measure]
      .filter((spelling) => mayBeWritten(name, spelling))
      .map((spelling) => ({ unit: spelling, is: inOwnUnit(name, spelling) })),
    limits: defaultLimitsOf(name).map(([limit, { text, basis }]) => ({ limit, value: text, basis })),
    otherwise: taken ? { what: taken.what, value: taken.text, basis: taken.basis } : null,
  };
}
