import assert from "node:assert/strict";
import { until } from "../page.mjs";

export const title = "the server dies while a line is typed: it comes back, and nothing is lost";

export async function run({ driven, code }) {
  await driven.open("raceways/log.marl");
  await driven.cursorAtEnd();
  await driven.type("  2026-12-01 07:55 read alkal");
  await driven.key("Escape");
  const [first] = code.servers();
  assert.ok(first, "no server runs");
  process.kill(first, "SIGKILL");
  await driven.type("inty 7.9 dKH by ao");
  await until("another server", () => code.servers().some((pid) => pid !== first));
  await driven.line("2026-12-01 07:55 read alkalinty 7.9 dKH by ao").waitFor();
  await driven.key("Escape");
  await driven.untilUnderlined("error", "alkalinty");
  assert.equal(code.servers().length, 1);
}
