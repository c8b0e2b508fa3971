/** The extension of VS Code: starts the language server, and adds what the protocol has no place for. */
import type { ExtensionContext } from "vscode";
import { offerCommands } from "./commands.ts";
import { showDoseSheets } from "./dose-sheet.ts";
import { offerExplanations } from "./explain-problem.ts";
import { type Server, startServer } from "./server.ts";
import { showServerStatus } from "./server-status.ts";
import { showSystemState } from "./system-status.ts";

let server: Server | undefined;

/** Returns once all is registered; the server starts meanwhile, and what needs it waits. */
export function activate(context: ExtensionContext): void {
  server = startServer(context);
  const sheets = showDoseSheets(server);
  context.subscriptions.push(
    sheets,
    showServerStatus(server),
    showSystemState(server),
    offerExplanations(),
    offerCommands(context, server, sheets),
  );
}

export function deactivate(): Promise<void> | undefined {
  return server?.stop();
}
