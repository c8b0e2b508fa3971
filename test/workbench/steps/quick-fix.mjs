export const title = "a fix is applied from the menu";

export async function run({ driven, shot }) {
  await driven.open("quarantine/log.marl");
  await driven.untilUnderlined("error", "carbonate-prat");
  await driven.cursor("gave carbonate-p|rat");
  await driven.fix("carbonate-part", () => shot(driven, "quick-fix"));
  await driven.line("09:00 gave carbonate-part 10 mL by es").waitFor();
  await driven.untilNotUnderlined("error", "carbonate-part 10 mL");
}
