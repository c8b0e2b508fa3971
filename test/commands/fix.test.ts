/** `marl check --fix`, as its own process, on files of its own. */
import { spawnSync } from "node:child_process";
import { chmodSync, copyFileSync, readFileSync, statSync, symlinkSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { cli, folder, marl } from "./marl.ts";

const at = ["--at", "2026-12-01T08:00"];
const vat = "system vat\n  tank main 500 L\n";
const read = (root: string, file: string): string => readFileSync(join(root, file), "utf8");

test("mends what can have meant one thing only, says so, and tells what is left", () => {
  const root = folder({
    "farm.marl": `${vat}  tank a 7,9 L\n  tank b 1,250 L\nevaporates 4 L/day\n`,
    "log.marl":
      'use "farm.marl"\n\nlog vat\n  2026-11-30 08:00 note "a"\n  2026-11-30 08:00 note "a"\n  11/29/2026 note "b"\n',
  });
  const ended = marl(root, ["check", "--fix", ...at]);
  expect(read(root, "farm.marl")).toBe(`${vat}  tank a 7.9 L\n  tank b 1,250 L\n  evaporates 4 L/day\n`);
  expect(read(root, "log.marl")).toBe(
    'use "farm.marl"\n\nlog vat\n  2026-11-30 08:00 note "a"\n  2026-11-29 note "b"\n',
  );
  const [done, left] = ended.out.split("\n\n");
  expect(done).toBe(
    [
      "farm.marl:3 Write 7.9",
      "farm.marl:5 Indent the line",
      "log.marl:5 Remove this line",
      "log.marl:6 Write 2026-11-29",
    ].join("\n"),
  );
  expect(left).toContain("farm.marl:4:10");
  expect(left).not.toContain("farm.marl:3");
  expect(ended.status).toBe(1);
  expect(ended.error).toBe("");
});

test("ends by what is left", () => {
  const root = folder({ "farm.marl": `${vat}  tank a 7,9 L\n` });
  expect(marl(root, ["check", ...at]).status).toBe(1);
  const ended = marl(root, ["check", "--fix", ...at]);
  expect(ended).toMatchObject({ status: 0, error: "" });
  expect(ended.out).toBe("farm.marl:3 Write 7.9\n\nNo problems.\n");
  expect(marl(root, ["check", "--fix", ...at]).out).toBe("No problems.\n");
});

test("with JSON standard output is one object, of what is left", () => {
  const root = folder({ "farm.marl": `${vat}  tank a 7,9 L\n  tank b 1,250 L\n` });
  const ended = marl(root, ["check", "--fix", "--format", "json", ...at]);
  const report = JSON.parse(ended.out);
  expect(report.problems.map(({ line, code }: { line: number; code: string }) => [line, code])).toEqual([
    [4, "syntax/number-form"],
  ]);
  expect(ended.error).toBe("farm.marl:3 Write 7.9\n");
  expect(ended.status).toBe(1);
});

test("keeps line endings, byte order mark, the missing last line ending and the file's mode", () => {
  const text = "\ufeffsystem vat\r\n  tank main 500 L\r\n  tank a 7,9 L # é 漢 😀\r\n  tank b .5 L";
  const root = folder({ "farm.marl": text });
  chmodSync(join(root, "farm.marl"), 0o640);
  marl(root, ["check", "--fix", ...at]);
  expect(read(root, "farm.marl")).toBe(text.replace("7,9", "7.9").replace(".5", "0.5"));
  expect(statSync(join(root, "farm.marl")).mode & 0o777).toBe(0o640);
});

test("a fix that brings another to light is followed by it", () => {
  const root = folder({ "farm.marl": `${vat}evaporates 7.9 L/day\n  evaporates 7,9 L/day\n` });
  expect(marl(root, ["check", "--fix", ...at])).toMatchObject({ status: 0 });
  expect(read(root, "farm.marl")).toBe(`${vat}  evaporates 7.9 L/day\n`);
});

test("a path narrows what is mended, and a file that needs nothing isn't written", () => {
  const root = folder({
    "farm.marl": `${vat}  tank a 7,9 L\n`,
    "pool.marl": "system pool\n  tank a 7,9 L\n",
  });
  const before = statSync(join(root, "farm.marl")).ino;
  marl(root, ["check", "pool.marl", "--fix", ...at]);
  expect(read(root, "pool.marl")).toContain("7.9");
  expect(read(root, "farm.marl")).toContain("7,9");
  expect(statSync(join(root, "farm.marl")).ino).toBe(before);
});

test("a file that may not be written is told of, with status 2, and stays as it is", () => {
  const root = folder({ "farm.marl": `${vat}  tank a 7,9 L\n` });
  chmodSync(root, 0o755);
  chmodSync(join(root, "farm.marl"), 0o444);
  // Whoever may write anything runs it as somebody who may not.
  const program = join(root, "marl.mjs");
  copyFileSync(cli, program);
  const nobody = process.getuid?.() === 0 ? { uid: 65534, gid: 65534 } : {};
  const ended = spawnSync(process.execPath, [program, "check", "--fix", ...at], {
    ...{ cwd: root, encoding: "utf8" },
    ...nobody,
  });
  expect(ended).toMatchObject({ status: 2, stdout: "" });
  expect(ended.stderr).toMatch(/^marl: .*farm\.marl can't be written/);
  expect(read(root, "farm.marl")).toContain("7,9");
});

test("without the word no file is touched, nor is a second name for it made a file", () => {
  const root = folder({ "farm.marl": `${vat}  tank a 7,9 L\n` });
  symlinkSync("farm.marl", join(root, "other.marl"));
  marl(root, ["check", ...at]);
  expect(read(root, "farm.marl")).toContain("7,9");
  marl(root, ["check", "--fix", ...at]);
  expect(read(root, "other.marl")).toBe(`${vat}  tank a 7.9 L\n`);
});
