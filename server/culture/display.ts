/** In which unit a parameter is told to people: as they write it themselves, else as the trade does. */
import { type ParameterName, parameterOf } from "../../grammar/parameters.ts";
import { unitTable } from "../../grammar/units.ts";
import { factorOf } from "../quantity/decimal.ts";
import { factAt } from "./history.ts";
import type { DisplayUnit, SystemFacts } from "./model.ts";

/** A parameter in the model's own unit. */
export const plainUnit = (parameter: ParameterName): DisplayUnit => ({
  spelling: parameterOf(parameter)?.unit ?? "",
  perModelUnit: 1,
});

const inMeqPerL = (spelling: string): number => {
  const row = unitTable.find((unit) => unit.spelling === spelling);
  return row ? factorOf(row.factor).toNumber() : 1;
};

/** meq/L in 1 dKH, as the unit table has it. */
export const dKH = inMeqPerL("dKH");

/** Alkalinity is told in dKH where the file shows no unit: common practice. */
const tradeUnit = (parameter: ParameterName): DisplayUnit =>
  parameter === "alkalinity" ? { spelling: "dKH", perModelUnit: 1 / dKH } : plainUnit(parameter);

/** As its hold is written, else as a reading of it was, else as the trade tells it. */
export const shownIn = (
  facts: SystemFacts,
  parameter: ParameterName,
  minute: number,
  reading?: { readonly unit: DisplayUnit } | null,
): DisplayUnit =>
  factAt(facts.holds.get(parameter), minute)?.value.unit ?? reading?.unit ?? tradeUnit(parameter);
