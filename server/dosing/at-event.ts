/** The water right before an event of a log and right after it. */
import { countUpTo } from "../culture/event-order.ts";
import type { SystemEvent } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import { foldEvent, foldEvents, foldUpTo, withReadingsOf } from "./fold.ts";
import type { FoldedLog } from "./fold-log.ts";
import type { WaterState } from "./water-state.ts";

/** A system's log in order. Where it is folded already, nothing is folded from its beginning again. */
export interface LogToLookInto {
  readonly constants: SystemConstants;
  readonly events: readonly SystemEvent[];
  readonly folded: Pick<FoldedLog, "checkpoints"> | null;
}

export interface AtEvent {
  readonly before: WaterState;
  readonly after: WaterState;
}

/** The states around an event, all before it in the log's order counted; null where the log doesn't hold it. */
export function atEvent(log: LogToLookInto, event: SystemEvent): AtEvent | null {
  const index = log.events.indexOf(event);
  return index < 0 ? null : foldEvent(afterFirst(log, index, event.minute), event, log.constants);
}

/** The state at a minute when all of that minute has happened: the reads of one minute are one reading. */
export const afterMinute = (log: LogToLookInto, minute: number): WaterState =>
  afterFirst(log, countUpTo(log.events, minute), minute);

/** The water after the first so many events, carried to a minute. */
function afterFirst({ constants, events, folded }: LogToLookInto, count: number, minute: number): WaterState {
  const from = folded?.checkpoints.findLast(({ index }) => index <= count);
  if (!from) return foldEvents(constants, events.slice(0, count), minute).state;
  const start = withReadingsOf(from.state, events.slice(0, from.index));
  return foldUpTo(start, events.slice(from.index, count), minute, constants).state;
}
