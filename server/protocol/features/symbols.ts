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
import type { Convert } from "../convert.ts";
import { turn } from "../farm-walk.ts";
import { about, type Feature, unlessCancelled } from "../session.ts";
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

function* trees(
  convert: Convert,
  farm: Farm,
  symbols: readonly FileSymbol[],
): Generator<void, DocumentSymbol[]> {
  const converted: DocumentSymbol[] = [];
  for (const [index, { name, detail, sort, whole, head, children }] of symbols.entries()) {
    if (index % symbolsAtOnce === 0) yield;
    converted.push({
      name,
      ...(detail === null ? {} : { detail }),
      kind: kindOf[sort],
      range: convert.lineRange(farm, whole),
      selectionRange: convert.range(farm, head),
      children: yield* trees(convert, farm, children),
    });
  }
  return converted;
}

function flat(convert: Convert, look: Look, symbol: NamedSymbol, whole: boolean): SymbolInformation {
  const { name, sort, within, head } = symbol;
  const range = whole ? convert.lineRange(look.farm, symbol.whole) : convert.range(look.farm, head);
  return {
    ...{ name, kind: kindOf[sort], location: { uri: look.uriOf(head.file), range } },
    ...(within === null ? {} : { containerName: within }),
  };
}

export const symbolsFeature: Feature = {
  title: "Document symbols",
  about: "the outline of a file: systems with what they hold, recipes, logs by month",
  offers: () => ({ documentSymbolProvider: true }),
  listen: (session) => {
    const { connection, client, convert } = session;
    connection.onDocumentSymbol(({ textDocument }, token) =>
      about(
        session,
        textDocument.uri,
        token,
        async (look): Promise<DocumentSymbol[] | SymbolInformation[]> => {
          const { farm, file } = look;
          if (!client.symbolTree) {
            const named = await inTurns(namedSymbols(farm, file), token);
            return named.map((symbol) => flat(convert, look, symbol, true));
          }
          const symbols = await inTurns(fileSymbols(farm, file), token);
          return inTurns(trees(convert, farm, symbols), token);
        },
      ),
    );
  },
};

export const workspaceSymbolsFeature: Feature = {
  title: "Workspace symbols",
  about: "sections and named things of all farms, found by a few of their letters",
  offers: () => ({ workspaceSymbolProvider: true }),
  listen: ({ connection, convert, workspace }) => {
    connection.onWorkspaceSymbol(async ({ query }, token): Promise<SymbolInformation[]> => {
      await turn();
      const looks = await unlessCancelled(token, workspace.looks());
      const found = await inTurns(workspaceSymbols(looks, query), token);
      return found.map(({ symbol, where }) => flat(convert, where, symbol, false));
    });
  },
};
