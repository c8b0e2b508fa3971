/** A language client for tests: starts the built server as its own process and speaks to it over its streams. */
import { type ChildProcess, spawn } from "node:child_process";
import { pathToFileURL } from "node:url";
import { onTestFinished } from "vitest";
import {
  CancellationTokenSource,
  createMessageConnection,
  ResponseError,
  StreamMessageReader,
  StreamMessageWriter,
} from "vscode-jsonrpc/node";
import { cli } from "../commands/marl.ts";
import { poor, rich } from "./capabilities.ts";

export { poor, rich };

export interface Published {
  readonly uri: string;
  readonly version?: number;
  readonly diagnostics: readonly {
    readonly range: { readonly start: Place; readonly end: Place };
    readonly code: string;
    readonly message: string;
    readonly severity: number;
  }[];
}
export interface Place {
  readonly line: number;
  readonly character: number;
}

export type TestClient = Awaited<ReturnType<typeof startClient>>;

export interface ClientOptions {
  readonly capabilities: object;
  /** The folder that the client has open; null where it has none. */
  readonly folder: string | null;
  readonly at?: string;
  readonly initializationOptions?: Readonly<Record<string, unknown>>;
  /** Answers every request of the server with an error. */
  readonly refuses?: boolean;
  /** What it answers to `workspace/configuration`. */
  readonly settings?: unknown;
}

/** A server's process with a connection to it, and nothing said yet; it is stopped after the test. */
export function startBare() {
  const server: ChildProcess = spawn(process.execPath, [cli, "serve", "--stdio"], {
    stdio: ["pipe", "pipe", "pipe"],
  });
  const exited = new Promise<number | null>((resolve) => server.on("exit", (code) => resolve(code)));
  let errors = "";
  server.stderr!.on("data", (piece: Buffer) => {
    errors += piece.toString();
  });
  const connection = createMessageConnection(
    new StreamMessageReader(server.stdout!),
    new StreamMessageWriter(server.stdin!),
  );
  connection.onError(() => undefined);
  onTestFinished(async () => {
    connection.dispose();
    server.kill();
    await exited;
  });
  connection.listen();
  return { server, connection, exited, errors: () => errors };
}

/** A running server that has been initialized; it is stopped after the test. */
export async function startClient(options: ClientOptions) {
  const { capabilities, folder, at = "2026-12-01T08:00" } = options;
  const { server, connection, exited, errors } = startBare();
  const published: Published[] = [];
  const requests: { readonly method: string; readonly params: unknown }[] = [];
  let heard: (() => void)[] = [];
  const hear = () => {
    for (const wake of heard) wake();
    heard = [];
  };
  connection.onNotification("textDocument/publishDiagnostics", (params: Published) => {
    published.push(params);
    hear();
  });
  const progress: { readonly token: unknown; readonly value: { readonly kind: string } }[] = [];
  connection.onUnhandledProgress(({ token, value }) => {
    progress.push({ token, value: value as { readonly kind: string } });
    hear();
  });
  connection.onNotification(() => undefined);
  connection.onRequest((method, params) => {
    requests.push({ method, params });
    hear();
    if (options.refuses) throw new ResponseError(-32601, "No such thing here.");
    if (method !== "workspace/configuration") return null;
    const { items } = params as { readonly items: readonly unknown[] };
    return items.map(() => options.settings ?? null);
  });

  const request = <T>(method: string, params: unknown): Promise<T> => connection.sendRequest(method, params);
  const notify = (method: string, params: unknown): Promise<void> =>
    connection.sendNotification(method, params);
  const uriOf = (path: string): string => pathToFileURL(folder === null ? path : `${folder}/${path}`).href;
  const initialized = await request<{ readonly capabilities: Record<string, unknown> }>("initialize", {
    processId: process.pid,
    rootUri: folder === null ? null : pathToFileURL(folder).href,
    workspaceFolders:
      folder === null || !("workspace" in capabilities)
        ? null
        : [{ uri: pathToFileURL(folder).href, name: "farm" }],
    capabilities,
    initializationOptions: { at, ...options.initializationOptions },
  });
  await notify("initialized", {});

  /** Waits until something that was heard of fulfils this. */
  async function until<T>(find: () => T | undefined): Promise<T> {
    for (;;) {
      const found = find();
      if (found !== undefined) return found;
      await new Promise<void>((wake) => heard.push(wake));
    }
  }
  return {
    connection,
    server,
    exited,
    request,
    notify,
    uriOf,
    capabilities: initialized.capabilities,
    published,
    requests,
    progress,
    until,
    errors,
    /** A request that can be taken back. */
    cancellable: <T>(method: string, params: unknown) => {
      const source = new CancellationTokenSource();
      const answer: Promise<T> = connection.sendRequest(method, params, source.token);
      return { answer, take: () => source.cancel() };
    },
    open: (path: string, text: string, version = 1) =>
      notify("textDocument/didOpen", {
        textDocument: { uri: uriOf(path), languageId: "marl", version, text },
      }),
    change: (path: string, version: number, contentChanges: readonly unknown[]) =>
      notify("textDocument/didChange", { textDocument: { uri: uriOf(path), version }, contentChanges }),
    /** The problems published for a version of a file. */
    problemsOf: (path: string, version: number) =>
      until(() => published.find((each) => each.uri === uriOf(path) && each.version === version)),
  };
}
