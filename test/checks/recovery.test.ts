/**
 * A slip in one header of the example farm: every other line reads as before, and the slip is one problem on its
 * line. What is told besides follows from it: names that nobody declares any more, and what they did.
 */
import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { summaryOf } from "../../grammar/write.ts";
import type { Problem } from "../../server/checks/problem.ts";
import { walk } from "./walk.ts";

const examples = new Map(
  readdirSync("examples", { recursive: true, encoding: "utf8" })
    .filter((file) => file.endsWith(".marl"))
    .sort()
    .map((file) => [file.replaceAll("\\", "/"), readFileSync(`examples/${file}`, "utf8")]),
);

interface Header {
  readonly file: string;
  readonly line: number;
  readonly text: string;
}

const headers: readonly Header[] = [...examples].flatMap(([file, text]) => {
  const { sections, lines } = readDocument(text);
  return sections.map(({ headerLine }) => ({ file, line: headerLine, text: lines[headerLine]!.text }));
});

/** What can go wrong while a header word is typed: a letter dropped, two swapped, one doubled, at every place. */
function slips(text: string): string[] {
  const [word = ""] = /^\w+/.exec(text) ?? [];
  const rest = text.slice(word.length);
  const made = new Set<string>();
  for (let at = 0; at < word.length; at += 1) {
    const [before, letter, after] = [word.slice(0, at), word[at]!, word.slice(at + 1)];
    made.add(before + after);
    made.add(before + letter + letter + after);
    if (after !== "") made.add(before + after[0]! + letter + after.slice(1));
  }
  made.delete(word);
  return [...made].map((slip) => slip + rest);
}

const withLine = ({ file, line }: Header, text: string): string => {
  const lines = examples.get(file)!.split("\n");
  lines[line] = text;
  return lines.join("\n");
};

/** What each line says; null where it says nothing or can't be read. */
const said = (text: string): (string | null)[] =>
  readDocument(text).lines.map(({ statement }) => statement && summaryOf(statement));

const problemLines = (text: string): number[] =>
  readDocument(text).lines.flatMap(({ findings }, line) => findings.map(() => line));

const ascending = (left: number, right: number): number => left - right;

const asItIs = new Set(
  walk(examples).problems.map(({ code, place }) => `${place.file}:${place.line} ${code}`),
);

test.each(["lgo raceways", "olg raceways", "ikt bench", "kti bench"])(
  "two letters of three swapped: %s",
  (header) => {
    expect(readDocument(header).lines[0]!.findings[0]).toMatchObject({
      nearest: [/^k|^i/.test(header) ? "kit" : "log"],
    });
  },
);

test("the example farm has headers of most kinds", () => {
  const kinds = new Set(headers.map(({ text }) => text.split(" ")[0]));
  expect([...kinds].sort()).toEqual(["kit", "log", "reagent", "saltwater", "solution", "store", "system"]);
  expect(headers.length).toBeGreaterThan(12);
});

describe.each(headers.map((header) => [`${header.file}:${header.line + 1} ${header.text}`, header] as const))(
  "%s",
  (_, header) => {
    const before = said(examples.get(header.file)!);
    // The quarantine has slips of its own, to be shown.
    const withHeader = [...problemLines(examples.get(header.file)!), header.line].sort(ascending);
    const others = (lines: readonly (string | null)[]) =>
      lines.map((line, number) => (number === header.line ? "the header" : line));

    test("a slip in its word leaves every other line as it was", () => {
      for (const slip of slips(header.text)) {
        const text = withLine(header, slip);
        expect(others(said(text)), slip).toEqual(others(before));
        expect(problemLines(text), slip).toEqual(withHeader);
      }
    });

    test("a slip in its word is answered with that word, once", () => {
      const [word = ""] = header.text.split(" ");
      for (const slip of slips(header.text)) {
        const [finding, ...more] = readDocument(withLine(header, slip)).lines[header.line]!.findings;
        expect(more, slip).toEqual([]);
        expect(finding, slip).toMatchObject({ code: "syntax/unknown-word", nearest: [word] });
      }
    });

    test.runIf(!header.text.startsWith("store"))("without its name it is one problem", () => {
      const [word = ""] = header.text.split(" ");
      for (const text of [word, header.text.replace(/^(\w+)\s+\S+/, "$1")]) {
        const changed = withLine(header, text);
        expect(others(said(changed)), text).toEqual(others(before));
        expect(problemLines(changed), text).toEqual(withHeader);
      }
    });

    test("of that line the farm says one thing, of others only what follows from it", () => {
      const [slip = ""] = slips(header.text);
      const farm = walk(new Map([...examples, [header.file, withLine(header, slip)]]));
      const lines = (problems: readonly Problem[]) =>
        problems
          .filter(({ code, place }) => /^(?:syntax|unit)\//.test(code) && place.span)
          .map(({ code, place }) => `${place.file}:${place.line} ${code}`);
      // What hangs on the names below: a unit is only looked at where what it belongs to is known.
      const here = `${header.file}:${header.line} syntax/unknown-word`;
      const told = lines(farm.problems);
      expect(told.filter((line) => line === here)).toHaveLength(1);
      expect(told.filter((line) => line !== here && !asItIs.has(line))).toEqual([]);
    });
  },
);

describe("other slips leave the other lines alone", () => {
  const file = "raceways/system.marl";
  const text = examples.get(file)!;
  const lines = text.split("\n");
  const before = said(text);

  test("a line that moves to the margin", () => {
    for (const [number, line] of lines.entries()) {
      if (!/^ {2}\w/.test(line)) continue;
      const changed = lines.with(number, line.trimStart()).join("\n");
      expect(said(changed)).toEqual(before.with(number, null));
      expect(problemLines(changed)).toEqual([number]);
    }
  });

  test("other indents: none is a slip", () => {
    for (const indent of [" ", "   ", "\t", "  \t", "\u00a0\u00a0"]) {
      const changed = lines.map((line) => line.replace(/^ {2}/, indent)).join("\n");
      expect(said(changed), JSON.stringify(indent)).toEqual(before);
    }
  });

  test("a header that is indented", () => {
    const changed = lines.map((line) => (/^system/.test(line) ? `  ${line}` : line)).join("\n");
    expect(said(changed)).toEqual(before);
  });

  test("merge marks around any line are one problem, and both sides count", () => {
    for (const number of lines.keys()) {
      const line = lines[number]!;
      if (line.trim() === "") continue;
      const marked = ["<<<<<<< ours", line, "=======", line, ">>>>>>> theirs"];
      const changed = lines.toSpliced(number, 1, ...marked).join("\n");
      const own = before[number]!;
      expect(said(changed)).toEqual(before.toSpliced(number, 1, null, own, null, own, null));
      expect(problemLines(changed)).toEqual([number]);
    }
  });

  test("a line that can't be read", () => {
    for (const number of lines.keys()) {
      const changed = lines.with(number, "  ?? smudged ??").join("\n");
      const after = said(changed);
      // Below a lost header lines belong to the section above it, if there is one.
      if (/^\S/.test(lines[number]!) && !lines[number]!.startsWith("#")) continue;
      expect(after).toEqual(before.with(number, null));
    }
  });
});
