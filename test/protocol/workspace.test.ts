/** Which farm a document belongs to, whose text counts, and what the server takes in from outside while it runs. */
import { mkdirSync, realpathSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { poor, rich, startClient, type TestClient } from "./client.ts";

const page = 'use "parts.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand part\n';
const parts = "solution part\n  supplies alkalinity 1.6 meq/mL\n";
const pushes = { ...rich, textDocument: { ...rich.textDocument, diagnostic: undefined } };

const codes = (client: TestClient, path: string): Promise<readonly string[]> =>
  client.until(() => codesNow(client, path));
const codesNow = (client: TestClient, path: string): readonly string[] | undefined =>
  client.published.findLast(({ uri }) => uri === client.uriOf(path))?.diagnostics.map(({ code }) => code);
/** Waits until a file is told to have just these. */
const untilCodes = (client: TestClient, path: string, wanted: readonly string[]) =>
  client.until(() => (JSON.stringify(codesNow(client, path)) === JSON.stringify(wanted) ? true : undefined));

test("what is open wins over what is on disk, for every use, until it is closed", async () => {
  const client = await startClient({
    capabilities: poor,
    folder: folder({ "farm.marl": page, "parts.marl": parts }),
  });
  await client.open("farm.marl", page);
  expect(await codes(client, "farm.marl")).toEqual([]);
  await client.open("parts.marl", "solution other\n  supplies alkalinity 1.6 meq/mL\n");
  await untilCodes(client, "farm.marl", ["name/undeclared"]);
  expect(await codes(client, "parts.marl")).toEqual(["name/unused"]);
  await client.notify("textDocument/didClose", { textDocument: { uri: client.uriOf("parts.marl") } });
  await untilCodes(client, "farm.marl", []);
  await untilCodes(client, "parts.marl", []);
});

test("a client that watches files is asked to, and what it saw is read; one that doesn't has it looked at on open and save", async () => {
  const root = folder({ "farm.marl": page });
  const watching = await startClient({ capabilities: pushes, folder: root });
  await watching.open("farm.marl", page);
  await untilCodes(watching, "farm.marl", ["use/missing-file", "name/undeclared"]);
  const registered = await watching.until(() =>
    watching.requests.find(
      ({ method, params }) =>
        method === "client/registerCapability" && JSON.stringify(params).includes("didChangeWatchedFiles"),
    ),
  );
  expect(JSON.stringify(registered.params)).toContain("**/*.marl");
  const saving = await startClient({ capabilities: poor, folder: root });
  await saving.open("farm.marl", page);
  await untilCodes(saving, "farm.marl", ["use/missing-file", "name/undeclared"]);
  expect(saving.requests).toEqual([]);

  writeFileSync(join(root, "parts.marl"), parts);
  await watching.notify("workspace/didChangeWatchedFiles", {
    changes: [{ uri: watching.uriOf("parts.marl"), type: 1 }],
  });
  await untilCodes(watching, "farm.marl", []);
  await saving.notify("textDocument/didSave", { textDocument: { uri: saving.uriOf("farm.marl") } });
  await untilCodes(saving, "farm.marl", []);

  rmSync(join(root, "parts.marl"));
  await watching.notify("workspace/didChangeWatchedFiles", {
    changes: [{ uri: watching.uriOf("parts.marl"), type: 3 }],
  });
  await untilCodes(watching, "farm.marl", ["use/missing-file", "name/undeclared"]);
});

test("a farm inside a farm is its own, and a folder that is added brings its farms", async () => {
  const root = folder({
    "east/farm.marl": "system vat\n  tank main 500 kg\n",
    "east/annex/farm.marl": "system vat\n  tank main 500 L\n  tank main 500 L\n",
    "west/notes.marl": "system pond\n  tank main 5 s\n",
  });
  const client = await startClient({ capabilities: pushes, folder: join(root, "east") });
  expect(await codes(client, "farm.marl")).toEqual(["system/no-volume", "unit/dimension"]);
  expect(await codes(client, "annex/farm.marl")).toEqual(["name/twice"]);
  const west = pathToFileURL(join(root, "west")).href;
  await client.notify("workspace/didChangeWorkspaceFolders", {
    event: { added: [{ uri: west, name: "west" }], removed: [] },
  });
  const told = await client.until(() => client.published.find(({ uri }) => uri === `${west}/notes.marl`));
  expect(told.diagnostics.map(({ code }) => code)).toEqual(["system/no-volume", "unit/dimension"]);
  await client.notify("workspace/didChangeWorkspaceFolders", {
    event: { added: [], removed: [{ uri: west, name: "west" }] },
  });
  await client.until(() =>
    client.published.findLast(({ uri }) => uri === `${west}/notes.marl`)?.diagnostics.length === 0
      ? true
      : undefined,
  );
});

test("a farm reached over a link keeps the client's own names for its files", async () => {
  const root = realpathSync(folder({ "real/farm.marl": page, "real/parts.marl": `${parts}  nonsense\n` }));
  symlinkSync(join(root, "real"), join(root, "linked"));
  const client = await startClient({ capabilities: poor, folder: join(root, "linked") });
  await client.open("farm.marl", page);
  expect(await codes(client, "parts.marl")).toEqual(["syntax/unknown-word"]);
  expect(client.published.every(({ uri }) => uri.includes("/linked/"))).toBe(true);
});

test("a new file that isn't on disk yet belongs to its folder's farm", async () => {
  const root = folder({ "farm.marl": page, "parts.marl": parts });
  mkdirSync(join(root, "logs"));
  const client = await startClient({ capabilities: poor, folder: root });
  await client.open("logs/new.marl", 'use "../farm.marl"\n\nlog vat\n  2026-11-30 gave prt 5 mL\n');
  expect(await codes(client, "logs/new.marl")).toEqual(["name/undeclared"]);
});

test("problems are told with the version that they are of, and other files only when theirs changed", async () => {
  const client = await startClient({
    capabilities: poor,
    folder: folder({ "farm.marl": page, "parts.marl": parts }),
  });
  await client.open("farm.marl", page);
  await client.problemsOf("farm.marl", 1);
  for (const version of [2, 3]) {
    await client.change("farm.marl", version, [
      { range: { start: { line: 4, character: 14 }, end: { line: 4, character: 14 } }, text: " " },
    ]);
    expect((await client.problemsOf("farm.marl", version)).diagnostics).toEqual([]);
  }
  expect(client.published.filter(({ uri }) => uri === client.uriOf("parts.marl"))).toEqual([]);
});

test("settings are asked for where the client answers, and taken as sent where not", async () => {
  const wrong = `system vat\n  tank main 500 L\n${"  nonsense\n".repeat(5)}`;
  const asked = await startClient({
    capabilities: pushes,
    folder: folder({ "farm.marl": wrong }),
    settings: { problems: { mostPerFile: 2 } },
  });
  const expected = ["file/more", "syntax/unknown-word", "syntax/unknown-word"];
  await untilCodes(asked, "farm.marl", expected);
  const sent = await startClient({ capabilities: poor, folder: folder({ "farm.marl": wrong }) });
  await sent.open("farm.marl", wrong);
  expect(await codes(sent, "farm.marl")).toHaveLength(5);
  await sent.notify("workspace/didChangeConfiguration", {
    settings: { marl: { "problems.mostPerFile": 2 } },
  });
  await untilCodes(sent, "farm.marl", expected);
  await sent.notify("workspace/didChangeConfiguration", {
    settings: { marl: { problems: { mostPerFile: "x" } } },
  });
  await client5(sent);
});

const client5 = (client: TestClient) =>
  client.until(() => (codesNow(client, "farm.marl")?.length === 5 ? true : undefined));

test("problems link to their pages and to other places for a client that can show them, and to nothing for a poor one", async () => {
  const text = "system vat\n  tank main 500 L\n  tank main 500 L\n";
  const full = await startClient({ capabilities: pushes, folder: folder({ "farm.marl": text }) });
  await full.open("farm.marl", text);
  const [problem] = (await full.problemsOf("farm.marl", 1)).diagnostics as readonly {
    readonly codeDescription?: { readonly href: string };
    readonly relatedInformation?: readonly unknown[];
  }[];
  expect(problem?.codeDescription?.href).toMatch(/^file:.*\/docs\/problems\/name-twice\.md$/);
  expect(problem?.relatedInformation).toMatchObject([
    { location: { uri: full.uriOf("farm.marl"), range: { start: { line: 1, character: 2 } } } },
  ]);
  const bare = await startClient({ capabilities: poor, folder: folder({ "farm.marl": text }) });
  await bare.open("farm.marl", text);
  const [plain] = (await bare.problemsOf("farm.marl", 1)).diagnostics;
  expect(Object.keys(plain!).sort()).toEqual(["code", "message", "range", "severity", "source"]);
});

test("a client that asks for problems is sent none, and is told what hasn't changed", async () => {
  const client = await startClient({
    capabilities: rich,
    folder: folder({ "farm.marl": page, "parts.marl": parts }),
  });
  await client.open("farm.marl", page);
  type Answer = {
    readonly kind: string;
    readonly resultId: string;
    readonly items?: readonly { readonly code: string }[];
  };
  const ask = (previousResultId?: string) =>
    client.request<Answer>("textDocument/diagnostic", {
      textDocument: { uri: client.uriOf("farm.marl") },
      ...(previousResultId ? { previousResultId } : {}),
    });
  const first = await ask();
  expect(first).toMatchObject({ kind: "full", items: [] });
  expect(await ask(first.resultId)).toEqual({ kind: "unchanged", resultId: first.resultId });
  await client.open("parts.marl", "solution other\n  supplies alkalinity 1.6 meq/mL\n");
  const after = await ask(first.resultId);
  expect(after.kind).toBe("full");
  expect(after.items?.map(({ code }) => code)).toEqual(["name/undeclared"]);
  await client.until(() => client.requests.find(({ method }) => method === "workspace/diagnostic/refresh"));
  expect(client.published).toEqual([]);
});

test("a long first walk shows how far it is to a client that draws progress, and ends it", async () => {
  const systems = Array.from({ length: 80 }, (_, number) => {
    const reads = Array.from(
      { length: 28 },
      (__, day) => `  2026-11-${String(day + 1).padStart(2, "0")} 08:00 read alkalinity 8.${day % 10} dKH\n`,
    );
    return `system vat-${number}\n  tank main 500 L\n  hold alkalinity 7 to 9 dKH\n  uptake alkalinity 0.2 dKH/day\n\nlog vat-${number}\n${reads.join("")}\n`;
  });
  const client = await startClient({
    capabilities: pushes,
    folder: folder({ "farm.marl": systems.join("") }),
  });
  const created = await client.until(() =>
    client.requests.find(({ method }) => method === "window/workDoneProgress/create"),
  );
  const { token } = created.params as { readonly token: unknown };
  const told = await client.until(() => {
    const own = client.progress.filter((each) => each.token === token).map(({ value }) => value.kind);
    return own.at(-1) === "end" ? own : undefined;
  });
  expect(told[0]).toBe("begin");
});

test("a farm.marl that appears in a folder makes a farm of it, and one that goes gives it back", async () => {
  const root = folder({
    "farm.marl": page,
    "parts.marl": parts,
    "east/log.marl": 'use "../farm.marl"\n\nlog vat\n',
  });
  for (const capabilities of [pushes, poor]) {
    const client = await startClient({ capabilities, folder: root });
    await client.open("east/log.marl", 'use "../farm.marl"\n\nlog vat\n');
    await untilCodes(client, "east/log.marl", []);
    const changed = async (type: number) => {
      if (capabilities === poor)
        await client.notify("textDocument/didSave", { textDocument: { uri: client.uriOf("east/log.marl") } });
      else
        await client.notify("workspace/didChangeWatchedFiles", {
          changes: [{ uri: client.uriOf("east/farm.marl"), type }],
        });
    };
    writeFileSync(join(root, "east/farm.marl"), "# The east hall.\n");
    await changed(1);
    await untilCodes(client, "east/log.marl", ["use/outside", "name/undeclared"]);
    rmSync(join(root, "east/farm.marl"));
    await changed(3);
    await untilCodes(client, "east/log.marl", []);
  }
});

test("a folder that is deleted takes its files' problems with it", async () => {
  const root = folder({ "farm.marl": "", "east/vat.marl": "system vat\n  tank main 500 kg\n" });
  const client = await startClient({ capabilities: pushes, folder: root });
  await untilCodes(client, "east/vat.marl", ["system/no-volume", "unit/dimension"]);
  rmSync(join(root, "east"), { recursive: true });
  await client.notify("workspace/didChangeWatchedFiles", {
    changes: [{ uri: client.uriOf("east"), type: 3 }],
  });
  await untilCodes(client, "east/vat.marl", []);
});

test("documents without a farm are forgotten when they are closed, and no late question brings one back", async () => {
  const outside = folder({ "vat.marl": "system vat\n  tank main 500 kg\n" });
  const client = await startClient({
    capabilities: poor,
    folder: folder({ "farm.marl": page, "parts.marl": parts }),
  });
  const uris = ["untitled:Untitled-1", pathToFileURL(join(outside, "vat.marl")).href];
  const last = (uri: string) => client.published.findLast((each) => each.uri === uri)?.diagnostics.length;
  for (const uri of uris) {
    const text = "system vat\n  tank main 500 kg\n";
    await client.notify("textDocument/didOpen", {
      textDocument: { uri, languageId: "marl", version: 1, text },
    });
    await client.until(() => (last(uri) === 2 ? true : undefined));
    await client.notify("textDocument/didClose", { textDocument: { uri } });
    await client.until(() => (last(uri) === 0 ? true : undefined));
    const before = client.published.length;
    expect(
      await client.request("textDocument/hover", {
        textDocument: { uri },
        position: { line: 0, character: 1 },
      }),
    ).toBeNull();
    expect(client.published.length).toBe(before);
  }
  expect(client.published.every(({ uri }) => uris.includes(uri) || !uri.includes("Untitled"))).toBe(true);
});

test("a document that is closed and opened again at once is open", async () => {
  const client = await startClient({
    capabilities: poor,
    folder: folder({ "farm.marl": page, "parts.marl": parts }),
  });
  await client.open("farm.marl", page);
  await client.notify("textDocument/didClose", { textDocument: { uri: client.uriOf("farm.marl") } });
  await client.open("farm.marl", "system vat\n", 2);
  await client.change("farm.marl", 3, [{ text: "system vat\n  tank main 500 kg\n" }]);
  expect((await client.problemsOf("farm.marl", 3)).diagnostics.map(({ code }) => code)).toEqual([
    "system/no-volume",
    "unit/dimension",
  ]);
});
