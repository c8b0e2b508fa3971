/** Leaves out the problems that a `# quiet:` comment asks to be left out, and tells of comments that quieten nothing. */
import type { DocumentLine } from "../../grammar/document.ts";
import { nearestWords } from "../../grammar/nearest.ts";
import type { Span } from "../../grammar/syntax.ts";
import type { Files } from "../culture/names.ts";
import type { Problem } from "./problem.ts";
import type { QuietFinding } from "./rule.ts";
import { codes, inOrder, problemsOf, rules } from "./rules.ts";

/** One code that a comment asks to be quiet about. */
export interface Wish {
  readonly file: string;
  readonly line: number;
  readonly wholeFile: boolean;
  readonly code: string;
  readonly span: Span;
  readonly without: Span;
  /** True where the line holds nothing but the comment. */
  readonly alone: boolean;
}

const own = "quiet/unused";

/** The problems that are told, with those of comments that quieten nothing. */
export function quieten(problems: readonly Problem[], files: Files): readonly Problem[] {
  const wishes = wishesOf(files);
  if (wishes.length === 0) return problems;
  // A comment about quiet comments is looked at last: only then is it known which of them are unused.
  const first = wishes.filter(({ code }) => code !== own);
  const last = wishes.filter(({ code }) => code === own);
  const kept = withWishes(problems, first);
  const unused = withWishes(problemsOf(kept.unused, files), last);
  return inOrder([...kept.told, ...unused.told, ...problemsOf(unused.unused, files)]);
}

function withWishes(problems: readonly Problem[], wishes: readonly Wish[]) {
  const byPlace = new Map<string, Wish[]>();
  const key = (file: string, line: number | null, code: string) => `${code} ${line ?? ""} ${file}`;
  for (const wish of wishes) {
    const at = key(wish.file, wish.wholeFile ? null : wish.line, wish.code);
    byPlace.set(at, [...(byPlace.get(at) ?? []), wish]);
  }
  const used = new Set<Wish>();
  const met = new Set<Wish>();
  const told = problems.filter(({ code, place, severity }) => {
    const asking = [key(place.file, place.line, code), key(place.file, null, code)].flatMap(
      (at) => byPlace.get(at) ?? [],
    );
    for (const wish of asking) (severity === "error" ? met : used).add(wish);
    return asking.length === 0 || severity === "error";
  });
  return {
    told,
    unused: wishes.filter((wish) => !used.has(wish)).map((wish) => unusedOf(wish, met.has(wish))),
  };
}

function unusedOf(wish: Wish, hasMetError: boolean): QuietFinding {
  const { file, line, span, code, wholeFile, without, alone } = wish;
  const rule = codes.find((known) => known === code);
  const why =
    code === ""
      ? "no-code"
      : rule === undefined
        ? "unknown"
        : hasMetError || rules[rule].severity === "error"
          ? "error"
          : alone && !wholeFile
            ? "no-line"
            : "nothing-here";
  return {
    code: own,
    place: { file, line, span },
    system: null,
    word: code,
    why,
    wholeFile,
    nearest: why === "unknown" ? nearestWords(code, codes) : [],
    without,
  };
}

function wishesOf(files: Files): Wish[] {
  return [...files].flatMap(([file, { lines }]) =>
    lines.flatMap((line, number) => (line.comment ? wishesOfLine(file, number, line, line.comment) : [])),
  );
}

const asking = /^(\s*quiet(\s+file)?\s*:)(.*)$/;

/** Each part of a comment that starts with `#` may ask for itself; any other part is a reason. */
export function wishesOfLine(file: string, line: number, { text }: DocumentLine, comment: Span): Wish[] {
  const alone = text.slice(0, comment.start).trim() === "";
  const wishes: Wish[] = [];
  for (const part of text.slice(comment.start, comment.end).matchAll(/#([^#]*)/g)) {
    const asked = asking.exec(part[1]!);
    if (!asked) continue;
    const start = comment.start + part.index;
    const whole = { start, end: start + part[0].length };
    const shared = { file, line, wholeFile: asked[2] !== undefined, alone };
    const from = start + 1 + asked[1]!.length;
    const words = [...asked[3]!.matchAll(/[^\s,]+/g)].map((word) => ({
      code: word[0],
      span: { start: from + word.index, end: from + word.index + word[0].length },
    }));
    if (words.length === 0) {
      const span = { start, end: from };
      wishes.push({ ...shared, code: "", span, without: commentSpan(text, whole) });
    }
    for (const [index, { code, span }] of words.entries()) {
      const before = words[index - 1];
      const after = words[index + 1];
      const without = before
        ? { start: before.span.end, end: span.end }
        : after
          ? { start: span.start, end: after.span.start }
          : commentSpan(text, whole);
      wishes.push({ ...shared, code, span, without });
    }
  }
  return wishes;
}

/** A part of the comment with the space before it. */
const commentSpan = (text: string, { start, end }: Span): Span => ({
  start: text.slice(0, start).trimEnd().length,
  end,
});
