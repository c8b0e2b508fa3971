/** Inlay hints: for the lines asked, each kind by its setting. */
import type { InlayHint } from "vscode-languageserver/node";
import { type Hint, type HintKind, hintTable, inlayHints } from "../../editor/inlay-hints.ts";
import { about, type Feature, type Session } from "../session.ts";
import type { LookAt } from "../workspace.ts";

interface Carried {
  readonly uri: string;
  readonly line: number;
  readonly kind: HintKind;
}

export const inlayHintsFeature: Feature = {
  title: "Inlay hints",
  about: "a tank's volume, what a cohort takes in a day, a recipe's strength, a reading at the salinity aim",
  offers: (client) => ({ inlayHintProvider: { resolveProvider: client.hintResolves } }),
  listen: (session) => {
    const { connection, client } = session;
    connection.languages.inlayHint.on(({ textDocument, range: { start, end } }, token) =>
      about(session, textDocument.uri, token, (look) => {
        // A range that ends at a line's beginning holds nothing of it.
        const last = end.character === 0 && end.line > start.line ? end.line - 1 : end.line;
        const found = inlayHints(look.farm, look.file, start.line, last, chosen(session));
        return found.map((hint) => hintFor(session, look, textDocument.uri, hint));
      }),
    );
    if (!client.hintResolves) return;
    connection.languages.inlayHint.resolve(async (hint, token) => {
      const { uri, line, kind } = (hint.data ?? {}) as Partial<Carried>;
      if (uri === undefined || line === undefined || kind === undefined) return hint;
      const told = await about(session, uri, token, ({ farm, file }) => {
        const [found] = inlayHints(farm, file, line, line, new Set([kind]));
        return found ? { tooltip: found.tooltip } : {};
      });
      return { ...hint, ...told };
    });
  },
};

function chosen({ settings }: Session): ReadonlySet<HintKind> {
  const kinds = Object.keys(hintTable) as HintKind[];
  return new Set(kinds.filter((kind) => settings()[`hints.${kind}`]));
}

function hintFor({ client, convert }: Session, look: LookAt, uri: string, hint: Hint): InlayHint {
  const { line, column, text, tooltip, kind } = hint;
  return {
    position: convert.position(look.farm, look.file, line, column),
    label: text,
    paddingLeft: true,
    ...(client.hintResolves ? { data: { uri, line, kind } satisfies Carried } : { tooltip }),
  };
}
