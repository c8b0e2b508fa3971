import assert from "node:assert/strict";

export const title = "a name changes in every file that speaks of it";

const files = [
  "solutions.marl",
  "farm.marl",
  "raceways/system.marl",
  "quarantine/system.marl",
  "quarantine/log.marl",
];

export async function run({ driven, shot }) {
  const before = files.map(driven.onDisk);
  await driven.open("raceways/system.marl");
  await driven.cursor("gives carbonate-|part");
  const box = driven.page.locator(".rename-box:visible");
  await driven.pressUntil("F2", box);
  await shot(driven, "rename");
  await driven.key("Control+a");
  await driven.type("soda-part");
  await driven.key("Enter");
  await driven.line("gives soda-part").waitFor();
  await driven.command("File: Save All Files");
  for (const [index, file] of files.entries()) {
    await driven.untilOnDisk(file, "soda-part");
    assert.equal(driven.onDisk(file), before[index].replaceAll(/\bcarbonate-part\b/g, "soda-part"), file);
  }
}
