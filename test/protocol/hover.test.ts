/** Hover through a real server: for a client that draws Markdown and one that doesn't, in three encodings. */
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { poor, rich, startClient } from "./client.ts";

const text = `system vat
  tank main_1 500 L
log vat
  2026-11-30 08:00 note "é漢💥" by ina
`;

interface Answer {
  readonly contents: { readonly kind: string; readonly value: string };
  readonly range: { readonly start: object; readonly end: object };
}

async function hovering(
  capabilities: object,
  position: { readonly line: number; readonly character: number },
) {
  const client = await startClient({ capabilities, folder: folder({ "farm.marl": text }) });
  await client.open("farm.marl", text);
  const textDocument = { uri: client.uriOf("farm.marl") };
  const answer = await client.request<Answer | null>("textDocument/hover", { textDocument, position });
  return { client, answer };
}

test("a rich client gets Markdown, a poor one the same as plain text", async () => {
  const at = { line: 1, character: 8 };
  const range = { start: { line: 1, character: 7 }, end: { line: 1, character: 13 } };
  const drawn = await hovering(rich, at);
  expect(drawn.client.capabilities.hoverProvider).toBe(true);
  expect(drawn.answer).toEqual({
    contents: {
      kind: "markdown",
      value: "main\\_1: 500 L, 100 % of the tanks' 500 L.\n\n500 L of water, by the tanks' measures.",
    },
    range,
  });
  const plain = await hovering(poor, at);
  expect(plain.answer).toEqual({
    contents: {
      kind: "plaintext",
      value: "main_1: 500 L, 100 % of the tanks' 500 L.\n\n500 L of water, by the tanks' measures.",
    },
    range,
  });
});

/** Where `by` stands behind é (1, 2, 1 units), a Chinese character (1, 3, 1) and an astral one (2, 4, 1). */
const encodings = [
  ["utf-16", 31],
  ["utf-8", 36],
  ["utf-32", 30],
] as const;

test.each(encodings)("ranges in %s", async (encoding, start) => {
  const capabilities = { ...rich, general: { positionEncodings: [encoding] } };
  const { client, answer } = await hovering(capabilities, { line: 3, character: start + 1 });
  expect(client.capabilities.positionEncoding).toBe(encoding);
  expect(answer?.range).toEqual({
    start: { line: 3, character: start },
    end: { line: 3, character: start + 2 },
  });
  expect(answer?.contents.value).toContain("Who did it");
});

test("nothing where there is nothing to tell", async () => {
  const { answer } = await hovering(poor, { line: 4, character: 0 });
  expect(answer).toBeNull();
});
