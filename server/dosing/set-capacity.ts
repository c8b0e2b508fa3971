/** What a pump is set to and can't give in its hours. */
import { factAt } from "../culture/history.ts";
import type { SystemEvent } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import type { DosingFinding } from "./finding.ts";
import { capacityLPerDay } from "./rates.ts";

/** A capacity rounded by hand is no slip. */
const tolerance = 1.005;

/** One finding for each pump of a `set` line that is asked for more than it can give: it counts as what it can. */
export function beyondCapacity(
  system: string,
  constants: SystemConstants,
  event: Extract<SystemEvent, { kind: "set" }>,
): DosingFinding[] {
  return event.rates.flatMap(({ source, litresPerDay, place }): DosingFinding[] => {
    const entry = factAt(constants.facts.sources.get(source), event.minute);
    const most = entry ? capacityLPerDay(entry.value) : null;
    if (most === null || litresPerDay <= most * tolerance) return [];
    return [{ code: "log/no-effect", place, system, source, mostLPerDay: most }];
  });
}
