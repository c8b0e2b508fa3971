import { existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import manifest from "../../package.json" with { type: "json" };
import { folder, marl } from "./marl.ts";

const vat = `system vat "Test vat"
  tank main 1000 L
  hold alkalinity 7.6 to 8.4 dKH aim 8.0
  limit alkalinity rise 0.5 dKH/day
  uptake alkalinity 0.5 dKH/day
  by-hand ash times 12

solution ash
  supplies alkalinity 1.6 meq/mL as carbonate

log vat
  2026-12-01 08:00 read alkalinity 7.9 dKH, salinity 35, temperature 25 degC, pH 8.1
  2026-12-01 08:00 set ash 111 mL/day
`;
const misspelt = vat.replace("hold alkalinity", "hold alkalinty");
const at = ["--at", "2026-12-01T08:00"];

describe("exit status", () => {
  test("0 where nothing is worse than a warning, and `--strict` makes it 1", () => {
    const root = folder({ "farm.marl": `${vat}  2026-12-01 08:00 gave ash 400 mL\n` });
    const plain = marl(root, ["check", ...at]);
    expect(plain.out).toContain("overdose/alkalinity-dose");
    const errors = JSON.parse(marl(root, ["check", ...at, "--format", "json"]).out).problems.filter(
      (problem: { severity: string }) => problem.severity === "error",
    );
    expect(plain.status).toBe(errors.length > 0 ? 1 : 0);
    expect(marl(root, ["check", "--strict", ...at]).status).toBe(1);
  });

  test("0 for a clean farm, also with `--strict`", () => {
    const root = folder({ "farm.marl": vat });
    expect(marl(root, ["check", ...at])).toMatchObject({ status: 0 });
    const strict = marl(root, ["check", "--strict", ...at]);
    expect(strict.out).not.toContain("warning");
    expect(strict.status).toBe(0);
  });

  test("1 for an error", () => {
    const root = folder({ "farm.marl": misspelt });
    const ended = marl(root, ["check", ...at]);
    expect(ended.status).toBe(1);
    expect(ended.out).toContain("farm.marl:3:8");
    expect(ended.out).toContain("syntax/unknown-word");
  });

  test("a sheet ends with 0 although the farm has errors", () => {
    const root = folder({ "farm.marl": misspelt });
    expect(marl(root, ["sheet", ".", ...at]).status).toBe(0);
  });

  test.each([
    [["check", "nowhere"], "nowhere can't be read"],
    [["chek"], "check?"],
    [["check", "--fast"], "--fast"],
    [["check", "--at", "yesterday"], "yesterday"],
    [["check", "--at", "2026-13-40"], "2026-13-40"],
    [["check", "--format", "yaml"], "yaml"],
    [["sheet"], "one PATH"],
    [["sheet", ".", "--system", "vatt"], "no system is called vatt; there are vat"],
    [["sheet", ".", "--to", "sheet.doc"], ".txt, .md or .json"],
    [["check", "notes.txt"], "no .marl file"],
  ])("2, a reason on standard error and nothing on standard output: %j", (words, reason) => {
    const root = folder({ "farm.marl": vat, "notes.txt": "" });
    const ended = marl(root, [...words]);
    expect(ended).toMatchObject({ status: 2, out: "" });
    expect(ended.error).toContain(reason);
  });

  test("2 for a folder without any .marl file", () => {
    const ended = marl(folder({ "notes.txt": "" }), ["check"]);
    expect(ended).toMatchObject({ status: 2, out: "" });
  });
});

describe("what is printed", () => {
  test("`--format json` is one object and nothing else, at status 1 too", () => {
    const root = folder({ "farm.marl": misspelt });
    const ended = marl(root, ["check", "--format", "json", ...at]);
    expect(ended).toMatchObject({ status: 1, error: "" });
    const report = JSON.parse(ended.out);
    expect(report).toMatchObject({ marl: 1, at: "2026-12-01T08:00" });
    expect(report.problems[0]).toMatchObject({
      file: "farm.marl",
      line: 3,
      column: 8,
      endLine: 3,
      endColumn: 17,
      severity: "error",
      code: "syntax/unknown-word",
      system: "vat",
    });
  });

  test("a sheet fits 100 columns and leads with what to do today", () => {
    const { out } = marl(folder({ "farm.marl": vat }), ["sheet", ".", ...at]);
    expect(Math.max(...out.split("\n").map((line) => [...line].length))).toBeLessThanOrEqual(100);
    const order = ["Dose today", "The water", "What the corals take", "Taken for granted"].map((title) =>
      out.indexOf(title),
    );
    expect(order.every((place) => place > 0)).toBe(true);
    expect(order).toEqual([...order].sort((left, right) => left - right));
    expect(out).toMatch(/ash\s+by hand\s+1\d\d mL\s+12 doses/);
  });

  test("colour only where it is wanted", () => {
    const root = folder({ "farm.marl": misspelt });
    const escapeCode = "\u001b[";
    expect(marl(root, ["check", ...at]).out).not.toContain(escapeCode);
    expect(marl(root, ["check", "--color", ...at]).out).toContain(escapeCode);
    expect(marl(root, ["check", "--color", ...at], { NO_COLOR: "1" }).out).not.toContain(escapeCode);
  });

  test("help lists every command, and each command its options", () => {
    const root = folder({});
    const all = marl(root, ["--help"]);
    expect(all.status).toBe(0);
    for (const name of ["check", "sheet"]) {
      expect(all.out).toContain(`marl ${name}`);
      expect(marl(root, [name, "--help"]).out).toContain("--at");
    }
    expect(marl(root, ["--version"]).out).toBe(`marl ${manifest.version}\n`);
  });
});

describe("which farm, and which part of it is told", () => {
  const log =
    'use "../vat.marl"\n\nlog vat\n  2026-12-01 09:00 gave ash 10 mL\n  2026-12-01 09:00 gave asch 10 mL\n';
  const other = "system other\n  tank main 10 L\n  hold calcium 400 to 440 mgl\n";

  test("a path narrows what is told, not what is read", () => {
    const root = folder({
      "farm.marl": "",
      "vat.marl": vat,
      "logs/december.marl": log,
      "other/other.marl": other,
    });
    const report = JSON.parse(marl(root, ["check", "logs", "--format", "json", ...at]).out);
    expect(report.problems.map((problem: { file: string }) => problem.file)).toEqual(["logs/december.marl"]);
    expect(report.systems.map((system: { name: string }) => system.name)).toEqual(["vat"]);
    const inOther = marl(join(root, "other"), ["check", "--format", "json", ...at]);
    expect(
      JSON.parse(inOther.out).problems.every(
        (problem: { file: string }) => problem.file === "other/other.marl",
      ),
    ).toBe(true);
  });

  test("`--system` keeps what touches that system", () => {
    const root = folder({ "farm.marl": "", "vat.marl": vat, "other.marl": other });
    const report = JSON.parse(marl(root, ["sheet", ".", "--system", "vat", "--format", "json", ...at]).out);
    expect(report.systems.map((system: { name: string }) => system.name)).toEqual(["vat"]);
    expect(report.problems).toEqual([]);
    expect(report.solutions.map((solution: { name: string }) => solution.name)).toEqual(["ash"]);
  });

  test("a farm inside a farm is its own, dot-folders and node_modules are left out", () => {
    const root = folder({
      "farm.marl": vat,
      "inner/farm.marl": other,
      ".hidden/x.marl": "nonsense",
      "node_modules/x.marl": "nonsense",
    });
    const report = JSON.parse(marl(root, ["check", "--format", "json", ...at]).out);
    expect(report.systems.map((system: { name: string }) => system.name)).toEqual(["vat"]);
    const inner = JSON.parse(marl(root, ["check", "inner", "--format", "json", ...at]).out);
    expect(inner.systems.map((system: { name: string }) => system.name)).toEqual(["other"]);
  });

  test("without farm.marl the nearest folder with .git is the farm, else the path", () => {
    const files = { "vat.marl": vat, "logs/december.marl": log };
    const root = folder(files);
    mkdirSync(join(root, ".git"));
    expect(
      JSON.parse(marl(join(root, "logs"), ["check", "--format", "json", ...at]).out).systems,
    ).toHaveLength(1);
    const plain = folder(files);
    expect(marl(join(plain, "logs"), ["check", ...at]).out).toContain("use/outside");
  });

  test("links out of the farm aren't followed", () => {
    const elsewhere = folder({ "secret.marl": other });
    const root = folder({ "farm.marl": vat });
    symlinkSync(elsewhere, join(root, "link"));
    symlinkSync(join(elsewhere, "secret.marl"), join(root, "secret.marl"));
    expect(JSON.parse(marl(root, ["check", "--format", "json", ...at]).out).systems).toHaveLength(1);
  });

  test("a link inside the farm is another name for where it leads, and counts once", () => {
    const shared = vat.replace(/^log vat[\s\S]*/m, "");
    const logs = 'use "../common/vat.marl"\n\nlog vat\n  2026-12-01 08:00 read alkalinity 7.9 dKH\n';
    const root = folder({ "farm.marl": "", "really/here/vat.marl": shared, "logs/december.marl": logs });
    symlinkSync(join(root, "really/here"), join(root, "common"));
    symlinkSync(join(root, "common"), join(root, "round-about"));
    symlinkSync(join(root, "nowhere"), join(root, "broken.marl"));
    symlinkSync(root, join(root, "itself"));
    const report = JSON.parse(marl(root, ["check", "--format", "json", ...at]).out);
    expect(report.problems.filter((problem: { severity: string }) => problem.severity === "error")).toEqual(
      [],
    );
    expect(report.systems.map((system: { file: string }) => system.file)).toEqual(["really/here/vat.marl"]);
    expect(report.systems[0].readings).toHaveLength(1);
    const through = JSON.parse(marl(root, ["check", "common/vat.marl", "--format", "json", ...at]).out);
    expect(through.systems).toHaveLength(1);
  });

  test("a file that isn't text is told and costs no other file", () => {
    const root = folder({ "farm.marl": vat });
    writeFileSync(join(root, "picture.marl"), Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0, 1, 2, 3]));
    const report = JSON.parse(marl(root, ["check", "--format", "json", ...at]).out);
    expect(report.problems).toMatchObject([
      { file: "picture.marl", line: null, code: "file/unreadable", severity: "error" },
    ]);
    expect(report.systems[0].plan.doses).toHaveLength(1);
  });
});

