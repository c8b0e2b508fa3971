/** The language server: a process of its own, started once, started again where it ends by itself. */
import { commands, type Disposable, type ExtensionContext, type TextDocument, Uri, workspace } from "vscode";
import {
  CloseAction,
  ErrorAction,
  type ErrorHandler,
  LanguageClient,
  State,
  TransportKind,
} from "vscode-languageclient/node";
import { stateChanged } from "../server/protocol/requests.ts";
import { commandNames, startedContext } from "./command-table.ts";
import { restarts } from "./restarts.ts";
import { schemesOf } from "./schemes.ts";

export { State };

export interface Server {
  readonly client: LanguageClient;
  /** Asks what the protocol has no request for; null where the server knows no answer. */
  readonly ask: <T>(method: string, params: object) => Promise<T | null>;
  /** A document's name as the server knows it. */
  readonly uriOf: (document: TextDocument) => string;
  /** Called whenever what is shown may be out of date: after an edit, a restart, or with time. */
  readonly onChange: (then: () => void) => Disposable;
  readonly restart: () => Promise<void>;
  readonly stop: () => Promise<void>;
}

export function startServer(context: ExtensionContext): Server {
  const module = context.asAbsolutePath("dist/extension/server.cjs");
  const client = new LanguageClient(
    "marl",
    "Marl",
    { module, transport: TransportKind.ipc },
    {
      documentSelector: schemesOf(workspace.workspaceFolders?.map(({ uri }) => uri.scheme) ?? []).map(
        (scheme) => ({ language: "marl", scheme }),
      ),
      initializationOptions: { commands: commandNames, ...fixedMoment() },
      errorHandler: startingAgain(),
    },
  );
  const listeners = new Set<() => void>();
  context.subscriptions.push(
    client,
    client.onNotification(stateChanged, () => {
      for (const listener of listeners) listener();
    }),
  );
  void commands.executeCommand("setContext", startedContext, true);
  // What went wrong is shown by the client itself and stays in its output.
  client.start().catch(() => undefined);
  return {
    client,
    ask: (method, params) => client.sendRequest(method, params),
    uriOf: (document) => client.code2ProtocolConverter.asUri(document.uri),
    onChange: (then) => {
      listeners.add(then);
      return { dispose: () => void listeners.delete(then) };
    },
    restart: () => client.restart(),
    stop: async () => {
      // One that hasn't started yet, or that has ended, has nothing to stop.
      if (client.isRunning()) await client.stop();
    },
  };
}

/** A server that ends is started again without a word; the client tells it of all open documents anew. */
function startingAgain(): ErrorHandler {
  const mayStart = restarts();
  return {
    error: () => ({ action: ErrorAction.Continue, handled: true }),
    closed: () =>
      mayStart(Date.now())
        ? { action: CloseAction.Restart, handled: true }
        : {
            action: CloseAction.DoNotRestart,
            message:
              "Marl's server has ended five times within three minutes and is left alone. Its output says why; Restart the Server starts it again.",
          },
  };
}

/** Where the moment is fixed from outside, as tests do, everything is seen as at that one. */
function fixedMoment(): { readonly at?: string } {
  const at = process.env.MARL_AT;
  return at ? { at } : {};
}

/** A document's URI as VS Code has it. */
export const parsed = (uri: string): Uri => Uri.parse(uri);
