// What a keystroke costs: types into logs through a real server process and prints medians and 95th percentiles.
import { spawn } from "node:child_process";
import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { createMessageConnection, StreamMessageReader, StreamMessageWriter } from "vscode-jsonrpc/node";
import { rich } from "../test/protocol/capabilities.ts";

/** Declares all but the pull of problems: what is measured is the time until they come by themselves. */
const { diagnostic: _, ...textDocument } = rich.textDocument;
const pushed = { ...rich, textDocument };

interface Published {
  readonly uri: string;
  readonly version?: number;
}

interface Server {
  readonly request: (method: string, params: unknown) => Promise<unknown>;
  readonly notify: (method: string, params: unknown) => Promise<void>;
  /** When the problems of this version come. */
  readonly published: (uri: string, version: number) => Promise<void>;
  readonly stop: () => Promise<void>;
}

async function startServer(folder: string): Promise<Server> {
  const child = spawn(process.execPath, ["dist/cli.js", "serve", "--stdio"], {
    stdio: ["pipe", "pipe", "inherit"],
  });
  const connection = createMessageConnection(
    new StreamMessageReader(child.stdout),
    new StreamMessageWriter(child.stdin),
  );
  const waiting = new Map<string, () => void>();
  connection.onNotification("textDocument/publishDiagnostics", ({ uri, version }: Published) => {
    waiting.get(`${uri} ${version}`)?.();
  });
  connection.onNotification(() => undefined);
  connection.onRequest(() => null);
  connection.listen();
  const uri = pathToFileURL(folder).href;
  await connection.sendRequest("initialize", {
    processId: process.pid,
    rootUri: uri,
    workspaceFolders: [{ uri, name: "farm" }],
    capabilities: pushed,
    initializationOptions: { at: "2026-12-01T08:00" },
  });
  await connection.sendNotification("initialized", {});
  return {
    request: (method, params) => connection.sendRequest(method, params),
    notify: (method, params) => connection.sendNotification(method, params),
    published: (file, version) => new Promise((resolve) => waiting.set(`${file} ${version}`, resolve)),
    stop: async () => {
      await connection.sendRequest("shutdown", null);
      await connection.sendNotification("exit");
      connection.dispose();
    },
  };
}

const quantile = (times: readonly number[], share: number): number =>
  [...times].sort((a, b) => a - b)[Math.min(times.length - 1, Math.floor(share * times.length))]!;

const milliseconds = (time: number): string => `${time.toFixed(time < 10 ? 1 : 0)} ms`;

function print(what: string, times: readonly number[]): void {
  const figures = [quantile(times, 0.5), quantile(times, 0.95), Math.max(...times)].map(milliseconds);
  console.log(
    `${what.padEnd(58)} ${figures.map((figure) => figure.padStart(9)).join(" ")}  (${times.length})`,
  );
}

/** A line that a technician types, letter by letter. */
const typed = "  2026-12-01 07:50 read alkalinity 7.9 dKH, calcium 421 mg/L with bench by jt";

/** Types at a file's end, and takes it back, several times; the first round is not counted. */
async function type(server: Server, uri: string, text: string, rounds: number): Promise<number[]> {
  const lines = text.trimEnd().split("\n");
  const line = lines.length;
  await server.notify("textDocument/didOpen", {
    textDocument: { uri, languageId: "marl", version: 1, text: `${lines.join("\n")}\n` },
  });
  let version = 1;
  const times: number[] = [];
  const change = async (range: object, put: string) => {
    version += 1;
    const published = server.published(uri, version);
    const began = performance.now();
    await server.notify("textDocument/didChange", {
      textDocument: { uri, version },
      contentChanges: [{ range, text: put }],
    });
    await published;
    return performance.now() - began;
  };
  for (let round = 0; round < rounds; round += 1) {
    for (const [column, letter] of [...typed].entries()) {
      const at = { line, character: column };
      const time = await change({ start: at, end: at }, letter);
      if (round > 0) times.push(time);
    }
    const all = { start: { line, character: 0 }, end: { line, character: typed.length } };
    await change(all, "");
  }
  return times;
}

async function ask(server: Server, method: string, params: object, rounds: number): Promise<number[]> {
  const times: number[] = [];
  for (let round = -3; round < rounds; round += 1) {
    const began = performance.now();
    await server.request(method, params);
    if (round >= 0) times.push(performance.now() - began);
  }
  return times;
}

