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
import type { ByParameter, EventHead, ReadEvent, ReadValue, SystemEvent } from "./model.ts";

/** A read line with its amounts still as written; `readings.ts` turns them into the model's units. */
export interface PendingRead extends EventHead {
  readonly kind: "read";
  readonly pending: ReadonlyMap<ParameterName, PendingValue>;
  readonly line: Line;
  readonly disregard: Word | null;
  readonly kit: string | null;
}

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
export function takeReadItems(
  line: Line,
  items: readonly ReadItem[],
): ReadonlyMap<ParameterName, PendingValue> | null {
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
const sameDay = minutesPerDay;

export interface Seen {
  readonly minute: number;
  readonly value: number;
}

/** The nearest value within a day, else the latest before, else the default. `seen` is in order of time. */
export function nearestKnown(seen: readonly Seen[], minute: number, byDefault: number): Known {
  let low = 0;
  let high = seen.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (seen[middle]!.minute <= minute) low = middle + 1;
    else high = middle;
  }
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
  return events.flatMap(({ minute, values, disregarded }) => {
    const value = values[parameter];
    return value && !disregarded && !value.impossible && !value.below ? [{ minute, value: value.value }] : [];
  });
}

/**
 * Converts all readings of a system, in order of time. Salinity and temperature need no other reading, so
 * they come first; then what is written for a kilogram is turned with the water of its own moment.
 */
export function convertReads(reads: readonly PendingRead[]): ReadEvent[] {
  const plain = (parameter: ParameterName) =>
    reads.flatMap((read) => {
      const pending = read.pending.get(parameter);
      const row = parameterOf(parameter)!;
      const value =
        pending && !pending.below && !read.disregard
          ? inModelUnit(pending.written.amount, row, () => 1)
          : null;
      const [low, high] = row.possible!;
      return value !== null && value >= low && value <= high
        ? [{ minute: read.minute, value, line: read.place }]
        : [];
    });
  const salinities = plain("salinity");
  const temperatures = plain("temperature");
  return reads.map((read) => {
    const own = (parameter: ParameterName) => {
      const pending = read.pending.get(parameter);
      const value = pending && inModelUnit(pending.written.amount, parameterOf(parameter)!, () => 1);
      return value ?? null;
    };
    const water = {
      salinity:
        inRange("salinity", own("salinity")) ??
        nearestKnown(salinities, read.minute, defaults.salinity.value).value,
      temperatureDegC:
        inRange("temperature", own("temperature")) ??
        nearestKnown(temperatures, read.minute, defaults.temperature.value).value,
    };
    const values: Partial<Record<ParameterName, ReadValue>> = {};
    for (const [parameter, pending] of read.pending) {
      const value = convertValue(read, parameter, pending, water);
      if (value) values[parameter] = value;
    }
    return readEvent(read, values);
  });
}

function inRange(parameter: ParameterName, value: number | null): number | null {
  const range = parameterOf(parameter)!.possible;
  return value !== null && range && value >= range[0] && value <= range[1] ? value : null;
}

function readEvent(read: PendingRead, values: ByParameter<ReadValue>): ReadEvent {
  const { minute, timeKnown, place, text, by, kit } = read;
  return {
    kind: "read",
    minute,
    timeKnown,
    place,
    text,
    by,
    kit,
    values,
    disregarded: read.disregard !== null,
  };
}

function convertValue(
  read: PendingRead,
  parameter: ParameterName,
  pending: PendingValue,
  water: ReferenceWater,
): ReadValue | null {
  const row = parameterOf(parameter)!;
  const { amount } = pending.written;
  const value = inModelUnit(amount, row, () => densityOf(water));
  const perKilogram =
    amount.sort === "dissolved" && amount.per === "kilogram" ? inModelUnit(amount, row, () => 1) : null;
  const unit = displayUnit(pending.quantity, row, water);
  const place = placeOf(read.line, { start: pending.word.start, end: pending.quantity.end });
  const scale = amount.sort === "pH" ? amount.scale : null;
  const written = pending.quantity.number.text;
  const shared = {
    place,
    system: read.line.system,
    parameter,
    written,
    writtenUnit: writtenUnit(pending.quantity),
    unit,
  };
  const possible = row.possible ?? [0, Number.MAX_VALUE];
  // Null: no sea water has this specific gravity or conductivity.
  const impossible = value === null || value < possible[0] || value > possible[1];
  if (impossible) {
    if (!read.disregard)
      read.line.report({
        code: "reading/impossible",
        ...shared,
        value,
        range: possible,
        tenth: tenthOf(pending.quantity, row, water),
      });
    return value === null || !Number.isFinite(value)
      ? null
      : { place, value, perKilogram, below: pending.below, impossible, scale, unit };
  }
  if (row.usual && !pending.below && !read.disregard && (value < row.usual[0] || value > row.usual[1])) {
    read.line.report({
      code: "reading/unusual",
      ...shared,
      value,
      range: row.usual,
      tenth: tenthOf(pending.quantity, row, water),
    });
  }
  return { place, value, perKilogram, below: pending.below, impossible, scale, unit };
}

/**
 * The events as they are seen at a moment. What was written for a kilogram is turned with the salinity and
 * temperature nearest to it; of those only what is known by then may count, so the last day's is turned again.
 */
export function eventsSeenAt(events: readonly SystemEvent[], at: number): readonly SystemEvent[] {
  const reads = events.filter((event): event is ReadEvent => event.kind === "read");
  if (!reads.some(({ minute }) => minute > at)) return events;
  const known = reads.filter(({ minute }) => minute <= at);
  const salinities = seenIn(known, "salinity");
  const temperatures = seenIn(known, "temperature");
  return events.map((event) => {
    if (event.kind !== "read" || event.minute > at || event.minute <= at - sameDay) return event;
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

/** The unit as it stands on the line; empty for a bare number. */
const writtenUnit = ({ unit, asCaCO3 }: QuantityText): string =>
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
function tenthOf(quantity: QuantityText, parameter: Parameter, water: ReferenceWater): string | null {
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
