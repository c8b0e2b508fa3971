/** Masses, moles and equivalents in a litre, in a kilogram, on an area, or in all. */
import type { QuantityText } from "../../grammar/syntax.ts";
import { type Dimension, unitTable } from "../../grammar/units.ts";
import type { Amount, Ask } from "./amount.ts";
import type { Decimal34 } from "./decimal.ts";
import { type Measured, sameDimension, without } from "./dimension.ts";
import { bad, good, type QuantityFinding, type Reading } from "./finding.ts";

/** From g to mg, and from a gram of water to a kilogram. */
const milli = 1000;

/** A number of mass, moles or equivalents in a litre, a kilogram, on an area, or in all. */
export function dissolved(
  quantity: QuantityText,
  ask: Ask,
  number: Decimal34,
  unit: Measured,
  still: Dimension,
  wrong: () => Reading<never>,
): Reading<Amount> {
  const isAlkalinity = ask.parameter.measure === "alkalinity";
  const asCaCO3 = quantity.asCaCO3 !== null;
  // Read as mg/L wherever kits print it; alkalinity in it means CaCO3 or nothing.
  const ppm = sameDimension(still, { "parts per million": 1 });
  const notes: QuantityFinding[] = [];
  let kind: { readonly base: "mass" | "amount" | "equivalents"; readonly per: Ask["pers"][number] } | null =
    null;
  let value = number.mul(unit.factor);
  if (ppm) {
    kind = { base: "mass", per: "litre" };
    if (!asCaCO3)
      notes.push({ code: "unit/ppm", span: quantity.unit ?? quantity, number: quantity.number.text });
  } else {
    // A bare rate (`/day`) and volumes in a volume (`mL/L`) count nothing; without this they would pass for
    // grams in a gram.
    kind = countsMass(unit) || !sameDimension(still, {}) ? kindOf(still) : null;
    if (!kind) return wrong();
    // Masses are in g, so per litre they become mg; a kilogram is 1000 g.
    if (kind.base === "mass") value = value.mul(milli);
    if (kind.per === "kilogram") value = value.mul(milli);
  }
  if (!ask.pers.includes(kind.per)) return wrong();
  if (isAlkalinity) {
    if (asCaCO3) {
      if (kind.base === "equivalents") return wrong();
      return good(
        {
          sort: "dissolved",
          substance: kind.base === "mass" ? "mass as CaCO3" : "moles as CaCO3",
          per: kind.per,
          value,
        },
        notes,
      );
    }
    const ofUptake = kind.per === "whole" || kind.per === "area";
    if (kind.base === "mass" || (kind.base === "amount" && ofUptake)) {
      return bad({
        code: "unit/as-caco3",
        span: quantity.unit ?? quantity,
        unit: unit.spelling,
        written: false,
      });
    }
    // Moles of alkalinity are equivalents everywhere.
    return good({ sort: "dissolved", substance: "equivalents", per: kind.per, value }, notes);
  }
  if (kind.base === "equivalents") return wrong();
  if (asCaCO3) {
    const allowed =
      kind.base === "mass" && (ask.parameter.name === "calcium" || ask.parameter.name === "magnesium");
    if (!allowed)
      return bad({
        code: "unit/as-caco3",
        span: quantity.asCaCO3 ?? quantity,
        unit: unit.spelling,
        written: true,
      });
    return good({ sort: "dissolved", substance: "mass as CaCO3", per: kind.per, value }, notes);
  }
  return good(
    { sort: "dissolved", substance: kind.base === "mass" ? "mass" : "moles", per: kind.per, value },
    notes,
  );
}

const countsMass = ({ spelling }: Measured): boolean => {
  const row = unitTable.find((entry) => entry.spelling === spelling.split("/")[0]);
  return row !== undefined && sameDimension(row.measures, { mass: 1 });
};

/** Sorts a timeless dimension: what is counted, in what. */
function kindOf(
  still: Dimension,
): { base: "mass" | "amount" | "equivalents"; per: Ask["pers"][number] } | null {
  for (const base of ["amount", "equivalents"] as const) {
    const rest = without(still, base, 1);
    if (!rest) continue;
    if (sameDimension(rest, { length: -3 })) return { base, per: "litre" };
    if (sameDimension(rest, { mass: -1 })) return { base, per: "kilogram" };
    if (sameDimension(rest, { length: -2 })) return { base, per: "area" };
    if (sameDimension(rest, {})) return { base, per: "whole" };
  }
  if (sameDimension(still, { mass: 1, length: -3 })) return { base: "mass", per: "litre" };
  // Grams in a kilogram: the masses cancel.
  if (sameDimension(still, {})) return { base: "mass", per: "kilogram" };
  if (sameDimension(still, { mass: 1, length: -2 })) return { base: "mass", per: "area" };
  return sameDimension(still, { mass: 1 }) ? { base: "mass", per: "whole" } : null;
}
