/** Splits a log by month: each month into a file beside it, the newest stays. Every line is kept. */
import { writeDate } from "../../../grammar/dates.ts";
import { writeStatement } from "../../../grammar/write.ts";
import type { Farm } from "../../farm.ts";
import { editsOf, rawLines } from "../text-edits.ts";
import type { Action, FarmEdit, FindActions } from "./action.ts";
import { type Block, blocksOf, isAtLog, type Log, logAt } from "./logs.ts";
import { filesDeclaring, namedIn, reachedFrom, useLine } from "./uses.ts";

const monthOf = (minute: number): string => writeDate(minute).slice(0, 7);

export const splitting: FindActions = (asked) => {
  const { farm, canCreate } = asked;
  const log = canCreate && isAtLog(asked) ? logAt(asked) : null;
  if (log?.document.lines[log.first]?.statement?.kind !== "header") return [];
  const byMonth = new Map<string, Block[]>();
  for (const block of blocksOf(log)) {
    if (block.minute === null) continue;
    const month = monthOf(block.minute);
    const own = byMonth.get(month);
    if (own) own.push(block);
    else byMonth.set(month, [block]);
  }
  const months = [...byMonth.keys()].sort();
  const older = months.slice(0, -1);
  const files = older.map((month) => fileFor(farm, log, month));
  if (older.length === 0 || files.includes(null)) return [];
  const parts = older.map((month, index) => ({ file: files[index]!, blocks: byMonth.get(month)! }));
  const action: Action = {
    ...{ title: "Split this log by month", kind: "refactor.move", problem: null, isPreferred: false },
    edit: () => split(farm, log, parts),
  };
  return [action];
};

/** A name that no file beside the log has. */
function fileFor(farm: Farm, { file, section }: Log, month: string): string | null {
  const folder = file.slice(0, file.lastIndexOf("/") + 1);
  const names = [`log-${month}.marl`, `log-${section.name!.text}-${month}.marl`];
  return names.map((name) => folder + name).find((path) => isFree(farm, path)) ?? null;
}

export const isFree = ({ texts, unreadable, links }: Farm, path: string): boolean =>
  !texts.has(path) && !unreadable.has(path) && !links.has(path);

function split(
  farm: Farm,
  log: Log,
  parts: readonly { readonly file: string; readonly blocks: readonly Block[] }[],
): FarmEdit {
  const { file, document } = log;
  const lines = rawLines(farm.texts.get(file)!);
  const quiet = quietLines(log);
  const { lineEnding, hasByteOrderMark } = document;
  const created = parts.map((part) => {
    const numbers = part.blocks.flatMap(({ from, to }) => numbersOf(from, to));
    const body = numbers.filter((number) => document.lines[number]!.statement?.kind !== "use");
    const first = body.findIndex((number) => document.lines[number]!.text.trim() !== "");
    const uses = usesFor(farm, log, part.file, numbers);
    const header = writeStatement(document.lines[log.first]!.statement!);
    const written = [
      ...quiet.map((number) => document.lines[number]!.text.trim()),
      ...uses.map((target) => useLine(part.file, target)),
      ...(uses.length > 0 || quiet.length > 0 ? [""] : []),
      header,
      ...body.slice(first).map((number) => document.lines[number]!.text),
    ];
    const mark = hasByteOrderMark ? "\ufeff" : "";
    return { file: part.file, text: mark + written.map((line) => line + lineEnding).join("") };
  });
  const gone = parts
    .flatMap(({ blocks }) => blocks)
    .sort((left, right) => left.from - right.from)
    .map(({ from, to }) => ({ from, to, lines: usesAmong(log, from, to).map((line) => lines[line]!) }));
  return { edits: editsOf(file, lines, gone), created };
}

const numbersOf = (from: number, to: number): number[] =>
  Array.from({ length: to - from }, (_, index) => from + index);

/** A `use` line may stand anywhere, and is the file's. */
const usesAmong = ({ document }: Log, from: number, to: number): number[] =>
  document.uses.map(({ line }) => line).filter((line) => from <= line && line < to);

/** Comments that keep problems of the whole file quiet hold for every part of it. */
const quietLines = ({ document, first, last }: Log): number[] =>
  numbersOf(0, document.lines.length).filter((number) => {
    const { text, comment } = document.lines[number]!;
    const asks = comment !== null && /^#[^#]*\bquiet\s+file\s*:/.test(text.slice(comment.start));
    return asks && text.slice(0, comment.start).trim() === "" && !(first < number && number <= last);
  });

/** The fewest of the original's `use` lines that show all that these lines name; else the original itself. */
function usesFor(farm: Farm, log: Log, part: string, numbers: readonly number[]): readonly string[] {
  const { uses } = farm.bound.names;
  const needed = new Set(filesDeclaring(namedIn(farm, log.file, [log.first, ...numbers])));
  needed.delete(part);
  if (needed.has(log.file)) return [log.file];
  const chosen: string[] = [];
  for (const target of uses.get(log.file) ?? []) {
    const reached = reachedFrom(uses, target);
    if (![...needed].some((file) => reached.has(file))) continue;
    chosen.push(target);
    for (const file of reached) needed.delete(file);
  }
  return chosen;
}
