import assert from "node:assert/strict";

export const title = "saving a file tidies it";

export async function run({ driven }) {
  const before = driven.onDisk("raceways/log.marl");
  await driven.open("raceways/log.marl");
  await driven.cursorAtEnd();
  await driven.type("     2026-12-01   07:55 read   alkalinity 7.9dKH   by ao");
  await driven.key("Escape");
  await driven.line("read alkalinity 7.9dKH").waitFor();
  await driven.save();
  await driven.untilOnDisk("raceways/log.marl", "07:55 read alkalinity 7.9 dKH by ao");
  assert.equal(
    driven.onDisk("raceways/log.marl"),
    `${before}  2026-12-01 07:55 read alkalinity 7.9 dKH by ao\n`,
  );
}
