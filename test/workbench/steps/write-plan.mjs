export const title = "today's plan goes into the log";

export async function run({ driven, shot }) {
  await driven.open("raceways/log.marl");
  await driven.cursorAtEnd();
  await driven.command("Marl: Write Today's Plan into the Log");
  await driven.line(/2026-12-01 08:00 set carbonate-pump \d+ mL\/day, calcium-pump \d+ mL\/day/).waitFor();
  await shot(driven, "write-plan");
}
