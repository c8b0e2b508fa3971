/** Columns in three encodings, and what edits make of a text. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { changed } from "../../server/protocol/buffers.ts";
import { characterOf, columnOf, encodings } from "../../server/protocol/positions.ts";

test.each([
  // text before the place, and what each encoding counts there
  { before: "", "utf-8": 0, "utf-16": 0, "utf-32": 0 },
  { before: "note", "utf-8": 4, "utf-16": 4, "utf-32": 4 },
  { before: "é", "utf-8": 2, "utf-16": 1, "utf-32": 1 },
  { before: "水槽", "utf-8": 6, "utf-16": 2, "utf-32": 2 },
  { before: "🪸", "utf-8": 4, "utf-16": 2, "utf-32": 1 },
  { before: 'a é "水🪸" ', "utf-8": 4 + 10 + 1, "utf-16": 4 + 5 + 1, "utf-32": 4 + 4 + 1 },
])("$before", ({ before, ...counts }) => {
  for (const encoding of encodings) {
    const text = `${before}here`;
    expect(characterOf(text, before.length, encoding)).toBe(counts[encoding]);
    expect(columnOf(text, counts[encoding], encoding)).toBe(before.length);
  }
});

test("beyond the line is its end, inside a character its start", () => {
  expect(columnOf("🪸a", 99, "utf-8")).toBe(3);
  expect(columnOf("🪸a", 2, "utf-8")).toBe(0);
  expect(columnOf("🪸a", 3, "utf-8")).toBe(0);
  expect(columnOf("🪸a", 4, "utf-8")).toBe(2);
  expect(columnOf("aé", 2, "utf-8")).toBe(1);
  expect(columnOf("a", -3, "utf-16")).toBe(0);
});

/** Texts of whole characters, since an edit never splits one. */
const symbols = fc.array(fc.constantFrom("a", " ", "é", "水", "🪸", "\n", "\r\n", "#"), { maxLength: 30 });

test("an edit told in any encoding makes the same text as cutting it there", () => {
  fc.assert(
    fc.property(
      symbols,
      symbols,
      fc.nat(),
      fc.nat(),
      fc.constantFrom(...encodings),
      (old, put, a, b, encoding) => {
        const [from, to] = [a % (old.length + 1), b % (old.length + 1)].sort((x, y) => x - y) as [
          number,
          number,
        ];
        const text = old.join("");
        const place = (count: number) => {
          const lines = old.slice(0, count).join("").split("\n");
          const last = lines.at(-1)!;
          return { line: lines.length - 1, character: characterOf(last, last.length, encoding) };
        };
        const change = { range: { start: place(from), end: place(to) }, text: put.join("") };
        const expected = old.slice(0, from).join("") + put.join("") + old.slice(to).join("");
        expect(changed(text, [change], encoding)).toBe(expected);
      },
    ),
    { numRuns: 500 },
  );
});

test("edits of one message follow one another; one without a range is the whole text", () => {
  const at = (line: number, character: number) => ({ line, character });
  expect(
    changed(
      "a\nb",
      [
        { range: { start: at(1, 0), end: at(1, 1) }, text: "cd" },
        { range: { start: at(1, 1), end: at(1, 1) }, text: "x" },
      ],
      "utf-16",
    ),
  ).toBe("a\ncxd");
  expect(changed("a\nb", [{ text: "z" }], "utf-16")).toBe("z");
});

test("places beyond the text, or after its start, do no harm", () => {
  const at = (line: number, character: number) => ({ line, character });
  expect(changed("a\nb", [{ range: { start: at(9, 9), end: at(9, 9) }, text: "!" }], "utf-8")).toBe("a\nb!");
  expect(changed("ab\ncd", [{ range: { start: at(1, 1), end: at(0, 0) }, text: "!" }], "utf-8")).toBe(
    "ab\nc!d",
  );
  expect(changed("ab\r\ncd", [{ range: { start: at(0, 9), end: at(0, 9) }, text: "!" }], "utf-16")).toBe(
    "ab!\r\ncd",
  );
});
