/** Tanks and what takes up room in them. */
import type { QuantityText, TankSize } from "../../grammar/syntax.ts";
import { aboveZero, type Line, positive, wholeNumber } from "./binder.ts";
import { enter, into } from "./enter.ts";
import type { FactOf, FactsDraft } from "./facts-draft.ts";
import { tankLitres } from "./tank.ts";

export function bindTank(draft: FactsDraft, line: Line, fact: FactOf<"tank">): void {
  const litres = tankSize(line, fact.size);
  const times = fact.times ? wholeNumber(line, fact.times) : 1;
  if (litres === null || times === null) return;
  enter(line, into(draft.tanks, fact.name.text), fact, litres * times, `tank ${fact.name.text}`);
}

export function bindDisplacement(draft: FactsDraft, line: Line, fact: FactOf<"displace">): void {
  const litres = displaced(line, fact.amount, fact.density);
  if (litres !== null)
    enter(line, into(draft.displacements, fact.name.text), fact, litres, `displace ${fact.name.text}`);
}

function tankSize(line: Line, size: TankSize): number | null {
  if (size.shape === "volume") return positive(line, size.volume, "volume");
  const sides = size.shape === "box" ? [size.length, size.width, size.depth] : [size.diameter, size.depth];
  const lengths = sides.map((side) => positive(line, side, "length"));
  return lengths.every((length) => length !== null) ? tankLitres(size.shape, lengths) : null;
}

/** Litres taken up: a volume as it stands, or a mass at its density. */
function displaced(line: Line, amount: QuantityText, density: QuantityText | null): number | null {
  if (!density) return positive(line, amount, "volume");
  const grams = positive(line, amount, "mass");
  const gramsPerL = aboveZero(line, density, "density");
  return grams === null || gramsPerL === null ? null : grams / gramsPerL;
}
