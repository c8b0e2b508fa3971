/** The quantities of a statement with what each of them measures: a table by the kind of statement. */
import { type Parameter, parameterOf } from "../../grammar/parameters.ts";
import type { QuantityText, Statement, StockCount, Word } from "../../grammar/syntax.ts";
import type { Written } from "../quantity/amount.ts";
import {
  asDifference,
  asRate,
  asValue,
  readCohortUptake,
  readConcentration,
  readStrength,
  readUptake,
} from "../quantity/concentration.ts";
import type { Reading } from "../quantity/finding.ts";
import type { PlainKind } from "../quantity/plain.ts";

/** What a quantity measures: a plain dimension, or a parameter in the water, in a solution, or taken from it. */
export type Measured =
  | { readonly of: "plain"; readonly kind: PlainKind }
  | {
      readonly of: "parameter";
      readonly parameter: Parameter;
      readonly manner: "value" | "difference" | "rate" | "strength" | "uptake" | "cohort uptake";
      readonly read: (quantity: QuantityText) => Reading<Written>;
    };

export interface MeasuredQuantity {
  readonly quantity: QuantityText;
  readonly measured: Measured;
}

type Among<S, K> = S extends { readonly kind: infer Kinds } ? (K extends Kinds ? S : never) : never;
type Of<K extends Statement["kind"]> = Among<Statement, K>;
type Listed = readonly (MeasuredQuantity | null)[];
type Table = { readonly [K in Statement["kind"]]?: (statement: Of<K>) => Listed };

const plain = (kind: PlainKind, quantity: QuantityText | null): MeasuredQuantity | null =>
  quantity && { quantity, measured: { of: "plain", kind } };

type Manner = Extract<Measured, { readonly of: "parameter" }>["manner"];

const readers: Readonly<Record<Manner, (quantity: QuantityText, parameter: Parameter) => Reading<Written>>> =
  {
    value: (quantity, parameter) => readConcentration(quantity, parameter, asValue),
    difference: (quantity, parameter) => readConcentration(quantity, parameter, asDifference),
    rate: (quantity, parameter) => readConcentration(quantity, parameter, asRate),
    strength: readStrength,
    uptake: readUptake,
    "cohort uptake": readCohortUptake,
  };

function of(
  name: Pick<Word, "text">,
  manner: Manner,
  quantity: QuantityText | null,
): MeasuredQuantity | null {
  const parameter = parameterOf(name.text);
  if (!parameter || !quantity) return null;
  const read = (each: QuantityText) => readers[manner](each, parameter);
  return { quantity, measured: { of: "parameter", parameter, manner, read } };
}

const area = (count: StockCount): MeasuredQuantity | null =>
  count.by === "area" ? plain("area", count.area) : null;
const stock = ({ count }: { readonly count: StockCount }): Listed => [area(count)];
const volume = ({ volume: quantity }: { readonly volume: QuantityText }): Listed => [
  plain("volume", quantity),
];
const mass = ({ mass: quantity }: { readonly mass: QuantityText }): Listed => [plain("mass", quantity)];
const flows = ({ items }: Of<"set">): Listed => items.map(({ quantity }) => plain("flow", quantity));

const table: Table = {
  tank: ({ size }) => {
    if (size.shape === "volume") return volume(size);
    const sides = size.shape === "box" ? [size.length, size.width, size.depth] : [size.diameter, size.depth];
    return sides.map((side) => plain("length", side));
  },
  displace: ({ amount, density }) => [plain(density ? "mass" : "volume", amount), plain("density", density)],
  measured: volume,
  hold: ({ parameter, low, high, aim }) => [low, high, aim].map((value) => of(parameter, "value", value)),
  limit: ({ parameter, which, value }) => {
    const manner =
      which === "rise" || which === "fall"
        ? "rate"
        : which === "max" || which === "min"
          ? "value"
          : "difference";
    return [of(parameter, manner, value)];
  },
  cohort: ({ count, uptake, grows }) => [
    area(count),
    of({ text: "alkalinity" }, "cohort uptake", uptake),
    plain("growth", grows),
  ],
  uptake: ({ parameter, value }) => [of(parameter, "uptake", value)],
  evaporates: ({ volume: flow }) => [plain("flow", flow)],
  feeds: ({ food }) => [plain("food", food)],
  "top-off": volume,
  "flows-through": ({ volume: flow }) => [plain("flow", flow)],
  pump: ({ flow, least, always, holding }) => [
    ...[plain("flow", flow), plain("volume", least)],
    ...[plain("flow", always), plain("volume", holding)],
  ],
  "by-hand": ({ always }) => [plain("flow", always)],
  dissolve: mass,
  "make-up": volume,
  keep: ({ temperature }) => [plain("temperature", temperature)],
  supplies: ({ parameter, strength }) => [of(parameter, "strength", strength)],
  "reorder-below": mass,
  lead: ({ time }) => [plain("time", time)],
  value: ({ parameter, value }) => [of(parameter, "value", value)],
  scatter: ({ parameter, value }) => [of(parameter, "difference", value)],
  tolerance: ({ parameter, value }) => [of(parameter, "difference", value)],
  read: ({ items }) => items.map(({ parameter, value }) => of(parameter, "value", value)),
  set: flows,
  gave: ({ items }) => items.map(({ quantity }) => plain("volume", quantity)),
  renewed: volume,
  topped: volume,
  stocked: stock,
  removed: stock,
  moved: stock,
  filled: volume,
  level: volume,
  calibrated: ({ volume: given, time }) => [plain("volume", given), plain("time", time)],
  received: mass,
  counted: mass,
  mixed: volume,
  discarded: volume,
  checked: ({ parameter, value, against }) => [
    of(parameter, "value", value),
    of(parameter, "value", against),
  ],
};

/** All quantities of a statement that can be written in other units, from left to right. */
export function quantitiesOf(statement: Statement): readonly MeasuredQuantity[] {
  const list = table[statement.kind] as ((statement: Statement) => Listed) | undefined;
  return (list?.(statement) ?? []).filter((each) => each !== null);
}
