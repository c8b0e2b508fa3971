// Bundles the entrances into dist/. Run by `npm ci` (prepare), so that `npx marl` works from a checkout.
import { chmod } from "node:fs/promises";
import { build } from "esbuild";

const shared = { bundle: true, platform: "node", target: "node20", legalComments: "none" };

/** An extension of VS Code is CommonJS, and so are the libraries that it is made of. */
const commonJs = {
  ...shared,
  outdir: "dist/extension",
  format: "cjs",
  outExtension: { ".js": ".cjs" },
  minifyWhitespace: true,
  minifySyntax: true,
};

await Promise.all([
  build({
    ...shared,
    entryPoints: { cli: "server/cli.ts" },
    outdir: "dist",
    format: "esm",
    banner: {
      js: "#!/usr/bin/env node\nimport { createRequire } from 'node:module';\nconst require = createRequire(import.meta.url);",
    },
  }),
  build({ ...commonJs, entryPoints: { extension: "client/extension.ts" }, external: ["vscode"] }),
  build({
    ...commonJs,
    entryPoints: { server: "server/ipc.ts" },
    // As if it lay beside dist/cli.js, a folder higher: from there the pages of problems are found.
    define: { "import.meta.url": "besideTheCommandLine" },
    banner: {
      js: "const besideTheCommandLine = require('node:url').pathToFileURL(__dirname + '.cjs').href;",
    },
  }),
]);
await chmod("dist/cli.js", 0o755);
