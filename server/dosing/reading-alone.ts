/** The carbonate system of one entry of a log, with what that alone rests on. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { Assumption, ReadEvent, SystemEvent } from "../culture/model.ts";
import type { KeptReadings, ReadingWithCarbonate } from "./carbonate-of-reading.ts";

export interface ReadingAlone {
  readonly carbonate: ReadingWithCarbonate["carbonate"];
  readonly assumptions: readonly Assumption[];
  /** The entry that the other half was read with, where that came later. */
  readonly with: ReadEvent | null;
}

/**
 * The carbonate system stands at the later of the two entries that hold alkalinity and pH; the earlier one is told of
 * it too. `kept`: all readings of the log up to a moment, as they were worked out; a later one has none.
 */
export function readingAlone(
  events: readonly SystemEvent[],
  event: ReadEvent,
  kept: Pick<KeptReadings, "readings" | "bases">,
): ReadingAlone {
  const solved = (of: ReadEvent) => {
    const index = kept.readings.findIndex((reading) => reading.event === of);
    const carbonate = kept.readings[index]?.carbonate;
    return carbonate ? { carbonate, assumptions: kept.bases[index]?.assumptions ?? [] } : null;
  };
  const own = solved(event);
  if (own) return { ...own, with: null };
  const later = otherHalf(events, event);
  const theirs = later && solved(later);
  return theirs ? { ...theirs, with: later } : { carbonate: null, assumptions: [], with: null };
}

/** Minutes within which alkalinity and pH count as read of one water. */
const together = 60;

const holds = ({ values, disregarded }: ReadEvent, name: ParameterName): boolean => {
  const value = values[name];
  return value !== undefined && !disregarded && !value.impossible && !value.below;
};

/** The next entry with the half that this one lacks, if none with the half that it has comes before. */
function otherHalf(events: readonly SystemEvent[], event: ReadEvent): ReadEvent | null {
  const halves = ["alkalinity", "pH"] as const;
  const own = halves.find((name) => holds(event, name));
  const missing = halves.find((name) => !holds(event, name));
  if (!own || !missing) return null;
  for (const next of events.slice(events.indexOf(event) + 1)) {
    if (next.minute - event.minute > together) return null;
    if (next.kind !== "read") continue;
    if (holds(next, own)) return null;
    if (holds(next, missing)) return next;
  }
  return null;
}
