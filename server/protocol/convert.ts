/** Places and edits as the protocol has them; the one place that turns columns into what the client counts. */
import {
  CreateFile,
  DiagnosticSeverity,
  type Location,
  type Position,
  type Range,
  TextDocumentEdit,
  type TextEdit,
  type WorkspaceEdit,
} from "vscode-languageserver/node";
import type { LineEdit, Severity } from "../checks/problem.ts";
import type { Cursor, LineSpan, LinesSpan } from "../editor/cursor.ts";
import type { TextEdit as EditOverLines } from "../editor/text-edits.ts";
import type { Farm } from "../farm.ts";
import type { Client } from "./client.ts";
import { characterOf, columnOf } from "./positions.ts";
import type { Look, LookAt } from "./workspace.ts";

export type Convert = ReturnType<typeof convertFor>;

const byteOrderMark = "\ufeff";

/** A line as the client has it: the first may begin with a byte order mark that Marl doesn't count. */
function clientLine(
  farm: Farm,
  file: string,
  line: number,
): { readonly mark: string; readonly text: string } {
  const document = farm.documents.get(file);
  const isLast = document !== undefined && line === document.lines.length - 1;
  // A carriage return that ends the text ends no line.
  const rest = isLast && farm.texts.get(file)?.endsWith("\r") ? "\r" : "";
  const text = (document?.lines[line]?.text ?? "") + rest;
  return { mark: line === 0 && document?.hasByteOrderMark ? byteOrderMark : "", text };
}

export function convertFor(client: Pick<Client, "encoding" | "versionedEdits">) {
  const { encoding } = client;

  function position(farm: Farm, file: string, line: number, column: number): Position {
    const { mark, text } = clientLine(farm, file, line);
    const character = characterOf(mark + text, column + mark.length, encoding);
    return { line, character };
  }

  const range = (farm: Farm, { file, line, start, end }: LineSpan): Range => ({
    start: position(farm, file, line, start),
    end: position(farm, file, line, end),
  });

  const lineRange = (farm: Farm, { file, first, start, last, end }: LinesSpan): Range => ({
    start: position(farm, file, first, start),
    end: position(farm, file, last, end),
  });

  /** A whole line with its ending; of the last one, with the ending before it. */
  function wholeLine(farm: Farm, file: string, line: number): Range {
    const lines = farm.documents.get(file)?.lines ?? [];
    if (line + 1 < lines.length)
      return { start: { line, character: 0 }, end: { line: line + 1, character: 0 } };
    const before =
      line > 0 ? position(farm, file, line - 1, lines[line - 1]!.text.length) : { line, character: 0 };
    return { start: before, end: position(farm, file, line, lines[line]?.text.length ?? 0) };
  }

  /** Columns in the text as it is; the new text has its line endings already. */
  const editOverLines = (farm: Farm, { file, from, to, text }: EditOverLines): TextEdit => ({
    range: {
      start: position(farm, file, from.line, from.column),
      end: position(farm, file, to.line, to.column),
    },
    newText: text,
  });

  function textEdit(farm: Farm, edit: LineEdit | EditOverLines): TextEdit {
    if ("from" in edit) return editOverLines(farm, edit);
    const { file, line, text } = edit;
    if (text === null) return { range: wholeLine(farm, file, line), newText: "" };
    const ending = farm.documents.get(file)?.lineEnding ?? "\n";
    return { range: range(farm, edit), newText: text.replaceAll("\n", ending) };
  }

  /** Edits in files that are there and, for a client that can make files, files that are new. */
  function workspaceEdit(
    look: Look,
    edits: readonly (LineEdit | EditOverLines)[],
    created: readonly { readonly file: string; readonly text: string }[] = [],
  ): WorkspaceEdit {
    const byFile = new Map<string, TextEdit[]>();
    for (const edit of edits) {
      const list = byFile.get(edit.file) ?? [];
      byFile.set(edit.file, list);
      list.push(textEdit(look.farm, edit));
    }
    if (!client.versionedEdits)
      return { changes: Object.fromEntries([...byFile].map(([file, list]) => [look.uriOf(file), list])) };
    const start = { line: 0, character: 0 };
    return {
      documentChanges: [
        ...created.flatMap(({ file, text }) => {
          const uri = look.uriOf(file);
          const edit = { range: { start, end: start }, newText: text };
          return [CreateFile.create(uri), TextDocumentEdit.create({ uri, version: null }, [edit])];
        }),
        ...[...byFile].map(([file, list]) =>
          TextDocumentEdit.create({ uri: look.uriOf(file), version: look.versionOf(file) }, list),
        ),
      ],
    };
  }

  return {
    position,
    range,
    lineRange,
    textEdit,
    workspaceEdit,
    cursor({ farm, file }: LookAt, { line, character }: Position): Cursor {
      const { mark, text } = clientLine(farm, file, line);
      const column = columnOf(mark + text, character, encoding) - mark.length;
      return { file, line, column: Math.max(0, column) };
    },
    location: (look: Look, span: LineSpan): Location => ({
      uri: look.uriOf(span.file),
      range: range(look.farm, span),
    }),
    /** From one line's place to another's. */
    lines: (farm: Farm, file: string, first: number, last: number): Range => ({
      start: { line: first, character: 0 },
      end: position(farm, file, last, clientLine(farm, file, last).text.length),
    }),
  };
}

export const severityFor: Readonly<Record<Severity, DiagnosticSeverity>> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  info: DiagnosticSeverity.Information,
  hint: DiagnosticSeverity.Hint,
};
