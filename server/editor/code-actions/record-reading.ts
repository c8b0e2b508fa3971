/** Adds a `read` line dated now at the end of a log, for a person to finish: the edit-only twin of a client's command. */

import { lineIn } from "../cursor.ts";
import { systemOfLine } from "../things.ts";
import { beginningOfRead, momentText, readLineFor } from "../usual-reading.ts";
import { type FindActions, inLines } from "./action.ts";
import { logAt } from "./logs.ts";

export const recording: FindActions = (asked) => {
  const log = logAt(asked);
  const header = log && lineIn(asked.farm, log.file, log.first);
  if (!log || !header) return [];
  const { farm, now } = asked;
  const { file, document, last: line } = log;
  const edit = () => {
    const system = systemOfLine(farm, header);
    const usual = system && readLineFor(farm, system, now);
    const words = usual ? beginningOfRead(usual) : "read ";
    const end = document.lines[line]!.text.length;
    return inLines([{ file, line, start: end, end, text: `\n  ${momentText(now)} ${words}` }]);
  };
  const title = "Add a read line dated now";
  return [{ title, kind: "source.recordReading", problem: null, isPreferred: false, edit }];
};
