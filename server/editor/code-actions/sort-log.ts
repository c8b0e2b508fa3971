/** Sorts a log by time. Order in a file doesn't count, so it means the same afterwards. */
import { editsOf, rawLines } from "../text-edits.ts";
import { type Asked, type FindActions, inLines } from "./action.ts";
import { problemsAt } from "./fixes.ts";
import { blocksOf, isAtLog, logAt } from "./logs.ts";

export const sorting: FindActions = (asked) => {
  const log = isAsked(asked) ? logAt(asked) : null;
  const text = log && asked.farm.texts.get(log.file);
  if (!log || text === null || text === undefined) return [];
  const blocks = blocksOf(log);
  const dated = blocks.filter(({ minute }) => minute !== null);
  // What is dated nowhere keeps its place: at the front or, being the only one left over, at the end.
  const sorted = [...dated].sort((left, right) => left.minute! - right.minute!);
  const before = dated.findIndex((block, index) => block !== sorted[index]);
  if (before < 0) return [];
  let after = dated.length - 1;
  while (dated[after] === sorted[after]) after -= 1;
  const from = dated[before]!.from;
  const to = dated[after]!.to;
  return [
    {
      ...{ title: "Sort this log by time", kind: "refactor.rewrite", problem: null, isPreferred: false },
      edit: () => {
        const lines = rawLines(text);
        const moved = withOwnEndings(
          sorted.slice(before, after + 1).flatMap((block) => lines.slice(block.from, block.to)),
          to === lines.length ? log.document.lineEnding : null,
        );
        return inLines(editsOf(log.file, lines, [{ from, to, lines: moved }]));
      },
    },
  ];
};

/** A text's last line has no ending of its own; moved up it gets one, and what ends the text now gives up its own. */
const withOwnEndings = (lines: readonly string[], ending: "\n" | "\r\n" | null): readonly string[] =>
  ending !== "\r\n"
    ? lines
    : lines.map((line, index) => line.replace(/\r$/, "") + (index < lines.length - 1 ? "\r" : ""));

/** Asked for at the log's header, or at a line that stands out of order. */
const isAsked = (asked: Asked): boolean =>
  isAtLog(asked) || problemsAt(asked).some(({ code }) => code === "log/out-of-order");
