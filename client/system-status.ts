/** One item in the status bar: the worst state of the system that is open, and as at when. */
import { Disposable, StatusBarAlignment, window } from "vscode";
import { marlRequest, type StateAnswer, type SystemChoice } from "../server/protocol/requests.ts";
import { type CommandName, category } from "./command-table.ts";
import { once } from "./once.ts";
import type { Server } from "./server.ts";
import { barLabel, barText, barTooltip } from "./state-words.ts";

const command: CommandName = "marl.showDoseSheet";

export function showSystemState(server: Server): Disposable {
  const item = window.createStatusBarItem("marl.state", StatusBarAlignment.Right, 100);
  item.name = category;
  /** Only the newest question's answer is shown. */
  let asked = 0;
  async function refresh(): Promise<void> {
    asked += 1;
    const mine = asked;
    const state = await stateHere(server).catch(() => null);
    if (mine !== asked) return;
    if (!state) {
      item.hide();
      return;
    }
    const { uri, answer } = state;
    item.text = barText(answer);
    item.tooltip = barTooltip(answer);
    item.accessibilityInformation = { label: barLabel(answer) };
    item.command = { title: "Show the dose sheet", command, arguments: [uri, answer.name] };
    item.show();
  }
  const again = once(() => void refresh());
  again.soon();
  return Disposable.from(
    item,
    again,
    server.onChange(again.soon),
    window.onDidChangeActiveTextEditor(again.soon),
    window.onDidChangeTextEditorSelection(again.soon),
  );
}

/** Of the system at the cursor, else of the first of the file. */
async function stateHere(server: Server) {
  const editor = window.activeTextEditor;
  if (editor?.document.languageId !== "marl") return null;
  const uri = server.uriOf(editor.document);
  const { line } = editor.selection.active;
  const systems = await server.ask<readonly SystemChoice[]>(marlRequest.systems, { uri, line, name: null });
  const [first] = systems ?? [];
  const answer = first && (await server.ask<StateAnswer>(marlRequest.state, { uri, system: first.ref }));
  return answer ? { uri, answer } : null;
}
