export const title = "pictures in light, dark and high contrast";

const themes = [
  { name: "light", theme: "Light Modern", mark: ".vs" },
  { name: "high-contrast", theme: "Dark High Contrast", mark: ".hc-black" },
  { name: "high-contrast-light", theme: "Light High Contrast", mark: ".hc-light" },
  { name: "dark", theme: "Dark Modern", mark: ".vs-dark" },
];

export async function run({ driven, shot }) {
  for (const { name, theme, mark } of themes) {
    await driven.theme(theme, mark);
    await driven.open("quarantine/log.marl");
    await driven.untilUnderlined("error", "carbonate-prat");
    await driven.coloured("new-salt-water").waitFor();
    await shot(driven, `${name}-log`);
    await driven.open("raceways/system.marl");
    await driven.lens("Today").waitFor();
    await driven.line(/tank upper.*720 L/).waitFor();
    await driven.coloured("carbonate-part").waitFor();
    await shot(driven, `${name}-system`);
    await driven.cursor("system race|ways");
    await driven.hover("carbonate-part");
    await shot(driven, `${name}-hover`);
    await driven.key("Escape");
    await driven.open("solutions.marl");
    await driven
      .line(/make up to 20 L.*=/)
      .first()
      .waitFor();
    await shot(driven, `${name}-solutions`);
  }
}
