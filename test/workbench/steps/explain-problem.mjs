import { until } from "../page.mjs";

export const title = "a problem is explained on its page";

export async function run({ driven, shot }) {
  await driven.open("quarantine/log.marl");
  await driven.untilUnderlined("error", "carbonate-prat");
  await driven.cursor("gave carbonate-p|rat");
  await driven.command("Marl: Explain This Problem");
  await driven.page.locator(".tab.active", { hasText: "name-undeclared.md" }).waitFor();
  // The page is a frame in a frame.
  await until("the page of the problem", async () => {
    const texts = driven.page.frames().map((frame) => frame.locator("body").textContent({ timeout: 1000 }));
    const shown = await Promise.allSettled(texts);
    return shown.some(({ value = "" }) => /name\/undeclared[\s\S]+What to do/.test(value));
  });
  await shot(driven, "explain-problem");
}
