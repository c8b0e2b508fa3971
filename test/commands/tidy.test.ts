import {
  chmodSync,
  lstatSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  statSync,
  symlinkSync,
  utimesSync,
  writeFileSync,
} from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { folder, marl } from "./marl.ts";

const untidy = "system  vat\n tank main  500L";
const tidy = "system vat\n  tank main 500 L\n";
const read = (root: string, path: string): string => readFileSync(join(root, path), "utf8");

describe("marl tidy", () => {
  test("rewrites what isn't tidy, says which, and leaves the rest untouched", () => {
    const root = folder({ "a.marl": untidy, "b.marl": tidy, "north/c.marl": untidy, "notes.txt": untidy });
    const past = new Date("2026-01-01T00:00:00Z");
    utimesSync(join(root, "b.marl"), past, past);
    expect(marl(root, ["tidy", "."])).toEqual({
      status: 0,
      out: "tidied a.marl\ntidied north/c.marl\n",
      error: "",
    });
    for (const path of ["a.marl", "b.marl", "north/c.marl"]) expect(read(root, path)).toBe(tidy);
    expect(read(root, "notes.txt")).toBe(untidy);
    expect(statSync(join(root, "b.marl")).mtime).toEqual(past);
    expect(marl(root, ["tidy", "."])).toEqual({ status: 0, out: "", error: "" });
    // Nothing that was written beside stays.
    expect(readdirSync(root).sort()).toEqual(["a.marl", "b.marl", "north", "notes.txt"]);
  });

  test("takes files and folders, and no file twice", () => {
    const root = folder({ "a.marl": untidy, "north/b.marl": untidy, "c.marl": untidy });
    const { out } = marl(root, ["tidy", "--check", "north", "a.marl", "north/b.marl", "./a.marl"]);
    expect(out).toBe("north/b.marl isn't tidy\n./a.marl isn't tidy\n");
    expect(marl(root, ["tidy", "a.marl", "north"]).out).toBe("tidied a.marl\ntidied north/b.marl\n");
    expect(read(root, "c.marl")).toBe(untidy);
  });

  test("`--check` writes nothing, and ends with 1 where something isn't tidy", () => {
    const root = folder({ "a.marl": untidy, "b.marl": tidy });
    expect(marl(root, ["tidy", "--check", "."])).toEqual({
      status: 1,
      out: "a.marl isn't tidy\n",
      error: "",
    });
    expect(read(root, "a.marl")).toBe(untidy);
    expect(marl(root, ["tidy", "--check", "b.marl"])).toEqual({ status: 0, out: "", error: "" });
  });

  test("keeps line endings, byte order mark and lines that can't be read", () => {
    const root = folder({ "a.marl": "\ufeffsystem  vat\r\n  tank  main 5 L L\r\n  tank sump  5 L" });
    expect(marl(root, ["tidy", "a.marl"]).status).toBe(0);
    expect(read(root, "a.marl")).toBe("\ufeffsystem vat\r\n  tank  main 5 L L\r\n  tank sump 5 L\r\n");
  });

  test("leaves dot-folders, node_modules and a farm inside alone, unless it is named", () => {
    const root = folder({
      "farm.marl": tidy,
      ".old/a.marl": untidy,
      "node_modules/x/a.marl": untidy,
      "inside/farm.marl": untidy,
      "inside/a.marl": untidy,
    });
    expect(marl(root, ["tidy", "."])).toEqual({ status: 0, out: "", error: "" });
    expect(marl(root, ["tidy", "inside"]).out).toBe("tidied inside/a.marl\ntidied inside/farm.marl\n");
    expect(read(root, ".old/a.marl")).toBe(untidy);
    expect(read(root, "node_modules/x/a.marl")).toBe(untidy);
  });

  test("doesn't follow a link that leads out; one that is named stays a link", () => {
    const outside = folder({ "a.marl": untidy });
    const root = folder({ "b.marl": untidy });
    symlinkSync(join(outside, "a.marl"), join(root, "out.marl"));
    symlinkSync(join(root, "b.marl"), join(root, "in.marl"));
    expect(marl(root, ["tidy", "."]).out).toBe("tidied b.marl\n");
    expect(read(outside, "a.marl")).toBe(untidy);
    expect(marl(root, ["tidy", "out.marl"]).out).toBe("tidied out.marl\n");
    expect(read(outside, "a.marl")).toBe(tidy);
    for (const link of ["out.marl", "in.marl"])
      expect(lstatSync(join(root, link)).isSymbolicLink()).toBe(true);
  });

  test("keeps a file's mode", () => {
    const root = folder({ "a.marl": untidy });
    chmodSync(join(root, "a.marl"), 0o640);
    expect(marl(root, ["tidy", "a.marl"]).status).toBe(0);
    expect(read(root, "a.marl")).toBe(tidy);
    expect(statSync(join(root, "a.marl")).mode & 0o777).toBe(0o640);
  });

  // Root may write whatever it likes.
  test.skipIf(process.getuid?.() === 0)("leaves a file that may not be written", () => {
    const root = folder({ "a.marl": untidy, "b.marl": untidy });
    chmodSync(join(root, "a.marl"), 0o444);
    const ended = marl(root, ["tidy", "."]);
    expect(ended).toMatchObject({ status: 2, out: "tidied b.marl\n" });
    expect(ended.error).toContain("a.marl can't be written");
    expect(read(root, "a.marl")).toBe(untidy);
  });

  test("tells of a file that is no text, leaves it alone and does the others", () => {
    const root = folder({ "b.marl": untidy });
    const bytes = Buffer.from([0x73, 0xff, 0xfe, 0x0a]);
    writeFileSync(join(root, "a.marl"), bytes);
    writeFileSync(join(root, "c.marl"), "system\0vat");
    expect(marl(root, ["tidy", "."])).toEqual({
      status: 2,
      out: "tidied b.marl\n",
      error: "marl: a.marl is left alone: it isn't UTF-8 text\nmarl: c.marl is left alone: it isn't text\n",
    });
    expect(readFileSync(join(root, "a.marl"))).toEqual(bytes);
  });

  test.each([
    [["tidy"], "tidy takes files or folders"],
    [["tidy", "nowhere"], "nowhere can't be read"],
    [["tidy", "a.marl", "nowhere.marl"], "nowhere.marl can't be read"],
    [["tidy", "notes.txt"], "notes.txt is no .marl file"],
    [["tidy", "empty"], "empty holds no .marl file"],
    [["tidy", "-", "a.marl"], "can't stand beside other paths"],
    [["tidy", "--format", "json", "a.marl"], "--format"],
  ])("refuses %j and writes nothing", (words, reason) => {
    const root = folder({ "a.marl": untidy, "notes.txt": "" });
    mkdirSync(join(root, "empty"));
    const ended = marl(root, words);
    expect(ended).toMatchObject({ status: 2, out: "" });
    expect(ended.error).toContain(reason);
    expect(read(root, "a.marl")).toBe(untidy);
  });
});

