/** Every place that speaks of what is under the cursor. */
import type { Farm } from "../farm.ts";
import type { Cursor, LineSpan } from "./cursor.ts";
import { mentionSteps } from "./things.ts";
import { underCursor } from "./under-cursor.ts";

/** All mentions in the farm, by file and line, pausing now and then; null where the cursor is on no known name. */
export function* references(
  farm: Farm,
  cursor: Cursor,
  withDeclarations: boolean,
): Generator<void, readonly LineSpan[] | null> {
  const thing = underCursor(farm, cursor)?.thing;
  if (!thing) return null;
  const mentions = yield* mentionSteps(farm, thing);
  return mentions
    .filter(({ declares }) => withDeclarations || !declares)
    .map(({ file, line, start, end }) => ({ file, line, start, end }));
}
