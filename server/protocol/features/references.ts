/** Find references. */
import { references } from "../../editor/references.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

export const referencesFeature: Feature = {
  title: "Find references",
  about: "every place of the farm that speaks of a thing",
  offers: () => ({ referencesProvider: true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onReferences(({ textDocument, position, context }, token) =>
      about(session, textDocument.uri, token, async (look) => {
        const cursor = convert.cursor(look, position);
        const found = await inTurns(references(look.farm, cursor, context.includeDeclaration), token);
        return found?.map((span) => convert.location(look, span)) ?? null;
      }),
    );
  },
};
