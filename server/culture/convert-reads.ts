/** Readings as written → in the model's units, with the water of their moment. */
import { type ParameterName, parameterOf } from "../../grammar/parameters.ts";
import type { BoundEvent } from "./bind-events.ts";
import { densityOf, displayUnit, type ReferenceWater } from "./binder.ts";
import { inModelUnit } from "./convert.ts";
import { defaults } from "./defaults.ts";
import { countUpTo } from "./event-order.ts";
import type { CultureFinding } from "./finding.ts";
import { fromEitherEnd, linesAtOnce, sameAtStart } from "./keep.ts";
import type { ByParameter, ReadEvent, ReadValue, SystemEvent } from "./model.ts";
import type { Place } from "./place.ts";
import {
  inRange,
  nearestKnown,
  type PendingRead,
  type PendingValue,
  type PendingValues,
  type Seen,
  sameDay,
  tenthOf,
  writtenUnit,
} from "./readings.ts";

/** A read line in the model's units, with what was found in that, and what it was made from. */
export interface ConvertedRead {
  readonly event: ReadEvent;
  readonly findings: readonly CultureFinding[];
  readonly pending: PendingValues;
  readonly own: OwnWater;
  readonly water: ReferenceWater;
}

interface OwnWater {
  /** Salinity and temperature of the line itself, as far as sea water can have them. */
  readonly here: ReferenceValues;
  /** The same, as far as they count for other lines too. */
  readonly elsewhere: ReferenceValues;
}

type ReferenceValues = Readonly<Record<"salinity" | "temperature", number | null>>;

/** The events of a log with their readings converted, and what the next conversion may take from it. */
export interface ConvertedLog {
  readonly lines: readonly BoundEvent[];
  /** One for each line; null for what is no reading. */
  readonly reads: readonly (ConvertedRead | null)[];
  /** One for each line. */
  readonly events: readonly SystemEvent[];
  readonly salinities: readonly Seen[];
  readonly temperatures: readonly Seen[];
  readonly found: readonly { readonly minute: number; readonly finding: CultureFinding }[];
}

/**
 * Converts all readings among a log's events, which are in order. Salinity and temperature need no other reading, so
 * they come first; then what is written for a kilogram is turned with the water of its own moment. What was converted
 * before an edit stays to a day before it: no reading knows of one that is later than that.
 */
export function* convertReads(
  lines: readonly BoundEvent[],
  last: ConvertedLog | undefined,
): Generator<void, ConvertedLog> {
  const same = sameAtStart(last?.lines ?? [], lines);
  const changed = Math.min(...[lines[same], last?.lines[same]].map((line) => line?.minute ?? Infinity));
  const until = changed - sameDay - 1;
  const first = countUpTo(lines, until);
  const before = <T extends { readonly minute: number }>(list: readonly T[] | undefined): T[] =>
    list?.slice(0, countUpTo(list, until)) ?? [];
  const salinities = before(last?.salinities);
  const temperatures = before(last?.temperatures);
  const pending: { readonly last: ConvertedRead | null; readonly own: OwnWater }[] = [];
  for (let index = first; index < lines.length; index += 1) {
    if (index % linesAtOnce === 0) yield;
    const read = lines[index]!;
    if (read.kind !== "read") continue;
    const { minute } = read;
    const isIt = (kept: ConvertedRead | null) => kept?.pending === read.pending;
    const kept = fromEitherEnd(last?.reads ?? [], lines.length, index, isIt) ?? null;
    const own = kept?.own ?? ownWater(read);
    pending.push({ last: kept, own });
    const { salinity, temperature } = own.elsewhere;
    if (salinity !== null) salinities.push({ minute, value: salinity });
    if (temperature !== null) temperatures.push({ minute, value: temperature });
  }
  const reads = last?.reads.slice(0, first) ?? [];
  const events = last?.events.slice(0, first) ?? [];
  const found = before(last?.found);
  let next = 0;
  for (let index = first; index < lines.length; index += 1) {
    if (index % linesAtOnce === 0) yield;
    const read = lines[index]!;
    if (read.kind !== "read") {
      reads.push(null);
      events.push(read);
      continue;
    }
    const { last: kept, own } = pending[next]!;
    next += 1;
    const { minute } = read;
    const salinity = own.here.salinity ?? nearestKnown(salinities, minute, defaults.salinity.value).value;
    const temperatureDegC =
      own.here.temperature ?? nearestKnown(temperatures, minute, defaults.temperature.value).value;
    const isSame = kept?.water.salinity === salinity && kept.water.temperatureDegC === temperatureDegC;
    const converted = isSame ? onLine(kept, read) : convert(read, own, { salinity, temperatureDegC });
    reads.push(converted);
    events.push(converted.event);
    for (const finding of converted.findings) found.push({ minute, finding });
  }
  return { lines, reads, events, salinities, temperatures, found };
}

function ownWater({ pending, disregard }: PendingRead): OwnWater {
  const value = (parameter: "salinity" | "temperature"): number | null => {
    const read = pending.get(parameter);
    return inRange(
      parameter,
      read ? inModelUnit(read.written.amount, parameterOf(parameter)!, () => 1) : null,
    );
  };
  const here = { salinity: value("salinity"), temperature: value("temperature") };
  const counted = (parameter: "salinity" | "temperature") =>
    disregard || pending.get(parameter)?.below ? null : here[parameter];
  return { here, elsewhere: { salinity: counted("salinity"), temperature: counted("temperature") } };
}

function convert(read: PendingRead, own: OwnWater, water: ReferenceWater): ConvertedRead {
  const findings: CultureFinding[] = [];
  const values: Partial<Record<ParameterName, ReadValue>> = {};
  for (const [parameter, pending] of read.pending) {
    const value = convertValue(read, parameter, pending, water, findings);
    if (value) values[parameter] = value;
  }
  return { event: readEvent(read, values), findings, pending: read.pending, own, water };
}

/** A line converted before, where it stands now. */
function onLine(converted: ConvertedRead, { place }: PendingRead): ConvertedRead {
  const { event, findings } = converted;
  if (event.place.line === place.line) return converted;
  const placed = <T extends { readonly place: Place }>(part: T): T => ({
    ...part,
    place: { ...part.place, line: place.line },
  });
  const values = Object.entries(event.values as Record<string, ReadValue>).map(([name, value]) => [
    name,
    placed(value),
  ]);
  return {
    ...converted,
    event: { ...event, place, values: Object.fromEntries(values) },
    findings: findings.map(placed),
  };
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
  findings: CultureFinding[],
): ReadValue | null {
  const row = parameterOf(parameter)!;
  const { amount } = pending.written;
  const value = inModelUnit(amount, row, () => densityOf(water));
  const perKilogram =
    amount.sort === "dissolved" && amount.per === "kilogram" ? inModelUnit(amount, row, () => 1) : null;
  const unit = displayUnit(pending.quantity, row, water);
  const place = { ...read.place, span: { start: pending.word.start, end: pending.quantity.end } };
  const scale = amount.sort === "pH" ? amount.scale : null;
  const written = pending.quantity.number.text;
  const shared = {
    place,
    system: read.system,
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
      findings.push({
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
    findings.push({
      code: "reading/unusual",
      ...shared,
      value,
      range: row.usual,
      tenth: tenthOf(pending.quantity, row, water),
    });
  }
  return { place, value, perKilogram, below: pending.below, impossible, scale, unit };
}
