import { mkdirSync, statSync } from "node:fs";
import { join } from "node:path";

export const title = "the two pictures of docs/";

const mostBytes = 150_000;

export async function run({ driven, root }) {
  const folder = join(root, "docs/images");
  mkdirSync(folder, { recursive: true });
  await driven.page.setViewportSize({ width: 1000, height: 560 });
  // More room for the file.
  await driven.command("View: Close Primary Side Bar");
  for (const { name, theme, mark } of [
    { name: "light", theme: "Light Modern", mark: ".vs" },
    { name: "dark", theme: "Dark Modern", mark: ".vs-dark" },
  ]) {
    await driven.theme(theme, mark);
    await driven.open("raceways/system.marl");
    await driven.status("raceways:").waitFor();
    await driven.lens("Today").waitFor();
    await driven.line(/tank upper.*720 L/).waitFor();
    await driven.coloured("raceways").waitFor();
    await driven.cursor("system race|ways");
    await driven.hover("carbonate-part");
    const path = join(folder, `editor-${name}.png`);
    await driven.picture(path);
    const { size } = statSync(path);
    if (size > mostBytes) throw new Error(`${path} has ${size} bytes; at most ${mostBytes} are wanted`);
    await driven.key("Escape");
  }
}
