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
  type WorkDoneProgressServerReporter,
} from "vscode-languageserver/node";
import { readMoment } from "../grammar/dates.ts";
import manifest from "../package.json" with { type: "json" };
import { clockNow } from "./environment.ts";
import type { Progress } from "./farm.ts";
import { type Client, clientOf } from "./protocol/client.ts";
import { convertFor } from "./protocol/convert.ts";
import { capabilitiesFor } from "./protocol/capabilities.ts";
import { features } from "./protocol/features.ts";
import { inOrder } from "./protocol/in-order.ts";
import { type Publisher, publisherFor } from "./protocol/publish.ts";
import { stateChanged } from "./protocol/requests.ts";
import type { Session } from "./protocol/session.ts";
import { settingsOf } from "./protocol/settings.ts";
import { pathOf } from "./protocol/uris.ts";
import { makeWorkspace } from "./protocol/workspace.ts";

/** Time alone makes problems: after so long everything is looked at again, ms. */
const lookAgainAfter = 10 * 60_000;

/** Serves one client until it says `exit` or goes away. */
export function serve(by: "stdio" | "ipc"): void {
  const [reader, writer] =
    by === "ipc"
      ? [new IPCMessageReader(process), new IPCMessageWriter(process)]
      : [new StreamMessageReader(process.stdin), new StreamMessageWriter(process.stdout)];
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
  const progress = progressFor(connection, client);
  const workspace = makeWorkspace(client.encoding, {
    moment: () => ({ at: now(), clock: now() }),
    walked: (look, _before, changed) => {
      publisher?.walked(look, changed);
      // An extension that shows more than the protocol knows of asks again.
      if (client.commands.size > 0) void connection.sendNotification(stateChanged);
    },
    progress,
  });
  const session: Session = {
    connection,
    client,
    convert: convertFor(client),
    workspace,
    settings: () => settings,
    now,
    pageOf,
  };
  publisher = publisherFor(session);
  for (const feature of features) feature.listen(session);

  const refreshViews = (): void => {
    const { refreshes } = client;
    if (refreshes.problems && client.pullsProblems) void connection.languages.diagnostics.refresh();
    if (refreshes.hints) void connection.languages.inlayHint.refresh();
    if (refreshes.lenses) void connection.sendRequest("workspace/codeLens/refresh");
  };
  const lookAgain = async (): Promise<void> => {
    await workspace.lookAgain();
    refreshViews();
  };
  const takeSettings = async (given: unknown): Promise<void> => {
    settings = settingsOf(client.configuration ? await connection.workspace.getConfiguration("marl") : given);
    await lookAgain();
  };
  let folders = foldersOf(params);

  connection.onInitialized(() => {
    if (client.watchesFiles)
      void connection.client.register(DidChangeWatchedFilesNotification.type, {
        watchers: [{ globPattern: "**/*.marl" }],
      });
    if (client.configurationRegistration)
      void connection.client.register(DidChangeConfigurationNotification.type, { section: "marl" });
    if (client.folders)
      connection.workspace.onDidChangeWorkspaceFolders(({ added, removed }) => {
        const gone = new Set(removed.map(({ uri }) => pathOf(uri)));
        folders = [
          ...folders.filter((path) => !gone.has(path)),
          ...added.flatMap(({ uri }) => pathOf(uri) ?? []),
        ];
        void workspace.setFolders(folders, Promise.resolve());
      });
    const settled = client.configuration ? takeSettings(null) : Promise.resolve();
    void workspace.setFolders(folders, settled);
  });
  connection.onDidChangeConfiguration(({ settings: given }) => {
    void takeSettings((given as { marl?: unknown } | null)?.marl);
  });
  connection.onDidOpenTextDocument(({ textDocument: { uri, version, text } }) => {
    void workspace.open(uri, version, text);
    if (!client.watchesFiles) void workspace.refresh(uri);
  });
  connection.onDidChangeTextDocument(({ textDocument: { uri, version }, contentChanges }) => {
    void workspace.change(uri, version, contentChanges);
  });
  connection.onDidSaveTextDocument(({ textDocument: { uri } }) => {
    if (!client.watchesFiles) void workspace.refresh(uri);
  });
  connection.onDidCloseTextDocument(({ textDocument: { uri } }) => void workspace.close(uri));
  connection.onDidChangeWatchedFiles(({ changes }) => {
    void workspace.touched(changes.flatMap(({ uri }) => pathOf(uri) ?? []));
  });
  const timer = setInterval(() => void lookAgain(), lookAgainAfter);
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

/** Shows how far a walk is, to a client that draws progress, once the walk has taken long enough to be told of. */
function progressFor(connection: Connection, client: Client) {
  const shown = new Map<string, Promise<WorkDoneProgressServerReporter>>();
  return (key: string, progress: Progress | null): void => {
    if (!client.progress) return;
    const reporter = shown.get(key);
    if (progress === null) {
      shown.delete(key);
      void reporter?.then((each) => each.done());
      return;
    }
    const { done, of, system } = progress;
    const share = Math.round((100 * done) / Math.max(of, 1));
    if (reporter) {
      void reporter.then((each) => each.report(share, system));
      return;
    }
    const made = connection.window.createWorkDoneProgress();
    shown.set(key, made);
    void made.then((each) => each.begin("Marl", share, system));
  };
}
