/** A farm out of one text, walked once. */
import { readMoment } from "../../grammar/dates.ts";
import { advance, type Farm } from "../../server/farm.ts";
import { exampleMoment, filesOf } from "../../server/report/explain/problems.ts";

/** The moment that fixtures are seen as at, and the real clock of theirs: that of the rules' examples. */
export const fixtureMoment = exampleMoment;

export { filesOf };

export function walk(files: ReadonlyMap<string, string>, at = fixtureMoment): Farm {
  const moment = readMoment(at, "midnight");
  if (!moment.known) throw new Error(`${at} is no moment`);
  const { minute } = moment.moment;
  const changes = new Map([...files].map(([file, text]) => [file, { text }]));
  return advance(null, changes, { at: minute, clock: minute });
}
