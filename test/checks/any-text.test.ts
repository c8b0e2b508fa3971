/** Whatever stands in a farm's files, what is told of it is whole: a message, a place inside its line, no odd figures. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { summaryOf } from "../../grammar/write.ts";
import { applySafeFixes, editedText } from "../../server/checks/apply-fixes.ts";
import type { Rule } from "../../server/checks/rule.ts";
import { codes, rules, severityRank } from "../../server/checks/rules.ts";
import { filesOf, walk } from "./walk.ts";

const lines = [
  ...new Set(
    codes.flatMap((code) => {
      const { example } = rules[code] as unknown as Rule;
      return example ? `${example.fires}\n${example.silent}`.split("\n").filter((line) => line !== "") : [];
    }),
  ),
];

/** Words that only those know who build readers of languages. */
const ofReaders =
  /\b(?:tokens?|pars(?:e|er|ing)|lexer|grammar|syntax|nonterminal|EOF|invalid|illegal|stray character|other letters|unclosed)\b/i;

const odd = /\b(?:NaN|Infinity|undefined|null|unknown L)\b|\[object|-0(?![.\d])/;

function wholeProblems(text: string): void {
  const files = filesOf(text);
  for (const problem of walk(files).problems) {
    const { message, why, todo, place, code, severity, fixes, related } = problem;
    // What a technician wrote may hold any word; our own sentences may not.
    const own = message.replace(/"[^"]*"/g, "");
    expect(own, `${code}: ${message}\n${text}`).not.toMatch(odd);
    expect(own, `${code}: ${message}\n${text}`).not.toMatch(ofReaders);
    for (const part of [message, why, todo]) expect(part.length).toBeGreaterThan(4);
    expect(severityRank(severity)).toBeGreaterThanOrEqual(0);
    const line = files.get(place.file)?.split("\n")[place.line];
    expect(line, `${code} at ${place.file}:${place.line}`).toBeDefined();
    if (place.span) {
      expect(place.span.start).toBeGreaterThanOrEqual(0);
      expect(place.span.end).toBeLessThanOrEqual(line!.length);
    }
    for (const { file, line: edited, end } of fixes.flatMap(({ edits }) => edits))
      expect(end).toBeLessThanOrEqual(files.get(file)!.split("\n")[edited]!.length);
    for (const other of related) expect(files.has(other.place.file)).toBe(true);
  }
}

/** A line with its numbers turned into others, small and absurd. */
const changedNumbers = fc
  .tuple(
    fc.constantFrom(...lines),
    fc.array(fc.constantFrom("0", "-1", "0.000001", "7,9", "1e3", "99999", "999999999999999", "8.10"), {
      minLength: 1,
      maxLength: 3,
    }),
  )
  .map(([line, numbers]) => {
    let next = 0;
    return line.replace(/(?<![\d\w.:-])\d+(\.\d+)?(?![\d.:-])/g, (digits) =>
      next < numbers.length ? (numbers[next++] ?? digits) : digits,
    );
  });

test("a farm of any lines in any order", () => {
  const line = fc.oneof({ weight: 3, arbitrary: fc.constantFrom(...lines) }, changedNumbers);
  fc.assert(
    fc.property(fc.array(line, { minLength: 1, maxLength: 25 }), (chosen) =>
      wholeProblems(`${chosen.join("\n")}\n`),
    ),
    { numRuns: 300 },
  );
});

test("a working farm with one line changed", () => {
  const farm = codes
    .map((code) => (rules[code] as unknown as Rule).example?.silent)
    .filter((text) => text !== undefined);
  fc.assert(
    fc.property(fc.constantFrom(...farm), fc.nat(), changedNumbers, (text, at, line) => {
      const changed = text.split("\n");
      const number = at % changed.length;
      changed[number] = line;
      wholeProblems(changed.join("\n"));
    }),
    { numRuns: 300 },
  );
});

const working = codes.flatMap((code) => {
  const { example } = rules[code] as unknown as Rule;
  return example && !example.silent.includes("// file:") ? [example.silent] : [];
});

/** Slips of a line that can be mended unasked, and some that can't. */
const slips: readonly ((line: string) => string)[] = [
  (line) => line.replace(/(?<![\w.:-])(\d+)\.(\d+)/, "$1,$2"),
  (line) => line.replace(/(?<![\w.:-])(\d+)(?= \w)/, "$1,5"),
  (line) => line.replace(/(?<![\w.:-])0\.(\d+)/, ".$1"),
  (line) => line.replace(/(\d{4})-(\d\d)-(\d\d)/, "$1/$2/$3"),
  (line) => line.replace(/(\d{4})-(\d\d)-(\d\d)/, "$3.$2.$1"),
  (line) => line.trimStart(),
  (line) => `${line}\n${line}`,
  (line) => `${line}\n${line} # again`,
  (line) => line.replace(/ x /g, "x"),
  (line) => line.replace(/[aeiou]/, ""),
];
const slipped = fc
  .tuple(
    fc.constantFrom(...working),
    fc.array(fc.tuple(fc.nat(), fc.constantFrom(...slips)), { minLength: 1, maxLength: 6 }),
  )
  .map(([text, chosen]) =>
    chosen.reduce((before, [at, slip]) => {
      const all = before.split("\n");
      return all.with(at % all.length, slip(all[at % all.length]!)).join("\n");
    }, text),
  );

test("a safe fix takes its problem away and leaves every other line as it was read", () => {
  let fixes = 0;
  const said = (text: string) =>
    readDocument(text).lines.map(({ statement }) => statement && summaryOf(statement));
  fc.assert(
    fc.property(slipped, (text) => {
      const { problems } = walk(new Map([["farm.marl", text]]));
      const count = (found: typeof problems, told: string) =>
        found.filter(({ message }) => message === told).length;
      for (const { message, place, fixes: offered } of problems) {
        for (const { edits } of offered.filter(({ safe }) => safe)) {
          fixes += 1;
          const after = editedText(text, edits);
          const now = walk(new Map([["farm.marl", after]])).problems;
          expect(count(now, message), `${text}\n→\n${after}`).toBeLessThan(count(problems, message));
          const isGone = edits.some((edit) => edit.text === null);
          const others = said(text).toSpliced(place.line, 1);
          expect(said(after).toSpliced(place.line, isGone ? 0 : 1)).toEqual(others);
        }
      }
    }),
    { numRuns: 200 },
  );
  expect(fixes).toBeGreaterThan(20);
});

test("safe fixes come to an end", () => {
  fc.assert(
    fc.property(slipped, (text) => {
      let texts: ReadonlyMap<string, string> = new Map([["farm.marl", text]]);
      for (let round = 0; texts.size > 0; round += 1) {
        expect(round).toBeLessThan(10);
        texts = applySafeFixes(texts, walk(texts).problems).texts;
      }
    }),
    { numRuns: 200 },
  );
});
