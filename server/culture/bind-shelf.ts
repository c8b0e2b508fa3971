/** What stands on the shelf: salt waters, kits, the store. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type {
  Fact,
  KitEvent,
  KitFact,
  LogEvent,
  QuantityText,
  StoreEvent,
  WaterFact,
} from "../../grammar/syntax.ts";
import { asDifference, asValue, readConcentration } from "../quantity/concentration.ts";
import { measuredUnit } from "../quantity/dimension.ts";
import {
  amountOf,
  defaultWater,
  type Line,
  named,
  parameterNamed,
  placeOf,
  positive,
  type ReferenceWater,
  shareQuantity,
} from "./binder.ts";
import { enter, into } from "./enter.ts";
import { addEntry, type Entry } from "./history.ts";
import type { Kit, SaltWater } from "./model.ts";
import type { Declaration } from "./names.ts";
import { isPossible } from "./readings.ts";
import { reagentNamed } from "./reagent.ts";

interface FactOf<F> {
  readonly line: Line;
  readonly fact: F;
}

interface EventOf<E> {
  readonly line: Line;
  readonly event: E;
}

/** A salt water: its stated values, and from their date on those read of a batch. */
export function bindWater(
  declaration: Declaration,
  title: string | null,
  facts: readonly FactOf<WaterFact | Fact>[],
  events: readonly EventOf<LogEvent>[],
): SaltWater {
  const values = new Map<ParameterName, Entry<number>[]>();
  const stated = facts.filter((entry): entry is FactOf<WaterFact> => entry.fact.kind === "value");
  const bySalinity = [...stated].sort(
    (left, right) => rank(left.fact.parameter.text) - rank(right.fact.parameter.text),
  );
  const water = (): ReferenceWater => ({
    salinity: values.get("salinity")?.at(-1)?.value ?? defaultWater.salinity,
    temperatureDegC: values.get("temperature")?.at(-1)?.value ?? defaultWater.temperatureDegC,
  });
  for (const { line, fact } of bySalinity) {
    const value = writtenValue(line, fact.parameter, fact.value, water());
    if (!value) continue;
    const history = into(values, value.parameter);
    enter(line, history, fact, value.value, value.parameter);
  }
  for (const { line, event } of events) {
    if (event.kind !== "read" || event.disregard) continue;
    for (const item of event.items) {
      const value = writtenValue(line, item.parameter, item.value, water());
      if (!value || item.below) continue;
      const history = into(values, value.parameter);
      const from = event.at.minute;
      addEntry(history, {
        from,
        until: Number.POSITIVE_INFINITY,
        value: value.value,
        place: placeOf(line, null),
      });
    }
  }
  const { ref, name, place } = declaration;
  return { ref, name, title, place, values };
}

/** Salinity and temperature first: they make the water in which the rest is converted. */
const rank = (parameter: string) => (parameter === "salinity" || parameter === "temperature" ? 0 : 1);

/** A value of a water; null after reporting, also where sea water can't have it. */
function writtenValue(
  line: Line,
  word: Parameters<typeof parameterNamed>[1],
  quantity: QuantityText,
  water: ReferenceWater,
) {
  const parameter = parameterNamed(line, word);
  const read =
    parameter && amountOf(line, quantity, parameter, readConcentration(quantity, parameter, asValue), water);
  if (!parameter || !read) return null;
  const span = { start: word.start, end: quantity.end };
  return isPossible(line, quantity, span, parameter, read.value, water)
    ? { parameter: parameter.name, value: read.value }
    : null;
}

/** A printed tolerance is two standard deviations. */
const deviationsIn = { scatter: 1, tolerance: 2 } as const;

/** A kit: the scatter of its tests. */
export function bindKit(
  declaration: Declaration,
  facts: readonly FactOf<KitFact | Fact>[],
  events: readonly EventOf<KitEvent>[],
): Kit {
  const deviations = new Map<ParameterName, Entry<{ value: number; relative: boolean }>[]>();
  for (const { line, fact } of facts) {
    if (fact.kind !== "scatter" && fact.kind !== "tolerance") continue;
    const parameter = parameterNamed(line, fact.parameter);
    if (!parameter) continue;
    const relative = isShare(fact.value);
    const value = relative
      ? shareQuantity(line, fact.value)
      : (amountOf(
          line,
          fact.value,
          parameter,
          readConcentration(fact.value, parameter, asDifference),
          defaultWater,
        )?.value ?? null);
    if (value === null) continue;
    const history = into(deviations, parameter.name);
    const deviation = { value: value / deviationsIn[fact.kind], relative };
    enter(line, history, fact, deviation, parameter.name);
  }
  for (const { line, event } of events) {
    if (event.kind !== "checked") continue;
    writtenValue(line, event.parameter, event.value, defaultWater);
    const parameter = event.parameter;
    const quiet: Line = {
      ...line,
      report: (finding) => finding.code !== "syntax/unknown-word" && line.report(finding),
    };
    writtenValue(quiet, parameter, event.against, defaultWater);
  }
  const { ref, name, place } = declaration;
  return { ref, name, place, deviations };
}

function isShare(quantity: QuantityText): boolean {
  const unit = measuredUnit(quantity.unit);
  return unit.ok && unit.value?.spelling === "%";
}

/** Checks the names and quantities of store lines. */
export function bindStore(events: readonly EventOf<StoreEvent>[]): void {
  for (const { line, event } of events) {
    if (event.kind === "received" || event.kind === "counted") {
      reagentNamed(line, event.reagent, () => []);
      positive(line, event.mass, "mass");
    } else if (event.kind === "mixed" || event.kind === "discarded") {
      named(line, event.solution, ["solution"]);
      positive(line, event.volume, "volume");
    }
  }
}
