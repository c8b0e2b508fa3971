/** What can be done to a log as a whole: sort it by time, add a line to it, split it by month. */
import type { MarlDocument, Section } from "../../../grammar/document.ts";
import { mergeMark } from "../../../grammar/line.ts";
import { isBlank } from "../../../grammar/tokens.ts";
import type { Asked } from "./action.ts";

/** The log that a selection begins in. */
export interface Log {
  readonly file: string;
  readonly document: MarlDocument;
  readonly section: Section;
  /** The header's line. */
  readonly first: number;
  /** The last line that is the log's own: blank lines and comments below it belong to what comes next. */
  readonly last: number;
}

export function logAt({ farm, selection }: Asked): Log | null {
  const document = farm.documents.get(selection.file);
  const number = document?.lines[selection.from.line]?.section ?? null;
  const section = number === null ? undefined : document?.sections[number];
  if (!document || section?.kind !== "log" || !section.name) return null;
  const { headerLine: first, lastLine } = section;
  // Two versions of a log at once are a person's to put together.
  if (document.lines.slice(first, lastLine + 1).some(({ text }) => mergeMark.test(text))) return null;
  return { file: selection.file, document, section, first, last: lastOwnLine(document, first, lastLine) };
}

/** True where a selection begins on the header of a log: what is done to all of it isn't offered on each of its lines. */
export const isAtLog = ({ farm, selection: { file, from } }: Asked): boolean =>
  farm.documents
    .get(file)
    ?.sections.some(({ kind, headerLine }) => kind === "log" && headerLine === from.line) ?? false;

/**
 * The last line of a section that is its own: not the blank ones at its end, nor comments at the margin that stand
 * right above the next header.
 */
export function lastOwnLine({ lines, sections }: MarlDocument, first: number, last: number): number {
  const isEmpty = (line: number): boolean => isBlank(lines[line]?.text ?? "");
  let end = last;
  if (sections.some(({ headerLine }) => headerLine === last + 1))
    while (end > first && lines[end]?.text.startsWith("#")) end -= 1;
  while (end > first && isEmpty(end)) end -= 1;
  return end;
}

/** Lines of a log that stay together. */
export interface Block {
  /** The minute of its event; null of what stands before the first event or behind the last. */
  readonly minute: number | null;
  readonly from: number;
  /** Exclusive. */
  readonly to: number;
}

/**
 * Cuts a log into its events, each with the comments and blank lines above it. A line that can't be read, or has no
 * date, stays below the line that it stands under.
 */
export function blocksOf({ document: { lines }, first, last }: Log): Block[] {
  const blocks: Block[] = [];
  let from = first + 1;
  let minute: number | null = null;
  let isOpen = false;
  for (let line = first + 1; line <= last; line += 1) {
    const { text, statement, comment } = lines[line]!;
    const isAbove = isBlank(text) || (comment !== null && isBlank(text.slice(0, comment.start)));
    if (isAbove && isOpen) {
      blocks.push({ minute, from, to: line });
      [from, isOpen, minute] = [line, false, null];
    } else if (!isAbove) {
      const at = statement && "at" in statement ? statement.at.minute : null;
      if (isOpen && at !== null) {
        blocks.push({ minute, from, to: line });
        [from, minute] = [line, at];
      } else if (!isOpen) {
        // What can't be read right below a comment keeps the place of the event before it.
        minute = at ?? blocks.at(-1)?.minute ?? null;
      }
      isOpen = true;
    }
  }
  if (from <= last) blocks.push({ minute, from, to: last + 1 });
  return blocks;
}
