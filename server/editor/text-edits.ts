/**
 * Edits that reach over lines, made from what becomes of a file's lines: only what changes is touched. Columns are
 * UTF-16 units of the line's own text, a byte order mark not counted, as everywhere in the editor's rooms.
 */

export interface TextPoint {
  /** From 0. */
  readonly line: number;
  readonly column: number;
}

export interface TextEdit {
  readonly file: string;
  readonly from: TextPoint;
  /** Exclusive. */
  readonly to: TextPoint;
  /** With the line endings that it shall have. */
  readonly text: string;
}

/** Lines from one number up to another (exclusive) become these; a carriage return before a line's end is part of it. */
export interface LineChange {
  readonly from: number;
  readonly to: number;
  readonly lines: readonly string[];
}

const byteOrderMark = "\ufeff";

/** The lines of a text between its `\n`s; the last is empty where the text ends with one. */
export const rawLines = (text: string): readonly string[] => withoutMark(text).split("\n");

const withoutMark = (text: string): string => (text.startsWith(byteOrderMark) ? text.slice(1) : text);

const returnsOf = (line: string): string => /\r*$/.exec(line)?.[0] ?? "";

/** The edits that make these changes, which are in order and don't overlap. */
export const editsOf = (file: string, lines: readonly string[], changes: readonly LineChange[]): TextEdit[] =>
  joined(changes, lines.length).flatMap((change) => editOf(file, lines, change) ?? []);

/** What is put before a line and what that line becomes is one edit; so is all that happens at the text's end. */
function joined(changes: readonly LineChange[], lineCount: number): LineChange[] {
  const result: LineChange[] = [];
  for (const change of changes) {
    const before = result.at(-1);
    const touches = before !== undefined && before.to === change.from;
    if (before && touches && (before.from === before.to || change.from === lineCount)) {
      result[result.length - 1] = {
        from: before.from,
        to: change.to,
        lines: [...before.lines, ...change.lines],
      };
    } else result.push(change);
  }
  return result;
}

function editOf(file: string, all: readonly string[], { from, to, lines }: LineChange): TextEdit | null {
  const [before, after] = [all[from], lines[0]];
  if (to === from + 1 && lines.length === 1 && before !== undefined && after !== undefined) {
    if (before === after) return null;
    // A line's ending is changed with the whole of it: what is no line ending alone is none in some editors.
    if (returnsOf(before) === returnsOf(after)) return withinLine(file, from, before, after);
  }
  if (to < all.length) {
    const text = lines.map((line) => `${line}\n`).join("");
    return { file, from: { line: from, column: 0 }, to: { line: to, column: 0 }, text };
  }
  const last = all.length - 1;
  const end = { line: last, column: all[last]?.length ?? 0 };
  if (from > last) return { file, from: end, to: end, text: lines.map((line) => `\n${line}`).join("") };
  if (lines.length > 0 || from === 0)
    return { file, from: { line: from, column: 0 }, to: end, text: lines.join("\n") };
  const kept = { line: from - 1, column: (all[from - 1] ?? "").replace(/\r$/, "").length };
  return { file, from: kept, to: end, text: "" };
}

/** Only the part of a line that changes; a character of two units is never cut. */
function withinLine(file: string, line: number, before: string, after: string): TextEdit {
  const most = Math.min(before.length, after.length);
  let start = 0;
  while (start < most && before[start] === after[start]) start += 1;
  if (start > 0 && isHighHalf(before.charCodeAt(start - 1))) start -= 1;
  let end = 0;
  while (end < most - start && before.at(-1 - end) === after.at(-1 - end)) end += 1;
  if (end > 0 && isLowHalf(before.charCodeAt(before.length - end))) end -= 1;
  return {
    file,
    from: { line, column: start },
    to: { line, column: before.length - end },
    text: after.slice(start, after.length - end),
  };
}

const isHighHalf = (unit: number): boolean => unit >= 0xd800 && unit <= 0xdbff;
const isLowHalf = (unit: number): boolean => unit >= 0xdc00 && unit <= 0xdfff;

/** The edits from one text to another; the byte order mark stays as it is. */
export function editsBetween(file: string, before: string, after: string): TextEdit[] {
  const old = rawLines(before);
  return editsOf(file, old, changesBetween(old, rawLines(after)));
}

/** More differing lines than this are taken as one block: beyond it the search for the shortest way costs too much. */
const mostDifferences = 400;

