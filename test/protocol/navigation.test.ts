/** Finding one's way through a farm, by a real server process: a rich client in each encoding, and a poor one. */
import { renameSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";
import { CancellationTokenSource } from "vscode-jsonrpc/node";
import { folder } from "../commands/marl.ts";
import { type Place, poor, rich, startClient, type TestClient } from "./client.ts";

type Encoding = "utf-8" | "utf-16" | "utf-32";

const stock = "lager-é水🪸.marl";
const files: Readonly<Record<string, string>> = {
  // As an editor on another system leaves it: a byte order mark, and lines that end in two characters.
  "farm.marl": `\ufeffuse "${stock}" # é 水 🪸 # quiet: use/cycle
use "halls/vat.marl"

log vat # é 水 🪸
  2026-10-31 read pH 8.1 disregard "é 水 🪸" with bench by ao
  2026-11-01 08:00 read alkalinity 8.1 dKH with bench # é 水 🪸
  2026-11-02 09:00 gave é 水 🪸 soda 10 mL
`.replaceAll("\n", "\r\n"),
  [stock]: `kit bench "é 水 🪸"
  pH scatter 0.05

solution soda "é 水 🪸"
  supplies alkalinity 1.6 meq/mL

solution soda "é 水 🪸" from 2026-11-01
  supplies alkalinity 1.5 meq/mL
`,
  "halls/vat.marl": `use "../${stock}"
# é 水 🪸
# two
system vat "é 水 🪸"
  tank main 500 L # é 水 🪸
  pump head-1 gives soda at 40 mL/min
`,
  // Sees nothing of the others.
  "alone.marl": "kit bench\n  pH scatter 0.1\n",
};

const lengthIn: Readonly<Record<Encoding, (text: string) => number>> = {
  "utf-8": (text) => Buffer.byteLength(text),
  "utf-16": (text) => text.length,
  "utf-32": (text) => [...text].length,
};

/** Where things stand, counted by the test itself. */
function placesIn(encoding: Encoding) {
  const lineOf = (file: string, line: number): string => files[file]!.split(/\r?\n/)[line]!;
  const at = (file: string, line: number, column: number): Place => ({
    line,
    character: lengthIn[encoding](lineOf(file, line).slice(0, column)),
  });
  /** The range of some words on a line; of the last such words. */
  const range = (file: string, line: number, words: string) => {
    const start = lineOf(file, line).lastIndexOf(words);
    if (start < 0) throw new Error(`${words} isn't on line ${line} of ${file}`);
    return { start: at(file, line, start), end: at(file, line, start + words.length) };
  };
  const end = (file: string, line: number) => at(file, line, lineOf(file, line).length);
  /** From the first character of a line, after a byte order mark, to another line's end. */
  const lines = (file: string, first: number, last: number) => ({
    start: at(file, first, lineOf(file, first).startsWith("\ufeff") ? 1 : 0),
    end: end(file, last),
  });
  return { range, end, lines };
}

async function started(capabilities: object, encoding: Encoding) {
  const client = await startClient({ capabilities, folder: folder(files) });
  await client.open("farm.marl", files["farm.marl"]!);
  const places = placesIn(encoding);
  /** Asks about the middle of some words. */
  const ask = <T>(method: string, file: string, line: number, words: string, more: object = {}) =>
    client.request<T>(`textDocument/${method}`, {
      textDocument: { uri: client.uriOf(file) },
      position: places.range(file, line, words).end,
      ...more,
    });
  const askFile = <T>(method: string, file: string, more: object = {}) =>
    client.request<T>(`textDocument/${method}`, { textDocument: { uri: client.uriOf(file) }, ...more });
  const location = (file: string, line: number, words: string) => ({
    uri: client.uriOf(file),
    range: places.range(file, line, words),
  });
  return { client, ...places, ask, askFile, location };
}

type Started = Awaited<ReturnType<typeof started>>;

const encodings: readonly Encoding[] = ["utf-8", "utf-16", "utf-32"];

/** The answer to a request that is refused. */
async function refusal(request: Promise<unknown>): Promise<string> {
  try {
    await request;
  } catch (error) {
    return (error as Error).message;
  }
  throw new Error("it wasn't refused");
}

async function findsDefinitions({ client, ask, location, range, lines }: Started): Promise<void> {
  expect(await ask("definition", "farm.marl", 4, "bench")).toEqual([
    {
      originSelectionRange: range("farm.marl", 4, "bench"),
      targetUri: client.uriOf(stock),
      targetRange: lines(stock, 0, 1),
      targetSelectionRange: range(stock, 0, "bench"),
    },
  ]);
  expect(await ask("definition", "farm.marl", 6, "soda")).toEqual(
    [
      [3, 4],
      [6, 7],
    ].map(([first, last]) => ({
      originSelectionRange: range("farm.marl", 6, "soda"),
      targetUri: client.uriOf(stock),
      targetRange: lines(stock, first!, last!),
      targetSelectionRange: range(stock, first!, "soda"),
    })),
  );
  expect(await ask("definition", "farm.marl", 0, stock)).toEqual([
    {
      originSelectionRange: range("farm.marl", 0, `"${stock}"`),
      targetUri: client.uriOf(stock),
      targetRange: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
      targetSelectionRange: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
    },
  ]);
  const uses = [location("farm.marl", 4, "bench"), location("farm.marl", 5, "bench")];
  const context = (includeDeclaration: boolean) => ({ context: { includeDeclaration } });
  expect(await ask("references", "farm.marl", 5, "bench", context(true))).toEqual([
    ...uses,
    location(stock, 0, "bench"),
  ]);
  expect(await ask("references", "farm.marl", 5, "bench", context(false))).toEqual(uses);
  expect(await ask("references", "farm.marl", 4, "read", context(true))).toBeNull();
  expect(await ask("documentHighlight", "farm.marl", 4, "bench")).toEqual(
    uses.map((use) => ({ range: use.range, kind: 2 })),
  );
  expect(await ask("documentHighlight", stock, 3, "soda")).toEqual([
    { range: range(stock, 3, "soda"), kind: 3 },
    { range: range(stock, 6, "soda"), kind: 3 },
  ]);
}

async function renames({ client, ask, range }: Started): Promise<void> {
  expect(client.capabilities.renameProvider).toEqual({ prepareProvider: true });
  expect(await ask("prepareRename", "farm.marl", 4, "bench")).toEqual({
    range: range("farm.marl", 4, "bench"),
    placeholder: "bench",
  });
  const put = (file: string, line: number) => ({ range: range(file, line, "bench"), newText: "meter" });
  expect(await ask("rename", "farm.marl", 4, "bench", { newName: "meter" })).toEqual({
    documentChanges: [
      {
        textDocument: { uri: client.uriOf("farm.marl"), version: 1 },
        edits: [put("farm.marl", 4), put("farm.marl", 5)],
      },
      { textDocument: { uri: client.uriOf(stock), version: null }, edits: [put(stock, 0)] },
    ],
  });
  expect(await refusal(ask("prepareRename", "farm.marl", 4, "read"))).toBe(
    '"read" is a word of the language. Only names that the farm\'s files declare can be renamed.',
  );
  expect(await refusal(ask("rename", "farm.marl", 4, "bench", { newName: "soda" }))).toBe(
    `"soda" is a solution in ${stock} already, and farm.marl sees both. Choose another name.`,
  );
  expect(await refusal(ask("rename", "farm.marl", 4, "bench", { newName: "bänk" }))).toBe(
    '"bänk" can\'t be a name. A name begins with a letter from a to z and goes on with letters, digits, - or _.',
  );
}

async function findsSymbols({ client, askFile, range, lines, location }: Started): Promise<void> {
  const line = (first: number, name: string, detail: string, words: string) => ({
    ...{ name, detail, kind: 24, children: [] },
    range: { start: range("farm.marl", first, name).start, end: range("farm.marl", first, words).end },
    selectionRange: range("farm.marl", first, name),
  });
  expect(await askFile("documentSymbol", "farm.marl")).toEqual([
    {
      ...{ name: "log vat", kind: 18 },
      range: lines("farm.marl", 3, 6),
      selectionRange: range("farm.marl", 3, "vat"),
      children: [
        {
          ...{ name: "2026-10", detail: "1 line", kind: 3 },
          range: lines("farm.marl", 4, 4),
          selectionRange: range("farm.marl", 4, "2026-10-31 read"),
          children: [line(4, "2026-10-31 read", 'pH 8.1 disregard "é 水 🪸" with bench by ao', "by ao")],
        },
        {
          ...{ name: "2026-11", detail: "1 line", kind: 3 },
          range: lines("farm.marl", 5, 6),
          selectionRange: range("farm.marl", 5, "2026-11-01 08:00 read"),
          children: [line(5, "2026-11-01 08:00 read", "alkalinity 8.1 dKH with bench", "bench")],
        },
      ],
    },
  ]);
  expect(await client.request("workspace/symbol", { query: "bnc" })).toEqual([
    { name: "bench", kind: 11, location: location("alone.marl", 0, "bench") },
    { name: "bench", kind: 11, location: location(stock, 0, "bench") },
  ]);
  expect(await client.request("workspace/symbol", { query: "he" })).toEqual([
    { name: "head-1", kind: 12, location: location("halls/vat.marl", 5, "head-1"), containerName: "vat" },
  ]);
}

async function colours({ client, askFile, range, end }: Started): Promise<void> {
  const provider = client.capabilities.semanticTokensProvider as {
    readonly legend: { readonly tokenTypes: readonly string[] };
  };
  interface Answer {
    readonly resultId?: string;
    readonly data: readonly number[];
  }
  const words = ({ data }: Answer) => {
    let line = 0;
    let start = 0;
    return Array.from({ length: data.length / 5 }, (_, index) => {
      const [down, along, length, type] = data.slice(5 * index) as [number, number, number, number];
      start = down > 0 ? along : start + along;
      line += down;
      return [provider.legend.tokenTypes[type], line, start, start + length];
    });
  };
  const token = (type: string, line: number, text: string) => {
    const { start, end: last } = range("farm.marl", line, text);
    return [type, line, start.character, last.character];
  };
  const full = await askFile<Answer>("semanticTokens/full", "farm.marl");
  expect(words(full).filter(([, line]) => [0, 4, 6].includes(line as number))).toEqual([
    [
      "keyword",
      0,
      range("farm.marl", 0, 'use "').start.character,
      range("farm.marl", 0, ' "').start.character,
    ],
    token("string", 0, `"${stock}"`),
    token("comment", 0, "# é 水 🪸 # quiet: use/cycle"),
    ...[token("macro", 4, "2026-10-31"), token("keyword", 4, "read"), token("property", 4, "pH")],
    ...[token("number", 4, "8.1"), token("keyword", 4, "disregard"), token("string", 4, '"é 水 🪸"')],
    ...[token("keyword", 4, "with"), token("interface", 4, "bench"), token("keyword", 4, "by")],
    token("parameter", 4, "ao"),
    ...[token("macro", 6, "2026-11-02"), token("macro", 6, "09:00"), token("keyword", 6, "gave")],
    ...[token("class", 6, "soda"), token("number", 6, "10")],
  ]);
  const part = await askFile<Answer>("semanticTokens/range", "farm.marl", {
    range: { start: { line: 4, character: 0 }, end: end("farm.marl", 4) },
  });
  expect(words(part)).toEqual(words(full).filter(([, line]) => line === 4));
  await client.change("farm.marl", 2, [
    { range: { start: end("farm.marl", 4), end: end("farm.marl", 4) }, text: " # 🪸" },
  ]);
  const delta = await askFile<{
    readonly edits: readonly { start: number; deleteCount: number; data: number[] }[];
  }>("semanticTokens/full/delta", "farm.marl", { previousResultId: full.resultId });
  const after = await askFile<Answer>("semanticTokens/full", "farm.marl");
  expect(after.data).not.toEqual(full.data);
  const data = [...full.data];
  for (const { start, deleteCount, data: put } of [...delta.edits].reverse())
    data.splice(start, deleteCount, ...put);
  expect(data).toEqual(after.data);
  expect(delta.edits.flatMap((edit) => edit.data).length).toBeLessThan(15);
  // One that nobody remembers is answered whole.
  expect(await askFile("semanticTokens/full/delta", "farm.marl", { previousResultId: "0" })).toMatchObject({
    data: after.data,
  });
}

async function foldsAndLinks({ client, askFile, range, end, lines }: Started): Promise<void> {
  const fold = (file: string, first: number, last: number, kind?: string) => ({
    ...{ startLine: first, endLine: last, ...(kind ? { kind } : {}) },
    startCharacter: end(file, first).character,
    endCharacter: end(file, last).character,
  });
  expect(await askFile("foldingRange", "farm.marl")).toEqual([
    fold("farm.marl", 0, 1, "imports"),
    fold("farm.marl", 3, 6),
    fold("farm.marl", 5, 6),
  ]);
  expect(await askFile("foldingRange", "halls/vat.marl")).toEqual([
    fold("halls/vat.marl", 1, 2, "comment"),
    fold("halls/vat.marl", 3, 5),
  ]);
  const ranges = [
    range("farm.marl", 4, "bench"),
    range("farm.marl", 4, '2026-10-31 read pH 8.1 disregard "é 水 🪸" with bench by ao'),
    lines("farm.marl", 4, 4),
    lines("farm.marl", 3, 6),
    lines("farm.marl", 0, 7),
  ];
  const nested = ranges.reduceRight<object | undefined>(
    (parent, each) => (parent ? { range: each, parent } : { range: each }),
    undefined,
  );
  expect(
    await askFile("selectionRange", "farm.marl", { positions: [range("farm.marl", 4, "bench").start] }),
  ).toEqual([nested]);
  expect(await askFile("documentLink", "farm.marl")).toEqual([
    { range: range("farm.marl", 0, stock), target: client.uriOf(stock) },
    {
      range: range("farm.marl", 0, "use/cycle"),
      target: expect.stringMatching(/^file:.*\/docs\/problems\/use-cycle\.md$/),
    },
    { range: range("farm.marl", 1, "halls/vat.marl"), target: client.uriOf("halls/vat.marl") },
  ]);
}

async function movesFiles({ client, range }: Started): Promise<void> {
  const operations = (client.capabilities.workspace as { readonly fileOperations: object }).fileOperations;
  const filters = [
    { scheme: "file", pattern: { glob: "**/*.marl", matches: "file" } },
    { scheme: "file", pattern: { glob: "**/*", matches: "folder" } },
  ];
  expect(operations).toEqual({ willRename: { filters }, didRename: { filters } });
  const rename = (from: string, to: string) =>
    client.request("workspace/willRenameFiles", {
      files: [{ oldUri: client.uriOf(from), newUri: client.uriOf(to) }],
    });
  expect(await rename(stock, "stock/水.marl")).toEqual({
    documentChanges: [
      {
        textDocument: { uri: client.uriOf("farm.marl"), version: 1 },
        edits: [{ range: range("farm.marl", 0, stock), newText: "stock/水.marl" }],
      },
      {
        textDocument: { uri: client.uriOf("halls/vat.marl"), version: null },
        edits: [{ range: range("halls/vat.marl", 0, `../${stock}`), newText: "../stock/水.marl" }],
      },
    ],
  });
  expect(await rename("halls", "east/é")).toEqual({
    documentChanges: [
      {
        textDocument: { uri: client.uriOf("farm.marl"), version: 1 },
        edits: [{ range: range("farm.marl", 1, "halls/vat.marl"), newText: "east/é/vat.marl" }],
      },
      {
        textDocument: { uri: client.uriOf("halls/vat.marl"), version: null },
        edits: [{ range: range("halls/vat.marl", 0, `../${stock}`), newText: `../../${stock}` }],
      },
    ],
  });
  expect(await rename("alone.marl", "single.marl")).toBeNull();
}

test.each(encodings)("a rich client that counts in %s finds its way", async (encoding) => {
  const all = await started({ ...rich, general: { positionEncodings: [encoding] } }, encoding);
  expect(all.client.capabilities.positionEncoding).toBe(encoding);
  await findsDefinitions(all);
  await renames(all);
  await findsSymbols(all);
  await foldsAndLinks(all);
  await movesFiles(all);
  await colours(all);
});

/** What a poor client gets, in the one encoding that every client knows. */
describe("a poor client", () => {
  const at = (client: TestClient, file: string) => ({ textDocument: { uri: client.uriOf(file) } });

  test("gets plain places, flat symbols, edits without versions, and is offered nothing else", async () => {
    const { client, ask, askFile, location, range, lines } = await started(poor, "utf-16");
    expect(client.capabilities.renameProvider).toBe(true);
    expect(client.capabilities.workspace).not.toHaveProperty("fileOperations");
    expect(await ask("definition", "farm.marl", 6, "soda")).toEqual([
      location(stock, 3, "soda"),
      location(stock, 6, "soda"),
    ]);
    expect(await ask("rename", "farm.marl", 5, "bench", { newName: "meter" })).toEqual({
      changes: {
        [client.uriOf("farm.marl")]: [
          { range: range("farm.marl", 4, "bench"), newText: "meter" },
          { range: range("farm.marl", 5, "bench"), newText: "meter" },
        ],
        [client.uriOf(stock)]: [{ range: range(stock, 0, "bench"), newText: "meter" }],
      },
    });
    const whole = (file: string, first: number, last: number) => ({
      location: { uri: client.uriOf(file), range: lines(file, first, last) },
    });
    expect(await askFile("documentSymbol", "halls/vat.marl")).toEqual([
      { name: "vat", kind: 2, ...whole("halls/vat.marl", 3, 5) },
      { name: "main", kind: 8, ...whole("halls/vat.marl", 4, 4), containerName: "vat" },
      { name: "head-1", kind: 12, ...whole("halls/vat.marl", 5, 5), containerName: "vat" },
    ]);
    expect(await askFile("documentSymbol", "farm.marl")).toEqual([
      { name: "log vat", kind: 18, ...whole("farm.marl", 3, 6) },
    ]);
  });

  test("that folds whole lines gets no columns, and no more folds than it takes", async () => {
    const textDocument = { foldingRange: { lineFoldingOnly: true, rangeLimit: 2 } };
    const { askFile } = await started({ textDocument }, "utf-16");
    expect(await askFile("foldingRange", "farm.marl")).toEqual([
      { startLine: 0, endLine: 1, kind: "imports" },
      { startLine: 3, endLine: 6 },
    ]);
  });

  test("that names no kinds of symbols is told of those that it knows", async () => {
    const { client } = await started({}, "utf-16");
    const found = await client.request<readonly { readonly name: string; readonly kind: number }[]>(
      "textDocument/documentSymbol",
      { textDocument: { uri: client.uriOf("farm.marl") } },
    );
    expect(found.length).toBeGreaterThan(0);
    expect(found.filter(({ kind }) => kind > 18)).toEqual([]);
  });

  test("that asks about places beyond a file is told of none", async () => {
    const { askFile } = await started({}, "utf-16");
    const beyond = { line: 99, character: 0 };
    expect(await askFile("selectionRange", "farm.marl", { positions: [beyond] })).toBeNull();
    const both = await askFile("selectionRange", "farm.marl", {
      positions: [{ line: 0, character: 0 }, beyond],
    });
    expect((both as readonly unknown[])[1]).toEqual({ range: { start: beyond, end: beyond } });
  });

  test("that gives a file a name that isn't Marl's has no path mended to it", async () => {
    const { client } = await started({ workspace: { fileOperations: { willRename: true } } }, "utf-16");
    const files = [{ oldUri: client.uriOf(stock), newUri: client.uriOf("stock.txt") }];
    expect(await client.request("workspace/willRenameFiles", { files })).toBeNull();
  });

  test("that only tells of renamed files has plain edits, and its farm looked at again", async () => {
    const fileOperations = { willRename: true, didRename: true };
    const { client, ask, range, location } = await started({ workspace: { fileOperations } }, "utf-16");
    const moved = { files: [{ oldUri: client.uriOf(stock), newUri: client.uriOf("stock.marl") }] };
    expect(await client.request("workspace/willRenameFiles", moved)).toEqual({
      changes: {
        [client.uriOf("farm.marl")]: [{ range: range("farm.marl", 0, stock), newText: "stock.marl" }],
        [client.uriOf("halls/vat.marl")]: [
          { range: range("halls/vat.marl", 0, `../${stock}`), newText: "../stock.marl" },
        ],
      },
    });
    expect(await ask("definition", "farm.marl", 4, "bench")).toEqual([location(stock, 0, "bench")]);
    renameSync(fileURLToPath(client.uriOf(stock)), fileURLToPath(client.uriOf("stock.marl")));
    await client.change("farm.marl", 2, [{ range: range("farm.marl", 0, stock), text: "stock.marl" }]);
    await client.notify("workspace/didRenameFiles", moved);
    const isMissing = ({ code }: { readonly code: string }) => code === "use/missing-file";
    await client.until(() => {
      const last = client.published.findLast(({ uri }) => uri === client.uriOf("farm.marl"));
      return last?.version === 2 && !last.diagnostics.some(isMissing) ? last : undefined;
    });
    expect(await ask("definition", "farm.marl", 4, "bench")).toEqual([
      { uri: client.uriOf("stock.marl"), range: range(stock, 0, "bench") },
    ]);
  });

  test("that takes a long question back is told so, and others are answered meanwhile", async () => {
    const { client } = await started(poor, "utf-16");
    const lines = Array.from({ length: 6000 }, () => "  2026-11-01 read alkalinity 8 dKH, pH 8.1 with bench");
    await client.open("long.marl", `log vat\n${lines.join("\n")}\n`);
    const source = new CancellationTokenSource();
    const params = at(client, "long.marl");
    const long = client.connection.sendRequest("textDocument/semanticTokens/full", params, source.token);
    const outcome = long.then(
      () => "answered",
      (error: { readonly code: number }) => error.code,
    );
    expect(await client.request("textDocument/foldingRange", params)).toHaveLength(1);
    source.cancel();
    expect(await outcome).toBe(-32800);
  });

  test("asks about a document that nobody knows, and about places beyond the text", async () => {
    const { client } = await started(poor, "utf-16");
    const position = { line: 99, character: 99 };
    const context = { includeDeclaration: true };
    const ask = (method: string, file: string, more: object) =>
      client.request(`textDocument/${method}`, { ...at(client, file), ...more });
    for (const file of ["farm.marl", "nowhere.marl"]) {
      expect(await ask("definition", file, { position })).toBeNull();
      expect(await ask("references", file, { position, context })).toBeNull();
    }
    expect(await ask("documentHighlight", "farm.marl", { position })).toEqual([]);
    expect(await ask("selectionRange", "farm.marl", { positions: [position] })).toBeNull();
    expect(await ask("semanticTokens/full", "nowhere.marl", {})).toEqual({ data: [] });
    expect(await ask("foldingRange", "nowhere.marl", {})).toBeNull();
  });
});
