// Bundles the entrances into dist/. Run by `npm ci` (prepare), so that `npx marl` works from a checkout.
import { chmod } from "node:fs/promises";
import { build } from "esbuild";

await build({
  entryPoints: { cli: "server/cli.ts" },
  outdir: "dist",
  bundle: true,
  platform: "node",
  target: "node20",
  format: "esm",
  banner: {
    js: "#!/usr/bin/env node\nimport { createRequire } from 'node:module';\nconst require = createRequire(import.meta.url);",
  },
  legalComments: "none",
});
await chmod("dist/cli.js", 0o755);
