/** Problems go out by one channel: sent after each walk, or asked for by the client and refreshed when it must ask again. */
import type {
  DocumentDiagnosticReport,
  PublishDiagnosticsParams,
  WorkspaceDocumentDiagnosticReport,
} from "vscode-languageserver/node";
import { diagnosticsOf, problemsByFile } from "./problems.ts";
import { about, type Feature, type Session, stopIfCancelled, unlessCancelled } from "./session.ts";
import type { Look } from "./workspace.ts";

/** What was last told of a file, to know whether it changed. */
interface Told {
  readonly text: string;
  readonly id: number;
}

export interface Publisher {
  /** After a walk: the changed files, and those whose problems changed. */
  readonly walked: (look: Look, changed: ReadonlySet<string>) => void;
}

export function publisherFor(session: Session): Publisher {
  const told = new Map<string, Told>();
  let waiting: (() => void)[] = [];
  let lastId = 0;

  function report(look: Look, file: string, problems: Parameters<typeof diagnosticsOf>[3]) {
    const items = diagnosticsOf(session, look, file, problems);
    const uri = look.uriOf(file);
    const text = JSON.stringify(items);
    const before = told.get(uri);
    const isNew = before === undefined ? text !== "[]" : before.text !== text;
    if (before === undefined || before.text !== text) {
      lastId += 1;
      told.set(uri, { text, id: lastId });
    }
    return { uri, items, id: String(told.get(uri)!.id), isNew };
  }

  function push(look: Look, changed: ReadonlySet<string>): void {
    const known = problemsByFile(look.farm);
    const gone = [...changed].filter((file) => !known.has(file));
    for (const [file, problems] of [...known, ...gone.map((file) => [file, []] as const)]) {
      const { uri, items, isNew } = report(look, file, problems);
      const version = look.versionOf(file);
      if (!isNew && !(changed.has(file) && version !== null)) continue;
      const params: PublishDiagnosticsParams = { uri, diagnostics: items };
      session.send(session.connection.sendDiagnostics(version === null ? params : { ...params, version }));
    }
  }

  /** A client that pulls asks again for the file that it edits; of others it must be told. */
  function refresh(look: Look, changed: ReadonlySet<string>): void {
    const known = problemsByFile(look.farm);
    const isNew = (file: string) => report(look, file, known.get(file) ?? []).isNew;
    const files = [...new Set([...known.keys(), ...changed])].filter(isNew);
    if (files.length === 0) return;
    for (const wake of waiting) wake();
    waiting = [];
    const others = files.filter((file) => !(changed.has(file) && look.isOpen(file)));
    if (others.length > 0 && session.client.refreshes.problems)
      session.send(session.connection.languages.diagnostics.refresh());
  }

  if (session.client.pullsProblems) listenToPulls();

  function listenToPulls(): void {
    const { connection, workspace } = session;
    connection.languages.diagnostics.on(async ({ textDocument, previousResultId }, token) => {
      const empty: DocumentDiagnosticReport = { kind: "full", items: [] };
      const answer = await about(session, textDocument.uri, token, (look): DocumentDiagnosticReport => {
        const problems = problemsByFile(look.farm).get(look.file) ?? [];
        const { items, id } = report(look, look.file, problems);
        return id === previousResultId
          ? { kind: "unchanged", resultId: id }
          : { kind: "full", resultId: id, items };
      });
      return answer ?? empty;
    });
    connection.languages.diagnostics.onWorkspace(async ({ previousResultIds }, token) => {
      const known = new Map(previousResultIds.map(({ uri, value }) => [uri, value]));
      for (;;) {
        const looks = await unlessCancelled(token, workspace.looks());
        const items: WorkspaceDocumentDiagnosticReport[] = looks.flatMap((look) =>
          [...problemsByFile(look.farm)].map(([file, problems]): WorkspaceDocumentDiagnosticReport => {
            const { uri, items: list, id } = report(look, file, problems);
            const version = look.versionOf(file);
            return known.get(uri) === id
              ? { kind: "unchanged", uri, version, resultId: id }
              : { kind: "full", uri, version, resultId: id, items: list };
          }),
        );
        const listed = new Set(items.map(({ uri }) => uri));
        for (const uri of known.keys())
          if (!listed.has(uri)) items.push({ kind: "full", uri, version: null, items: [] });
        if (known.size === 0 || items.some(({ kind }) => kind === "full")) return { items };
        // Nothing is new: the answer waits until something is, or the client takes its question back.
        await new Promise<void>((wake) => {
          waiting.push(wake);
          token.onCancellationRequested(() => wake());
        });
        stopIfCancelled(token);
      }
    });
  }

  return { walked: session.client.pullsProblems ? refresh : push };
}

export const problemsFeature: Feature = {
  title: "Problems",
  about:
    "everything that `marl check` tells, while you type; asked for by the client or sent, by the client's word",
  offers: (client) =>
    client.pullsProblems
      ? {
          diagnosticProvider: {
            identifier: "marl",
            interFileDependencies: true,
            workspaceDiagnostics: true,
          },
        }
      : {},
  listen: () => undefined,
};
