/** Document highlight. */
import { DocumentHighlightKind } from "vscode-languageserver/node";
import { highlights } from "../../editor/highlight.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

export const highlightFeature: Feature = {
  title: "Document highlight",
  about: "the other places of the file that speak of the thing or parameter under the cursor",
  offers: () => ({ documentHighlightProvider: true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onDocumentHighlight(({ textDocument, position }, token) =>
      about(session, textDocument.uri, token, async (look) => {
        const found = await inTurns(highlights(look.farm, convert.cursor(look, position)), token);
        return found.map(({ span, declares }) => ({
          range: convert.range(look.farm, span),
          kind: declares ? DocumentHighlightKind.Write : DocumentHighlightKind.Read,
        }));
      }),
    );
  },
};
