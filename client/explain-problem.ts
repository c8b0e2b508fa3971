/** Opens the page of a problem: the one named, or the one at the cursor. */
import {
  CodeAction,
  CodeActionKind,
  commands,
  type Diagnostic,
  type Disposable,
  type ExtensionContext,
  languages,
  Uri,
  window,
} from "vscode";
import type { CommandName } from "./command-table.ts";
import { pageOf } from "./problem-page.ts";

const command: CommandName = "marl.explainProblem";

const codeOf = ({ code }: Diagnostic): string => String(typeof code === "object" ? code.value : (code ?? ""));

export async function explainProblem(context: ExtensionContext, given: unknown): Promise<void> {
  const code = typeof given === "string" ? given : await codeAtCursor();
  if (code === undefined) return;
  const page = pageOf(code);
  if (page === null) {
    void window.showInformationMessage(`${code} is no code of a problem.`);
    return;
  }
  await commands.executeCommand("markdown.showPreview", Uri.file(context.asAbsolutePath(page)));
}

/** Of several problems one is chosen. */
async function codeAtCursor(): Promise<string | undefined> {
  const editor = window.activeTextEditor;
  const position = editor?.selection.active;
  const own = languages
    .getDiagnostics(editor?.document.uri ?? Uri.parse("untitled:none"))
    .filter(({ source, range }) => source === "marl" && position && range.start.line === position.line);
  const touching = own.filter(({ range }) => position && range.contains(position));
  const found = touching.length > 0 ? touching : own;
  const codes = [...new Set(found.map(codeOf))];
  if (codes.length === 0) {
    void window.showInformationMessage(
      "There is no problem on this line. Put the cursor on an underlined word.",
    );
    return undefined;
  }
  if (codes.length === 1) return codes[0];
  const choices = codes.map((code) => ({
    label: code,
    detail: found.find((each) => codeOf(each) === code)!.message,
  }));
  const chosen = await window.showQuickPick(choices, { title: "Which problem?" });
  return chosen?.label;
}

/** In the list of what can be done about a problem. */
export function offerExplanations(): Disposable {
  return languages.registerCodeActionsProvider(
    { language: "marl" },
    {
      provideCodeActions: (_document, _range, { diagnostics }) =>
        diagnostics
          .filter(({ source }) => source === "marl")
          .map((diagnostic) => {
            const code = codeOf(diagnostic);
            const title = `Explain ${code}`;
            const action = new CodeAction(title, CodeActionKind.QuickFix);
            action.diagnostics = [diagnostic];
            action.command = { title, command, arguments: [code] };
            return action;
          }),
    },
    { providedCodeActionKinds: [CodeActionKind.QuickFix] },
  );
}
