/** Folding ranges. */
import { type FoldingRange, FoldingRangeKind } from "vscode-languageserver/node";
import { type Fold, folds } from "../../editor/folding.ts";
import type { Client } from "../client.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

const kindOf: Readonly<Record<Fold["sort"], string | null>> = {
  section: null,
  month: null,
  comment: FoldingRangeKind.Comment,
  use: FoldingRangeKind.Imports,
};

/** Where a client takes only so many, sections go before all others. */
function asManyAsTaken(found: readonly Fold[], { mostFolds }: Client): readonly Fold[] {
  if (mostFolds === null || found.length <= mostFolds) return found;
  const sections = found.filter(({ sort }) => sort === "section");
  const others = found.filter(({ sort }) => sort !== "section");
  const taken = new Set([...sections, ...others].slice(0, mostFolds));
  return found.filter((fold) => taken.has(fold));
}

export const foldingFeature: Feature = {
  title: "Folding",
  about: "sections, months of a log, blocks of comments, runs of `use` lines",
  offers: () => ({ foldingRangeProvider: true }),
  listen: (session) => {
    const { connection, client, convert } = session;
    connection.onFoldingRanges(({ textDocument }, token) =>
      about(session, textDocument.uri, token, async ({ farm, file }) => {
        const endOf = (line: number): number => convert.lines(farm, file, line, line).end.character;
        const found = await inTurns(folds(farm, file), token);
        return asManyAsTaken(found, client).map(({ first, last, sort }): FoldingRange => {
          const kind = kindOf[sort];
          return {
            ...{ startLine: first, endLine: last },
            ...(client.foldsWholeLines ? {} : { startCharacter: endOf(first), endCharacter: endOf(last) }),
            ...(kind === null ? {} : { kind }),
          };
        });
      }),
    );
  },
};
