import assert from "node:assert/strict";

export const title = "a slip is underlined while it is typed, and says what to do";

export async function run({ driven, shot }) {
  await driven.open("raceways/log.marl");
  await driven.cursorAtEnd();
  await driven.type("  2026-12-01 07:55 read alkalinty 7.9 dKH by ao");
  await driven.key("Escape");
  await driven.untilUnderlined("error", "alkalinty");
  await driven.key("Home", ...Array(7).fill("Control+ArrowRight"));
  const said = await driven.hover("is no parameter");
  assert.match(said, /Is alkalinity meant\?/);
  await shot(driven, "problem-hover");
  await driven.key("Escape", "End");
  await driven.key(...Array(" 7.9 dKH by ao".length).fill("ArrowLeft"), "Backspace", "Backspace");
  await driven.type("ity");
  await driven.untilNotUnderlined("error", "alkalinity 7.9 dKH");
  await driven.line("07:55 read alkalinity 7.9 dKH by ao").waitFor();
}
