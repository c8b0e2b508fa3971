/** Formatting through a real server process, as clients that count characters in every way. */
import { describe, expect, test } from "vitest";
import { tidyText } from "../../grammar/tidy.ts";
import { folder } from "../commands/marl.ts";
import { appliedIn, type ClientEdit, type CountedIn } from "./apply.ts";
import { poor, rich, startClient } from "./client.ts";

const options = { tabSize: 8, insertSpaces: false };

const untidy =
  '\ufeffsystem  vat “é海🐠”  \r\n   tank main  500 L   # é海🐠\r\n\r\n\r\n  note “🐠” until  2026-12-01\r\nlog vat\n  2026-12-01  note "🐡"  by  mk';
const tidy =
  '\ufeffsystem vat "é海🐠"\r\n  tank main 500 L   # é海🐠\r\n\r\n  note "🐠" until 2026-12-01\r\n\r\nlog vat\r\n  2026-12-01 note "🐡" by mk\r\n';

const clients: readonly (readonly [name: string, capabilities: object, encoding: CountedIn])[] = [
  ["a poor client", poor, "utf-16"],
  ...(["utf-8", "utf-16", "utf-32"] as const).map(
    (encoding) =>
      [
        `a rich client in ${encoding}`,
        { ...rich, general: { positionEncodings: [encoding] } },
        encoding,
      ] as const,
  ),
];

describe.each(clients)("%s", (_, capabilities, encoding) => {
  const open = async (text: string) => {
    const client = await startClient({ capabilities, folder: folder({}) });
    await client.open("farm.marl", text);
    const textDocument = { uri: client.uriOf("farm.marl") };
    const ask = async (method: string, more: object): Promise<readonly ClientEdit[]> =>
      client.request(`textDocument/${method}`, { textDocument, options, ...more });
    return { client, ask };
  };

  test("tidies a document, whatever its tab size, and has nothing to do afterwards", async () => {
    const { client, ask } = await open(untidy);
    expect(tidyText(untidy)).toBe(tidy);
    expect(appliedIn(untidy, await ask("formatting", {}), encoding)).toBe(tidy);
    await client.change("farm.marl", 2, [{ text: tidy }]);
    expect(await ask("formatting", {})).toEqual([]);
  });

  test("tidies the lines of a range", async () => {
    const { ask } = await open(untidy);
    const range = { start: { line: 4, character: 0 }, end: { line: 5, character: 0 } };
    expect(appliedIn(untidy, await ask("rangeFormatting", { range }), encoding)).toBe(
      untidy.replace("  note “🐠” until  2026", '  note "🐠" until 2026'),
    );
  });

  test("tidies the line just left", async () => {
    const { client, ask } = await open("system vat\n  tank  main 500 L # é海🐠");
    await client.change("farm.marl", 2, [{ text: "system vat\n  note  “é海🐠” # 🐠\n\n" }]);
    const edits = await ask("onTypeFormatting", { position: { line: 2, character: 0 }, ch: "\n" });
    expect(appliedIn("system vat\n  note  “é海🐠” # 🐠\n\n", edits, encoding)).toBe(
      'system vat\n  note "é海🐠" # 🐠\n  \n',
    );
    expect(await ask("onTypeFormatting", { position: { line: 2, character: 0 }, ch: "x" })).toEqual([]);
  });

  test("is told that it may ask", async () => {
    const { client } = await open("");
    expect(client.capabilities).toMatchObject({
      documentFormattingProvider: true,
      documentRangeFormattingProvider: true,
      documentOnTypeFormattingProvider: { firstTriggerCharacter: "\n" },
    });
  });
});
