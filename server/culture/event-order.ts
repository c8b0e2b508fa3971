/** The canonical order of events: by minute, then by kind, then by tidy text. Order in a file doesn't count. */
import type { SystemEvent } from "./model.ts";

/** Kinds of event in the order in which those of one minute count. */
export const eventKinds = [
  "read",
  "checked",
  "mixed",
  "received",
  "counted",
  "calibrated",
  "filled",
  "level",
  "stocked",
  "removed",
  "moved",
  "stopped",
  "started",
  "renewed",
  "topped",
  "gave",
  "set",
  "note",
] as const;

const rank = new Map<string, number>(eventKinds.map((kind, index) => [kind, index]));

/** Negative where the left event comes first. Events of equal rank and text are in no order that matters. */
export function compareEvents(left: SystemEvent, right: SystemEvent): number {
  return (
    left.minute - right.minute ||
    (rank.get(left.kind) ?? 0) - (rank.get(right.kind) ?? 0) ||
    (left.text < right.text ? -1 : left.text > right.text ? 1 : 0)
  );
}

/** How many of some events in order happened up to a minute. */
export function countUpTo(events: readonly { readonly minute: number }[], minute: number): number {
  let low = 0;
  let high = events.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (events[middle]!.minute <= minute) low = middle + 1;
    else high = middle;
  }
  return low;
}
