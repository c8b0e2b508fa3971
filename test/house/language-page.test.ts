/** docs/language.md is what its script makes, holds every word of the language, and all that it shows reads. */
import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { beforeAll, describe, expect, test } from "vitest";
import { readLine } from "../../grammar/line.ts";
import { parameterTable } from "../../grammar/parameters.ts";
import { partTable } from "../../grammar/parts.ts";
import { aParameter, statementTable } from "../../grammar/statements.ts";
import { type SectionKind, sectionKinds } from "../../grammar/syntax.ts";
import { tidyText } from "../../grammar/tidy.ts";
import { unitTable } from "../../grammar/units.ts";
import { anchorOf, languagePage, page, pageFrom } from "../../scripts/language-page.ts";
import { codes } from "../../server/checks/rules.ts";
import { reagents } from "../../server/chemistry/reagents.ts";
import { defaultLimits, defaults } from "../../server/culture/defaults.ts";
import { walk } from "../checks/walk.ts";

const text = readFileSync(languagePage, "utf8");
const prose = text.replace(/```[\s\S]*?```/g, "");

interface Block {
  /** What stands after `marl`: nothing for a farm of one file, a file's name, or the section of loose lines. */
  readonly of: string;
  readonly lines: string;
}
const blocks: readonly Block[] = [...text.matchAll(/^```marl ?(.*)\n([\s\S]*?)^```$/gm)].map(
  ([, of = "", lines = ""]) => ({ of, lines }),
);
const isFile = ({ of }: Block): boolean => of.endsWith(".marl");
const farms = blocks.filter(({ of }) => of === "").map(({ lines }) => new Map([["farm.marl", lines]]));
farms.push(new Map(blocks.filter(isFile).map(({ of, lines }) => [of, lines])));
const loose = blocks.filter((block) => block.of !== "" && !isFile(block));

let made = "";
beforeAll(async () => {
  made = await page();
});

test("the page is the one that the script makes", () => {
  expect(text).toBe(made);
});

test("a mark that nothing stands for is refused", () => {
  expect(() => pageFrom("{{nothing of this name}}")).toThrow("nothing stands for");
  expect(text).not.toContain("{{");
});

describe("what the page shows", () => {
  test("there are farms and lines to try", () => {
    expect(farms.length).toBeGreaterThan(4);
    expect(farms.at(-1)?.size).toBe(3);
    expect(loose.length).toBeGreaterThanOrEqual(statementTable.length);
  });

  test.each(farms.map((files, index) => [index, files] as const))("farm %i has no error", (_, files) => {
    const { problems, assessments } = walk(files);
    expect(problems.filter(({ severity }) => severity === "error")).toEqual([]);
    const families = new Set(problems.map(({ code }) => code.split("/")[0]));
    for (const family of ["syntax", "unit", "use"]) expect(families).not.toContain(family);
    expect(assessments.size + [...files.values()].join("").split(/^solution /m).length).toBeGreaterThan(1);
  });

  test("the first farm and the whole one have a plan and nothing to warn of", () => {
    for (const files of [farms[0]!, farms.at(-1)!]) {
      const { problems, assessments } = walk(files);
      expect(problems.filter(({ severity }) => severity !== "info" && severity !== "hint")).toEqual([]);
      expect([...assessments.values()][0]?.plan?.sources.length).toBe(2);
    }
  });

  test.each(loose.map(({ of, lines }) => [of, lines] as const))("lines of %s read: %s", (of, lines) => {
    const section = of === "header" ? null : (sectionKinds.find((kind) => kind === of) as SectionKind);
    expect(section).toBeDefined();
    for (const line of lines.trimEnd().split("\n")) {
      const { statement, findings } = readLine(section, line);
      expect(findings, line).toEqual([]);
      expect(statement, line).not.toBeNull();
    }
  });

  test("it is tidy, so that it teaches the tidy form", () => {
    for (const files of farms) for (const lines of files.values()) expect(tidyText(lines)).toBe(lines);
  });
});

describe("the page holds", () => {
  const shown = new Set(text.split("\n").map((line) => line.trim()));
  const quoted = new Set([...prose.matchAll(/`([^`\n]+)`/g)].map((match) => match[1]));
  const headings = new Set([...prose.matchAll(/^#+ (.+)$/gm)].map((match) => match[1]!));

  test("every section and every statement's word", () => {
    for (const kind of sectionKinds) expect(quoted).toContain(kind);
    for (const { word } of statementTable)
      expect(
        word === aParameter || word === "use" || [...headings].some((head) => head.startsWith(word)),
        word,
      ).toBe(true);
    expect(text).toContain('\nuse "');
  });

  test("every statement's meaning and examples", () => {
    for (const { word, meaning, examples } of statementTable) {
      if (word === "use") continue;
      expect(text).toContain(meaning);
      for (const line of examples) expect(shown, line).toContain(line);
    }
  });

  test.each([
    ["parameters", parameterTable.map(({ name }) => name)],
    ["units", unitTable.flatMap(({ spelling, also }) => [spelling, ...also])],
    ["reagents", Object.keys(reagents)],
    ["words inside statements", partTable.map(({ word }) => word)],
  ])("every one of the %s", (_, words) => {
    expect(words.filter((word) => !quoted.has(word))).toEqual([]);
  });

  test("every default", () => {
    for (const { what, text: value } of [...Object.values(defaultLimits), ...Object.values(defaults)])
      expect(text).toContain(`| ${what} | ${value} |`);
  });

  test("every problem, each with a link to its page", () => {
    for (const code of codes) expect(text).toContain(`[${code}](problems/${code.replace("/", "-")}.md)`);
  });
});

test("every link leads somewhere", () => {
  const anchors = new Set([...prose.matchAll(/^#+ (.+)$/gm)].map((match) => anchorOf(match[1]!)));
  const links = [...prose.matchAll(/\]\(([^)]+)\)/g)].map((match) => match[1]!);
  expect(links.length).toBeGreaterThan(codes.length);
  const broken = links.filter((link) =>
    link.startsWith("#") ? !anchors.has(link.slice(1)) : !existsSync(join(dirname(languagePage), link)),
  );
  expect(broken).toEqual([]);
});
