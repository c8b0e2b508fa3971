/** Completion and signature help through a real server process, for clients that can much and that can nothing. */
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { poor, rich, startClient } from "./client.ts";

const farm = {
  "farm.marl": `system vat "Vat é 鉢 🪸"
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH

kit bench
  alkalinity scatter 0.1 dKH

log vat
  2026-11-30 08:00 read alkalinity 7.8 dKH, calcium 420 mg/L with bench by ro
  2026-12-01 08:00 read alkalinity 8 dKH disregard "é鉢🪸" by r
  
`,
  "waters.marl": 'saltwater mixing-vat "New salt water"\n  salinity 35\n',
};
const emptyLine = { line: 10, character: 2 };

interface Item {
  readonly label: string;
  readonly kind: number;
  readonly detail?: string;
  readonly documentation?: unknown;
  readonly sortText: string;
  readonly filterText: string;
  readonly insertTextFormat?: number;
  readonly textEdit: { readonly newText: string };
  readonly additionalTextEdits?: unknown;
  readonly data?: unknown;
}
interface List {
  readonly isIncomplete: boolean;
  readonly items: readonly Item[];
}

async function started(capabilities: object, text = farm["farm.marl"]) {
  const client = await startClient({ capabilities, folder: folder({ ...farm, "farm.marl": text }) });
  await client.open("farm.marl", text);
  const at = (line: number, character: number, context?: object) => ({
    textDocument: { uri: client.uriOf("farm.marl") },
    position: { line, character },
    ...(context ? { context } : {}),
  });
  const complete = (line: number, character: number, context?: object) =>
    client.request<List | null>("textDocument/completion", at(line, character, context));
  return { client, at, complete };
}

