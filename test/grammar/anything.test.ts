/** Whatever the text, an answer comes back, and its places lie inside the line. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { expectedAfter, readLine } from "../../grammar/line.ts";
import { statementTable } from "../../grammar/statements.ts";
import { type SectionKind, sectionKinds } from "../../grammar/syntax.ts";
import { keywords } from "../../grammar/tokens.ts";
import { summaryOf, writeStatement } from "../../grammar/write.ts";
import { withoutSpans } from "./fixture.ts";

const section: fc.Arbitrary<SectionKind | null> = fc.constantFrom(null, ...sectionKinds);

const anyText = fc.oneof(
  fc.string({ unit: "binary", maxLength: 60 }),
  fc.string({ unit: "grapheme", maxLength: 60 }),
  fc.string({ unit: fc.constantFrom(..."0123456789.,:-−±/ \"“”#xT%µ²·'eE"), maxLength: 40 }),
);

const anyWord = fc.oneof(
  fc.constantFrom(...keywords),
  fc.constantFrom(
    "alkalinity",
    "calcium",
    "pH",
    "salinity",
    "head-1",
    "soda",
    "mL",
    "L",
    "dKH",
    "mg/L",
    "%",
    "day",
  ),
  fc.constantFrom(
    "7",
    "8.4",
    "7,9",
    "1,250",
    "-2",
    "2026-11-24",
    "08:10",
    "24.11.2026",
    '"x"',
    "“x”",
    '"',
    "#",
    ",",
  ),
  fc.constantFrom(
    "x",
    "×",
    "±",
    "/",
    "as CaCO3",
    "total",
    "🐠",
    "é",
    "SrCl2·6H2O",
    "(",
    "\u0000",
    "\ud83d",
    "__proto__",
  ),
);
const wordSoup = fc.array(anyWord, { maxLength: 14 }).map((words) => words.join(" "));

/** A line of the table with a word dropped, doubled, swapped or broken. */
const nearMiss = fc
  .tuple(
    fc.constantFrom(...statementTable.flatMap((row) => row.examples)),
    fc.nat(),
    fc.constantFrom("drop", "double", "swap", "cut", "insert"),
    anyWord,
  )
  .map(([line, place, how, word]) => {
    const words = line.split(" ");
    const at = place % words.length;
    if (how === "drop") words.splice(at, 1);
    if (how === "double") words.splice(at, 0, words[at]!);
    if (how === "swap") words.splice(at, 2, ...words.slice(at, at + 2).reverse());
    if (how === "cut") words[at] = words[at]!.slice(0, -1);
    if (how === "insert") words.splice(at, 0, word);
    return words.join(" ");
  });

function spansWithin(value: unknown, end: number): void {
  if (value === null || typeof value !== "object") return;
  const span = value as { start?: unknown; end?: unknown };
  if (typeof span.start === "number" && typeof span.end === "number") {
    expect(span.start).toBeGreaterThanOrEqual(0);
    expect(span.start).toBeLessThanOrEqual(span.end);
    expect(span.end).toBeLessThanOrEqual(end);
  }
  for (const inner of Object.values(value)) spansWithin(inner, end);
}

function noNumberIsLost(value: unknown): void {
  if (typeof value === "number") expect(Number.isFinite(value)).toBe(true);
  if (value !== null && typeof value === "object")
    for (const inner of Object.values(value)) noNumberIsLost(inner);
}

test("a line", () => {
  fc.assert(
    fc.property(section, fc.oneof(anyText, wordSoup, nearMiss), (kind, text) => {
      const reading = readLine(kind, text);
      spansWithin(reading, text.length);
      noNumberIsLost(reading);
      if (reading.statement !== null) expect(reading.findings).toEqual([]);
      expect(readLine(kind, text)).toEqual(reading);
    }),
    { numRuns: 6000 },
  );
});

test("a line that reads is written so that it reads alike", () => {
  let read = 0;
  fc.assert(
    fc.property(section, fc.oneof(nearMiss, wordSoup), (kind, text) => {
      const { statement } = readLine(kind, text);
      if (!statement) return;
      read += 1;
      const tidy = writeStatement(statement);
      const again = readLine(kind, tidy);
      expect(again.findings, tidy).toEqual([]);
      expect(withoutSpans(again.statement), tidy).toEqual(withoutSpans(statement));
      expect(summaryOf(again.statement!)).toBe(summaryOf(statement));
    }),
    { numRuns: 6000 },
  );
  expect(read).toBeGreaterThan(100);
});

test("a line half written", () => {
  fc.assert(
    fc.property(section, fc.oneof(anyText, nearMiss), (kind, text) => {
      expect(Array.isArray(expectedAfter(kind, text))).toBe(true);
    }),
    { numRuns: 1500 },
  );
});

test("a file", () => {
  const line = fc.oneof(
    anyText,
    wordSoup,
    nearMiss.map((text) => `  ${text}`),
    fc.constantFrom("system a", "log a", "store"),
  );
  fc.assert(
    fc.property(fc.array(line, { maxLength: 12 }), fc.constantFrom("\n", "\r\n"), (lines, ending) => {
      const text = lines.join(ending);
      const document = readDocument(text);
      for (const read of document.lines) spansWithin(read, read.text.length);
      const mark = document.hasByteOrderMark ? "\ufeff" : "";
      const back = mark + document.lines.map((read) => read.text).join("\n");
      expect(back).toBe(text.replaceAll("\r\n", "\n").replace(/\r$/, ""));
    }),
    { numRuns: 1500 },
  );
});

test("a long line of many words, in good time", () => {
  const items = Array.from({ length: 900 }, (_, index) => `head-${index} 5 mL/day`).join(", ");
  const started = performance.now();
  expect(readLine("log", `2026-11-24 set ${items}`).statement).not.toBeNull();
  expect(readLine("log", `2026-11-24 set ${items} oops oops`).findings).toHaveLength(1);
  expect(readLine("system", "hold ".repeat(3999)).findings).toHaveLength(1);
  expect(performance.now() - started).toBeLessThan(3000);
});
