/** Writes what the command line prints for the example farm into the README, so that it shows what is true. */
import { spawnSync } from "node:child_process";
import { readFile, writeFile } from "node:fs/promises";

export const shownSheet = ["sheet", "examples", "--system", "raceways", "--at", "2026-12-01T08:00"];

const block = /(```text\n)[\s\S]*?(\n```)/;

export async function main(): Promise<void> {
  const { stdout, status, stderr } = spawnSync(process.execPath, ["dist/cli.js", ...shownSheet], {
    encoding: "utf8",
  });
  if (status !== 0) throw new Error(stderr);
  const before = await readFile("README.md", "utf8");
  if (!block.test(before)) throw new Error("README.md has no text block");
  await writeFile(
    "README.md",
    before.replace(block, (_, open: string, close: string) => open + stdout.trimEnd() + close),
  );
  console.log("README.md");
}
