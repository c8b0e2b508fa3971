/** Tidies every file of the farm. */
import { window, workspace } from "vscode";
import { marlRequest, type TidyAnswer } from "../server/protocol/requests.ts";
import { documentHere } from "./here.ts";
import type { Server } from "./server.ts";

export async function tidyFarm(server: Server): Promise<void> {
  const here = documentHere(server);
  if (!here) return;
  const answer = await server.ask<TidyAnswer>(marlRequest.tidyEdits, { uri: here.uri });
  if (!answer) return;
  if (answer.files === 0) {
    void window.showInformationMessage("Every file of this farm is tidy.");
    return;
  }
  const edit = await server.client.protocol2CodeConverter.asWorkspaceEdit(answer.edit);
  // As a refactoring: where several files change they are saved, if the editor is set to do so.
  const isDone = await workspace.applyEdit(edit, { isRefactoring: true });
  if (!isDone)
    void window.showWarningMessage("Nothing was tidied: a file has changed meanwhile. Do it again.");
}
