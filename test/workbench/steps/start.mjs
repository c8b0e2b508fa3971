import assert from "node:assert/strict";
import { rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { until } from "../page.mjs";

export const title = "nothing runs before a Marl file is opened, and it is there soon";

const mostMs = 300;

export async function run({ driven, code, say }) {
  const notes = join(driven.farm.path, "notes.md");
  writeFileSync(notes, "# Notes\n");
  await driven.open("notes.md");
  assert.deepEqual(code.servers(), []);
  await driven.open("raceways/system.marl");
  await until("a language server", () => code.servers().length === 1);
  // All of the list, which begins with the slowest.
  await driven.page.setViewportSize({ width: 1280, height: 3000 });
  await driven.command("Developer: Show Running Extensions");
  const marl = await activationMs(driven, /^\s*Marl/);
  const markdown = await activationMs(driven, /^\s*Markdown Language Features/);
  await driven.page.setViewportSize({ width: 1280, height: 800 });
  rmSync(notes);
  say(`activation: ${marl} ms; VS Code's own Markdown beside it: ${markdown} ms`);
  // On a machine that is busy with other things everything is slow: VS Code's own tells how slow.
  const most = Math.max(mostMs, markdown);
  assert.ok(marl <= most, `activation took ${marl} ms; here it may take ${most} ms`);
}

async function activationMs({ page }, name) {
  const row = page.locator(".runtime-extensions-editor .monaco-list-row", { hasText: name });
  const time = row.locator(".activation-time", { hasText: /\d+\s*ms/ });
  await time.waitFor();
  return Number(/(\d+)\s*ms/.exec(await time.textContent())[1]);
}
