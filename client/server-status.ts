/** The language's own status: whether the server runs, and how to start it again. */
import { Disposable, LanguageStatusSeverity, languages } from "vscode";
import { type CommandName, category } from "./command-table.ts";
import { type Server, State } from "./server.ts";

const command: CommandName = "marl.restartServer";

export function showServerStatus({ client }: Server): Disposable {
  const item = languages.createLanguageStatusItem("marl.server", { language: "marl" });
  item.name = category;
  item.command = { title: "Restart", command, tooltip: "Start Marl's server again" };
  const show = (state: State): void => {
    item.busy = state === State.Starting;
    const isStopped = state === State.Stopped;
    item.severity = isStopped ? LanguageStatusSeverity.Error : LanguageStatusSeverity.Information;
    item.text = isStopped
      ? "Marl has stopped"
      : state === State.Starting
        ? "Marl is starting"
        : "Marl is running";
    const version = client.initializeResult?.serverInfo?.version;
    if (version !== undefined) item.detail = version;
  };
  show(client.state);
  return Disposable.from(
    item,
    client.onDidChangeState(({ newState }) => show(newState)),
  );
}
