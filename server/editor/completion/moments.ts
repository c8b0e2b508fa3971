/** The moment that it is, and today. */
import { minutesPerDay, writeClock, writeDate } from "../../../grammar/dates.ts";
import type { SectionKind } from "../../../grammar/syntax.ts";
import { momentText } from "../usual-reading.ts";
import type { Offer } from "./item.ts";
import type { CompletionPlace } from "./place.ts";

/** Sections whose lines are mostly events. */
const dated: ReadonlySet<SectionKind> = new Set<SectionKind>(["log", "store", "kit", "saltwater"]);

/** What stands before a line's words when it is written where the cursor is. */
export const indentAt = ({ atMargin }: CompletionPlace): string => (atMargin ? "  " : "");

/** True where an event may begin. */
export const beginsEvent = ({ words, isDated, section, isLast }: CompletionPlace): boolean =>
  words.length === 0 && !isDated && section !== null && dated.has(section) && isLast;

export function momentOffers(place: CompletionPlace): Offer[] {
  const { now, expected, words, isDated, hasTime } = place;
  const offer = (label: string, detail: string, text = label, begins = false): Offer => ({
    ...{ kind: "moment", label, detail, text, filter: label, begins },
  });
  const clock = writeClock(((now % minutesPerDay) + minutesPerDay) % minutesPerDay);
  if (beginsEvent(place)) {
    const indent = indentAt(place);
    return [
      offer(momentText(now), "now", `${indent}${momentText(now)} `, true),
      offer(writeDate(now), "today, the hour unknown", `${indent}${writeDate(now)} `, true),
    ];
  }
  if (isDated && !hasTime && words.length === 0) return [offer(clock, "now", clock, true)];
  return words.length > 0 && expected.includes("a date") ? [offer(writeDate(now), "today")] : [];
}
