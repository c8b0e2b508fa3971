/** Document links. */
import type { DocumentLink } from "vscode-languageserver/node";
import { links } from "../../editor/links.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

export const linksFeature: Feature = {
  title: "Document links",
  about: "from a `use` line to its file, from the code in a `# quiet:` comment to the problem's page",
  offers: () => ({ documentLinkProvider: { resolveProvider: false } }),
  listen: (session) => {
    const { connection, convert, pageOf } = session;
    connection.onDocumentLinks(({ textDocument }, token) =>
      about(session, textDocument.uri, token, async (look) => {
        const found = await inTurns(links(look.farm, look.file), token);
        return found.flatMap(({ span, to }): DocumentLink[] => {
          const target = "file" in to ? look.uriOf(to.file) : pageOf(to.code);
          return target === null ? [] : [{ range: convert.range(look.farm, span), target }];
        });
      }),
    );
  },
};
