/** Colouring without the server: texts with the scopes written under their words, and lines of the language's own tables. */
import { spawnSync } from "node:child_process";
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { expect, test } from "vitest";
import { parameterTable } from "../../grammar/parameters.ts";
import { statementTable } from "../../grammar/statements.ts";
import { unitTable } from "../../grammar/units.ts";
import { grammarFile } from "../../scripts/textmate.ts";
import { reagents } from "../../server/chemistry/reagents.ts";

const tool = "node_modules/vscode-tmgrammar-test/dist/unit.js";
const checked = (files: string) =>
  spawnSync(process.execPath, [tool, "-g", grammarFile, files], { encoding: "utf8" });

const head = '# SYNTAX TEST "source.marl"\n';

/** Whether a text's scopes are as is written under its words. */
function holds(text: string): boolean {
  const folder = mkdtempSync(join(tmpdir(), "marl-colours-"));
  try {
    writeFileSync(join(folder, "one.test.marl"), head + text);
    const { status, stdout } = checked(join(folder, "one.test.marl"));
    if (status !== 0 && !stdout.includes("missing required scopes")) throw new Error(stdout);
    return status === 0;
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** A line with a scope under one of its words. */
function under(line: string, word: string, scope: string): string {
  const start = line.lastIndexOf(word);
  if (start < 1) throw new Error(`no place for a caret under ${word}: ${line}`);
  return `${line}\n#${" ".repeat(start - 1)}${"^".repeat(word.length)} ${scope}\n`;
}

test("the texts of this folder have the scopes that stand under their words", () => {
  expect(readdirSync("test/textmate").filter((name) => name.endsWith(".test.marl")).length).toBeGreaterThan(
    1,
  );
  const { status, stdout } = checked("test/textmate/*.test.marl");
  expect(stdout).not.toContain("failed");
  expect(status).toBe(0);
});

test("a scope that isn't there is seen", () => {
  expect(holds(under("  tank main 80 L", "main", "variable.other.declaration.marl"))).toBe(true);
  expect(holds(under("  tank main 80 L", "main", "comment.line.number-sign.marl"))).toBe(false);
});

test("every unit, parameter and reagent has its colour", () => {
  const units = unitTable
    .flatMap(({ spelling, also }) => [spelling, ...also])
    .map((unit) => under(`  tank main 80 ${unit}`, unit, "keyword.other.unit.marl"));
  const parameters = parameterTable.map(({ name }) =>
    under(`  limit ${name} max 3`, name, "variable.other.property.marl"),
  );
  const names = Object.keys(reagents).map((name) =>
    under(`  dissolve ${name} 4 g`, name, "support.constant.reagent.marl"),
  );
  expect(units.length + parameters.length + names.length).toBeGreaterThan(70);
  expect(holds([...units, ...parameters, ...names].join(""))).toBe(true);
});

test("the word of every statement has its colour, in each of its examples", () => {
  const lines = statementTable.flatMap(({ form, word, examples }) =>
    form === "header" || word === "a parameter" ? [] : examples.map((line) => ({ word, line })),
  );
  expect(lines.length).toBeGreaterThan(60);
  const text = lines.map(({ word, line }) => {
    const indented = `  ${line}`;
    const start = indented.search(new RegExp(`(?<=^ +|\\d )${word}(?![\\w-])`));
    return `${indented}\n#${" ".repeat(start - 1)}${"^".repeat(word.length)} keyword.control.statement.marl\n`;
  });
  expect(holds(text.join(""))).toBe(true);
});
