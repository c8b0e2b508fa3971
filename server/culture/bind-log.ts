/** One section of a log → its events. A line that says the same and whose names mean the same is bound once. */
import type { DocumentLine } from "../../grammar/document.ts";
import type { Event } from "../../grammar/syntax.ts";
import { type BoundEvent, bindEvent, onLine } from "./bind-events.ts";
import type { CultureFinding } from "./finding.ts";
import type { House } from "./house.ts";
import { fromEitherEnd, sameAtStart } from "./keep.ts";
import type { SystemFacts } from "./model.ts";

/** A bound line, and where it stood. */
interface BoundLine {
  readonly statement: Event;
  readonly line: number;
  readonly event: BoundEvent | null;
  readonly findings: readonly CultureFinding[];
  readonly used: ReadonlySet<string>;
}

/** Some lines of a log in a row, with what they are bound to. */
interface BoundPart {
  readonly firstLine: number;
  /** The minute of the last event before them; null where there is none. */
  readonly after: number | null;
  readonly documentLines: readonly DocumentLine[];
  /** One for each line; null for a line that holds no event. */
  readonly lines: readonly (BoundLine | null)[];
  readonly events: readonly BoundEvent[];
  readonly findings: readonly CultureFinding[];
  readonly used: ReadonlySet<string>;
  readonly refersTo: ReadonlySet<string>;
  readonly lastMinute: number | null;
}

/** A section of a log, and what names mean in it. */
export interface BoundLog {
  readonly meanings: string;
  readonly parts: readonly BoundPart[];
  readonly events: readonly BoundEvent[];
}

/** So many lines are bound, and kept, together. */
const linesInPart = 128;

/** Binds the lines of one section. Of those that it had before and that mean the same whole parts are kept. */
export function* bindLog(
  house: House,
  file: string,
  index: number,
  facts: SystemFacts,
  meanings: string,
  last: BoundLog | undefined,
): Generator<void, BoundLog> {
  const document = house.files.get(file)!;
  const { firstLine, lastLine, name } = document.sections[index]!;
  const system = name!.text;
  const before = last?.meanings === meanings ? last : null;
  const length = lastLine - firstLine + 1;
  const linesBefore = before?.parts.flatMap(({ lines }) => lines) ?? [];
  const boundOn = (line: number, statement: Event): BoundLine => {
    const at = line - firstLine;
    const kept = fromEitherEnd(linesBefore, length, at, (bound) => bound?.statement === statement);
    return kept ? onItsLine(kept, line) : bindLine(house, file, system, line, statement, facts);
  };
  const parts: BoundPart[] = [];
  let after: number | null = null;
  for (let line = firstLine; line <= lastLine; line += linesInPart) {
    yield;
    const documentLines = document.lines.slice(line, Math.min(line + linesInPart, lastLine + 1));
    const kept: BoundPart | undefined = before?.parts[parts.length];
    const isSame: boolean =
      kept?.firstLine === line &&
      kept.after === after &&
      kept.documentLines.length === documentLines.length &&
      sameAtStart(kept.documentLines, documentLines) === documentLines.length;
    const part: BoundPart = isSame && kept ? kept : partOf(file, system, line, after, documentLines, boundOn);
    parts.push(part);
    after = part.lastMinute;
  }
  return { meanings, parts, events: parts.flatMap(({ events }) => events) };
}

function partOf(
  file: string,
  system: string,
  firstLine: number,
  after: number | null,
  documentLines: readonly DocumentLine[],
  boundOn: (line: number, statement: Event) => BoundLine,
): BoundPart {
  const lines: (BoundLine | null)[] = [];
  const findings: CultureFinding[] = [];
  const used = new Set<string>();
  const refersTo = new Set<string>();
  let lastMinute = after;
  for (const [index, { statement }] of documentLines.entries()) {
    if (!statement || !("at" in statement)) {
      lines.push(null);
      continue;
    }
    const line = firstLine + index;
    const bound = boundOn(line, statement);
    lines.push(bound);
    if (lastMinute !== null && statement.at.minute < lastMinute)
      findings.push({ code: "log/out-of-order", place: { file, line, span: statement.at }, system });
    lastMinute = statement.at.minute;
    findings.push(...bound.findings);
    for (const ref of bound.used) used.add(ref);
    for (const ref of refsOf(bound.event)) refersTo.add(ref);
  }
  const events = lines.flatMap((bound) => bound?.event ?? []);
  return { firstLine, after, documentLines, lines, events, findings, used, refersTo, lastMinute };
}

/** The solutions and waters that an event names. */
function refsOf(event: BoundEvent | null): readonly string[] {
  if (event?.kind === "renewed") return [event.water];
  if (event?.kind === "topped") return event.solution ? [event.solution] : [];
  return event?.kind === "gave" ? event.doses.map(({ solution }) => solution) : [];
}

function bindLine(
  { names }: House,
  file: string,
  system: string,
  line: number,
  statement: Event,
  facts: SystemFacts,
): BoundLine {
  const findings: CultureFinding[] = [];
  const used = new Set<string>();
  const report = (finding: CultureFinding) => void findings.push(finding);
  const event = bindEvent({ file, system, names, used, report, line }, statement, { facts });
  return { statement, line, event, findings, used };
}

/** A bound line on the line where it stands now: all that it points at stands on it. */
function onItsLine(bound: BoundLine, line: number): BoundLine {
  if (bound.line === line) return bound;
  const onIt = <P extends { readonly line: number }>(place: P): P => ({ ...place, line });
  return {
    ...bound,
    line,
    event: bound.event && onLine(bound.event, line),
    findings: bound.findings.map((finding) => {
      const place = onIt(finding.place);
      return "first" in finding && finding.first
        ? { ...finding, place, first: onIt(finding.first) }
        : { ...finding, place };
    }),
  };
}

/** What a log may name of its system, as a text. */
export const ownNames = ({ sources, cohorts }: SystemFacts): string =>
  JSON.stringify([
    [...sources].map(([key, history]) => [
      key,
      history.map(({ from, until, value }) => [String(from), String(until), value.solution]),
    ]),
    [...cohorts].map(([name, history]) => [name, history[0]?.value.count.by]),
  ]);
