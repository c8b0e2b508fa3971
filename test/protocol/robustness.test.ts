/** What a client may send wrong, early, late or take back; the server answers, and goes on. */
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { poor, rich, startBare, startClient } from "./client.ts";

const farm = { "farm.marl": "system vat\n  tank main 500 L\n  hold alkalinty 7.5 to 8.5 dKH\n" };
const pushes = { ...rich, textDocument: { ...rich.textDocument, diagnostic: undefined } };
const hoverAt = (uri: string) => ({ textDocument: { uri }, position: { line: 1, character: 3 } });
const codeOf = (request: Promise<unknown>): Promise<unknown> =>
  request.then(
    (answer) => ({ answer }),
    (error: { code: number }) => error.code,
  );

test("a request before initialize is refused, and one after shutdown", async () => {
  const bare = startBare();
  expect(await codeOf(bare.connection.sendRequest("textDocument/hover", hoverAt("file:///x.marl")))).toBe(
    -32002,
  );
  await bare.connection.sendRequest("initialize", { processId: null, rootUri: null, capabilities: {} });
  expect(
    await codeOf(
      bare.connection.sendRequest("initialize", { processId: null, rootUri: null, capabilities: {} }),
    ),
  ).toBe(-32600);
  await bare.connection.sendRequest("shutdown", null);
  expect(await codeOf(bare.connection.sendRequest("textDocument/hover", hoverAt("file:///x.marl")))).toBe(
    -32600,
  );
  await bare.connection.sendNotification("exit");
  expect(await bare.exited).toBe(0);
});

test("exit without shutdown ends with 1, and so does a client that goes away", async () => {
  const bare = startBare();
  await bare.connection.sendNotification("exit");
  expect(await bare.exited).toBe(1);
  const left = startBare();
  left.server.stdin!.end();
  expect(await left.exited).toBe(1);
});

test("unknown requests are refused, unknown notifications pass, parameters that are none do no harm", async () => {
  const client = await startClient({ capabilities: poor, folder: folder(farm) });
  const uri = client.uriOf("farm.marl");
  expect(await codeOf(client.request("textDocument/nonesuch", {}))).toBe(-32601);
  await client.notify("textDocument/nonesuch", { x: 1 });
  expect(typeof (await codeOf(client.request("textDocument/hover", { textDocument: { uri } })))).toBe(
    "number",
  );
  expect(typeof (await codeOf(client.request("textDocument/hover", [1, 2])))).toBe("number");
  await client.open("farm.marl", farm["farm.marl"]);
  expect((await client.problemsOf("farm.marl", 1)).diagnostics).toHaveLength(1);
});

test("a message that is no JSON is answered, and the next one is heard", async () => {
  const client = await startClient({ capabilities: poor, folder: folder(farm) });
  const raw = (body: string) =>
    client.server.stdin!.write(`Content-Length: ${Buffer.byteLength(body)}\r\n\r\n${body}`);
  let said = "";
  client.server.stdout!.on("data", (piece: Buffer) => {
    said += piece.toString();
  });
  raw("{ this is no JSON");
  raw("[]");
  raw('{"jsonrpc":"2.0"}');
  raw('{"jsonrpc":"2.0","id":"mine","method":"textDocument/nonesuch"}');
  await client.open("farm.marl", farm["farm.marl"]);
  expect((await client.problemsOf("farm.marl", 1)).diagnostics).toHaveLength(1);
  expect(said).toContain('"id":null,"error":{"code":-32700');
  expect(said).toContain('"id":"mine","error":{"code":-32601');
});

test("edits and closes of a document that isn't open, a second open, an odd address", async () => {
  const client = await startClient({ capabilities: poor, folder: folder(farm) });
  await client.change("farm.marl", 7, [{ text: "system other\n" }]);
  await client.notify("textDocument/didClose", { textDocument: { uri: client.uriOf("farm.marl") } });
  await client.open("farm.marl", farm["farm.marl"], 3);
  expect((await client.problemsOf("farm.marl", 3)).diagnostics).toHaveLength(1);
  await client.open("farm.marl", "system vat\n  tank main 500 L\n", 4);
  expect((await client.problemsOf("farm.marl", 4)).diagnostics).toEqual([]);
  for (const uri of ["untitled:Untitled-1", "file:///", "file:///%ff", "nonsense", ""]) {
    const text = "system vat\n  tank main 500 kg\n";
    await client.notify("textDocument/didOpen", {
      textDocument: { uri, languageId: "marl", version: 1, text },
    });
  }
  const loose = await client.until(() => client.published.find(({ uri }) => uri === "untitled:Untitled-1"));
  expect(loose.diagnostics.map(({ code }) => code)).toContain("unit/dimension");
  const hover = await client.request("textDocument/hover", hoverAt("untitled:Untitled-1"));
  expect(hover).not.toBeNull();
  expect(await client.request("textDocument/hover", hoverAt("file:///none/such.marl"))).toBeNull();
});

/** Systems enough that a walk takes a while. */
const large = (systems: number): string => {
  const each = Array.from({ length: systems }, (_, number) => {
    const name = `vat-${number}`;
    const days = Array.from({ length: 28 }, (__, day) => {
      const date = `2026-11-${String(day + 1).padStart(2, "0")}`;
      return `  ${date} 08:00 read alkalinity ${(7.6 + ((day * 7 + number) % 9) / 10).toFixed(1)} dKH\n  ${date} 09:00 set head-1 ${50 + day} mL/day\n`;
    }).join("");
    return `system ${name}\n  tank main 500 L\n  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0.3 dKH/day\n  pump head-1 gives part at 40 mL/min\n\nlog ${name}\n${days}\n`;
  });
  return `${each.join("")}solution part\n  supplies alkalinity 1.6 meq/mL as bicarbonate\n`;
};

