/** Puts an edit of the server's into the documents as one step that can be undone, and shows it. */
import { Range, window, workspace } from "vscode";
import type { WorkspaceEdit } from "vscode-languageclient/node";
import { parsed, type Server } from "./server.ts";

export async function writeEdit(
  { client }: Server,
  answer: { readonly uri: string; readonly edit: WorkspaceEdit },
): Promise<boolean> {
  const edit = await client.protocol2CodeConverter.asWorkspaceEdit(answer.edit);
  const uri = parsed(answer.uri);
  const changed = edit.get(uri);
  const isDone = await workspace.applyEdit(edit);
  if (!isDone) {
    void window.showWarningMessage("Nothing was written: the text has changed meanwhile. Do it again.");
    return false;
  }
  const first = changed[0];
  if (!first) return true;
  const document = await workspace.openTextDocument(uri);
  // A new line begins behind the end of the one before it.
  const line = first.range.start.line + (first.newText.match(/\n/g)?.length ?? 0);
  const { lineNumber, firstNonWhitespaceCharacterIndex: column } = document.lineAt(
    Math.min(line, document.lineCount - 1),
  );
  const selection = new Range(lineNumber, column, lineNumber, column);
  await window.showTextDocument(document, { selection });
  return true;
}