test("a rich client is given snippets, two ranges, and documentation when it asks", async () => {
  const { client, complete } = await started(rich);
  expect(client.capabilities.completionProvider).toEqual({
    triggerCharacters: [" ", '"'],
    resolveProvider: true,
  });
  const { isIncomplete, items } = (await complete(emptyLine.line, emptyLine.character))!;
  expect(isIncomplete).toBe(false);
  const range = { start: emptyLine, end: emptyLine };
  expect(items).toEqual([
    {
      label: "2026-12-01 08:00",
      kind: 12,
      detail: "now",
      sortText: "0000",
      filterText: "2026-12-01 08:00",
      textEdit: { newText: "2026-12-01 08:00 ", insert: range, replace: range },
    },
    {
      label: "2026-12-01",
      kind: 12,
      detail: "today, the hour unknown",
      sortText: "0001",
      filterText: "2026-12-01",
      textEdit: { newText: "2026-12-01 ", insert: range, replace: range },
    },
    {
      label: "2026-12-01 08:00 read alkalinity … dKH, calcium … mg/L with bench",
      kind: 23,
      detail: "last: 7.8 dKH, 420 mg/L",
      sortText: "0002",
      filterText: "read alkalinity … dKH, calcium … mg/L with bench",
      insertTextFormat: 2,
      textEdit: {
        newText: `2026-12-01 08:00 read alkalinity $1 dKH, calcium $2 mg/L with bench by \${3:ro}$0`,
        insert: range,
        replace: range,
      },
      data: { uri: client.uriOf("farm.marl"), about: { kind: "statement", rule: "read" } },
    },
  ]);
  const resolved = await client.request<Item>("completionItem/resolve", items[2]);
  expect(resolved.documentation).toEqual({
    kind: "markdown",
    value: expect.stringMatching(/^```marl\nDATE \[TIME\] read PARAMETER/),
  });
  expect(await client.request("completionItem/resolve", items[0])).toEqual(items[0]);
});

test("a poor client is given plain text, one range, and the documentation at once", async () => {
  const { client, complete } = await started(poor);
  expect(client.capabilities.completionProvider).toEqual({
    triggerCharacters: [" ", '"'],
    resolveProvider: false,
  });
  const { items } = (await complete(emptyLine.line, emptyLine.character))!;
  expect(items.map(({ textEdit }) => textEdit)).toEqual(
    ["2026-12-01 08:00 ", "2026-12-01 ", "2026-12-01 08:00 read alkalinity "].map((newText) => ({
      newText,
      range: { start: emptyLine, end: emptyLine },
    })),
  );
  expect(items[2]!.documentation).toMatch(/^DATE \[TIME\] read PARAMETER/);
  for (const item of items) {
    expect(item.insertTextFormat).toBeUndefined();
    expect(item.data).toBeUndefined();
  }
  const { items: facts } = (await complete(1, 2))!;
  expect(facts.length).toBeGreaterThan(10);
  expect(JSON.stringify(facts)).not.toContain("$");
});

/** Where `by r` ends on the line with é, 鉢 and 🪸 in quotes. */
const line = farm["farm.marl"].split("\n")[9]!;
const lengths = {
  "utf-8": Buffer.byteLength(line),
  "utf-16": line.length,
  "utf-32": [...line].length,
} as const;

test.each(Object.entries(lengths))("the word's place is right in %s", async (encoding, end) => {
  const capabilities = { ...rich, general: { positionEncodings: [encoding] } };
  const { complete } = await started(capabilities);
  const { items } = (await complete(9, end))!;
  expect(items).toEqual([
    {
      label: "ro",
      kind: 1,
      detail: "signed before",
      sortText: "0000",
      filterText: "ro",
      textEdit: {
        newText: "ro",
        insert: { start: { line: 9, character: end - 1 }, end: { line: 9, character: end } },
        replace: { start: { line: 9, character: end - 1 }, end: { line: 9, character: end } },
      },
    },
  ]);
});

test("a name of a file that isn't used brings its use line", async () => {
  const text = farm["farm.marl"].replace("  \n", "  2026-12-01 09:00 renewed 20 L with \n");
  const { complete } = await started(poor, text);
  const { items } = (await complete(10, 37))!;
  expect(items).toEqual([
    {
      label: "mixing-vat",
      kind: 7,
      detail: "New salt water (waters.marl)",
      sortText: "0000",
      filterText: "mixing-vat",
      textEdit: {
        newText: "mixing-vat",
        range: { start: { line: 10, character: 37 }, end: { line: 10, character: 37 } },
      },
      additionalTextEdits: [
        {
          range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
          newText: 'use "waters.marl"\n\n',
        },
      ],
    },
  ]);
});

test("a space that was typed asks only where a kind of word is wanted", async () => {
  const { complete, client } = await started(poor);
  const space = { triggerKind: 2, triggerCharacter: " " };
  expect(await complete(emptyLine.line, 2, space)).toBeNull();
  await client.change("farm.marl", 2, [
    { range: { start: emptyLine, end: emptyLine }, text: "2026-12-01 09:00 read " },
  ]);
  const { items } = (await complete(emptyLine.line, 24, space))!;
  expect(items.slice(0, 3).map(({ label }) => label)).toEqual(["alkalinity", "calcium", "magnesium"]);
});

const signatureLabel = "hold PARAMETER q to q [aim q] [from DATE [TIME]] [until DATE [TIME]]";

test("a signature has its parts by place, or in words that stand nowhere before", async () => {
  const wide = await started(rich);
  const help = await wide.client.request("textDocument/signatureHelp", wide.at(2, 25));
  const parts = [
    ...[
      [0, 4],
      [5, 14],
      [15, 16],
      [17, 19],
      [20, 21],
      [22, 29],
      [30, 48],
      [49, 68],
    ],
  ];
  expect(help).toEqual({
    signatures: [
      {
        label: signatureLabel,
        documentation: { kind: "markdown", value: expect.stringMatching(/^The band to keep/) },
        parameters: parts.map((label) => ({ label })),
        activeParameter: 4,
      },
    ],
    activeSignature: 0,
    activeParameter: 4,
  });
  const narrow = await started(poor);
  expect(await narrow.client.request("textDocument/signatureHelp", narrow.at(2, 25))).toEqual({
    signatures: [
      {
        label: signatureLabel,
        documentation: expect.stringMatching(/^The band to keep[^`]*$/),
        parameters: [
          ...["hold", "PARAMETER", "q", "to", "to q", "[aim q]"],
          ...["[from DATE [TIME]]", "[until DATE [TIME]]"],
        ].map((label) => ({ label })),
      },
    ],
    activeSignature: 0,
    activeParameter: 4,
  });
  expect(await narrow.client.request("textDocument/signatureHelp", narrow.at(3, 0))).toBeNull();
});

test("behind a full form no part is marked: for a client that can't have that, there is no help", async () => {
  const full = "system vat\n  stopped head\n\nlog vat\n  2026-11-01 stopped head by mk ";
  const ask = async (capabilities: object) => {
    const { client, at } = await started(capabilities);
    await client.change("farm.marl", 2, [{ text: full }]);
    return client.request("textDocument/signatureHelp", at(4, 32));
  };
  expect(await ask(rich)).toMatchObject({ activeSignature: 0, activeParameter: null });
  expect(await ask(poor)).toBeNull();
});

test("a client is told of the kinds that it knows", async () => {
  const kindsFor = async (capabilities: object) => {
    const { client, complete } = await started(capabilities);
    await client.change("farm.marl", 2, [
      { text: "system vat\n  tank main 500 L\n  by-hand \n\nsolution ash\n  supplies alkalinity 1 meq/mL\n" },
    ]);
    const answer = await complete(2, 10);
    return answer!.items.map(({ label, kind }) => [label, kind]);
  };
  expect(await kindsFor(rich)).toContainEqual(["ash", 22]);
  expect(await kindsFor(poor)).toContainEqual(["ash", 7]);
});
