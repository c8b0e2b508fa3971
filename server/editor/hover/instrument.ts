/** Salinity and temperature in the unit that a line of the file is written in; the model keeps each in one unit. */
import { type ParameterName, parameterOf } from "../../../grammar/parameters.ts";
import {
  conductivityFromSalinity,
  specificGravity,
  specificGravityScales,
} from "../../chemistry/salinity.ts";
import type { DisplayUnit, Hold } from "../../culture/model.ts";
import type { Place } from "../../culture/place.ts";
import type { Farm } from "../../farm.ts";
import type { Latest } from "../../report/latest.ts";
import { lineIn } from "../cursor.ts";

export interface Instrument {
  /** What it shows for a value of the model, in thousandths where it is read to four decimals. */
  readonly of: (value: number) => number;
  readonly unit: DisplayUnit;
}

const gravity =
  (scale: keyof typeof specificGravityScales) =>
  (salinity: number): number =>
    1000 * specificGravity(salinity, specificGravityScales[scale], specificGravityScales[scale]);

const instruments: Readonly<Record<string, Instrument>> = {
  "temperature degF": { of: (celsius) => celsius * 1.8 + 32, unit: { spelling: "degF", perModelUnit: 1 } },
  "salinity SG": { of: gravity("25/25 °C"), unit: { spelling: "SG", perModelUnit: 0.001 } },
  "salinity SG20": { of: gravity("20/20 °C"), unit: { spelling: "SG20", perModelUnit: 0.001 } },
  "salinity mS/cm": {
    of: (salinity) => conductivityFromSalinity(salinity, 25) ?? Number.NaN,
    unit: { spelling: "mS/cm", perModelUnit: 1 },
  },
};

/** The unit that a hold or a limit is written in. */
function unitHere(farm: Farm, { file, line }: Place): string | null {
  const statement = lineIn(farm, file, line)?.line.statement;
  if (statement?.kind === "limit") return statement.value.unit?.text ?? null;
  return statement?.kind === "hold" ? (statement.high.unit?.text ?? statement.low.unit?.text ?? null) : null;
}

/** Null where the model's own unit is the one of the line. */
export const instrumentAt = (farm: Farm, place: Place, parameter: ParameterName): Instrument | null =>
  instruments[`${parameterOf(parameter)?.name} ${unitHere(farm, place)}`] ?? null;

export const holdIn = (instrument: Instrument | null, hold: Hold): Hold =>
  instrument
    ? {
        ...hold,
        low: instrument.of(hold.low),
        high: instrument.of(hold.high),
        aim: instrument.of(hold.aim),
        unit: instrument.unit,
      }
    : hold;

export const latestIn = (instrument: Instrument | null, latest: Latest | null): Latest | null =>
  instrument && latest
    ? {
        ...latest,
        value: instrument.of(latest.value),
        reading: { ...latest.reading, value: instrument.of(latest.reading.value) },
      }
    : latest;

/** A difference of temperature as it is written. */
export const differenceUnit = (
  farm: Farm,
  place: Place,
  parameter: ParameterName,
  unit: DisplayUnit,
): DisplayUnit =>
  parameter === "temperature" && unitHere(farm, place)?.startsWith("degF")
    ? { spelling: "degF", perModelUnit: 1.8 }
    : unit;
