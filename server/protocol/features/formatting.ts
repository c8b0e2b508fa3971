/** Formatting: of a document, of a range of it, and while typing. */
import { tidyEdits, tidyRangeEdits, tidyTypedEdits } from "../../editor/formatting.ts";
import type { TextEdit } from "../../editor/text-edits.ts";
import type { Farm } from "../../farm.ts";
import type { Convert } from "../convert.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

const editsAtOnce = 256;

/** Pauses every so many edits. */
function* converted(convert: Convert, farm: Farm, edits: readonly TextEdit[]) {
  const all: ReturnType<Convert["textEdit"]>[] = [];
  for (const edit of edits) {
    all.push(convert.textEdit(farm, edit));
    if (all.length % editsAtOnce === 0) yield;
  }
  return all;
}

export const formattingFeature: Feature = {
  title: "Formatting",
  about:
    "what `marl tidy` writes, to the byte; only what changes is sent. There is one tidy form: tab size and the like are ignored",
  offers: () => ({ documentFormattingProvider: true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onDocumentFormatting(({ textDocument }, token) =>
      about(session, textDocument.uri, token, async ({ farm, file }) => {
        const edits = await inTurns(tidyEdits(farm, file), token);
        return inTurns(converted(convert, farm, edits), token);
      }),
    );
  },
};

export const rangeFormattingFeature: Feature = {
  title: "Range formatting",
  about: "the same for the lines that stand whole in a range",
  offers: () => ({ documentRangeFormattingProvider: true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onDocumentRangeFormatting(({ textDocument, range }, token) =>
      about(session, textDocument.uri, token, async (look) => {
        const { farm, file } = look;
        const [from, to] = [convert.cursor(look, range.start), convert.cursor(look, range.end)];
        const edits = await inTurns(tidyRangeEdits(farm, file, from, to), token);
        return inTurns(converted(convert, farm, edits), token);
      }),
    );
  },
};

export const typingFormattingFeature: Feature = {
  title: "Formatting while typing",
  about:
    "at a line's end the line just left becomes tidy, and an empty new one gets the indent of its section",
  offers: () => ({ documentOnTypeFormattingProvider: { firstTriggerCharacter: "\n" } }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onDocumentOnTypeFormatting(({ textDocument, position, ch }, token) =>
      about(session, textDocument.uri, token, ({ farm, file }) =>
        ch === "\n"
          ? tidyTypedEdits(farm, file, position.line).map((edit) => convert.textEdit(farm, edit))
          : [],
      ),
    );
  },
};
