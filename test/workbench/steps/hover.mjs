import assert from "node:assert/strict";

export const title = "hovering a system shows today's doses";

export async function run({ driven, shot }) {
  await driven.open("raceways/system.marl");
  await driven.cursor("system race|ways");
  const said = await driven.hover("carbonate-part");
  assert.match(said, /carbonate-part \d+ mL/);
  assert.match(said, /calcium-part \d+ mL/);
  await shot(driven, "hover");
}
