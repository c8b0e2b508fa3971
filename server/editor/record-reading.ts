/** Values read by a person → one tidy `read` line, and where it goes in the log. What can't be read is refused in words. */
import { clockMinute, minutesPerDay, readMoment } from "../../grammar/dates.ts";
import { readLine } from "../../grammar/line.ts";
import { numberReadings, plainNumber } from "../../grammar/numbers.ts";
import { parameterTable } from "../../grammar/parameters.ts";
import type { ReadItem, Statement } from "../../grammar/syntax.ts";
import { writeStatement } from "../../grammar/write.ts";
import { editedText } from "../checks/apply-fixes.ts";
import type { LineEdit, Problem } from "../checks/problem.ts";
import { intoLog, linesAtEnd, sectionAtEnd } from "../checks/sections.ts";
import { countUpTo } from "../culture/event-order.ts";
import type { System } from "../culture/model.ts";
import type { Place } from "../culture/place.ts";
import { advanceBySystem, type Farm } from "../farm.ts";
import { momentText, usualReadings } from "./usual-reading.ts";

export interface LastValue {
  /** With its unit, as it was written. */
  readonly text: string;
  /** `2026-12-01 07:30`. */
  readonly moment: string;
}

export interface AskedItem {
  readonly parameter: string;
  /** Empty for a bare number. */
  readonly unit: string;
  readonly last: LastValue | null;
}

/** The units that a parameter is asked for in where it was never read: the usual ones of the trade. */
const firstUnit = (parameter: (typeof parameterTable)[number]): string =>
  parameter.name === "alkalinity" ? "dKH" : parameter.unit;

/** Every parameter, with its last value and unit in this system; those read last come first. */
export function askedItems(farm: Farm, system: System, now: number): readonly AskedItem[] {
  const found = new Map<string, AskedItem>();
  const { events } = system;
  for (let index = countUpTo(events, now) - 1; index >= 0; index -= 1) {
    const event = events[index]!;
    if (event.kind !== "read" || event.disregarded) continue;
    const statement = farm.documents.get(event.place.file)?.lines[event.place.line]?.statement;
    if (statement?.kind !== "read") continue;
    for (const item of statement.items)
      if (!found.has(item.parameter.text)) found.set(item.parameter.text, askedAgain(item, event.minute));
    if (found.size === parameterTable.length) break;
  }
  const others = parameterTable
    .filter(({ name }) => !found.has(name))
    .map((parameter) => ({ parameter: parameter.name, unit: firstUnit(parameter), last: null }));
  return [...found.values(), ...others];
}

function askedAgain({ parameter, value, below }: ReadItem, minute: number): AskedItem {
  const unit = [value.unit?.text ?? "", value.asCaCO3 ? "as CaCO3" : ""].filter(Boolean).join(" ");
  const text = [below ? "below" : "", value.number.text, unit].filter(Boolean).join(" ");
  return { parameter: parameter.text, unit, last: { text, moment: momentText(minute) } };
}

/** What is read together in a system, the most usual first. */
export const usuallyTogether = (farm: Farm, system: System, now: number) =>
  usualReadings(farm, system, now).map(({ items, kit }) => ({
    parameters: items.map(({ parameter }) => parameter),
    kit,
  }));

export interface Reading {
  readonly values: readonly { readonly parameter: string; readonly text: string }[];
  readonly kit: string | null;
  readonly by: string | null;
  /** `2026-12-01 08:00`, or a time of today; null for now. */
  readonly moment: string | null;
}

export type ReadingEdit = { readonly line: string; readonly edit: LineEdit } | { readonly refusal: string };

/** The line with these values, and the edit that puts it where its time belongs. */
export function readingEdit(farm: Farm, system: System, reading: Reading, now: number): ReadingEdit {
  const at = momentOf(reading.moment, now);
  if (at === null)
    return { refusal: `"${reading.moment}" is no time. Write 08:00, or 2026-12-01 08:00 for another day.` };
  if (at > now) return { refusal: `${momentText(at)} is still to come. Write when the water was read.` };
  const units = new Map(askedItems(farm, system, now).map(({ parameter, unit }) => [parameter, unit]));
  const items: string[] = [];
  for (const { parameter, text } of reading.values) {
    const item = itemText(parameter, text, units.get(parameter) ?? "");
    if (typeof item !== "string") return item;
    items.push(item);
  }
  if (items.length === 0) return { refusal: "No value is given yet." };
  const kit = reading.kit ? ` with ${reading.kit}` : "";
  const by = reading.by ? ` by ${reading.by}` : "";
  const statement = statementOf(`${momentText(at)} read ${items.join(", ")}${kit}${by}`);
  if (statement?.kind !== "read" || (statement.by?.text ?? null) !== (reading.by || null))
    return { refusal: `"${reading.by ?? ""}" is no name. Write one word or initials.` };
  const line = writeStatement(statement);
  return { line, edit: placed(farm, system, at, line) };
}

