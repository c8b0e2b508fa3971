// Runs a script of this folder: `node scripts/run.mjs problem-pages`. Node 20 reads no TypeScript, so it is bundled first.
import { mkdtemp, rm } from "node:fs/promises";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";

const [name, ...words] = process.argv.slice(2);
if (!/^[a-z-]+$/.test(name ?? "")) throw new Error("node scripts/run.mjs NAME");
const folder = await mkdtemp(join("node_modules", ".script-"));
try {
  const outfile = join(folder, "script.mjs");
  const banner = {
    js: "import { createRequire } from 'node:module';\nconst require = createRequire(import.meta.url);",
  };
  const shared = { bundle: true, platform: "node", target: "node20", format: "esm", legalComments: "none" };
  await build({ entryPoints: [`scripts/${name}.ts`], outfile, banner, ...shared });
  const { main } = await import(pathToFileURL(outfile).href);
  await main(words);
} finally {
  await rm(folder, { recursive: true });
}
