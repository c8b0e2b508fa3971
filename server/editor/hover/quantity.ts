/** A quantity: the same in the other units of its kind. */
import type { QuantityText, Span } from "../../../grammar/syntax.ts";
import { otherUnits } from "./other-units.ts";
import { digits } from "./parts.ts";
import type { Tells } from "./spot.ts";

/** The quantity whose number, unit or deviation a column is in. */
function quantityAt(part: unknown, column: number): QuantityText | null {
  if (typeof part !== "object" || part === null) return null;
  if ("borrowedUnit" in part) {
    const quantity = part as QuantityText;
    const isIn = ownSpans(quantity).some(({ start, end }) => start <= column && column <= end);
    return isIn ? quantity : null;
  }
  for (const each of Object.values(part)) {
    const found = quantityAt(each, column);
    if (found) return found;
  }
  return null;
}

function ownSpans({ number, unit, borrowedUnit, asCaCO3, uncertainty }: QuantityText): Span[] {
  return [
    number,
    ...(unit && !borrowedUnit ? [unit] : []),
    ...(asCaCO3 && !borrowedUnit ? [asCaCO3] : []),
    ...(uncertainty ? [uncertainty] : []),
  ];
}

export const quantityTold: Tells = (spot) => {
  const column = spot.under.word?.start ?? spot.under.cursor.column;
  const quantity = quantityAt(spot.statement, column);
  if (!quantity) return null;
  const others = otherUnits(spot, quantity);
  if (!others || others.texts.length === 0) return null;
  return {
    answer: `${writtenOf(quantity)} = ${others.texts.join(" = ")}.`,
    blocks: [deviationLines(quantity)],
    assumptions: others.assumptions,
    sources: others.sources,
  };
};

/** A line that states one value: in other units. */
export const valueTold: Tells = (spot) => {
  const { statement } = spot;
  if (statement.kind !== "value" && statement.kind !== "scatter" && statement.kind !== "tolerance")
    return null;
  const others = otherUnits(spot, statement.value);
  const texts = others?.texts ?? [];
  if (texts.length === 0 && statement.kind === "value") return null;
  const lines = {
    value: [],
    scatter: ["One standard deviation."],
    tolerance: ["Taken as two standard deviations."],
  };
  return {
    answer: `${statement.parameter.text} ${[writtenOf(statement.value), ...texts].join(" = ")}.`,
    blocks: [lines[statement.kind]],
    assumptions: others?.assumptions ?? [],
    sources: others?.sources ?? [],
  };
};

/** As it stands on the line, without its deviation. */
export const writtenOf = ({ number, unit, asCaCO3 }: QuantityText): string =>
  `${number.text}${unit ? ` ${unit.text}` : ""}${asCaCO3 ? " as CaCO3" : ""}`;

/** How large a deviation is beside its number. */
function deviationLines({ number, unit, uncertainty }: QuantityText): string[] {
  if (!uncertainty) return [];
  const size = Number(uncertainty.number.text);
  const value = Number(number.text);
  const isShare = uncertainty.unit?.text === "%";
  const own = uncertainty.unit?.text ?? unit?.text ?? "";
  const written = `± ${uncertainty.number.text}${own ? ` ${own}` : ""} is one standard deviation`;
  if (isShare) return [`${written}: ${digits((value * size) / 100, 2)}${unit ? ` ${unit.text}` : ""}.`];
  const sameUnit = uncertainty.unit === null || uncertainty.unit.text === unit?.text;
  return [
    value === 0 || !sameUnit ? `${written}.` : `${written}, ${digits((100 * size) / Math.abs(value), 2)} %.`,
  ];
}
