// Packs the extension: dist/marl.vsix. What packs it needs a newer Node than the product, and is installed beside this.
import { spawnSync } from "node:child_process";
import { existsSync, statSync } from "node:fs";
import { join, resolve } from "node:path";

const tools = "scripts/packaging";
const vsix = "dist/marl.vsix";
const mostBytes = 1_000_000;

const run = (command, words, options) => {
  const { status, error } = spawnSync(command, words, { stdio: "inherit", ...options });
  if (error) throw error;
  if (status !== 0) process.exit(status ?? 1);
};

const installed = join(tools, "node_modules");
if (!existsSync(join(installed, ".package-lock.json")))
  run("npm", ["ci", "--no-audit", "--no-fund", "--loglevel=error"], { cwd: tools });
run(resolve(installed, ".bin/node"), [
  join(installed, "@vscode/vsce/vsce"),
  "package",
  "--no-dependencies",
  "--allow-missing-repository",
  "--no-rewrite-relative-links",
  "--out",
  vsix,
]);
const { size } = statSync(vsix);
console.log(`${vsix}: ${Math.round(size / 1000)} kB`);
if (size > mostBytes) throw new Error(`${vsix} is larger than ${mostBytes / 1000} kB`);
