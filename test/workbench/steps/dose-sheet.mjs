import assert from "node:assert/strict";
import { until } from "../page.mjs";

export const title = "the dose sheet stands beside the file and follows what is typed";

const row = /carbonate-part carbonate-pump (\d+) mL/;

export async function run({ driven, shot }) {
  await driven.open("raceways/system.marl");
  await driven.command("Marl: Show the Dose Sheet");
  const dose = driven.lineBeside(row);
  await dose.waitFor();
  const told = async () => Number(row.exec((await dose.textContent()).replaceAll(/\s+/g, " "))[1]);
  const before = await told();
  assert.ok(before > 0);
  await shot(driven, "dose-sheet");
  // Twice as many corals take more.
  await driven.cursor("acropora-plugs |320");
  await driven.type("9");
  await until("a larger dose on the sheet", async () => (await told()) > before);
}
