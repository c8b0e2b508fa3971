/** What package.json says to VS Code is what the tables make, and the files that it names are there and packed. */
import { existsSync, readdirSync, readFileSync } from "node:fs";
import { inflateSync } from "node:zlib";
import { expect, test } from "vitest";
import { category, commandNames, commandTable } from "../../client/command-table.ts";
import { sectionKinds } from "../../grammar/syntax.ts";
import manifest from "../../package.json" with { type: "json" };
import { iconFiles, png, svg } from "../../scripts/icon.ts";
import { configurationFile, configurationText } from "../../scripts/language-configuration.ts";
import { capabilities, contributes } from "../../scripts/manifest.ts";
import { grammarFile, grammarText } from "../../scripts/textmate.ts";
import { settingsTable } from "../../server/protocol/settings.ts";

const read = (name: string): string => readFileSync(name, "utf8");

test("the manifest is what its script makes", () => {
  expect(manifest.contributes).toEqual(contributes);
  expect(manifest.capabilities).toEqual(capabilities);
});

test("the grammar and the language configuration are what their scripts make", () => {
  expect(read(grammarFile)).toBe(grammarText());
  expect(read(configurationFile)).toBe(configurationText());
});

test("the icon is what its script draws, 256 pixels each way", () => {
  const drawn = readFileSync(iconFiles.png);
  expect([drawn.readUInt32BE(16), drawn.readUInt32BE(20)]).toEqual([256, 256]);
  const pixelsOf = (file: Buffer) => inflateSync(file.subarray(41, 41 + file.readUInt32BE(33)));
  // How well it is packed may differ from one zlib to the next.
  expect(pixelsOf(drawn).equals(pixelsOf(png()))).toBe(true);
  expect(read(iconFiles.svg)).toBe(svg());
});

test("nothing runs before a Marl file is opened: what the language brings starts the extension", () => {
  expect(manifest.activationEvents).toEqual([]);
  expect(manifest.contributes.languages[0]?.configuration).toBe(`./${configurationFile}`);
});

test("every setting of the server is one of the editor's, with what it does", () => {
  const { properties } = manifest.contributes.configuration;
  expect(Object.keys(properties)).toEqual(Object.keys(settingsTable).map((name) => `marl.${name}`));
  for (const [name, { description, default: value }] of Object.entries(properties)) {
    expect(name).toMatch(/^marl\.[a-z]+\.[a-zA-Z]+$/);
    expect(description.length).toBeGreaterThan(20);
    expect(["boolean", "number"]).toContain(typeof value);
  }
});

test("every command stands under one category and can't be chosen where it means nothing", () => {
  const { commands } = manifest.contributes;
  expect(commands.map(({ command }) => command)).toEqual(commandNames);
  for (const each of commands)
    expect(each).toMatchObject({ category, enablement: expect.stringMatching(/\S/) });
  for (const { title } of commandTable) expect(title).toMatch(/^(Record|Write|Show|Tidy|Explain|Restart) /);
});

test("the walkthrough has four steps, and its commands and pages are there", () => {
  const [{ steps } = { steps: [] }] = manifest.contributes.walkthroughs;
  expect(steps).toHaveLength(4);
  for (const { description, media } of steps) {
    expect(existsSync(media.markdown)).toBe(true);
    const [, command = ""] = /\(command:([\w.]+)\)/.exec(description) ?? [];
    if (command !== "vscode.openFolder") expect(commandNames).toContain(command);
  }
});

test("the types are those of the oldest VS Code that it runs in", () => {
  const oldest = manifest.engines.vscode.replace("^", "");
  expect(manifest.devDependencies["@types/vscode"]).toBe(oldest);
});

/** What is packed, by the lines of .vscodeignore that leave it in. */
const packed = read(".vscodeignore")
  .split("\n")
  .filter((line) => line.startsWith("!"))
  .map((line) => line.slice(1));

test("only what the extension runs and shows is packed, and all that the manifest names", () => {
  const isPacked = (path: string): boolean =>
    packed.some((line) => (line.endsWith("/**") ? path.startsWith(line.slice(0, -2)) : path === line));
  const { languages, grammars, walkthroughs } = manifest.contributes;
  const named = [
    manifest.main,
    manifest.icon,
    ...languages.flatMap(({ configuration, icon }) =>
      configuration && icon ? [configuration, icon.light, icon.dark] : [],
    ),
    ...grammars.map(({ path }) => path),
    ...walkthroughs.flatMap(({ steps }) => steps.map(({ media }) => media.markdown)),
  ].map((path) => path.replace(/^\.\//, ""));
  expect(named.filter((path) => !isPacked(path))).toEqual([]);
  expect(isPacked("docs/problems/water-stale.md")).toBe(true);
  for (const path of ["server/cli.ts", "dist/cli.js", "client/extension.ts", "test/examples.test.ts"])
    expect(isPacked(path)).toBe(false);
});

test("the extension asks no telemetry of anybody", () => {
  const sources = readdirSync("client").filter((name) => name.endsWith(".ts"));
  expect(sources.length).toBeGreaterThan(10);
  for (const name of sources) expect(read(`client/${name}`)).not.toMatch(/telemetry|https?:\/\//i);
});

test("an indent begins below every section's header", () => {
  for (const kind of sectionKinds) expect(configurationText()).toContain(kind);
});
