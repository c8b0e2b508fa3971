/** The language server: the entrance that joins a client's messages to the farms. Knows the process and the protocol. */
import { existsSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import {
  type Connection,
  createConnection,
  DidChangeConfigurationNotification,
  DidChangeWatchedFilesNotification,
  ErrorCodes,
  type InitializeParams,
  type InitializeResult,
  IPCMessageReader,
  IPCMessageWriter,
  type Message,
  ProposedFeatures,
  StreamMessageReader,
  StreamMessageWriter,
  WatchKind,
} from "vscode-languageserver/node";
import { readMoment } from "../grammar/dates.ts";
import manifest from "../package.json" with { type: "json" };
import { clockNow } from "./environment.ts";
import { capabilitiesFor } from "./protocol/capabilities.ts";
import { clientOf } from "./protocol/client.ts";
import { convertFor } from "./protocol/convert.ts";
import { features } from "./protocol/features.ts";
import { inOrder } from "./protocol/in-order.ts";
import { progressFor } from "./protocol/progress.ts";
import { type Publisher, publisherFor } from "./protocol/publish.ts";
import { stateChanged } from "./protocol/requests.ts";
import type { Session } from "./protocol/session.ts";
import { settingsOf } from "./protocol/settings.ts";
import { pathOf } from "./protocol/uris.ts";
import { makeWorkspace } from "./protocol/workspace.ts";

/** Time alone makes problems: after so long everything is looked at again, ms. */
const lookAgainAfter = 10 * 60_000;
/** So long the farms wait for a client's settings, ms. */
const longestWait = 2000;

const after = (time: number): Promise<void> =>
  new Promise((resolve) => {
    setTimeout(resolve, time).unref();
  });

const wordsOf = (error: unknown): string =>
  error instanceof Error ? (error.stack ?? error.message) : String(error);

/** Serves one client until it says `exit` or goes away. */
export function serve(by: "stdio" | "ipc"): void {
  const [reader, writer] =
    by === "ipc"
      ? [new IPCMessageReader(process), new IPCMessageWriter(process)]
      : [new StreamMessageReader(process.stdin), new StreamMessageWriter(process.stdout)];
  // What one message brought about must not take the others with it.
  process.on("unhandledRejection", (error) => process.stderr.write(`marl: ${wordsOf(error)}\n`));
  const order = inOrder();
  // A message that can't be read has no number to answer it by; the rest is unharmed.
  reader.onError(() => void writer.write(unreadable));
  reader.onClose(() => process.exit(order.hasEnded() ? 0 : 1));
  const connection = createConnection(ProposedFeatures.all, reader, writer, order.options);
  order.refuse(connection);
  connection.onInitialize((params) => initialize(connection, params));
  connection.listen();
}

const unreadable = {
  jsonrpc: "2.0",
  id: null,
  error: { code: ErrorCodes.ParseError, message: "This message is no JSON." },
} as unknown as Message;

function initialize(connection: Connection, params: InitializeParams): InitializeResult {
  const client = clientOf(params);
  const options = (params.initializationOptions ?? {}) as {
    readonly at?: unknown;
    readonly settings?: unknown;
  };
  const fixed = typeof options.at === "string" ? readMoment(options.at, "noon") : null;
  const now = (): number => (fixed?.known ? fixed.moment.minute : clockNow());
  let settings = settingsOf(options.settings);
  let publisher: Publisher | null = null;
  const failed = (error: unknown): void => connection.console.error(wordsOf(error));
  const send = (sending: Promise<unknown>): void => void sending.catch(failed);
  const workspace = makeWorkspace(client.encoding, {
    moment: () => ({ at: now(), clock: now() }),
    walked: (look, changed) => {
      publisher?.walked(look, changed);
      // An extension that shows more than the protocol knows of asks again.
      if (client.commands.size > 0) send(connection.sendNotification(stateChanged));
    },
    progress: progressFor(connection, client, failed),
    failed,
  });
  const session: Session = {
    connection,
    client,
    convert: convertFor(client),
    workspace,
    settings: () => settings,
    now,
    send,
    pageOf,
  };
  publisher = publisherFor(session);
  for (const feature of features) feature.listen(session);

  const refreshViews = (): void => {
    const { refreshes } = client;
    if (refreshes.problems && client.pullsProblems) send(connection.languages.diagnostics.refresh());
    if (refreshes.hints) send(connection.languages.inlayHint.refresh());
    if (refreshes.lenses) send(connection.sendRequest("workspace/codeLens/refresh"));
  };
  const lookAgain = async (): Promise<void> => {
    await workspace.lookAgain();
    refreshViews();
  };
  const takeSettings = async (given: unknown): Promise<void> => {
    const asked = client.configuration ? connection.workspace.getConfiguration("marl") : given;
    settings = settingsOf(await asked);
    await lookAgain();
  };
  let folders = foldersOf(params);

  connection.onInitialized(() => {
    if (client.watchesFiles)
      send(
        connection.client.register(DidChangeWatchedFilesNotification.type, {
          // Of a folder that goes only its own path may be told.
          watchers: [{ globPattern: "**/*.marl" }, { globPattern: "**/*", kind: WatchKind.Delete }],
        }),
      );
    if (client.configurationRegistration)
      send(connection.client.register(DidChangeConfigurationNotification.type, { section: "marl" }));
    if (client.folders)
      connection.workspace.onDidChangeWorkspaceFolders(({ added, removed }) => {
        const gone = new Set(removed.map(({ uri }) => pathOf(uri)));
        folders = [
          ...folders.filter((path) => !gone.has(path)),
          ...added.flatMap(({ uri }) => pathOf(uri) ?? []),
        ];
        void workspace.setFolders(folders, Promise.resolve());
      });
    const settled = client.configuration ? takeSettings(null).catch(failed) : Promise.resolve();
    // A client that never answers must not keep its own farms waiting.
    void workspace.setFolders(folders, Promise.race([settled, after(longestWait)]));
  });
  connection.onDidChangeConfiguration(({ settings: given }) => {
    send(takeSettings((given as { marl?: unknown } | null)?.marl));
  });
  connection.onDidOpenTextDocument(({ textDocument: { uri, version, text } }) => {
    void workspace.open(uri, version, text);
    if (!client.watchesFiles) void workspace.refresh();
  });
  connection.onDidChangeTextDocument(({ textDocument: { uri, version }, contentChanges }) => {
    void workspace.change(uri, version, contentChanges);
  });
  connection.onDidSaveTextDocument(() => {
    if (!client.watchesFiles) void workspace.refresh();
  });
  connection.onDidCloseTextDocument(({ textDocument: { uri } }) => void workspace.close(uri));
  connection.onDidChangeWatchedFiles(({ changes }) => {
    void workspace.touched(changes.flatMap(({ uri }) => pathOf(uri) ?? []));
  });
  const timer = setInterval(() => send(lookAgain()), lookAgainAfter);
  timer.unref();
  connection.onShutdown(() => clearInterval(timer));

  return { capabilities: capabilitiesFor(client), serverInfo: { name: "marl", version: manifest.version } };
}

function foldersOf({ workspaceFolders, rootUri, rootPath }: InitializeParams): readonly string[] {
  if (workspaceFolders) return workspaceFolders.flatMap(({ uri }) => pathOf(uri) ?? []);
  const path = rootUri ? pathOf(rootUri) : rootPath;
  return path ? [path] : [];
}

const shipped = fileURLToPath(new URL("..", import.meta.url));

/** The page of a problem, shipped beside the built server. */
function pageOf(code: string): string | null {
  const path = join(shipped, "docs", "problems", `${code.replace("/", "-")}.md`);
  return existsSync(path) ? pathToFileURL(path).href : null;
}