function momentOf(text: string | null, now: number): number | null {
  const words = (text ?? "").trim();
  if (words === "") return now;
  const clock = clockMinute(words);
  if (clock !== null) return now - (((now % minutesPerDay) + minutesPerDay) % minutesPerDay) + clock;
  const read = readMoment(words.replace(" ", "T"), "noon");
  return read.known && read.moment.timeKnown ? read.moment.minute : null;
}

/** The line's statement, where all of it can be read. */
function statementOf(text: string): Statement | null {
  const { statement, findings } = readLine("log", `  ${text}`);
  return findings.length === 0 ? statement : null;
}

const leading = /^((?:below\s+)?)([-+−]?[\d.,'’]*\d)(.*)$/s;

/** `alkalinity 7.8 dKH` from `7.8`; a unit that is written goes before the usual one. */
function itemText(parameter: string, given: string, unit: string): string | { readonly refusal: string } {
  const text = given.trim();
  const [, below = "", number = "", rest = ""] = leading.exec(text) ?? [];
  const numbers = plainNumber(number) !== null ? [number] : numberReadings(number);
  if (numbers.length > 1)
    return { refusal: `${number} may be ${numbers.join(" or ")}. Write it with a point.` };
  const [plain] = numbers;
  if (plain === undefined)
    return {
      refusal: `"${text}" is no value of ${parameter}. Write a number, for example ${unit ? `7.8 or 7.8 ${unit}` : "7.8"}.`,
    };
  const withUnit = unit === "" ? [] : [`${below}${plain} ${unit}${rest}`];
  for (const value of [...withUnit, `${below}${plain}${rest}`]) {
    const statement = statementOf(`2000-01-01 read ${parameter} ${value}`);
    if (statement?.kind !== "read") continue;
    const { items, kit, by, disregard } = statement;
    if (items.length === 1 && !kit && !by && !disregard) return `${parameter} ${value}`;
  }
  return {
    refusal: `"${text}" is no value of ${parameter}. Write a number${unit ? `, in ${unit} where no unit follows` : ""}.`,
  };
}

/** In order of time in the log that holds the newest line; in a log without lines; else in a new log. */
function placed(farm: Farm, system: System, at: number, line: string): LineEdit {
  const { documents } = farm;
  const newest = newestPlace(system, at);
  const ordered = intoLog(documents, system.name, newest, at, [line]);
  if (ordered) return ordered;
  for (const file of [...new Set([...system.logFiles, system.place.file])]) {
    const document = documents.get(file);
    const log = document?.sections.find(({ kind, name }) => kind === "log" && name?.text === system.name);
    if (document && log) return linesAtEnd(document, file, log, [line]);
  }
  const { file } = system.place;
  return sectionAtEnd(documents.get(file)!, file, `log ${system.name}`, [line]);
}

/** Where the last line up to a minute stands; what arrives from another system stands in that one's log. */
function newestPlace({ events }: System, at: number): Place | null {
  const own = events.filter(({ kind }) => kind !== "stocked");
  return (own.findLast(({ minute }) => minute <= at) ?? own[0])?.place ?? null;
}

/** What a problem says, without why it matters and what to do. */
function whatOf({ message, why }: Problem): string {
  const end = why === "" ? -1 : message.indexOf(why);
  return end > 0 ? message.slice(0, end).trim() : message;
}

/** What would be told of the line if it stood there, pausing now and then. */
export function* notesOn(
  farm: Farm,
  { line, edit }: { readonly line: string; readonly edit: LineEdit },
): Generator<unknown, readonly string[]> {
  const text = farm.texts.get(edit.file);
  if (text === undefined) return [];
  const changes = new Map([[edit.file, { text: editedText(text, [edit]) }]]);
  const after = yield* advanceBySystem(farm, changes, farm.moment);
  const lines = after.documents.get(edit.file)?.lines ?? [];
  const number = lines.findIndex((each, index) => index > edit.line && each.text.trim() === line);
  return after.problems
    .filter(({ place, severity }) => place.file === edit.file && place.line === number && severity !== "hint")
    .map(whatOf);
}