describe("marl tidy -", () => {
  const piped = (input: string | Uint8Array, ...words: readonly string[]) =>
    marl(folder({}), ["tidy", "-", ...words], {}, input);

  test("tidies standard input to standard output", () => {
    expect(piped(untidy)).toEqual({ status: 0, out: tidy, error: "" });
    expect(piped("")).toEqual({ status: 0, out: "", error: "" });
    expect(piped("\ufeffsystem  vat # é 海水 🐠\r\n").out).toBe("\ufeffsystem vat # é 海水 🐠\r\n");
  });

  test("gives back a long text whole", () => {
    const log = `log vat\n${'  2026-11-30 note  "all well"\n'.repeat(40_000)}`;
    expect(piped(log).out).toBe(log.replaceAll("note  ", "note "));
  });

  test("with `--check` only says whether it is tidy", () => {
    expect(piped(untidy, "--check")).toEqual({
      status: 1,
      out: "standard input isn't tidy\n",
      error: "",
    });
    expect(piped(tidy, "--check")).toEqual({ status: 0, out: "", error: "" });
  });

  test("refuses bytes that are no text", () => {
    expect(piped(Buffer.from([0xff, 0xfe]))).toEqual({
      status: 2,
      out: "",
      error: "marl: standard input: it isn't UTF-8 text\n",
    });
  });
});
