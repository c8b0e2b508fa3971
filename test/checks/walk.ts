/** A farm out of one text, walked once. */
import { readMoment } from "../../grammar/dates.ts";
import { advance, type Farm } from "../../server/farm.ts";

/** The moment that fixtures are seen as at, and the real clock of theirs. */
export const fixtureMoment = "2026-12-01T08:00";

/** Files by name: the text up to the first `// file: NAME` is the file named by `file`. */
export function filesOf(text: string, file = "farm.marl"): Map<string, string> {
  const [first = "", ...others] = text.split(/^\/\/ file: /m);
  const files = new Map<string, string>();
  if (first.trim() !== "" || others.length === 0) files.set(file, first);
  for (const other of others) {
    const end = other.indexOf("\n");
    files.set(other.slice(0, end).trim(), other.slice(end + 1));
  }
  return files;
}

export function walk(files: ReadonlyMap<string, string>, at = fixtureMoment): Farm {
  const moment = readMoment(at, "midnight");
  if (!moment.known) throw new Error(`${at} is no moment`);
  const { minute } = moment.moment;
  const changes = new Map([...files].map(([file, text]) => [file, { text }]));
  return advance(null, changes, { at: minute, clock: minute });
}
