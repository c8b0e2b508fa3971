/** What is held, and the limits that no dose may break. */

import type { QuantityText } from "../../grammar/syntax.ts";
import { asDifference, asRate, asValue, readConcentration } from "../quantity/concentration.ts";
import { amountOf, displayUnit, type Line, parameterNamed, placeOf, type ReferenceWater } from "./binder.ts";
import { enter, into } from "./enter.ts";
import type { FactOf, FactsDraft } from "./facts-draft.ts";
import type { Hold } from "./model.ts";
import { isPossible } from "./readings.ts";

export function bindHold(draft: FactsDraft, line: Line, fact: FactOf<"hold">, water: ReferenceWater): void {
  const parameter = parameterNamed(line, fact.parameter);
  if (!parameter) return;
  const value = (quantity: QuantityText) =>
    amountOf(line, quantity, parameter, readConcentration(quantity, parameter, asValue), water);
  const low = value(fact.low);
  const high = value(fact.high);
  const aim = fact.aim ? value(fact.aim) : null;
  if (!low || !high || (fact.aim && !aim)) return;
  for (const [quantity, { value }] of [[fact.low, low] as const, [fact.high, high] as const])
    if (!isPossible(line, quantity, quantity, parameter, value, water)) return;
  const unit = displayUnit(fact.low, parameter, water);
  const shared = { system: line.system, parameter: parameter.name, low: low.value, high: high.value, unit };
  if (low.value >= high.value) {
    const span = { start: fact.low.start, end: fact.high.end };
    line.report({ code: "system/empty-hold", place: placeOf(line, span), ...shared });
    return;
  }
  const middle = (low.value + high.value) / 2;
  const outside = aim !== null && (aim.value < low.value || aim.value > high.value);
  if (outside) {
    line.report({ code: "system/aim-outside", place: placeOf(line, fact.aim), ...shared, aim: aim.value });
  }
  // A band with a wrong aim is still a band: without it nobody would be told that the water has left it.
  const stated = aim !== null && !outside;
  const scale = low.amount.sort === "pH" ? low.amount.scale : null;
  const hold: Hold = { ...shared, aim: stated ? aim.value : middle, aimStated: stated, scale };
  enter(line, into(draft.holds, parameter.name), fact, hold, `hold ${parameter.name}`);
}

const mannerOf = {
  rise: asRate,
  fall: asRate,
  swing: asDifference,
  dose: asDifference,
  max: asValue,
  min: asValue,
} as const;

export function bindLimit(draft: FactsDraft, line: Line, fact: FactOf<"limit">, water: ReferenceWater): void {
  const parameter = parameterNamed(line, fact.parameter);
  if (!parameter) return;
  const read = amountOf(
    line,
    fact.value,
    parameter,
    readConcentration(fact.value, parameter, mannerOf[fact.which]),
    water,
  );
  if (!read) return;
  const isLevel = mannerOf[fact.which] === asValue;
  if (isLevel && !isPossible(line, fact.value, fact.value, parameter, read.value, water)) return;
  const scale = read.amount.sort === "pH" ? read.amount.scale : null;
  const key = `${parameter.name} ${fact.which}`;
  enter(
    line,
    into(draft.limits, key),
    fact,
    { parameter: parameter.name, which: fact.which, value: read.value, scale },
    `limit ${key}`,
  );
}
