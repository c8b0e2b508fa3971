/** From a file to hover and problems, through a real server process. */
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { poor, startClient } from "./client.ts";

const farm = {
  "farm.marl": "system vat\n  tank main 500 L\n  hold alkalinty 7.5 to 8.5 dKH\n",
};

test("a poor client is sent problems, and gets a hover", async () => {
  const client = await startClient({ capabilities: poor, folder: folder(farm) });
  await client.open("farm.marl", farm["farm.marl"]);
  const { diagnostics } = await client.problemsOf("farm.marl", 1);
  expect(diagnostics.map(({ code, range }) => [code, range])).toEqual([
    ["syntax/unknown-word", { start: { line: 2, character: 7 }, end: { line: 2, character: 16 } }],
  ]);
  const hover = await client.request("textDocument/hover", {
    textDocument: { uri: client.uriOf("farm.marl") },
    position: { line: 1, character: 3 },
  });
  expect(hover).toMatchObject({
    range: { start: { line: 1, character: 2 }, end: { line: 1, character: 6 } },
  });
  await client.change("farm.marl", 2, [
    { range: { start: { line: 2, character: 14 }, end: { line: 2, character: 14 } }, text: "i" },
  ]);
  const after = await client.problemsOf("farm.marl", 2);
  expect(after.diagnostics.filter(({ code }) => code.startsWith("syntax/"))).toEqual([]);
  await client.request("shutdown", null);
  await client.notify("exit", null);
  expect(await client.exited).toBe(0);
});
