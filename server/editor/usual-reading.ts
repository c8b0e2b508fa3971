/**
 * What a system is usually read for, and the `read` line that records it again. Its values are left to be filled in:
 * a line that holds the last ones would be a reading that nobody took.
 */
import { minutesPerDay, writeClock, writeDate } from "../../grammar/dates.ts";
import type { QuantityText, ReadItem, Statement } from "../../grammar/syntax.ts";
import { countUpTo } from "../culture/event-order.ts";
import type { System } from "../culture/model.ts";
import type { Farm } from "../farm.ts";

export interface UsualItem {
  readonly parameter: string;
  /** As it was last written; empty for a bare number. */
  readonly unit: string;
  /** The value as it was last written, with its unit. */
  readonly last: string;
}

export interface UsualReading {
  readonly items: readonly UsualItem[];
  /** The kit that these tests are usually done with; null where none is named. */
  readonly kit: string | null;
  /** Who read them, the last first. */
  readonly by: readonly string[];
}

/** How many of the last `read` lines tell what is usual. */
const lastLines = 10;

type ReadStatement = Extract<Statement, { kind: "read" }>;

/** Readings of a system up to a minute, the kind that is read most often first, of several the last one. */
export function usualReadings(farm: Farm, system: System, now: number): readonly UsualReading[] {
  const groups = new Map<string, ReadStatement[]>();
  for (const line of lastReadLines(farm, system, now)) {
    const key = line.items
      .map(({ parameter }) => parameter.text)
      .sort()
      .join(" ");
    groups.set(key, [...(groups.get(key) ?? []), line]);
  }
  return [...groups.values()].sort((left, right) => right.length - left.length).map(usualOf);
}

/** The last ones, newest first, as they stand in the files. */
function lastReadLines(farm: Farm, { events }: System, now: number): ReadStatement[] {
  const lines: ReadStatement[] = [];
  for (let index = countUpTo(events, now) - 1; index >= 0 && lines.length < lastLines; index -= 1) {
    const event = events[index]!;
    if (event.kind !== "read" || event.disregarded) continue;
    const { file, line } = event.place;
    const statement = farm.documents.get(file)?.lines[line]?.statement;
    if (statement?.kind === "read") lines.push(statement);
  }
  return lines;
}

/** The newest line gives the order and the units; kit and people are those of all. */
function usualOf(lines: readonly ReadStatement[]): UsualReading {
  const newest = lines[0]!;
  const kits = byCount(lines.map(({ kit }) => kit?.text ?? ""));
  const seen = new Set<string>();
  const items = newest.items.filter(({ parameter: { text } }) => !seen.has(text) && seen.add(text));
  return {
    items: items.map(itemOf),
    kit: kits[0] || null,
    by: [...new Set(lines.flatMap(({ by }) => by?.text ?? []))],
  };
}

function itemOf({ parameter, value, below }: ReadItem): UsualItem {
  const unit = unitOf(value);
  const words = [below ? "below" : "", value.number.text, unit];
  return { parameter: parameter.text, unit, last: words.filter(Boolean).join(" ") };
}

const unitOf = ({ unit, asCaCO3 }: QuantityText): string =>
  [unit?.text ?? "", asCaCO3 ? "as CaCO3" : ""].filter(Boolean).join(" ");

/** Each once, the most frequent first. */
function byCount(words: readonly string[]): string[] {
  const count = new Map<string, number>();
  for (const word of words) count.set(word, (count.get(word) ?? 0) + 1);
  return [...count].sort(([, left], [, right]) => right - left).map(([word]) => word);
}

/** A `read` line to be filled in. */
export interface ReadLine extends UsualReading {
  /** `2026-12-01 08:00`. */
  readonly moment: string;
}

/** `2026-12-01 08:00`. */
export const momentText = (minute: number): string =>
  `${writeDate(minute)} ${writeClock(((minute % minutesPerDay) + minutesPerDay) % minutesPerDay)}`;

/** The line for what a system is most often read for, dated now; null where it was never read. */
export function readLineFor(farm: Farm, system: System, now: number): ReadLine | null {
  const [usual] = usualReadings(farm, system, now);
  return usual ? { ...usual, moment: momentText(now) } : null;
}

/** The line up to its first value, which is all that can be written before the tests are done. */
export const beginningOfRead = ({ items }: UsualReading): string => `read ${items[0]?.parameter ?? ""} `;

/** The line with its values left out, as it is shown. */
export function outlineOfRead({ items, kit }: UsualReading): string {
  const values = items.map(({ parameter, unit }) => [parameter, "…", unit].filter(Boolean).join(" "));
  return `read ${values.join(", ")}${kit ? ` with ${kit}` : ""}`;
}

/** By parameter, the unit of its last reading among the last few lines; empty for a bare number. */
export function unitsLastRead(farm: Farm, system: System, now: number): ReadonlyMap<string, string> {
  const units = new Map<string, string>();
  for (const { items } of lastReadLines(farm, system, now))
    for (const { parameter, value } of items)
      if (!units.has(parameter.text)) units.set(parameter.text, unitOf(value));
  return units;
}
