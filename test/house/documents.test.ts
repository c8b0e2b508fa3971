/** What README and DEVELOPERS.md quote is there: paths, commands, examples, and the sheet as it is printed. */
import { existsSync, readFileSync } from "node:fs";
import { dirname, join, resolve } from "node:path";
import { describe, expect, test } from "vitest";
import { readMoment } from "../../grammar/dates.ts";
import manifest from "../../package.json" with { type: "json" };
import { shownSheet } from "../../scripts/readme.ts";
import { advance } from "../../server/farm.ts";
import { marl } from "../commands/marl.ts";

const root = resolve(import.meta.dirname, "../..");
const read = (name: string): string => readFileSync(join(root, name), "utf8");
const pages = ["README.md", "DEVELOPERS.md", "CHANGELOG.md", "client/README.md"];

const blocksOf = (text: string, language: string): string[] =>
  [...text.matchAll(/```(\S*)\n([\s\S]*?)```/g)].flatMap((match) =>
    match[1] === language ? [match[2] ?? ""] : [],
  );
const quoted = (text: string): string[] =>
  [...text.replace(/```[\s\S]*?```/g, "").matchAll(/`([^`\n]+)`/g)].map((match) => match[1] ?? "");

const isPath = (word: string): boolean => /^[\w.-]+(\/[\w.-]+)+\/?$|^[\w-]+\.(ts|md|json|mjs)$/.test(word);
/** Units and files that the language speaks of look like paths too. */
const isOfTheLanguage = (word: string): boolean => /^(mg|mmol|umol|meq|mS|g)\/|^farm\.marl$/.test(word);

/** The lines of a tree drawing as paths: deeper lines stand under the folder above them. */
function treePaths(tree: string): string[] {
  const paths: string[] = [];
  const folders: { readonly indent: number; readonly path: string }[] = [];
  for (const line of tree.split("\n")) {
    const match = /^(\s*)([\w.-]+\/?)(?=\s|$)/.exec(line);
    if (!match) continue;
    const indent = match[1]!.length;
    const name = match[2]!;
    while (folders.length > 0 && folders.at(-1)!.indent >= indent) folders.pop();
    const path = (folders.at(-1)?.path ?? "") + name;
    if (name.endsWith("/")) folders.push({ indent, path });
    paths.push(path);
  }
  return paths;
}

describe.each(pages)("%s", (page) => {
  const text = read(page);

  test("quotes no path that isn't there", () => {
    const links = [...text.matchAll(/\]\(([^)#]+)\)/g)]
      .map((match) => match[1] ?? "")
      .filter((link) => !link.includes("://"));
    const words = quoted(text).filter((word) => isPath(word) && !isOfTheLanguage(word));
    const missing = [...links, ...words].filter((path) => {
      const places = [dirname(page), "", "server/checks", "server/culture"].map((place) => join(root, place));
      return !places.some((place) => existsSync(join(place, path)));
    });
    expect(missing).toEqual([]);
  });

  test("quotes no npm script that isn't there", () => {
    const scripts = [...text.matchAll(/npm run ([\w-]+)/g)].map((match) => match[1] ?? "");
    expect(scripts.filter((name) => !(name in manifest.scripts))).toEqual([]);
  });

  test("quotes no command that the command line doesn't know", () => {
    const commands = [...text.matchAll(/npx marl ([^`\n]+)/g)].map((match) => match[1] ?? "");
    const refused = commands.filter((words) => marl(root, words.trim().split(" ")).status === 2);
    expect(refused).toEqual([]);
  });
});

test("the tree of rooms is the tree on disk", () => {
  const [tree = ""] = blocksOf(read("DEVELOPERS.md"), "");
  const paths = treePaths(tree);
  expect(paths.length).toBeGreaterThan(20);
  expect(paths.filter((path) => !existsSync(join(root, path)))).toEqual([]);
});

test("README opens with the job and the two commands that set everything up", () => {
  const commands = blocksOf(read("README.md"), "sh").map((block) => block.trim());
  expect(commands).toEqual(["npm ci && npm run demo", "npm ci && npm test"]);
  for (const name of ["demo", "test", "prepare"]) expect(manifest.scripts).toHaveProperty(name);
});

test("README shows the sheet as it is printed", () => {
  const [shown] = blocksOf(read("README.md"), "text");
  const { out, status } = marl(root, shownSheet);
  expect(status).toBe(0);
  expect(shown).toBe(out);
});

test("the language page of README reads without a problem", () => {
  const [vat = "", solutions = ""] = blocksOf(read("README.md"), "marl");
  const moment = readMoment("2026-12-01T08:00", "noon");
  if (!moment.known) throw new Error("the moment doesn't read");
  const { minute } = moment.moment;
  const files = new Map([
    ["vat.marl", { text: vat }],
    ["solutions.marl", { text: solutions }],
  ]);
  const { problems, assessments } = advance(null, files, { at: minute, clock: minute });
  expect(problems.filter(({ severity }) => severity !== "info")).toEqual([]);
  expect([...assessments.values()][0]?.plan?.sources).toHaveLength(2);
});

test("the demo gives each system its volume, water, drift, doses and assumptions, and ends with 0", () => {
  const words = manifest.scripts.demo.split(" ").slice(2);
  const { out, status } = marl(root, words);
  expect(status).toBe(0);
  const heads = ["raceways:", "lagoon:", "quarantine:"].map((name) => out.indexOf(`\n${name}`));
  expect(heads.every((place) => place >= 0)).toBe(true);
  for (const part of [
    "Dose today",
    "The water, and when it leaves its hold",
    "What the corals take",
    "Taken for granted",
  ]) {
    expect(out.split(part)).toHaveLength(heads.length + 1);
  }
  expect(out.match(/\d L of water/g)).toHaveLength(heads.length);
  expect(out).toMatch(/\n {2}warning {2}/);
});

test("the helper sees a path that isn't there", () => {
  expect(treePaths("server/\n  report/\n    nowhere.ts  words\n  cli.ts")).toEqual([
    "server/",
    "server/report/",
    "server/report/nowhere.ts",
    "server/cli.ts",
  ]);
});
