import assert from "node:assert/strict";

export const title = "a folder that isn't trusted is read all the same";

export async function run({ bench, open, shot }) {
  const careful = await bench.start({
    "security.workspace.trust.enabled": true,
    "security.workspace.trust.startupPrompt": "never",
  });
  try {
    const driven = await open(careful);
    await driven.page
      .locator("#status\\.workspaceTrust, .part.banner", { hasText: "Restricted Mode" })
      .first()
      .waitFor();
    await driven.open("quarantine/log.marl");
    await driven.untilUnderlined("error", "carbonate-prat");
    await driven.cursor("log quaran|tine");
    assert.match(await driven.hover("carbonate-part"), /carbonate-part \d+ mL/);
    await shot(driven, "untrusted");
    await driven.expectSilence();
    await driven.close();
  } finally {
    await careful.stop();
  }
}
