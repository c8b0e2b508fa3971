/** The other places of a file that speak of what is under the cursor: a thing, or a parameter. */
import { linesAtOnce } from "../culture/keep.ts";
import type { Farm } from "../farm.ts";
import type { Cursor, LineSpan } from "./cursor.ts";
import { mentionSteps } from "./things.ts";
import { underCursor } from "./under-cursor.ts";
import { parametersIn } from "./words.ts";

export interface Highlight {
  readonly span: LineSpan;
  readonly declares: boolean;
}

/** By line, pausing now and then. */
export function* highlights(farm: Farm, cursor: Cursor): Generator<void, readonly Highlight[]> {
  const found = underCursor(farm, cursor);
  const { file } = cursor;
  if (found?.word?.role === "parameter") return yield* ofParameter(farm, file, found.word.text);
  if (!found?.thing) return [];
  const mentions = yield* mentionSteps(farm, found.thing, [file]);
  return mentions.map(({ line, start, end, declares }) => ({ span: { file, line, start, end }, declares }));
}

function* ofParameter(farm: Farm, file: string, parameter: string): Generator<void, readonly Highlight[]> {
  const highlights: Highlight[] = [];
  for (const [number, line] of farm.documents.get(file)?.lines.entries() ?? []) {
    if (number % linesAtOnce === 0) yield;
    if (!line.text.includes(parameter)) continue;
    for (const { start, end } of parametersIn(line))
      if (line.text.slice(start, end) === parameter)
        highlights.push({ span: { file, line: number, start, end }, declares: false });
  }
  return highlights;
}
