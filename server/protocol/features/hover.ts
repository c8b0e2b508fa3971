/** Hover. */
import { MarkupKind } from "vscode-languageserver/node";
import { hover } from "../../editor/hover.ts";
import { plainText } from "../../editor/markdown.ts";
import { about, type Feature } from "../session.ts";

export const hoverFeature: Feature = {
  title: "Hover",
  about: "what the thing under the cursor is, and what the water says about it",
  offers: () => ({ hoverProvider: true }),
  listen: (session) => {
    const { connection, client, convert } = session;
    connection.onHover(({ textDocument, position }, token) =>
      about(session, textDocument.uri, token, (look) => {
        const found = hover(look.farm, convert.cursor(look, position));
        if (!found) return null;
        const contents = client.markdownHover
          ? { kind: MarkupKind.Markdown, value: found.markdown }
          : { kind: MarkupKind.PlainText, value: plainText(found.markdown) };
        return { contents, range: convert.range(look.farm, found.span) };
      }),
    );
  },
};
