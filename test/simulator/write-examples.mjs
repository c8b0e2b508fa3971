// Writes the logs of the example farm anew from their truths. Run from the project's folder.
import { writeFile } from "node:fs/promises";
import { build } from "esbuild";

const { outputFiles } = await build({
  entryPoints: ["test/simulator/examples.ts"],
  bundle: true,
  write: false,
  format: "esm",
  target: "node20",
});
const source = Buffer.from(outputFiles[0].contents).toString("base64");
const { exampleLogs } = await import(`data:text/javascript;base64,${source}`);
for (const { path, text } of exampleLogs()) {
  await writeFile(`examples/${path}`, text);
  console.log(`examples/${path}`);
}