/** The fewest lines that change from one list to another, as far as that is quick to find. */
export function changesBetween(old: readonly string[], next: readonly string[]): LineChange[] {
  let first = 0;
  while (first < old.length && first < next.length && old[first] === next[first]) first += 1;
  let rest = 0;
  const most = Math.min(old.length, next.length) - first;
  while (rest < most && old.at(-1 - rest) === next.at(-1 - rest)) rest += 1;
  const left = old.slice(first, old.length - rest);
  const right = next.slice(first, next.length - rest);
  if (left.length === 0 && right.length === 0) return [];
  const whole: LineChange = { from: first, to: first + left.length, lines: right };
  const pairs = left.length === 0 || right.length === 0 ? null : keptPairs(left, right);
  if (!pairs) return paired(whole);
  const changes: LineChange[] = [];
  let [a, b] = [0, 0];
  for (const [x, y] of [...pairs, [left.length, right.length] as const]) {
    if (x > a || y > b) changes.push({ from: first + a, to: first + x, lines: right.slice(b, y) });
    [a, b] = [x + 1, y + 1];
  }
  return changes.flatMap(paired);
}

/** As many lines as there were change one by one. */
const paired = (change: LineChange): LineChange[] =>
  change.to - change.from === change.lines.length
    ? change.lines.map((line, index) => ({
        from: change.from + index,
        to: change.from + index + 1,
        lines: [line],
      }))
    : [change];

/** The lines that stay, as pairs of places: Myers 1986, Algorithmica 1, 251–266; null where too many differ. */
function keptPairs(left: readonly string[], right: readonly string[]): (readonly [number, number])[] | null {
  const trail: Map<number, number>[] = [];
  let furthest = new Map<number, number>([[1, 0]]);
  for (let cost = 0; cost <= Math.min(mostDifferences, left.length + right.length); cost += 1) {
    trail.push(new Map(furthest));
    for (let diagonal = -cost; diagonal <= cost; diagonal += 2) {
      let x = furthest.get(stepBefore(furthest, diagonal, cost)) ?? 0;
      if (stepBefore(furthest, diagonal, cost) < diagonal) x += 1;
      while (x < left.length && x - diagonal < right.length && left[x] === right[x - diagonal]) x += 1;
      furthest = furthest.set(diagonal, x);
      if (x >= left.length && x - diagonal >= right.length) return pairsOn(trail, left.length, right.length);
    }
  }
  return null;
}

/** The diagonal from which one is reached: from above by a line put in, from the left by one taken out. */
function stepBefore(furthest: ReadonlyMap<number, number>, diagonal: number, cost: number): number {
  const down = furthest.get(diagonal + 1) ?? -1;
  const across = furthest.get(diagonal - 1) ?? -1;
  return diagonal === -cost || (diagonal !== cost && across < down) ? diagonal + 1 : diagonal - 1;
}

function pairsOn(
  trail: readonly ReadonlyMap<number, number>[],
  leftLength: number,
  rightLength: number,
): (readonly [number, number])[] {
  const pairs: (readonly [number, number])[] = [];
  let [x, y] = [leftLength, rightLength];
  for (let cost = trail.length - 1; cost >= 0; cost -= 1) {
    const furthest = trail[cost]!;
    const before = stepBefore(furthest, x - y, cost);
    const startX = cost === 0 ? 0 : (furthest.get(before) ?? 0);
    const startY = cost === 0 ? 0 : startX - before;
    while (x > startX && y > startY) {
      x -= 1;
      y -= 1;
      pairs.push([x, y]);
    }
    [x, y] = [startX, startY];
  }
  return pairs.reverse();
}

/** A text with edits that don't overlap. */
export function withEdits(text: string, edits: readonly TextEdit[]): string {
  const mark = text.startsWith(byteOrderMark) ? byteOrderMark : "";
  const plain = text.slice(mark.length);
  const starts = [0];
  for (let end = plain.indexOf("\n"); end >= 0; end = plain.indexOf("\n", end + 1)) starts.push(end + 1);
  const offset = ({ line, column }: TextPoint): number => (starts[line] ?? plain.length) + column;
  return (
    mark +
    [...edits]
      .reverse()
      .sort((left, right) => offset(right.from) - offset(left.from))
      .reduce(
        (after, { from, to, text: put }) => after.slice(0, offset(from)) + put + after.slice(offset(to)),
        plain,
      )
  );
}
