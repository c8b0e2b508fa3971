/** Texts as disks and keyboards make them: where a word stands is counted in UTF-16, whatever stands before it. */
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import type { Span } from "../../grammar/syntax.ts";
import { file } from "./fixture.ts";

/** What is underlined in each line of a text. */
const underlined = (text: string): readonly (readonly string[])[] =>
  readDocument(text).lines.map((line) =>
    line.findings.map(({ span }) => line.text.slice(span.start, span.end)),
  );

/** The only word that a text gets wrong. */
function slip(text: string): { readonly line: number; readonly span: Span; readonly word: string } {
  const found = readDocument(text).lines.flatMap((line, number) =>
    line.findings.map(({ span }) => ({
      line: number,
      span: { start: span.start, end: span.end },
      word: line.text.slice(span.start, span.end),
    })),
  );
  expect(found, JSON.stringify(text)).toHaveLength(1);
  return found[0]!;
}

describe("a slip in a line", () => {
  const before = "  hold alkalinity 7.6 to 8.4 dKH ";
  const places: Readonly<Record<string, string>> = {
    LF: `system a\n${before}oops\n  tank main 5 L\n`,
    CRLF: `system a\r\n${before}oops\r\n  tank main 5 L\r\n`,
    "LF and CRLF": `system a\r\n${before}oops\n  tank main 5 L\r\n`,
    "a byte order mark": `\ufeffsystem a\n${before}oops\n`,
    "a byte order mark and CRLF": `\ufeffsystem a\r\n${before}oops\r\n`,
    "no final line break": `system a\n${before}oops`,
    "a carriage return at the very end": `system a\n${before}oops\r`,
  };
  test.each(Object.entries(places))("stands at the same place with %s", (_, text) => {
    expect(slip(text)).toEqual({
      line: 1,
      span: { start: before.length, end: before.length + 4 },
      word: "oops",
    });
  });

  test.each(["\t", "\t\t ", "\u00a0", "\u3000", "\u200b"])("counts %j as one place a character", (space) => {
    const line = `${space}tank${space}main${space}5 L${space}oops`;
    expect(slip(`system a\n${line}`)).toMatchObject({ span: { start: line.length - 4, end: line.length } });
  });

  test("in the first line, behind a byte order mark", () => {
    expect(slip("\ufeffsystm a\n  tank main 5 L\n")).toEqual({
      line: 0,
      span: { start: 0, end: 5 },
      word: "systm",
    });
  });
});

test("letters of other scripts, accents and characters of two code units", () => {
  file(`
system halle "Große Halle é 海水槽 🐠"
  note "é 海水 🐠🐠" oops
                   ^^^^ unknown-word oops → nothing | from, until
  tank bécken 5 L
       ^^^^^^ unknown-word bécken → nothing | a name
  tank 水槽 5 L
       ^^ unknown-word 水槽 → nothing | a name
  tank main 5 🐠
              ^^ unknown-word 🐠 → nothing | a unit, x, times, from, until
  tank 𠮷 5 L
       ^^ unknown-word 𠮷 → nothing | a name
  tank main 5 L # é 海水 🐠
`);
});

test("half a character, and an accent that stands by itself", () => {
  expect(underlined("system a\n  tank \ud83d 5 L\n  tank \udc20x 5 L\n  tank be\u0301cken 5 L")).toEqual([
    [],
    ["\ud83d"],
    ["\udc20"],
    ["be\u0301cken"],
  ]);
});

describe("what is no text", () => {
  test("bytes read as UTF-8 give a finding inside each line, and no other line is lost", () => {
    const bytes = Uint8Array.from({ length: 4096 }, (_, index) => (index * 197 + (index >> 8) * 31) & 0xff);
    const binary = new TextDecoder("utf-8").decode(bytes).replaceAll("\n", " ");
    const { lines } = readDocument(`system a\n  ${binary}\n  tank main 5 L\n`);
    expect(lines[1]!.statement).toBeNull();
    expect(lines[1]!.findings.length).toBeGreaterThan(0);
    for (const { span } of lines[1]!.findings) expect(span.end).toBeLessThanOrEqual(lines[1]!.text.length);
    expect(lines[2]!.statement).toMatchObject({ kind: "tank" });
  });

  test("a line of a megabyte is one finding over all of it", () => {
    const long = "x".repeat(2 ** 20);
    const started = performance.now();
    expect(slip(`system a\r\n  ${long}\r\n  tank main 5 L`)).toMatchObject({
      line: 1,
      span: { start: 0, end: long.length + 2 },
    });
    expect(performance.now() - started).toBeLessThan(1000);
  });

  test("a stray carriage return doesn't end a comment", () => {
    const { lines } = readDocument("system a\n  tank main 5 L # old\r  tank sump 5 L\n");
    expect(lines[1]).toMatchObject({ statement: { kind: "tank" }, findings: [] });
    expect(lines[1]!.comment).toEqual({ start: 16, end: 37 });
  });
});
