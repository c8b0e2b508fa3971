/** For an extension: every file of a farm in its tidy form. */
import { tidyEdits } from "../../editor/formatting.ts";
import type { TextEdit } from "../../editor/text-edits.ts";
import { marlRequest, type TidyAnswer } from "../requests.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";
import type { LookAt } from "../workspace.ts";

export const tidyFarmFeature: Feature = {
  title: "Tidying a farm",
  about:
    "for an extension, `marl/tidyEdits`: the edits that tidy every file of the farm. An editor without has formatting, and `marl tidy`",
  offers: () => ({}),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onRequest(marlRequest.tidyEdits, ({ uri }: { readonly uri: string }, token) =>
      about(session, uri, token, async (look): Promise<TidyAnswer> => {
        const edits = await inTurns(editsOfAll(look), token);
        return {
          edit: convert.workspaceEdit(look, edits),
          files: new Set(edits.map(({ file }) => file)).size,
        };
      }),
    );
  },
};

function* editsOfAll({ farm }: LookAt) {
  const edits: TextEdit[] = [];
  for (const file of farm.texts.keys()) {
    for (const edit of yield* tidyEdits(farm, file)) edits.push(edit);
    yield;
  }
  return edits;
}
