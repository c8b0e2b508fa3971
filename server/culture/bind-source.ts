/** Sources of a solution: pumps and hands. */
import type { QuantityText } from "../../grammar/syntax.ts";
import { type Line, named, positive, wholeNumber } from "./binder.ts";
import { enter, into } from "./enter.ts";
import { type FactOf, type FactsDraft, hoursOf } from "./facts-draft.ts";
import { type Source, sourceKey } from "./model.ts";

export function bindPump(draft: FactsDraft, line: Line, fact: FactOf<"pump">): void {
  const solution = named(line, fact.solution, ["solution"]);
  const flow = positive(line, fact.flow, "flow");
  const optional = (quantity: QuantityText | null, kind: "volume" | "flow") =>
    quantity ? positive(line, quantity, kind) : null;
  const least = optional(fact.least, "volume");
  const always = optional(fact.always, "flow");
  const holding = optional(fact.holding, "volume");
  const failed = (quantity: QuantityText | null, value: number | null) => quantity !== null && value === null;
  if (failed(fact.least, least) || failed(fact.always, always) || failed(fact.holding, holding)) return;
  if (!solution || flow === null) return;
  const source: Source = {
    by: fact.name.text,
    device: "pump",
    solution: solution.ref,
    flowLPerDay: flow,
    leastL: least,
    hours: fact.hours && hoursOf(fact.hours),
    alwaysLPerDay: always ?? 0,
    holdingL: holding,
    times: 1,
  };
  enter(line, into(draft.sources, sourceKey(source)), fact, source, `pump ${fact.name.text}`);
}

export function bindByHand(draft: FactsDraft, line: Line, fact: FactOf<"by-hand">): void {
  const solution = named(line, fact.solution, ["solution"]);
  const always = fact.always ? positive(line, fact.always, "flow") : null;
  const times = fact.times ? wholeNumber(line, fact.times) : 1;
  if (!solution || times === null || (fact.always && always === null)) return;
  const source: Source = {
    by: "hand",
    device: "hand",
    solution: solution.ref,
    flowLPerDay: null,
    leastL: null,
    hours: null,
    alwaysLPerDay: always ?? 0,
    holdingL: null,
    times,
  };
  enter(line, into(draft.sources, sourceKey(source)), fact, source, `by-hand ${fact.solution.text}`);
}
