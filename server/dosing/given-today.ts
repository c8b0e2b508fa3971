/** What was given by hand on this day already. */
import { minutesPerDay } from "../../grammar/dates.ts";
import type { System } from "../culture/model.ts";

export interface GivenToday {
  readonly litres: number;
  /** When the last of it was given. */
  readonly minute: number;
}

/** The doses of a solution on the calendar day of a minute, up to it; null where there was none. */
export function givenToday(
  { system: { events }, at }: { readonly system: Pick<System, "events">; readonly at: number },
  solution: string,
): GivenToday | null {
  const midnight = Math.floor(at / minutesPerDay) * minutesPerDay;
  let litres = 0;
  let minute: number | null = null;
  for (let index = events.length - 1; index >= 0; index -= 1) {
    const event = events[index]!;
    if (event.minute < midnight) break;
    if (event.minute > at || event.kind !== "gave") continue;
    for (const dose of event.doses) {
      if (dose.solution !== solution) continue;
      litres += dose.litres;
      minute ??= event.minute;
    }
  }
  return minute === null ? null : { litres, minute };
}
