/** Runs the built command line as its own process, in a folder of files made for the test. */
import { spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join, resolve } from "node:path";
import { onTestFinished } from "vitest";

export const cli = resolve(import.meta.dirname, "../../dist/cli.js");

export interface Ended {
  readonly status: number | null;
  readonly out: string;
  readonly error: string;
}

/** A folder with these files, gone after the test. */
export function folder(files: Readonly<Record<string, string>>): string {
  const root = mkdtempSync(join(tmpdir(), "marl-test-"));
  onTestFinished(() => rmSync(root, { recursive: true, force: true }));
  for (const [path, text] of Object.entries(files)) {
    mkdirSync(dirname(join(root, path)), { recursive: true });
    writeFileSync(join(root, path), text);
  }
  return root;
}

/** Runs `marl` with these words in a folder, and with this on its standard input. */
export function marl(
  cwd: string,
  words: readonly string[],
  env: Readonly<Record<string, string>> = {},
  input: string | Uint8Array = "",
): Ended {
  const { NO_COLOR: _, ...inherited } = process.env;
  const { status, stdout, stderr } = spawnSync(process.execPath, [cli, ...words], {
    cwd,
    encoding: "utf8",
    input,
    env: { ...inherited, ...env },
    maxBuffer: 64 * 1024 * 1024,
  });
  return { status, out: stdout, error: stderr };
}
