export const title = "completion offers the names of the farm, by the keyboard";

export async function run({ driven, shot }) {
  await driven.open("raceways/log.marl");
  await driven.cursorAtEnd();
  await driven.type("  2026-12-01 07:55 gave carb");
  await driven.key("Control+Space");
  const list = driven.page.locator(".suggest-widget.visible");
  await list.locator(".monaco-list-row.focused", { hasText: "carbonate-part" }).waitFor();
  await shot(driven, "completion");
  await driven.key("Enter");
  await driven.line("07:55 gave carbonate-part").waitFor();
}
