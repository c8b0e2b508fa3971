/**
 * Files with slips of every kind in them: each is read without a throw, no line is lost, every place lies inside its
 * line, and tidying keeps the meaning. Seeded, so that a failure comes again; each failure shows its file.
 */
import { describe, expect, test } from "vitest";
import { type MarlDocument, readDocument } from "../../grammar/document.ts";
import { tidyText } from "../../grammar/tidy.ts";
import { summaryOf } from "../../grammar/write.ts";
import { advance } from "../../server/farm.ts";
import { chanceFrom } from "../simulator/random.ts";
import { eastHall, shelves } from "./a-farm.ts";
import { mutatedFile, mutations, pick, type Random, wholeTexts } from "./mutate.ts";

const fileCount = 20_000;
const walkCount = 500;

/** What a document says, line by line, without where its lines stand and how they are spaced. */
function meaningOf({ lines, sections, uses }: MarlDocument): readonly unknown[] {
  const opened = sections.map(({ kind, name, title, from }) => [kind, name?.text, title?.text, from?.minute]);
  const said = lines
    .filter(({ text }) => /[^\s\u180e\u200b\u2060\ufeff]/.test(text))
    .map(({ text, statement, comment, findings, section }) => [
      section,
      statement ? [statement.kind, summaryOf(statement)] : null,
      comment && text.slice(comment.start, comment.end).trimEnd(),
      findings.map(({ span: _, ...finding }) => finding),
    ]);
  return [opened, uses.map(({ path }) => path.text), ...said];
}

function placesInside(document: MarlDocument): void {
  for (const { text, comment, findings } of document.lines) {
    for (const { start, end } of [...(comment ? [comment] : []), ...findings.map(({ span }) => span)]) {
      const inside = start >= 0 && start <= end && end <= text.length;
      if (!inside) throw new Error(`${start} to ${end} isn't inside a line of ${text.length}`);
      // An editor would draw half a character.
      if (splitsACharacter(text, start) || splitsACharacter(text, end))
        throw new Error(`${start} to ${end} splits a character`);
    }
  }
}

const splitsACharacter = (text: string, at: number): boolean =>
  /^[\ud800-\udbff][\udc00-\udfff]$/.test(text.slice(at - 1, at + 1));

/** The lines as they stand in a file, whatever its line endings. */
const linesOf = (text: string): string =>
  text
    .replace(/^\ufeff/, "")
    .replaceAll("\r\n", "\n")
    .replace(/\r$/, "");

/** Reads and tidies a file; gives back whether tidying changed it. */
function readsAndTidies(text: string): boolean {
  const document = readDocument(text);
  expect(document.hasByteOrderMark).toBe(text.startsWith("\ufeff"));
  expect(document.lines.map((line) => line.text).join("\n")).toBe(linesOf(text));
  placesInside(document);
  const tidy = tidyText(text);
  const again = readDocument(tidy);
  expect(meaningOf(again)).toEqual(meaningOf(document));
  expect(tidyText(tidy)).toBe(tidy);
  expect(tidy.startsWith("\ufeff")).toBe(document.hasByteOrderMark);
  if (document.lineEnding === "\r\n") expect(tidy.replaceAll("\r\n", "")).not.toContain("\n");
  else expect(tidy).not.toContain("\r\n");
  const unread = document.lines.filter((line) => line.findings.length > 0).map((line) => line.text);
  for (const line of unread) expect(tidy).toContain(line.replace(/\r+$/, ""));
  return tidy !== text;
}

/** Does something with each of many files; a failure names its file. */
function eachFile(count: number, seed: number, use: (text: string, random: Random) => void): void {
  const random = chanceFrom(seed).uniform;
  for (let number = 0; number < count; number += 1) {
    const text = mutatedFile(random);
    try {
      use(text, random);
    } catch (error) {
      throw new Error(`file ${number} of seed ${seed}: ${JSON.stringify(text)}`, { cause: error });
    }
  }
}

describe("mutated files", () => {
  test("are read and tidied without loss", () => {
    let changed = 0;
    let broken = 0;
    eachFile(fileCount, 1, (text) => {
      if (readsAndTidies(text)) changed += 1;
      if (readDocument(text).lines.some(({ findings }) => findings.length > 0)) broken += 1;
    });
    // Neither all torn to shreds nor all left whole.
    expect(changed).toBeGreaterThan(fileCount / 2);
    expect(broken).toBeGreaterThan(fileCount / 2);
  }, 300_000);

  test("are of every kind", () => {
    const random = chanceFrom(2).uniform;
    for (const [name, mutate] of Object.entries(mutations)) {
      const texts = Array.from({ length: 20 }, () => pick(random, wholeTexts));
      const changed = texts.filter((text) => mutate(text, random) !== text);
      expect(changed.length, name).toBeGreaterThan(5);
    }
  });

  test("go through the whole walk: every problem lies inside its line, and tidied they have the same problems", () => {
    const at = Date.UTC(2026, 11, 1, 8) / 60_000;
    let problemCount = 0;
    eachFile(walkCount, 3, (small, random) => {
      const mutated = pick(random, Object.values(mutations))(eastHall, random);
      const texts: Readonly<Record<string, string>> = {
        "east.marl": mutated,
        "shelves.marl": shelves,
        "small.marl": small,
      };
      const walk = (write: (text: string) => string) =>
        advance(null, new Map(Object.entries(texts).map(([file, text]) => [file, { text: write(text) }])), {
          at,
          clock: at,
        });
      const { problems, documents } = walk((text) => text);
      const told = problems.map(({ code, severity, message }) => [code, severity, message]);
      expect(walk(tidyText).problems.map(({ code, severity, message }) => [code, severity, message])).toEqual(
        told,
      );
      problemCount += problems.length;
      for (const { place, code, related, fixes } of problems) {
        for (const { file, line, span } of [place, ...related.map((other) => other.place)]) {
          const written = documents.get(file)?.lines[line]?.text;
          if (written === undefined) throw new Error(`${code}: no line ${line} in ${file}`);
          if (span && (span.start < 0 || span.start > span.end || span.end > written.length))
            throw new Error(`${code}: ${span.start} to ${span.end} isn't inside ${written.length}`);
        }
        for (const edit of fixes.flatMap(({ edits }) => edits))
          expect(edit.end).toBeLessThanOrEqual(documents.get(edit.file)!.lines[edit.line]!.text.length);
      }
    });
    expect(problemCount).toBeGreaterThan(walkCount);
  }, 300_000);
});
