/** Selection ranges. */
import type { SelectionRange } from "vscode-languageserver/node";
import { selections } from "../../editor/selection.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

export const selectionFeature: Feature = {
  title: "Selection ranges",
  about: "a selection grows from the word to its quantity, statement, line, month, section, file",
  offers: () => ({ selectionRangeProvider: true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onSelectionRanges(({ textDocument, positions }, token) =>
      about(session, textDocument.uri, token, async (look) => {
        const cursors = positions.map((position) => convert.cursor(look, position));
        const all = await inTurns(selections(look.farm, cursors), token);
        // None of them is in the file.
        if (all.every((grown) => grown.length === 0)) return null;
        return positions.map((position, index): SelectionRange => {
          const ranges = all[index]!.map((span) => convert.lineRange(look.farm, span));
          const grown = ranges.reduceRight<SelectionRange | undefined>(
            (parent, range) => (parent ? { range, parent } : { range }),
            undefined,
          );
          return grown ?? { range: { start: position, end: position } };
        });
      }),
    );
  },
};
