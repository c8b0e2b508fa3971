import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { numbersEdits, type Token, tokens } from "../../server/editor/tokens.ts";
import type { Farm } from "../../server/farm.ts";
import { marked } from "./fixture.ts";
import { inOneGo } from "./spans.ts";

/** Each token as `type+modifiers text`, a line to a line. */
function told(text: string): readonly string[] {
  const { farm } = marked(text);
  const { lines } = farm.documents.get("farm.marl")!;
  const found = inOneGo(tokens(farm, "farm.marl"));
  return lines.flatMap(({ text: line }, number) => {
    const here = found.filter((token) => token.line === number);
    return here.length === 0
      ? []
      : [
          here
            .map(
              ({ start, end, type, modifiers }) =>
                `${[type, ...modifiers].join("+")} ${line.slice(start, end)}`,
            )
            .join(" · "),
        ];
  });
}

test("every sort of word", () => {
  expect(
    told(`
use "a.marl" # é 水 🪸
system vat "The vat"
  tank main 310 x 80 x 28 cm
  hold alkalinity 7.5 to 8.5 dKH
  cohort tips 10 pieces uptake 1 meq/day ± 10 % each from 2026-09-20 08:00
  pump head-1 gives soda at 40 mL/min between 20:00 and 08:00
reagent drum
  formula SrCl2·6H2O purity 98 %
solution soda
  dissolve sodium-carbonate 80 g
  dissolve drum 1 g
log vat
  2026-11-01 08:00 read calcium 1060 mg/L as CaCO3, pH 8 by ao
  2026-11-01 set head-1 30 mL/day, soda 2 mL/day, nobody 1 mL/day
  2026-11-02 gave soda 10 mL twice
`),
  ).toEqual([
    'keyword use · string "a.marl" · comment # é 水 🪸',
    'keyword system · namespace+declaration vat · string "The vat"',
    "keyword tank · variable+declaration main · number 310 · operator x · number 80 · operator x · number 28 · type cm",
    "keyword hold · property alkalinity · number 7.5 · keyword to · number 8.5 · type dKH",
    "keyword cohort · variable+declaration tips · number 10 · keyword pieces · keyword uptake · number 1 · type meq/day · operator ± · number 10 · type % · keyword each · keyword from · macro 2026-09-20 08:00",
    "keyword pump · function+declaration head-1 · keyword gives · class soda · keyword at · number 40 · type mL/min · keyword between · macro 20:00 · keyword and · macro 08:00",
    "keyword reagent · enumMember+declaration drum",
    "keyword formula · string SrCl2·6H2O · keyword purity · number 98 · type %",
    "keyword solution · class+declaration soda",
    "keyword dissolve · enumMember+defaultLibrary sodium-carbonate · number 80 · type g",
    "keyword dissolve · enumMember drum · number 1 · type g",
    "keyword log · namespace vat",
    "macro 2026-11-01 08:00 · keyword read · property calcium · number 1060 · type mg/L · type as CaCO3 · operator , · property pH · number 8 · keyword by · parameter ao",
    "macro 2026-11-01 · keyword set · function head-1 · number 30 · type mL/day · operator , · class soda · number 2 · type mL/day · operator , · function nobody · number 1 · type mL/day",
    "macro 2026-11-02 · keyword gave · class soda · number 10",
  ]);
});

test("a range holds the tokens of its lines", () => {
  const { farm } = marked("system vat\n  tank main 5 L\n  tank spare 5 L\n");
  const all = inOneGo(tokens(farm, "farm.marl"));
  expect(inOneGo(tokens(farm, "farm.marl", 1, 1))).toEqual(all.filter(({ line }) => line === 1));
  expect(inOneGo(tokens(farm, "farm.marl", 7, 9))).toEqual([]);
});

function expectInOrder(farm: Farm, file: string): readonly Token[] {
  const found = inOneGo(tokens(farm, file));
  let before = { line: 0, end: 0 };
  for (const { line, start, end } of found) {
    expect(line).toBeGreaterThanOrEqual(before.line);
    if (line === before.line) expect(start).toBeGreaterThanOrEqual(before.end);
    expect(end).toBeGreaterThan(start);
    expect(end).toBeLessThanOrEqual(farm.documents.get(file)!.lines[line]!.text.length);
    before = { line, end };
  }
  return found;
}

const applied = (before: readonly number[], edits: ReturnType<typeof numbersEdits>): readonly number[] =>
  edits.reduceRight<readonly number[]>(
    (list, { start, deleteCount, data }) => [
      ...list.slice(0, start),
      ...data,
      ...list.slice(start + deleteCount),
    ],
    before,
  );

describe("whatever is typed", () => {
  const text =
    readFileSync("examples/raceways/system.marl", "utf8") +
    "\nlog raceways\n  2026-09-02 07:30 read alkalinity 7.8 dKH, calcium 425 mg/L as CaCO3 ± 6 mg/L with bench by ao # é 水 🪸\n";
  const pieces = [
    "#",
    '"',
    " ",
    "\n",
    "é",
    "水",
    "🪸",
    "± 5 %",
    "as CaCO3",
    ",",
    "tank ",
    "2026-11-01 ",
    "8:30",
    "gives soda",
    "-",
    "/day",
  ];
  const edit = fc.record({
    at: fc.nat(text.length),
    length: fc.nat(12),
    put: fc.array(fc.constantFrom(...pieces), { maxLength: 3 }).map((list) => list.join("")),
  });
  const numbersOf = (found: readonly Token[]): readonly number[] =>
    found.flatMap(({ line, start, end, type }) => [line, start, end, type.length]);

  test("tokens stand in order, and the change leads from the old ones to the new", () => {
    fc.assert(
      fc.property(fc.array(edit, { minLength: 1, maxLength: 4 }), (edits) => {
        let current = text;
        let before: readonly number[] = [];
        for (const { at, length, put } of edits) {
          const start = Math.min(at, current.length);
          current = current.slice(0, start) + put + current.slice(start + length);
          const { farm } = marked(current.replaceAll("|", ""));
          const after = numbersOf(expectInOrder(farm, "farm.marl"));
          expect(applied(before, numbersEdits(before, after))).toEqual(after);
          before = after;
        }
      }),
      { numRuns: 40 },
    );
  }, 60_000);

  test("a change says no more than what differs", () => {
    expect(numbersEdits([1, 2, 3, 4], [1, 2, 3, 4])).toEqual([]);
    expect(numbersEdits([1, 2, 3, 4], [1, 9, 3, 4])).toEqual([{ start: 1, deleteCount: 1, data: [9] }]);
    expect(numbersEdits([1, 1], [1, 1, 1])).toEqual([{ start: 2, deleteCount: 0, data: [1] }]);
    expect(numbersEdits([], [5])).toEqual([{ start: 0, deleteCount: 0, data: [5] }]);
    expect(numbersEdits([5], [])).toEqual([{ start: 0, deleteCount: 1, data: [] }]);
  });
});

test("a line that is no person's has no tokens", () => {
  const { farm } = marked(`system vat\n  tank main ${"9".repeat(30_000)} L\n`);
  expect(inOneGo(tokens(farm, "farm.marl")).map(({ line }) => line)).toEqual([0, 0]);
});