/** A log of so many lines, with tests, doses and pumps set. */
function longLog(lines: number): string {
  const start = Date.UTC(2016, 0, 1);
  const written = Array.from({ length: lines }, (_unused, number) => {
    const at = new Date(start + number * 4 * 3_600_000).toISOString().replace("T", " ").slice(0, 16);
    const value = (7.7 + ((number * 7) % 9) / 10).toFixed(1);
    if (number % 40 === 0) return `  ${at} set head-1 ${50 + (number % 30)} mL/day`;
    return number % 3 === 0
      ? `  ${at} gave part ${10 + (number % 5)} mL`
      : `  ${at} read alkalinity ${value} dKH`;
  });
  return `use "farm.marl"\n\nlog vat\n${written.join("\n")}\n`;
}

const vat =
  "system vat\n  tank main 900 L\n  hold alkalinity 7.5 to 8.5 dKH\n  cohort plugs 200 pieces uptake 0.8 meq/day each\n  pump head-1 gives part at 40 mL/min\n  by-hand part\n\nsolution part\n  supplies alkalinity 1.6 meq/mL as bicarbonate\n\nkit bench\n  alkalinity scatter 0.1 dKH\n";

export async function main(): Promise<void> {
  const folder = mkdtempSync(join(tmpdir(), "marl-bench-"));
  try {
    cpSync("examples", join(folder, "farm"), { recursive: true });
    const farm = join(folder, "farm");
    console.log(
      `${"".padEnd(58)} ${["median", "95th", "longest"].map((head) => head.padStart(9)).join(" ")}`,
    );

    print("start → problems of the first file", await firstAnswer(farm));
    const server = await startServer(farm);
    const log = join(farm, "raceways/log.marl");
    const uri = pathToFileURL(log).href;
    const times = await type(server, uri, readFileSync(log, "utf8"), 9);
    print("key → problems, example log", times);
    const textDocument = { uri };
    const at = (file: string, line: number, character: number) => ({
      textDocument: { uri: pathToFileURL(join(farm, file)).href },
      position: { line, character },
    });
    print("hover on a system", await ask(server, "textDocument/hover", at("raceways/system.marl", 2, 8), 60));
    print(
      "hover on a reading",
      await ask(server, "textDocument/hover", at("raceways/log.marl", 200, 30), 60),
    );
    print(
      "completion at a line's end",
      await ask(server, "textDocument/completion", at("raceways/log.marl", 200, 24), 60),
    );
    print(
      "code actions of a line",
      await ask(
        server,
        "textDocument/codeAction",
        {
          textDocument,
          range: { start: { line: 200, character: 0 }, end: { line: 200, character: 20 } },
          context: { diagnostics: [] },
        },
        60,
      ),
    );
    print(
      "semantic tokens, whole log",
      await ask(server, "textDocument/semanticTokens/full", { textDocument }, 60),
    );
    await server.stop();

    const long = join(folder, "long");
    cpSync("examples/farm.marl", join(long, "farm.marl"));
    writeFileSync(join(long, "farm.marl"), vat);
    const text = longLog(20_000);
    writeFileSync(join(long, "log.marl"), text);
    const second = await startServer(long);
    const longUri = pathToFileURL(join(long, "log.marl")).href;
    print("key → problems, a log of 20 000 lines", await type(second, longUri, text, 2));
    print(
      "semantic tokens of 60 of its lines",
      await ask(
        second,
        "textDocument/semanticTokens/range",
        {
          textDocument: { uri: longUri },
          range: { start: { line: 10_000, character: 0 }, end: { line: 10_060, character: 0 } },
        },
        30,
      ),
    );
    await second.stop();
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** From starting the process to the first problems, five times. */
async function firstAnswer(farm: string): Promise<number[]> {
  const times: number[] = [];
  for (let round = 0; round < 5; round += 1) {
    const began = performance.now();
    const server = await startServer(farm);
    const uri = pathToFileURL(join(farm, "raceways/log.marl")).href;
    const published = server.published(uri, 1);
    const text = readFileSync(join(farm, "raceways/log.marl"), "utf8");
    await server.notify("textDocument/didOpen", {
      textDocument: { uri, languageId: "marl", version: 1, text },
    });
    await published;
    times.push(performance.now() - began);
    await server.stop();
  }
  return times;
}
