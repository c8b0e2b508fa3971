/** Whole `read` lines for what a system is usually read for; the values are left to whoever takes them. */
import {
  beginningOfRead,
  momentText,
  outlineOfRead,
  type UsualReading,
  usualReadings,
} from "../usual-reading.ts";
import { inSnippet, type Offer, tabStop } from "./item.ts";
import { beginsEvent, indentAt } from "./moments.ts";
import type { CompletionPlace } from "./place.ts";

/** More kinds of readings than a system is usually read for. */
const most = 3;

export function readingLineOffers(place: CompletionPlace): Offer[] {
  const { section, system, farm, now, words, isDated, isLast, typed } = place;
  const isFresh = beginsEvent(place);
  if (section !== "log" || !system || words.length > 0 || !isLast || !(isDated || isFresh)) return [];
  const moment = isFresh ? `${momentText(now)} ` : "";
  const indent = isFresh ? indentAt(place) : "";
  return usualReadings(farm, system, now)
    .slice(0, most)
    .map((usual) => {
      const outline = outlineOfRead(usual);
      return {
        kind: "line",
        label: moment + outline,
        detail: `last: ${usual.items.map(({ last }) => last).join(", ")}`,
        text: indent + moment + beginningOfRead(usual),
        snippet: indent + moment + snippetOf(usual),
        // A line that begins with its date or with its word is meant all the same.
        filter: /^\d/.test(typed) ? moment + outline : outline,
        about: { kind: "statement", rule: "read" },
        begins: true,
      };
    });
}

function snippetOf({ items, kit, by }: UsualReading): string {
  const values = items.map(({ parameter, unit }, index) =>
    [parameter, tabStop(index + 1, []), inSnippet(unit)].filter(Boolean).join(" "),
  );
  const who = by.length === 0 ? "" : ` by ${tabStop(items.length + 1, by)}`;
  return `read ${values.join(", ")}${kit === null ? "" : ` with ${inSnippet(kit)}`}${who}$0`;
}
