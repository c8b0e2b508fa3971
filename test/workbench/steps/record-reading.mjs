import assert from "node:assert/strict";

export const title = "a reading is recorded from the palette, value by value, and undone at once";

const line = "2026-12-01 08:00 read salinity 35.0, temperature 25.4 degC, pH 8.02";

export async function run({ driven, shot }) {
  await driven.open("raceways/log.marl");
  await driven.command("Marl: Record a Reading");
  const box = driven.quickInput.filter({ hasText: "Record a reading: raceways" });
  await driven.chosen("salinity, temperature, pH").waitFor();
  await shot(driven, "record-what");
  await driven.key("Enter");
  for (const [index, value] of ["35.0", "25.4", "8.02"].entries()) {
    await box.filter({ hasText: `(${index + 1}/3)` }).waitFor();
    await driven.type(value);
    await box.filter({ hasText: value }).waitFor();
    await shot(driven, `record-${index + 1}`);
    await driven.key("Enter");
  }
  const write = driven.chosen("Write this line into the log");
  await write.waitFor();
  await shot(driven, "record-preview");
  assert.ok((await write.textContent()).includes(line));
  await driven.key("Enter");
  await driven.line(line).waitFor();
  await shot(driven, "recorded");
  await driven.key("Control+z");
  await driven.line(line).waitFor({ state: "detached" });
  await driven.page.locator(".tab.active:not(.dirty)").waitFor();
}
