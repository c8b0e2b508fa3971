/** Wall-clock dates and times: reading them, writing them, and what other ways of writing one may have meant. */
import type { Moment } from "./syntax.ts";

export const minutesPerDay = 24 * 60;
/** Years that a log can be of. A date beyond the four digits of a year couldn't be written. */
const firstYear = 1900;
const lastYear = 9998;
const noon = 720;

/** What a date without its time stands for: an event's hour is unknown, a fact begins with the day. */
export type BareDate = "noon" | "midnight";

const two = (value: number): string => String(value).padStart(2, "0");

/** Minutes since 1970-01-01 at 00:00 of a `YYYY-MM-DD`, or null where there is no such day. */
export function dayMinute(text: string): number | null {
  const [, year, month, day] = /^(\d{4})-(\d{2})-(\d{2})$/.exec(text) ?? [];
  if (!year || !month || !day || Number(year) < firstYear || Number(year) > lastYear) return null;
  const date = new Date(Date.UTC(Number(year), Number(month) - 1, Number(day)));
  // A day past the month's end runs over into the next: then it comes back as another.
  return date.getUTCMonth() === Number(month) - 1 && date.getUTCDate() === Number(day)
    ? date.getTime() / 60_000
    : null;
}

/** Minutes after midnight of an `H:MM` or `HH:MM`, with or without the `T`; null past 24:00. */
export function clockMinute(text: string): number | null {
  const [, hour, minute] = /^[Tt]?(\d{1,2}):(\d{2})$/.exec(text) ?? [];
  if (!hour || !minute || Number(minute) > 59) return null;
  const total = Number(hour) * 60 + Number(minute);
  return total <= minutesPerDay ? total : null;
}

/** The dates that this word may have meant. */
export function dateReadings(text: string): readonly string[] {
  if (/^\d{8}$/.test(text)) return dateReadings(text.replace(/(....)(..)(..)/, "$1-$2-$3"));
  const words = text.split(/[^\d]/);
  const fullYear = (word: string) => (word.length === 4 ? word : `20${word.padStart(2, "0")}`);
  const orders =
    words[0]!.length === 4
      ? [[0, 1, 2], ...(/^\d{4}-\d\d-\d\d$/.test(text) ? [[0, 2, 1]] : [])]
      : [
          ...(/^\d\d-\d\d?-\d\d$/.test(text) ? [[0, 1, 2]] : []),
          [2, 1, 0],
          [2, 0, 1],
          ...(words[2]!.length === 4 ? [] : [[0, 1, 2]]),
        ];
  const written = orders.map(
    ([year, month, day]) =>
      `${fullYear(words[year!]!)}-${words[month!]!.padStart(2, "0")}-${words[day!]!.padStart(2, "0")}`,
  );
  return [...new Set(written)].filter((date) => dayMinute(date) !== null);
}

/** The times that this word may have meant. */
export function timeReadings(text: string): readonly string[] {
  const [, hour, minute, half] = /^[Tt]?(\d{1,2}):(\d{1,2})(?::\d+)? ?([AaPp])?/.exec(text) ?? [];
  if (!hour || !minute) return [];
  const twelve = Number(hour) >= 1 && Number(hour) <= 12;
  if (half && !twelve) return [];
  const shift = half === undefined ? Number(hour) : (Number(hour) % 12) + (/p/i.test(half) ? 12 : 0);
  const time = `${two(shift)}:${two(Number(minute))}`;
  return clockMinute(time) === null ? [] : [time];
}

/** `2026-12-01`. */
export const writeDate = (minute: number): string => new Date(minute * 60_000).toISOString().slice(0, 10);

/** `08:00`, from minutes after midnight. */
export const writeClock = (minute: number): string => `${two(Math.floor(minute / 60))}:${two(minute % 60)}`;

/** `2026-12-01T08:00`. */
export const writeMoment = (minute: number): string => new Date(minute * 60_000).toISOString().slice(0, 16);

/** The moment of a real date and, where it was written, a real time. */
export function momentAt(
  day: number,
  clock: number | null,
  bareDate: BareDate,
): Omit<Moment, "start" | "end"> {
  const bare = bareDate === "noon" ? noon : 0;
  return { minute: day + (clock ?? bare), timeKnown: clock !== null };
}

export type MomentReading =
  | { readonly known: true; readonly moment: Moment }
  | { readonly known: false; readonly readings: readonly string[] };

/** Reads a moment that stands alone, such as a command's argument: `2026-12-01`, `2026-12-01T08:00`. */
export function readMoment(text: string, bareDate: BareDate): MomentReading {
  const [, date, time] = /^\s*(\S+?)(?:(?:\s+|(?=[Tt]\d))[Tt]?(\d\S*))?\s*$/.exec(text) ?? [];
  const day = date === undefined ? null : dayMinute(date);
  const clock = time === undefined ? null : clockMinute(time);
  if (day === null || (time !== undefined && clock === null)) {
    const dates = day !== null ? [date!] : /^\d+\D\d+\D\d+$/.test(date ?? "") ? dateReadings(date!) : [];
    const times = time === undefined ? [""] : timeReadings(time).map((word) => `T${word}`);
    return { known: false, readings: dates.flatMap((word) => times.map((hour) => word + hour)) };
  }
  return { known: true, moment: { start: 0, end: text.length, ...momentAt(day, clock, bareDate) } };
}
