/** What an extension asks beyond the protocol, through a real server process; and the server as the extension starts it. */
import { fork } from "node:child_process";
import { existsSync } from "node:fs";
import { resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { expect, onTestFinished, test } from "vitest";
import { createMessageConnection, IPCMessageReader, IPCMessageWriter } from "vscode-jsonrpc/node";
import { folder } from "../commands/marl.ts";
import { appliedIn, type ClientEdit } from "./apply.ts";
import { poor, rich, startClient } from "./client.ts";

const text = `kit bench "é 鉢 🪸"

system vat "Grow-out vat"
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH aim 8
  hold calcium 400 to 450 mg/L
  limit alkalinity rise 0.5 dKH/day
  cohort plugs 300 pieces uptake 0.55 meq/day each
  pump head-1 gives ash-part at 40 mL/min
  by-hand chloride-part

solution ash-part
  dissolve sodium-carbonate 424 g
  make up to 4 L

solution chloride-part
  dissolve calcium-chloride-dihydrate 588 g
  make up to 4 L

log vat
  2026-11-30 08:00 read alkalinity 8.0 dKH, calcium 430 mg/L with bench by mk # é 鉢 🪸
  2026-11-30 08:05 read salinity 35, temperature 25.4 degC by mk
  2026-12-01 07:00 read alkalinity 8.0 dKH, calcium 425 mg/L with bench by ro
`;

async function started(capabilities: object, given = text, commands: readonly string[] = []) {
  const client = await startClient({
    capabilities,
    folder: folder({ "farm.marl": given }),
    initializationOptions: { commands },
  });
  await client.open("farm.marl", given);
  const uri = client.uriOf("farm.marl");
  const [system] = await client.request<{ readonly ref: string }[]>("marl/systems", {
    uri,
    line: 20,
    name: null,
  });
  return { client, uri, of: { uri, system: system?.ref } };
}

interface ClientEdits {
  readonly changes?: Readonly<Record<string, readonly ClientEdit[]>>;
  readonly documentChanges?: readonly {
    readonly textDocument: { readonly uri: string };
    readonly edits: readonly ClientEdit[];
  }[];
}

/** What becomes of a document: a rich client counts in UTF-8, a poor one in UTF-16. */
function applied(before: string, uri: string, edit: unknown): string {
  const { changes, documentChanges = [] } = edit as ClientEdits;
  if (changes) return appliedIn(before, changes[uri] ?? [], "utf-16");
  const own = documentChanges.filter(({ textDocument }) => textDocument.uri === uri);
  return appliedIn(
    before,
    own.flatMap(({ edits }) => edits),
    "utf-8",
  );
}

const reading = { kit: null, by: null, moment: null };
const value = (parameter: string, given: string) => ({ parameter, text: given });

test("a place speaks of systems: its line's, its file's, the farm's, or one by name", async () => {
  const two = `${text}\nsystem tub\n  tank main 80 L\n`;
  const { client, uri } = await started(poor, two);
  const names = async (line: number | null, name: string | null = null) =>
    (await client.request<{ name: string }[]>("marl/systems", { uri, line, name })).map((each) => each.name);
  expect(await names(3)).toEqual(["vat"]);
  expect(await names(21)).toEqual(["vat"]);
  expect(await names(0)).toEqual(["vat", "tub"]);
  expect(await names(null)).toEqual(["vat", "tub"]);
  expect(await names(0, "tub")).toEqual(["tub"]);
  expect(await names(0, "nobody")).toEqual([]);
});

test("the sheet is the one that the command line prints, of what is typed", async () => {
  const { client, of } = await started(poor);
  const sheet = async () => (await client.request<{ readonly text: string }>("marl/sheet", of)).text;
  const before = await sheet();
  expect(before).toContain("Dose sheet, Tuesday 1 December 2026 08:00");
  expect(before).toContain("\nvat: Grow-out vat\n");
  expect(before).toContain("\n500 L of water\n");
  await client.change("farm.marl", 2, [
    { range: { start: { line: 3, character: 12 }, end: { line: 3, character: 15 } }, text: "600" },
  ]);
  expect(await sheet()).toContain("\n600 L of water\n");
  expect(await client.request("marl/sheet", { ...of, system: "gone" })).toBeNull();
});

test("what is usually read comes with the last values, and all else that can be", async () => {
  const { client, of } = await started(poor);
  const answer = await client.request<Record<string, unknown>>("marl/usualReading", of);
  expect(answer).toMatchObject({
    now: "2026-12-01 08:00",
    usual: [
      { parameters: ["alkalinity", "calcium"], kit: "bench" },
      { parameters: ["salinity", "temperature"], kit: null },
    ],
    kits: ["bench"],
    people: ["ro", "mk"],
  });
  expect((answer.items as unknown[]).slice(0, 5)).toEqual([
    { parameter: "alkalinity", unit: "dKH", last: { text: "8.0 dKH", moment: "2026-12-01 07:00" } },
    { parameter: "calcium", unit: "mg/L", last: { text: "425 mg/L", moment: "2026-12-01 07:00" } },
    { parameter: "salinity", unit: "", last: { text: "35", moment: "2026-11-30 08:05" } },
    { parameter: "temperature", unit: "degC", last: { text: "25.4 degC", moment: "2026-11-30 08:05" } },
    { parameter: "magnesium", unit: "mg/L", last: null },
  ]);
  expect(answer.items).toHaveLength(10);
});

interface Answer {
  readonly line?: string;
  readonly notes?: readonly string[];
  readonly edit?: unknown;
  readonly refusal?: string;
}

test.each([
  ["rich", rich],
  ["poor", poor],
])("a reading becomes one tidy line where its time belongs: %s", async (_, capabilities) => {
  const { client, uri, of } = await started(capabilities);
  const answer = await client.request<Answer>("marl/readingEdit", {
    ...of,
    values: [value("calcium", " 431 "), value("alkalinity", "2.9 meq/L")],
    kit: "bench",
    by: "mk",
    moment: "2026-11-30 09:00",
  });
  const line = "2026-11-30 09:00 read calcium 431 mg/L, alkalinity 2.9 meq/L with bench by mk";
  expect(answer.line).toBe(line);
  expect(answer.notes).toEqual([]);
  const before = "  2026-12-01 07:00 read";
  expect(applied(text, uri, answer.edit)).toBe(text.replace(before, `  ${line}\n${before}`));
});

test.each([
  [[value("alkalinity", "7,8")], null, "2026-12-01 08:00 read alkalinity 7.8 dKH"],
  [[value("alkalinity", "7.8 ± 0.1")], "07:30", "2026-12-01 07:30 read alkalinity 7.8 dKH ± 0.1"],
  [[value("nitrate", "below 2")], null, "2026-12-01 08:00 read nitrate below 2 mg/L"],
  [[value("alkalinity", "140 mg/L as CaCO3")], null, "2026-12-01 08:00 read alkalinity 140 mg/L as CaCO3"],
  [
    [value("pH", "8.1"), value("salinity", "1.0264 SG")],
    null,
    "2026-12-01 08:00 read pH 8.1, salinity 1.0264 SG",
  ],
])("%j at %s is %s", async (values, moment, line) => {
  const { client, of } = await started(poor);
  const answer = await client.request<Answer>("marl/readingEdit", { ...of, ...reading, moment, values });
  expect(answer.line).toBe(line);
});

test.each([
  [[], {}, "No value is given yet."],
  [
    [value("alkalinity", "high")],
    {},
    '"high" is no value of alkalinity. Write a number, for example 7.8 or 7.8 dKH.',
  ],
  [
    [value("alkalinity", "7.8 foo bar")],
    {},
    '"7.8 foo bar" is no value of alkalinity. Write a number, in dKH where no unit follows.',
  ],
  [[value("calcium", "1,250")], {}, "1,250 may be 1.250 or 1250. Write it with a point."],
  [
    [value("pH", "8.1")],
    { moment: "soon" },
    '"soon" is no time. Write 08:00, or 2026-12-01 08:00 for another day.',
  ],
  [
    [value("pH", "8.1")],
    { moment: "09:30" },
    "2026-12-01 09:30 is still to come. Write when the water was read.",
  ],
  [[value("pH", "8.1")], { by: "two words" }, '"two words" is no name. Write one word or initials.'],
])("%j %j is refused", async (values, more, refusal) => {
  const { client, of } = await started(poor);
  const answer = await client.request<Answer>("marl/readingEdit", { ...of, ...reading, ...more, values });
  expect(answer).toEqual({ refusal });
});

test("what is unusual is told before it is written", async () => {
  const { client, of } = await started(poor);
  const ask = (given: string) =>
    client.request<Answer>("marl/readingEdit", { ...of, ...reading, values: [value("alkalinity", given)] });
  expect((await ask("8.0")).notes).toEqual([]);
  const { notes = [] } = await ask("78");
  expect(notes).toHaveLength(1);
  expect(notes[0]).toMatch(/^Sea water can't have 78 dKH of alkalinity\./);
});

test("a system without a log gets one", async () => {
  const small = "system tub\n  tank main 80 L\n";
  const { client, uri, of } = await started(rich, small);
  const answer = await client.request<Answer>("marl/readingEdit", {
    ...of,
    ...reading,
    values: [value("pH", "8.1")],
  });
  expect(applied(small, uri, answer.edit)).toBe(
    `${small.trimEnd()}\n\nlog tub\n  2026-12-01 08:00 read pH 8.1\n`,
  );
});

test("the plan is written once", async () => {
  const { client, uri, of } = await started(poor);
  const answer = await client.request<Answer & { title: string }>("marl/planEdit", of);
  expect(answer.title).toMatch(/^Set head-1 to \d+ mL\/day from now on$/);
  const after = applied(text, uri, answer.edit);
  expect(after.replace(text, "")).toMatch(/^ {2}2026-12-01 08:00 set head-1 \d+ mL\/day\n$/);
  await client.change("farm.marl", 2, [{ text: after }]);
  expect(await client.request("marl/planEdit", of)).toEqual({
    refusal: "Every pump of vat is set as planned. Doses by hand are written once they are given.",
  });
});

test("a system without a volume has no plan, and says why", async () => {
  const { client, of } = await started(poor, "system vat\n  hold alkalinity 7 to 8 dKH\n");
  expect(await client.request("marl/planEdit", of)).toEqual({
    refusal: "Nothing can be planned: its volume isn't known.",
  });
});

test("the whole farm is tidied by one edit", async () => {
  const { client, uri } = await started(poor, "system  tub\n  tank main   80 L\n");
  const answer = await client.request<{ edit: { changes: Record<string, unknown> }; files: number }>(
    "marl/tidyEdits",
    { uri },
  );
  expect(answer.files).toBe(1);
  expect(applied("system  tub\n  tank main   80 L\n", uri, answer.edit)).toBe(
    "system tub\n  tank main 80 L\n",
  );
});

test("a system's state counts what is wrong, and says as at when", async () => {
  const { client, of } = await started(poor);
  const state = () => client.request<Record<string, unknown>>("marl/state", of);
  expect(await state()).toMatchObject({
    name: "vat",
    worst: "warning",
    errors: 0,
    warnings: 1,
    message: expect.stringMatching(/^Alkalinity leaves its band on Tuesday 1 December/),
    asAt: "2026-12-01 08:00",
    lastRead: "2026-12-01 07:00",
    doses: expect.stringMatching(/^Today: head-1 \d+ mL/),
  });
  const held = text.replace("alkalinity 7.5 to 8.5 dKH aim 8", "alkalinity 5 to 12 dKH aim 8");
  await client.change("farm.marl", 2, [{ text: held }]);
  // The caustic reagent of a solution is no matter of the system's.
  expect(await state()).toMatchObject({ worst: null, errors: 0, warnings: 0, message: null });
  await client.change("farm.marl", 3, [{ text: text.replace("hold calcium", "hold calcum") }]);
  expect(await state()).toMatchObject({
    worst: "error",
    errors: 1,
    message: expect.stringContaining("calcum"),
  });
});

test("a change of state is told to a client with commands, and to no other", async () => {
  for (const [commands, told] of [
    [["marl.showDoseSheet"], true],
    [[], false],
  ] as const) {
    const client = await startClient({
      capabilities: poor,
      folder: folder({ "farm.marl": text }),
      initializationOptions: { commands },
    });
    let heard = 0;
    client.connection.onNotification("marl/stateChanged", () => {
      heard += 1;
    });
    await client.open("farm.marl", text);
    await client.problemsOf("farm.marl", 1);
    // An answer comes after all that was sent before it.
    await client.request("marl/systems", { uri: client.uriOf("farm.marl"), line: null, name: null });
    expect(heard > 0).toBe(told);
  }
});

test("the extension's own server speaks over its channel, and finds the pages of problems", async () => {
  const server = fork(resolve("dist/extension/server.cjs"), { silent: true });
  const connection = createMessageConnection(new IPCMessageReader(server), new IPCMessageWriter(server));
  onTestFinished(() => {
    connection.dispose();
    server.kill();
  });
  connection.listen();
  const initialized = await connection.sendRequest<{ capabilities: object; serverInfo: object }>(
    "initialize",
    {
      processId: process.pid,
      rootUri: null,
      capabilities: { textDocument: { publishDiagnostics: { codeDescriptionSupport: true } } },
    },
  );
  expect(initialized.serverInfo).toMatchObject({ name: "marl" });
  const published = new Promise<{ diagnostics: { code: string; codeDescription: { href: string } }[] }>(
    (heard) => connection.onNotification("textDocument/publishDiagnostics", heard),
  );
  await connection.sendNotification("initialized", {});
  await connection.sendNotification("textDocument/didOpen", {
    textDocument: {
      uri: "untitled:one",
      languageId: "marl",
      version: 1,
      text: "system vat\n  tnk main 80 L\n",
    },
  });
  const [problem] = (await published).diagnostics.filter(({ code }) => code === "syntax/unknown-word");
  expect(existsSync(fileURLToPath(problem!.codeDescription.href))).toBe(true);
});
