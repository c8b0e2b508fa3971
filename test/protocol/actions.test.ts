/** Code actions through a real server process: as literals, resolved or at once, and as commands. */
import { describe, expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { appliedIn, type ClientEdit, type CountedIn } from "./apply.ts";
import { type ClientOptions, poor, rich, startClient } from "./client.ts";

interface Answer {
  readonly title: string;
  readonly kind?: string;
  readonly isPreferred?: boolean;
  readonly command?: string;
  readonly arguments?: readonly unknown[];
  readonly data?: unknown;
  readonly diagnostics?: readonly { readonly code: string }[];
  readonly edit?: WorkspaceEdit;
}
interface WorkspaceEdit {
  readonly changes?: Readonly<Record<string, readonly ClientEdit[]>>;
  readonly documentChanges?: readonly {
    readonly kind?: string;
    readonly uri?: string;
    readonly textDocument?: { readonly uri: string; readonly version: number | null };
    readonly edits?: readonly ClientEdit[];
  }[];
}

const untidy =
  '\ufeffsystem  vat "é海🐠"\r\n  tank main 500 L\r\n  note "é海🐠" from 2026/11/02 # 🐠\r\n\r\nlog vat\r\n  2026-10-30 note "é🐠"\r\n  2026-11-30 note "海"\r\n';

async function start(capabilities: object, text = untidy, more: Partial<ClientOptions> = {}) {
  const client = await startClient({ capabilities, folder: folder({ "farm.marl": "" }), ...more });
  await client.open("farm.marl", text, 7);
  const uri = client.uriOf("farm.marl");
  const ask = (line: number, character: number, context: object = {}): Promise<readonly Answer[] | null> =>
    client.request("textDocument/codeAction", {
      textDocument: { uri },
      range: { start: { line, character }, end: { line, character } },
      context: { diagnostics: [], ...context },
    });
  return { client, uri, ask };
}

const literals = {
  textDocument: {
    codeAction: { codeActionLiteralSupport: { codeActionKind: { valueSet: [] } } },
  },
};
const commandsOnly = { workspace: { applyEdit: true } };

/** Where 2026/11/02 begins on the third line, in each way of counting. */
const dateAt: Readonly<Record<CountedIn, number>> = { "utf-8": 24, "utf-16": 19, "utf-32": 18 };
const dateMended = untidy.replace("2026/11/02", "2026-11-02");

describe.each(["utf-8", "utf-16", "utf-32"] as const)("a rich client that counts in %s", (encoding) => {
  const capabilities = { ...rich, general: { positionEncodings: [encoding] } };

  test("gets the edit of a fix when it asks for it", async () => {
    const { client, uri, ask } = await start(capabilities);
    const [fix, ...others] = (await ask(2, dateAt[encoding], { only: ["quickfix"] })) ?? [];
    expect(others).toEqual([]);
    expect(fix).toMatchObject({ title: "Write 2026-11-02", kind: "quickfix", isPreferred: true });
    expect(fix?.diagnostics?.map(({ code }) => code)).toEqual(["syntax/date-form"]);
    expect(fix?.edit).toBeUndefined();
    const { edit } = await client.request<Answer>("codeAction/resolve", fix);
    expect(edit?.documentChanges?.map(({ textDocument }) => textDocument)).toEqual([{ uri, version: 7 }]);
    expect(appliedIn(untidy, edit!.documentChanges![0]!.edits!, encoding)).toBe(dateMended);
  });

  test("splits a log into new files", async () => {
    const { client, uri, ask } = await start(capabilities);
    const found = (await ask(4, 0, { only: ["refactor"] })) ?? [];
    expect(found.map(({ title, kind }) => [title, kind])).toEqual([
      ["Split this log by month", "refactor.move"],
    ]);
    const { edit } = await client.request<Answer>("codeAction/resolve", found[0]);
    const [create, fill, change] = edit?.documentChanges ?? [];
    const made = client.uriOf("log-2026-10.marl");
    expect(create).toEqual({ kind: "create", uri: made });
    expect(fill?.textDocument).toEqual({ uri: made, version: null });
    expect(appliedIn("", fill!.edits!, encoding)).toBe(
      '\ufeffuse "farm.marl"\r\n\r\nlog vat\r\n  2026-10-30 note "é🐠"\r\n',
    );
    expect(change?.textDocument).toEqual({ uri, version: 7 });
    expect(appliedIn(untidy, change!.edits!, encoding)).toBe(
      untidy.replace('  2026-10-30 note "é🐠"\r\n', ""),
    );
  });
});

describe("a rich client", () => {
  test("gets what it asks for only, and of its own accord nothing about the whole file", async () => {
    const { ask } = await start(rich);
    const titles = async (line: number, context: object) =>
      (await ask(line, 0, context))?.map(({ title }) => title);
    expect(await titles(4, { only: ["source"] })).toEqual([
      "Add a read line dated now",
      "Do the one safe fix of this file",
      "Tidy this file",
    ]);
    expect(await titles(4, { only: ["source.fixAll"] })).toEqual(["Do the one safe fix of this file"]);
    expect(await titles(4, { triggerKind: 2 })).toEqual(["Split this log by month"]);
    expect(await titles(4, {})).toEqual([
      "Split this log by month",
      "Add a read line dated now",
      "Do the one safe fix of this file",
      "Tidy this file",
    ]);
  });

  test("is refused an edit for a text that has changed", async () => {
    const { client, ask } = await start(rich);
    const [fix] = (await ask(2, dateAt["utf-8"], { only: ["quickfix"] })) ?? [];
    await client.change("farm.marl", 8, [{ text: "system vat\n" }]);
    await expect(client.request("codeAction/resolve", fix)).rejects.toMatchObject({ code: -32801 });
  });

  test("hears which kinds there are", async () => {
    const { client } = await start(rich);
    expect(client.capabilities.codeActionProvider).toEqual({
      codeActionKinds: [
        ...["quickfix", "refactor.move", "refactor.rewrite", "source.fixAll", "source.fixAll.marl"],
        ...["source.recordReading", "source.tidy", "source.writePlan"],
      ],
      resolveProvider: true,
    });
    expect(client.capabilities.executeCommandProvider).toBeUndefined();
  });
});

describe("a client of action literals and nothing more", () => {
  test("gets edits at once, without versions, and nothing that makes a file", async () => {
    const { uri, ask } = await start(literals);
    const [fix, ...others] = (await ask(2, dateAt["utf-16"], { only: ["quickfix"] })) ?? [];
    expect(others).toEqual([]);
    expect(Object.keys(fix!).sort()).toEqual(["diagnostics", "edit", "kind", "title"]);
    expect(Object.keys(fix!.edit!)).toEqual(["changes"]);
    expect(appliedIn(untidy, fix!.edit!.changes![uri]!, "utf-16")).toBe(dateMended);
    expect(await ask(4, 0, { only: ["refactor"] })).toEqual([]);
  });
});

test("a long log selected as a whole has a short menu, and a cancel is heard", async () => {
  const lines = Array.from({ length: 20_000 }, () => "  evaporates 7,9 L/day\n");
  const { client, uri } = await start(rich, `system vat\n  tank main 500 L\n${lines.join("")}`);
  const range = { start: { line: 0, character: 0 }, end: { line: 20_002, character: 0 } };
  const params = { textDocument: { uri }, range, context: { diagnostics: [], triggerKind: 2 } };
  const found = await client.request<readonly Answer[]>("textDocument/codeAction", params);
  expect(found.length).toBe(50);
  const all = { ...params, context: { diagnostics: [], only: ["source"] } };
  const asked = client.cancellable("textDocument/codeAction", all);
  asked.take();
  await expect(asked.answer).rejects.toMatchObject({ code: -32800 });
});

describe("a client that knows commands only", () => {
  test("is sent the edit when it runs one", async () => {
    const { client, uri, ask } = await start(commandsOnly);
    expect(client.capabilities).toMatchObject({
      codeActionProvider: true,
      executeCommandProvider: { commands: ["marl.applyAction"] },
    });
    const found = (await ask(2, dateAt["utf-16"])) ?? [];
    expect(found.map(({ title, command }) => [title, command])).toEqual(
      ["Write 2026-11-02", "Do the one safe fix of this file", "Tidy this file"].map((title) => [
        title,
        "marl.applyAction",
      ]),
    );
    expect(Object.keys(found[0]!).sort()).toEqual(["arguments", "command", "title"]);
    const { command, arguments: given } = found[0]!;
    expect(await client.request("workspace/executeCommand", { command, arguments: given })).toBeNull();
    const sent = client.requests.find(({ method }) => method === "workspace/applyEdit");
    const { edit } = sent!.params as { readonly edit: WorkspaceEdit };
    expect(appliedIn(untidy, edit.changes![uri]!, "utf-16")).toBe(dateMended);
  });

  test("may send anything as a command, without harm", async () => {
    const { client } = await start(commandsOnly);
    for (const given of [undefined, [], [null], [{ uri: "x" }], [7]])
      expect(
        await client.request("workspace/executeCommand", { command: "marl.applyAction", arguments: given }),
      ).toBeNull();
    expect(client.requests.filter(({ method }) => method === "workspace/applyEdit")).toEqual([]);
  });
});

test("a client that declares nothing is offered nothing that it couldn't do", async () => {
  const { client, ask } = await start(poor);
  expect(client.capabilities.codeActionProvider).toBeUndefined();
  expect(client.capabilities.executeCommandProvider).toBeUndefined();
  expect(await ask(2, dateAt["utf-16"])).toEqual([]);
});
