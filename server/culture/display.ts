/** In which unit a parameter is told to people: as they write it themselves, else as the trade does. */
import { type ParameterName, parameterOf } from "../../grammar/parameters.ts";
import { factAt } from "./history.ts";
import type { DisplayUnit, SystemFacts } from "./model.ts";

/** A parameter in the model's own unit. */
export const plainUnit = (parameter: ParameterName): DisplayUnit => ({
  spelling: parameterOf(parameter)?.unit ?? "",
  perModelUnit: 1,
});

/** Alkalinity is told in dKH where the file shows no unit (common practice): 1 meq/L is M(CaO) / 20 dKH. */
const tradeUnit = (parameter: ParameterName): DisplayUnit =>
  parameter === "alkalinity" ? { spelling: "dKH", perModelUnit: 56.077 / 20 } : plainUnit(parameter);

/** As its hold is written, else as a reading of it was, else as the trade tells it. */
export const shownIn = (
  facts: SystemFacts,
  parameter: ParameterName,
  minute: number,
  reading?: { readonly unit: DisplayUnit } | null,
): DisplayUnit =>
  factAt(facts.holds.get(parameter), minute)?.value.unit ?? reading?.unit ?? tradeUnit(parameter);
