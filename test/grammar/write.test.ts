import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { readLine } from "../../grammar/line.ts";
import { statementTable } from "../../grammar/statements.ts";
import type { SectionKind } from "../../grammar/syntax.ts";
import { summaryOf, writeStatement } from "../../grammar/write.ts";
import { eastHall, shelves } from "./a-farm.ts";
import { reads, withoutSpans } from "./fixture.ts";

type Written = { readonly section: SectionKind | null; readonly line: string };

const examples: readonly Written[] = [
  ...statementTable.flatMap(({ sections, form, examples: lines }) =>
    (form === "header" ? [null] : sections).flatMap((section) => lines.map((line) => ({ section, line }))),
  ),
  ...[eastHall, shelves].flatMap((text) => {
    const { lines, sections } = readDocument(text);
    return lines
      .filter((line) => line.statement !== null)
      .map((line) => ({
        section: line.section === null ? null : sections[line.section]!.kind,
        line: line.text,
      }));
  }),
];

const outsideQuotes = (line: string, change: (text: string) => string): string =>
  line
    .split(/("[^"]*")/)
    .map((piece) => (piece.startsWith('"') ? piece : change(piece)))
    .join("");

/** Ways to write the same: each keeps what a line means. */
const variations: readonly ((line: string) => string)[] = [
  (line) => outsideQuotes(line, (text) => text.replaceAll(" ", "  ")),
  (line) => `\t${outsideQuotes(line, (text) => text.replaceAll(" ", "\u00a0"))}`,
  (line) => line.replaceAll(" x ", "×"),
  (line) => outsideQuotes(line, (text) => text.replace(/(\d) (mL|L|cm|kg|g|dKH|%)(?![A-Za-z0-9-])/g, "$1$2")),
  (line) => line.replace(/(mL|L|g|dKH|%)\/(day|min|L|week)/g, "$1 / $2"),
  (line) => line.replaceAll("±", "+/-"),
  (line) => line.replaceAll("m2", "m²").replaceAll("degC", "°C"),
  (line) => line.replace(/"([^"]*)"/g, "“$1”"),
  (line) => line.replace(/^(\s*\d{4}-\d\d-\d\d) 0?(\d+:\d\d)/, "$1T$2"),
  (line) => `${line}   # and a comment`,
];

const varied = fc
  .tuple(fc.constantFrom(...examples), fc.subarray([...variations]))
  .map(([{ section, line }, chosen]) => ({
    section,
    line,
    as: chosen.reduce((text, vary) => vary(text), line),
  }));

describe("writing a statement", () => {
  test("and reading it gives the same statement, and the same text again", () => {
    fc.assert(
      fc.property(varied, ({ section, as }) => {
        const statement = reads(section, as);
        const tidy = writeStatement(statement);
        const again = reads(section, tidy);
        expect(withoutSpans(again)).toEqual(withoutSpans(statement));
        expect(writeStatement(again)).toBe(tidy);
      }),
      { numRuns: 800 },
    );
  });

  test("changes no digit", () => {
    for (const { section, line } of examples) {
      const digits = (text: string) =>
        text
          .replace(/#.*/, "")
          .match(/(?<![A-Za-z])\d+(\.\d+)?/g)
          ?.map((number) => number.replace(/^0+(?=\d)/, "")) ?? [];
      // Notes keep what stands in them, and parts may change places.
      if (line.includes('"') || line.includes("T09")) continue;
      expect(digits(writeStatement(reads(section, line))).sort(), line).toEqual(digits(line).sort());
    }
  });
});

describe("the summary of a statement", () => {
  test("is the same however the line is written", () => {
    fc.assert(
      fc.property(varied, ({ section, line, as }) => {
        expect(summaryOf(reads(section, as))).toBe(summaryOf(reads(section, line)));
      }),
      { numRuns: 400 },
    );
  });

  test("is the same whether or not a unit is borrowed", () => {
    const summary = (line: string) => summaryOf(reads("system", line));
    expect(summary("hold alkalinity 7.6 to 8.4 dKH")).toBe(summary("hold alkalinity 7.6 dKH to 8.4 dKH"));
    expect(summary("tank a 240 x 90 x 32 cm")).toBe(summary("tank a 240 cm x 90 cm x 32 cm"));
    expect(summary("hold alkalinity 7.6 to 8.4 dKH")).not.toBe(
      summary("hold alkalinity 7.6 meq/L to 8.4 dKH"),
    );
  });

  test("differs where anything said differs", () => {
    const summaries = new Map<string, string>();
    for (const { section, line } of examples) {
      const statement = reads(section, line);
      const summary = summaryOf(statement);
      const said = JSON.stringify(withoutSpans(statement));
      expect(summaries.get(summary) ?? said, line).toBe(said);
      summaries.set(summary, said);
    }
    expect(summaries.size).toBeGreaterThan(80);
  });

  test("is that of the place in no way", () => {
    const [first, second] = ["tank a 5 L", "      tank   a 5 L # x"].map(
      (line) => readLine("system", line).statement!,
    );
    expect(summaryOf(first!)).toBe(summaryOf(second!));
  });
});
