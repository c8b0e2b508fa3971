/** Whatever stands in a farm's files, what is told of it is whole: a message, a place inside its line, no odd figures. */
import fc from "fast-check";
import { expect, test } from "vitest";
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

const odd = /\b(?:NaN|Infinity|undefined|null|unknown L)\b|\[object|-0(?![.\d])/;

function wholeProblems(text: string): void {
  const files = filesOf(text);
  for (const problem of walk(files).problems) {
    const { message, why, todo, place, code, severity, fixes, related } = problem;
    // What a technician wrote may hold any word; our own sentences may not.
    const own = message.replace(/"[^"]*"/g, "");
    expect(own, `${code}: ${message}\n${text}`).not.toMatch(odd);
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
