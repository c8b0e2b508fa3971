import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { applySafeFixes, editedText } from "../../server/checks/apply-fixes.ts";
import type { LineEdit, Problem } from "../../server/checks/problem.ts";
import { filesOf, walk } from "./walk.ts";

const edit = (line: number, start: number, end: number, text: string | null): LineEdit => ({
  ...{ file: "a.marl", line, start, end, text },
});

describe("edits of a text", () => {
  test("several on one line, whatever their order", () => {
    const edits = [edit(0, 2, 3, "CCC"), edit(0, 0, 1, ""), edit(0, 4, 4, "!")];
    expect(editedText("abcd\ne", edits)).toBe("bCCCd!\ne");
    expect(editedText("abcd\ne", [...edits].reverse())).toBe("bCCCd!\ne");
  });

  test.each([
    ["a\nb\nc\n", 1, "a\nc\n"],
    ["a\nb\nc\n", 0, "b\nc\n"],
    ["a\nb\nc", 2, "a\nb"],
    ["a\r\nb\r\nc", 2, "a\r\nb"],
    ["a\r\nb\r\nc\r\n", 1, "a\r\nc\r\n"],
    ["\ufeffa\nb\n", 0, "\ufeffb\n"],
    ["a", 0, ""],
  ])("a whole line of %j goes", (text, line, after) => {
    expect(editedText(text, [edit(line, 0, 1, null)])).toBe(after);
  });

  test("a new line has the file's ending, and the byte order mark is no part of a line", () => {
    expect(editedText("\ufeffab\r\ncd\r\n", [edit(0, 0, 0, "x\n")])).toBe("\ufeffx\r\nab\r\ncd\r\n");
    expect(editedText("ab\ncd", [edit(1, 2, 2, "\nx")])).toBe("ab\ncd\nx");
  });

  test("lines that aren't touched keep every byte, mixed endings and all", () => {
    fc.assert(
      fc.property(fc.array(fc.string(), { minLength: 2 }), fc.nat(), (parts, at) => {
        const lines = parts.map((part) => part.replaceAll("\n", " ").replaceAll("\ufeff", ""));
        const line = at % lines.length;
        const after = editedText(lines.join("\n"), [edit(line, 0, 0, "new ")]).split("\n");
        expect(after).toEqual(lines.map((each, index) => (index === line ? `new ${each}` : each)));
      }),
    );
  });
});

describe("safe fixes", () => {
  const fixed = (text: string, file = "farm.marl") => {
    const farm = walk(filesOf(text, file));
    return applySafeFixes(farm.texts, farm.problems);
  };
  const vat = "system vat\n  tank main 500 L\n";

  test("are done, and those that aren't safe aren't", () => {
    const { texts, done, skipped } = fixed(
      `${vat}  tank a 7,9 L from 2026/11/02\n  tank b 1,250 L\n  tnak c 8 L\n`,
    );
    expect(texts.get("farm.marl")).toBe(
      `${vat}  tank a 7.9 L from 2026-11-02\n  tank b 1,250 L\n  tnak c 8 L\n`,
    );
    expect(done).toEqual([
      { file: "farm.marl", line: 2, title: "Write 7.9" },
      { file: "farm.marl", line: 2, title: "Write 2026-11-02" },
    ]);
    expect(skipped).toEqual([]);
  });

  test("a text without any stays out of the answer", () => {
    expect(fixed(`${vat}  tank b 1,250 L\n`).texts.size).toBe(0);
  });

  test("of several that overlap only the first is done, the others are told", () => {
    const problem = (title: string, ...edits: LineEdit[]): Problem => ({
      ...{ code: "x", severity: "error", message: "", why: "", todo: "", system: null, related: [] },
      place: { file: "a.marl", line: edits[0]!.line, span: null },
      fixes: [{ title, safe: true, edits }],
    });
    const texts = new Map([["a.marl", "abcdef\nghi\n"]]);
    const given = [
      problem("first", edit(0, 1, 3, "X")),
      problem("overlaps", edit(0, 2, 4, "Y"), edit(1, 0, 0, "never")),
      problem("beside", edit(0, 3, 4, "Z")),
      problem("line", edit(0, 0, 6, null)),
      problem("other line", edit(1, 0, 3, null)),
      problem("same place", edit(1, 0, 0, "never")),
      problem("elsewhere", { ...edit(0, 0, 0, "never"), file: "b.marl" }),
    ];
    const answer = applySafeFixes(texts, given);
    expect(answer.texts.get("a.marl")).toBe("aXZef\n");
    expect(answer.done.map(({ title }) => title)).toEqual(["first", "beside", "other line"]);
    expect(answer.skipped.map(({ title }) => title)).toEqual(["overlaps", "line", "same place"]);
  });

  test("a number that is the end of another word is no number to be written anew", () => {
    expect(fixed(`${vat}  tank a 20x30x40.5 cm\n`).texts.get("farm.marl")).toBe(
      `${vat}  tank a 20 x 30 x 40.5 cm\n`,
    );
    expect(fixed(`${vat}  hold temperature 24,5-26,5 degC\n`).texts.get("farm.marl")).toBe(
      `${vat}  hold temperature 24.5-26,5 degC\n`,
    );
  });

  test.each(["8:5", "8.10"])(
    "a time that may lack a digit or be a number isn't mended unasked: %s",
    (time) => {
      expect(fixed(`${vat}\nlog vat\n  2026-11-30 ${time} note "a"\n`).texts.size).toBe(0);
    },
  );

  test.each(["2026-13-05", "03.04.2026", "26-11-02"])("nor is a date that may be a slip: %s", (date) => {
    expect(fixed(`${vat}\nlog vat\n  ${date} note "a"\n`).texts.size).toBe(0);
  });

  test("a line at the margin is indented only where it then reads", () => {
    expect(fixed(`${vat}evaporates 4 L/day\nevaporates\n`).texts.get("farm.marl")).toBe(
      `${vat}  evaporates 4 L/day\nevaporates\n`,
    );
  });

  test("leave every other line as it was read", () => {
    const text = `${vat}  tank a 7,9 L\nevaporates 4 L/day\n\nlog vat\n  2026-11-30 08:00 note "a"\n  2026-11-30 08:00 note "a"\n`;
    const after = fixed(text).texts.get("farm.marl")!;
    expect(after).toBe(
      `${vat}  tank a 7.9 L\n  evaporates 4 L/day\n\nlog vat\n  2026-11-30 08:00 note "a"\n`,
    );
    expect(walk(filesOf(after)).problems).toEqual([]);
  });
});
