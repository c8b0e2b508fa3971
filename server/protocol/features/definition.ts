/** Go to definition. */
import type { DefinitionLink, Location } from "vscode-languageserver/node";
import { definition } from "../../editor/definition.ts";
import { about, type Feature } from "../session.ts";

export const definitionFeature: Feature = {
  title: "Go to definition",
  about:
    "where a name is declared: every recipe of a solution, every line of a tank or pump; from a `use` line to its file",
  offers: () => ({ definitionProvider: true }),
  listen: (session) => {
    const { connection, client, convert } = session;
    connection.onDefinition(({ textDocument, position }, token) =>
      about(session, textDocument.uri, token, (look): DefinitionLink[] | Location[] | null => {
        const answer = definition(look.farm, convert.cursor(look, position));
        if (!answer) return null;
        if (!client.linkTargets) return answer.found.map(({ name }) => convert.location(look, name));
        return answer.found.map(({ name, whole }) => ({
          originSelectionRange: convert.range(look.farm, answer.origin),
          targetUri: look.uriOf(name.file),
          targetRange: convert.lineRange(look.farm, whole),
          targetSelectionRange: convert.range(look.farm, name),
        }));
      }),
    );
  },
};