test("a request that is taken back is answered as such, also while a walk is on its way", async () => {
  const client = await startClient({ capabilities: rich, folder: folder(farm) });
  await client.open("farm.marl", large(60));
  const uri = client.uriOf("farm.marl");
  const cancel = client.cancellable("textDocument/hover", hoverAt(uri));
  cancel.take();
  expect(await codeOf(cancel.answer)).toBe(-32800);
  expect(await client.request("textDocument/hover", hoverAt(uri))).not.toBeNull();
});

test("a held workspace request ends when it is taken back", async () => {
  const client = await startClient({ capabilities: rich, folder: folder(farm) });
  type Report = {
    readonly items: readonly { readonly uri: string; readonly resultId: string; readonly kind: string }[];
  };
  const first = await client.request<Report>("workspace/diagnostic", { previousResultIds: [] });
  expect(first.items.map(({ kind }) => kind)).toEqual(["full"]);
  const previousResultIds = first.items.map(({ uri, resultId: value }) => ({ uri, value }));
  const held = client.cancellable("workspace/diagnostic", { previousResultIds });
  // Something else is answered meanwhile.
  await client.request("textDocument/hover", hoverAt(client.uriOf("farm.marl")));
  held.take();
  expect(await codeOf(held.answer)).toBe(-32800);
  const again = client.cancellable<Report>("workspace/diagnostic", { previousResultIds });
  await client.open("farm.marl", "system vat\n  tank main 500 L\n");
  expect((await again.answer).items.map(({ kind, uri }) => [kind, uri])).toEqual([
    ["full", client.uriOf("farm.marl")],
  ]);
});

test("binary, unreadable and huge files, CRLF and a byte order mark", async () => {
  const root = folder({
    "farm.marl": '\ufeffsystem vat "é 水 🪸"\r\n  tank main 500 L\r\n',
    "binary.marl": "system x\u0000\u0001\n",
    "log.marl": 'use "farm.marl"\r\n\r\nlog vat\r\n  2026-11-30 08:00 read alkalinity 8 dKHH\r\n',
  });
  const client = await startClient({ capabilities: poor, folder: root });
  const problemsIn = (path: string) =>
    client.until(() => client.published.findLast((each) => each.uri === client.uriOf(path)));
  expect((await problemsIn("binary.marl")).diagnostics.map(({ code, range }) => [code, range.start])).toEqual(
    [["file/unreadable", { line: 0, character: 0 }]],
  );
  expect((await problemsIn("log.marl")).diagnostics.map(({ code, range }) => [code, range])).toEqual([
    ["unit/unknown", { start: { line: 3, character: 37 }, end: { line: 3, character: 41 } }],
  ]);
  const line = '  2026-11-30 08:00 note "nothing to see on rack seven of the east hall today"\n';
  const huge = `use "farm.marl"\n\nlog vat\n${line.repeat(Math.ceil(5_000_000 / line.length))}  2026-11-30 08:01 nota "x"\n`;
  await client.open("huge.marl", huge);
  const { diagnostics } = await client.problemsOf("huge.marl", 1);
  const last = diagnostics.find(({ code }) => code === "syntax/unknown-word");
  expect(last?.range.start).toEqual({ line: huge.split("\n").length - 2, character: 19 });
  expect(diagnostics.length).toBeLessThanOrEqual(201);
  expect(diagnostics[0]).toMatchObject({ code: "file/more", range: { start: { line: 0, character: 0 } } });
});

test("a client that refuses all that it is asked loses nothing by it", async () => {
  const root = folder(farm);
  const client = await startClient({ capabilities: rich, folder: root, refuses: true });
  await client.open("farm.marl", farm["farm.marl"]);
  await client.notify("workspace/didChangeConfiguration", { settings: null });
  await client.until(() => client.requests.find(({ method }) => method === "workspace/configuration"));
  const uri = client.uriOf("farm.marl");
  const answer = await client.request<{ readonly items: readonly unknown[] }>("textDocument/diagnostic", {
    textDocument: { uri },
  });
  expect(answer.items).toHaveLength(1);
  expect(await client.request("workspace/symbol", { query: "vat" })).toHaveLength(1);
});

test("a request that is taken back during a long walk is answered before the walk ends", async () => {
  const client = await startClient({ capabilities: pushes, folder: folder({}) });
  await client.open("farm.marl", large(400));
  const uri = client.uriOf("farm.marl");
  const cancel = client.cancellable("textDocument/hover", hoverAt(uri));
  const symbols = client.cancellable("workspace/symbol", { query: "vat" });
  // Something else is heard first, so that both wait for the walk by now.
  await codeOf(client.request("marl/nonesuch", {}));
  cancel.take();
  symbols.take();
  expect(await codeOf(cancel.answer)).toBe(-32800);
  expect(await codeOf(symbols.answer)).toBe(-32800);
  expect(client.published.filter((each) => each.uri === uri)).toEqual([]);
  await client.problemsOf("farm.marl", 1);
});
