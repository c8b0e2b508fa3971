/** Document symbols and workspace symbols. */
import { type DocumentSymbol, type SymbolInformation, SymbolKind } from "vscode-languageserver/node";
import {
  type FileSymbol,
  fileSymbols,
  type NamedSymbol,
  namedSymbols,
  type SymbolSort,
} from "../../editor/symbols.ts";
import { workspaceSymbols } from "../../editor/workspace-symbols.ts";
import type { Farm } from "../../farm.ts";
import type { Client } from "../client.ts";
import { turn } from "../farm-walk.ts";
import { about, type Feature, type Session, unlessCancelled } from "../session.ts";
import { inTurns } from "../turns.ts";
import type { Look } from "../workspace.ts";

const symbolsAtOnce = 256;

const kindOf: Readonly<Record<SymbolSort, SymbolKind>> = {
  system: SymbolKind.Module,
  solution: SymbolKind.Class,
  reagent: SymbolKind.Constant,
  saltwater: SymbolKind.Struct,
  kit: SymbolKind.Interface,
  log: SymbolKind.Array,
  store: SymbolKind.Package,
  month: SymbolKind.Namespace,
  event: SymbolKind.Event,
  fact: SymbolKind.Property,
  tank: SymbolKind.Field,
  displacement: SymbolKind.Field,
  cohort: SymbolKind.Variable,
  pump: SymbolKind.Function,
};

/** What an older client is told instead of a kind that it doesn't know. */
const olderKinds: Readonly<Partial<Record<SymbolKind, SymbolKind>>> = {
  [SymbolKind.Struct]: SymbolKind.Class,
  [SymbolKind.Event]: SymbolKind.Field,
};

function kindFor({ symbolKinds }: Client, sort: SymbolSort): SymbolKind {
  const kind = kindOf[sort];
  return symbolKinds.has(kind) ? kind : (olderKinds[kind] ?? SymbolKind.Variable);
}

type Told = Pick<Session, "client" | "convert">;

function* trees(told: Told, farm: Farm, symbols: readonly FileSymbol[]): Generator<void, DocumentSymbol[]> {
  const { client, convert } = told;
  const converted: DocumentSymbol[] = [];
  for (const [index, { name, detail, sort, whole, head, children }] of symbols.entries()) {
    if (index % symbolsAtOnce === 0) yield;
    converted.push({
      name,
      ...(detail === null ? {} : { detail }),
      kind: kindFor(client, sort),
      range: convert.lineRange(farm, whole),
      selectionRange: convert.range(farm, head),
      children: yield* trees(told, farm, children),
    });
  }
  return converted;
}

function flat({ client, convert }: Told, look: Look, symbol: NamedSymbol, whole: boolean): SymbolInformation {
  const { name, sort, within, head } = symbol;
  const range = whole ? convert.lineRange(look.farm, symbol.whole) : convert.range(look.farm, head);
  return {
    ...{ name, kind: kindFor(client, sort), location: { uri: look.uriOf(head.file), range } },
    ...(within === null ? {} : { containerName: within }),
  };
}

export const symbolsFeature: Feature = {
  title: "Document symbols",
  about: "the outline of a file: systems with what they hold, recipes, logs by month",
  offers: () => ({ documentSymbolProvider: true }),
  listen: (session) => {
    const { connection, client } = session;
    connection.onDocumentSymbol(({ textDocument }, token) =>
      about(
        session,
        textDocument.uri,
        token,
        async (look): Promise<DocumentSymbol[] | SymbolInformation[]> => {
          const { farm, file } = look;
          if (!client.symbolTree) {
            const named = await inTurns(namedSymbols(farm, file), token);
            return named.map((symbol) => flat(session, look, symbol, true));
          }
          const symbols = await inTurns(fileSymbols(farm, file), token);
          return inTurns(trees(session, farm, symbols), token);
        },
      ),
    );
  },
};

export const workspaceSymbolsFeature: Feature = {
  title: "Workspace symbols",
  about: "sections and named things of all farms, found by a few of their letters",
  offers: () => ({ workspaceSymbolProvider: true }),
  listen: (session) => {
    const { connection, workspace } = session;
    connection.onWorkspaceSymbol(async ({ query }, token): Promise<SymbolInformation[]> => {
      await turn();
      const looks = await unlessCancelled(token, workspace.looks());
      const found = await inTurns(workspaceSymbols(looks, query), token);
      return found.map(({ symbol, where }) => flat(session, where, symbol, false));
    });
  },
};
