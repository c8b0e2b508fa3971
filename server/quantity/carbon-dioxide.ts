/** CO2 of the room's air. */
import type { QuantityText } from "../../grammar/syntax.ts";
import type { Decimal34 } from "./decimal.ts";
import { measuredUnit, numberOf, sameDimension } from "./dimension.ts";
import { bad, good, type Reading } from "./finding.ts";

/** Reads CO2 in air or water, µatm; a share of dry air in ppm comes out as such. */
export function readCarbonDioxide(
  quantity: QuantityText,
): Reading<{ readonly value: Decimal34; readonly unit: "ppm" | "uatm" }> {
  const number = numberOf(quantity);
  if (!number.ok) return number;
  const unit = measuredUnit(quantity.unit);
  if (!unit.ok) return unit;
  const asked = { expected: "CO2", examples: ["ppm", "uatm"] };
  if (!unit.value)
    return bad({ code: "unit/missing", span: quantity.number, number: quantity.number.text, ...asked });
  const value = number.value.mul(unit.value.factor);
  if (!quantity.asCaCO3 && sameDimension(unit.value.dimension, { "parts per million": 1 }))
    return good({ value, unit: "ppm" });
  if (!quantity.asCaCO3 && sameDimension(unit.value.dimension, { "partial pressure": 1 }))
    return good({ value, unit: "uatm" });
  return bad({
    code: "unit/dimension",
    span: quantity.unit ?? quantity,
    unit: unit.value.spelling,
    ...asked,
  });
}
