// Checks the packed extension in a real VS Code, one step after the other; words given are the steps to run.
// With --shots the two pictures of docs/ are made instead.
import { mkdirSync, rmSync, writeFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { chromium } from "playwright-core";
import { openWindow } from "./page.mjs";
import { workbench } from "./workbench.mjs";

const root = resolve(import.meta.dirname, "../..");
const output = join(root, "dist/workbench");
const chromiumFlags = [
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

const order = [
  "start",
  "problems",
  "hover",
  "completion",
  "quick-fix",
  "rename",
  "lens-and-hints",
  "record-reading",
  "write-plan",
  "dose-sheet",
  "tidy-on-save",
  "explain-problem",
  "status",
  "server-killed",
  "colours",
  "untrusted",
];

const words = process.argv.slice(2);
const named = words.filter((word) => !word.startsWith("--"));
const steps = words.includes("--shots") ? ["pictures"] : named.length > 0 ? named : order;
const trustsAll = { "security.workspace.trust.enabled": false };

rmSync(output, { recursive: true, force: true });
mkdirSync(output, { recursive: true });
const bench = workbench(join(root, "dist/marl.vsix"));
const code = await bench.start(trustsAll);
const browser = await chromium.launch({
  executablePath: "/usr/bin/chromium",
  args: chromiumFlags,
  handleSIGHUP: false,
  handleSIGINT: false,
  handleSIGTERM: false,
});
// Whoever stops this leaves nothing running behind.
let stoppedBy = null;
for (const signal of ["SIGHUP", "SIGINT", "SIGTERM"])
  process.once(signal, () => {
    stoppedBy = signal;
    // The step that runs ends with its window.
    browser.close();
  });
const context = await browser.newContext();
const open = (of = code) => openWindow(context, of, bench.farm());
const shot = (driven, picture) => driven.picture(join(output, `${picture}.png`));
const say = (line) => console.log(`   ${line}`);

let driven;
let failures = 0;
for (const name of steps) {
  const started = performance.now();
  const { title, run } = await import(`./steps/${name}.mjs`);
  try {
    driven ??= await open();
    await run({ driven, code, bench, open, shot, say, root });
    await driven.expectSilence();
    await driven.startAnew();
    console.log(`ok ${name}: ${title} (${seconds(started)})`);
  } catch (error) {
    if (stoppedBy) break;
    failures += 1;
    console.log(`FAILED ${name}: ${title} (${seconds(started)})\n${error.stack}`);
    await keepEvidence(name);
    // The next step isn't to stumble over what is left of this one.
    await driven?.close();
    driven = undefined;
  }
}

await browser.close();
await code.stop();
bench.remove();
if (stoppedBy) console.log(`stopped from outside by ${stoppedBy}`);
else console.log(`${steps.length - failures} passed, ${failures} failed`);
process.exitCode = failures > 0 || stoppedBy ? 1 : 0;

function seconds(since) {
  return `${((performance.now() - since) / 1000).toFixed(1)} s`;
}

/** What a red step leaves: each screen, and what the extension and its server wrote down. */
async function keepEvidence(name) {
  for (const [index, page] of context.pages().entries()) {
    const path = join(output, `red-${name}-${index + 1}.png`);
    await page.screenshot({ path }).catch((error) => console.log(String(error)));
  }
  const logs = bench.logs().map(({ path, text }) => `== ${path}\n${text}`);
  writeFileSync(join(output, `red-${name}.log`), logs.join("\n"));
  console.log(`see ${join(output, `red-${name}`)}*`);
}
