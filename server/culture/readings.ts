/**
 * Readings: what each value is in the model's unit, whether sea water can have it, and which salinity,
 * temperature and calcium belong to a moment.
 */
import { minutesPerDay } from "../../grammar/dates.ts";
import { type Parameter, type ParameterName, parameterOf } from "../../grammar/parameters.ts";
import type { QuantityText, ReadItem, Span, Word } from "../../grammar/syntax.ts";
import type { Written } from "../quantity/amount.ts";
import { asValue, readConcentration } from "../quantity/concentration.ts";
import {
  densityOf,
  displayUnit,
  type Line,
  parameterNamed,
  placeOf,
  type ReferenceWater,
  take,
} from "./binder.ts";
import { inModelUnit } from "./convert.ts";
import { defaults } from "./defaults.ts";
import { countUpTo } from "./event-order.ts";
import type { EventHead, ReadEvent, ReadValue, SystemEvent } from "./model.ts";

/** A read line with its amounts still as written; `readings.ts` turns them into the model's units. */
export interface PendingRead extends EventHead {
  readonly kind: "read";
  /** The same value wherever the line stands. */
  readonly pending: PendingValues;
  readonly system: string | null;
  readonly disregard: Word | null;
  readonly kit: string | null;
}

export type PendingValues = ReadonlyMap<ParameterName, PendingValue>;

export interface PendingValue {
  readonly quantity: QuantityText;
  readonly written: Written;
  readonly word: Word;
  readonly below: boolean;
}

/** A value with where it comes from: a reading, or a default that is then listed as an assumption. */
export interface Known {
  readonly value: number;
  readonly from: "reading" | "default";
}

/**
 * The values of one line as written; null where one of them can't be read: a line counts whole or not at all.
 * Of a parameter read twice in it the first counts.
 */
export function takeReadItems(line: Line, items: readonly ReadItem[]): PendingValues | null {
  let whole = true;
  const pending = new Map<ParameterName, PendingValue>();
  for (const item of items) {
    const parameter = parameterNamed(line, item.parameter);
    const written = parameter && take(line, readConcentration(item.value, parameter, asValue));
    if (!parameter || !written) {
      whole = false;
      continue;
    }
    const first = pending.get(parameter.name);
    if (first) {
      const place = placeOf(line, item);
      line.report({
        code: "name/twice",
        place,
        system: line.system,
        word: parameter.name,
        what: "reading",
        first: placeOf(line, first.word),
      });
      continue;
    }
    pending.set(parameter.name, { quantity: item.value, written, word: item.parameter, below: item.below });
  }
  return whole ? pending : null;
}

/** Minutes within which a value of another line belongs to a reading. */
export const sameDay = minutesPerDay;

export interface Seen {
  readonly minute: number;
  readonly value: number;
}

/** The nearest value within a day, else the latest before, else the default. `seen` is in order of time. */
export function nearestKnown(seen: readonly Seen[], minute: number, byDefault: number): Known {
  const low = countUpTo(seen, minute);
  const before = seen[low - 1];
  const after = seen[low];
  const apart = (other: Seen | undefined) =>
    other ? Math.abs(other.minute - minute) : Number.POSITIVE_INFINITY;
  const nearest = apart(after) < apart(before) ? after : before;
  if (nearest && apart(nearest) <= sameDay) return { value: nearest.value, from: "reading" };
  return before ? { value: before.value, from: "reading" } : { value: byDefault, from: "default" };
}

/** Counts a reading into a lookup: not what was disregarded, impossible, or only known to be below something. */
export function seenIn(events: readonly ReadEvent[], parameter: ParameterName): Seen[] {
  const seen: Seen[] = [];
  for (const { minute, values, disregarded } of events) {
    const value = values[parameter];
    if (value && !disregarded && !value.impossible && !value.below) seen.push({ minute, value: value.value });
  }
  return seen;
}

/** Null for a value that sea water can't have. */
export function inRange(parameter: ParameterName, value: number | null): number | null {
  const range = parameterOf(parameter)!.possible;
  return value !== null && range && value >= range[0] && value <= range[1] ? value : null;
}

/**
 * The events as they are seen at a moment. What was written for a kilogram is turned with the salinity and
 * temperature nearest to it; of those only what is known by then may count, so the last day's is turned again.
 */
export function eventsSeenAt(events: readonly SystemEvent[], at: number): readonly SystemEvent[] {
  const known = countUpTo(events, at);
  const dayBefore = countUpTo(events, at - sameDay);
  if (!events.slice(dayBefore, known).some(isPerKilogram) || !events.slice(known).some(isRead)) return events;
  const reads = events.slice(0, known).filter(isRead);
  const salinities = seenIn(reads, "salinity");
  const temperatures = seenIn(reads, "temperature");
  return events.map((event, index) => {
    if (index < dayBefore || index >= known || !isPerKilogram(event)) return event;
    const own = (parameter: ParameterName) => inRange(parameter, event.values[parameter]?.value ?? null);
    const water = {
      salinity: own("salinity") ?? nearestKnown(salinities, event.minute, defaults.salinity.value).value,
      temperatureDegC:
        own("temperature") ?? nearestKnown(temperatures, event.minute, defaults.temperature.value).value,
    };
    const values = Object.entries(event.values as Record<string, ReadValue>).map(([name, value]) => [
      name,
      value.perKilogram === null ? value : { ...value, value: value.perKilogram * densityOf(water) },
    ]);
    return { ...event, values: Object.fromEntries(values) };
  });
}

export const isRead = (event: SystemEvent): event is ReadEvent => event.kind === "read";

const isPerKilogram = (event: SystemEvent): event is ReadEvent =>
  isRead(event) &&
  Object.values(event.values as Record<string, ReadValue>).some(({ perKilogram }) => perKilogram !== null);

/** The unit as it stands on the line; empty for a bare number. */
export const writtenUnit = ({ unit, asCaCO3 }: QuantityText): string =>
  `${unit?.text ?? ""}${asCaCO3 ? " as CaCO3" : ""}`;

/** Says so where sea water can't have a value; false then. */
export function isPossible(
  line: Line,
  quantity: QuantityText,
  span: Span,
  parameter: Parameter,
  value: number,
  water: ReferenceWater,
): boolean {
  const { possible } = parameter;
  if (!possible || (value >= possible[0] && value <= possible[1])) return true;
  line.report({
    code: "reading/impossible",
    place: placeOf(line, span),
    system: line.system,
    parameter: parameter.name,
    value,
    written: quantity.number.text,
    writtenUnit: writtenUnit(quantity),
    unit: displayUnit(quantity, parameter, water),
    range: possible,
    tenth: tenthOf(quantity, parameter, water),
  });
  return false;
}

/** The same digits with the point one place to the left, where that would be usual. */
export function tenthOf(quantity: QuantityText, parameter: Parameter, water: ReferenceWater): string | null {
  const { usual } = parameter;
  const [whole = "0", decimals = ""] = quantity.number.text.split(".");
  if (!usual || whole.startsWith("-")) return null;
  const shifted =
    whole.length > 1 ? `${whole.slice(0, -1)}.${whole.slice(-1)}${decimals}` : `0.${whole}${decimals}`;
  // Read again rather than divided: 780 degF isn't ten times 78 degF.
  const number = { ...quantity.number, text: shifted };
  const read = readConcentration({ ...quantity, number, uncertainty: null }, parameter, asValue);
  const value = read.ok ? inModelUnit(read.value.amount, parameter, () => densityOf(water)) : null;
  return value === null || value < usual[0] || value > usual[1] ? null : shifted.replace(/\.?0+$/, "");
}
