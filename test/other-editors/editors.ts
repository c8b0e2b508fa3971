/** Runs an editor on a copy of the example farm, set up by the very lines that its page in docs/editors gives. */
import { spawnSync } from "node:child_process";
import { chmodSync, cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { onTestFinished } from "vitest";
import { cli } from "../commands/marl.ts";

const root = resolve(import.meta.dirname, "../..");

export interface Bench {
  /** The copy of the farm. */
  readonly farm: string;
  /** A place for the test's own files. */
  readonly folder: string;
}

export function bench(): Bench {
  const folder = mkdtempSync(join(tmpdir(), "marl-editor-"));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  const farm = join(folder, "farm");
  cpSync(join(root, "examples"), farm, { recursive: true });
  const marl = join(folder, "marl");
  writeFileSync(marl, `#!/bin/sh\nexec "${process.execPath}" "${cli}" "$@"\n`);
  chmodSync(marl, 0o755);
  return { farm, folder };
}

/** The first block of a language in a page of docs/editors. */
export function setUpBy(page: string, language: string): string {
  const text = readFileSync(join(root, "docs/editors", page), "utf8");
  const block = new RegExp(`^\`\`\`${language}\\n([\\s\\S]*?)^\`\`\`$`, "m").exec(text);
  if (!block) throw new Error(`${page} has no ${language}`);
  return block[1]!;
}

/** Runs a command with `marl` on its path; what it wrote to a file of answers comes back line by line. */
export function run(
  { folder }: Bench,
  words: readonly string[],
): { readonly out: string; readonly status: number | null } {
  const { stdout, stderr, status, error } = spawnSync(words[0]!, words.slice(1), {
    cwd: folder,
    encoding: "utf8",
    timeout: 60_000,
    env: { ...process.env, PATH: `${folder}:${process.env.PATH}`, HOME: folder, XDG_CONFIG_HOME: folder },
  });
  if (error) throw error;
  return { out: stdout + stderr, status };
}
