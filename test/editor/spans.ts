/** Spans as a reader sees them: the line with the span in brackets. */
import { inOneGo } from "../../server/culture/keep.ts";
import type { LineSpan, LinesSpan } from "../../server/editor/cursor.ts";
import type { Farm } from "../../server/farm.ts";

export { inOneGo };

/** `farm.marl:3 by-hand [soda]`, lines from 1. */
export function shown(farm: Farm, { file, line, start, end }: LineSpan): string {
  const text = farm.documents.get(file)!.lines[line]!.text;
  const marked = `${text.slice(0, start)}[${text.slice(start, end)}]${text.slice(end)}`;
  return `${file}:${line + 1} ${marked.trim()}`;
}

export const allShown = (farm: Farm, spans: readonly LineSpan[] | null): readonly string[] | null =>
  spans?.map((span) => shown(farm, span)) ?? null;

/** What a span over lines holds. */
export function held(farm: Farm, { file, first, start, last, end }: LinesSpan): string {
  const lines = farm.documents
    .get(file)!
    .lines.slice(first, last + 1)
    .map(({ text }) => text);
  if (lines.length === 1) return lines[0]!.slice(start, end);
  return [lines[0]!.slice(start), ...lines.slice(1, -1), lines.at(-1)!.slice(0, end)].join("\n");
}
