export const title = "the status bar tells the state of the open system, and that the server runs";

export async function run({ driven, shot }) {
  await driven.open("raceways/system.marl");
  await driven.status("raceways: in order, 08:00").waitFor();
  await driven.open("quarantine/system.marl");
  await driven.status(/quarantine: \d+ errors, 08:00/).waitFor();
  await driven.page.locator('footer .statusbar-item[aria-label*="Marl is running"]').waitFor();
  await shot(driven, "status");
}
