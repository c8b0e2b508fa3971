/** Inlay hints and code lenses through a real server process. */
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { type ClientOptions, poor, rich, startClient } from "./client.ts";

const text = `system vat "é 鉢 🪸"
  tank main 120 cm x 60 cm x 50 cm
  hold alkalinity 7.5 to 8.5 dKH
  hold salinity 34 to 36 aim 35
  cohort plugs 30 pieces uptake 0.5 meq/day each
  pump head-1 gives ash-part at 40 mL/min

solution ash-part
  dissolve sodium-carbonate 424 g
  make up to 4 L # é

log vat
  2026-12-01 07:00 read salinity 32, alkalinity 7.6 dKH disregard "é鉢🪸"
  2026-12-01 07:30 read salinity 32, alkalinity 7.6 dKH with é鉢🪸
  2026-12-01 07:40 read salinity 32, alkalinity 7.6 dKH # é鉢🪸
  2026-12-01 07:50 note "é鉢🪸" by ro
`;

async function started(options: Pick<ClientOptions, "capabilities"> & Partial<ClientOptions>) {
  const client = await startClient({ ...options, folder: folder({ "farm.marl": text }) });
  await client.open("farm.marl", text);
  const textDocument = { uri: client.uriOf("farm.marl") };
  const hints = (first: number, last: number) =>
    client.request<readonly Hint[]>("textDocument/inlayHint", {
      textDocument,
      range: { start: { line: first, character: 0 }, end: { line: last, character: 0 } },
    });
  const lenses = () => client.request<readonly Lens[]>("textDocument/codeLens", { textDocument });
  return { client, uri: textDocument.uri, hints, lenses };
}

interface Hint {
  readonly position: { readonly line: number; readonly character: number };
  readonly label: string;
  readonly tooltip?: string;
  readonly data?: unknown;
}
interface Lens {
  readonly range: unknown;
  readonly data: unknown;
  readonly command?: { readonly title: string; readonly command: string };
}

const volumeTip = "The water in main by its measures; what displaces water is taken off the system's volume.";

test("hints trail their lines; a poor client has what they mean at once", async () => {
  const { client, hints } = await started({ capabilities: poor });
  expect(client.capabilities.inlayHintProvider).toEqual({ resolveProvider: false });
  const all = await hints(0, 20);
  expect(all.map(({ position: { line, character }, label }) => [line, character, label])).toEqual([
    [1, 34, "= 360 L"],
    [4, 48, "0.12 dKH/day"],
    [9, 16, "= alkalinity 2.00 meq/mL"],
    [14, 55, "at salinity 35: alkalinity 8.3 dKH"],
  ]);
  expect(all[0]).toEqual({
    position: { line: 1, character: 34 },
    label: "= 360 L",
    paddingLeft: true,
    tooltip: volumeTip,
  });
  // Only the lines that are shown.
  expect((await hints(2, 5)).map(({ label }) => label)).toEqual(["0.12 dKH/day"]);
});

test("a rich client asks what a hint means", async () => {
  const { client, hints, uri } = await started({ capabilities: rich });
  expect(client.capabilities.inlayHintProvider).toEqual({ resolveProvider: true });
  const [first] = await hints(0, 2);
  expect(first).toEqual({
    position: { line: 1, character: 34 },
    label: "= 360 L",
    paddingLeft: true,
    data: { uri, line: 1, kind: "volume" },
  });
  expect(await client.request("inlayHint/resolve", first)).toEqual({ ...first, tooltip: volumeTip });
});

test("a line that is being typed has no hint, and others keep theirs", async () => {
  const { client, hints } = await started({ capabilities: poor });
  await client.change("farm.marl", 2, [
    { range: { start: { line: 1, character: 29 }, end: { line: 1, character: 34 } }, text: "" },
  ]);
  expect((await hints(0, 20)).map(({ label }) => label)).toEqual([
    "= alkalinity 2.00 meq/mL",
    "at salinity 35: alkalinity 8.3 dKH",
  ]);
});

test("each kind is switched by its setting", async () => {
  const { hints, lenses } = await started({
    capabilities: rich,
    initializationOptions: { commands: ["marl.recordReading"] },
    settings: { hints: { volume: false, uptake: false }, lenses: { doses: false } },
  });
  expect((await hints(0, 20)).map(({ label }) => label)).toEqual([
    ...["= alkalinity 2.00 meq/mL", "at salinity 35: alkalinity 8.3 dKH"],
  ]);
  expect(await lenses()).toHaveLength(1);
});

test("a lens names commands that the client lists, else it is only told", async () => {
  const told = await started({ capabilities: poor });
  expect(told.client.capabilities.codeLensProvider).toEqual({ resolveProvider: true });
  const plain = await told.lenses();
  expect(plain).toEqual([
    {
      range: { start: { line: 0, character: 0 }, end: { line: 0, character: 10 } },
      data: { uri: told.uri, kind: "doses", system: "vat", name: "vat" },
    },
  ]);
  const doses = await told.client.request<Lens>("codeLens/resolve", plain[0]);
  expect(doses.command).toEqual({ title: expect.stringMatching(/^Today: head-1 \d+ mL$/), command: "" });

  const commands = ["marl.recordReading", "marl.showDoseSheet"];
  const wide = await started({ capabilities: rich, initializationOptions: { commands } });
  const found = await wide.lenses();
  const resolved = await Promise.all(
    found.map((lens) => wide.client.request<Lens>("codeLens/resolve", lens)),
  );
  expect(resolved.map(({ command }) => command)).toEqual([
    { ...doses.command, command: "marl.showDoseSheet", arguments: [wide.uri, "vat"] },
    { title: "Record a reading", command: "marl.recordReading", arguments: [wide.uri, "vat"] },
  ]);
});

const behindSign = { "utf-8": 55, "utf-16": 54, "utf-32": 54 } as const;

test.each(Object.entries(behindSign))("a hint's place is right in %s", async (encoding, character) => {
  const capabilities = { ...rich, general: { positionEncodings: [encoding] } };
  const { client, hints } = await started({ capabilities });
  await client.change("farm.marl", 2, [
    {
      range: { start: { line: 4, character: 43 }, end: { line: 4, character: 48 } },
      text: "± 10 % each # é鉢🪸",
    },
  ]);
  // Behind the sign, which takes two bytes, and before the comment.
  expect((await hints(4, 5)).map(({ position }) => position)).toEqual([{ line: 4, character }]);
});