describe("writing a sheet to a file", () => {
  test.each(["txt", "md", "json"])("writes .%s, never over a file without being asked", (ending) => {
    const root = folder({ "farm.marl": vat });
    const name = `sheet.${ending}`;
    const file = join(root, name);
    const first = marl(root, ["sheet", ".", "--to", name, ...at]);
    expect(first).toMatchObject({ status: 0, out: "" });
    const text = readFileSync(file, "utf8");
    if (ending === "json") expect(JSON.parse(text)).toMatchObject({ marl: 1 });
    else expect(text).toContain("Dose today");
    writeFileSync(file, "mine");
    const second = marl(root, ["sheet", ".", "--to", name, ...at]);
    expect(second.status).toBe(2);
    expect(second.error).toContain("--replace");
    expect(readFileSync(file, "utf8")).toBe("mine");
    expect(marl(root, ["sheet", ".", "--to", name, "--replace", ...at]).status).toBe(0);
    expect(readFileSync(file, "utf8")).toBe(text);
    expect(readdirSync(root).sort()).toEqual(["farm.marl", name].sort());
  });

  test("JSON asked for goes into no other kind of file", () => {
    const root = folder({ "farm.marl": vat });
    const ended = marl(root, ["sheet", ".", "--to", "sheet.md", "--format", "json", ...at]);
    expect(ended).toMatchObject({ status: 2, out: "" });
    expect(existsSync(join(root, "sheet.md"))).toBe(false);
  });

  test("a folder of that name is no file to write over", () => {
    const root = folder({ "farm.marl": vat, "sheet.md/x.txt": "" });
    const ended = marl(root, ["sheet", ".", "--to", "sheet.md", ...at]);
    expect(ended.status).toBe(2);
    expect(ended.error).toContain("sheet.md is a folder");
  });

  test("a place that can't be written is a 2", () => {
    const root = folder({ "farm.marl": vat });
    const ended = marl(root, ["sheet", ".", "--to", "no/such/folder/sheet.txt", ...at]);
    expect(ended.status).toBe(2);
    expect(ended.error).toContain("there is no such folder");
    expect(existsSync(join(root, "no"))).toBe(false);
  });

  test("what people wrote is escaped in Markdown", () => {
    const root = folder({ "farm.marl": vat.replace("Test vat", "<b>*x*</b> | y") });
    const { out } = marl(root, ["sheet", ".", "--to", "sheet.md", ...at]);
    expect(out).toBe("");
    const text = readFileSync(join(root, "sheet.md"), "utf8");
    expect(text).not.toContain("<b>");
    expect(text).toContain("\\<b\\>\\*x\\*");
  });
});
