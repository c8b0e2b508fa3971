/** Formatting: of a document, of a range of it, and while typing. */
import { tidyEdits, tidyRangeEdits, tidyTypedEdits } from "../../editor/formatting.ts";
import { about, type Feature } from "../session.ts";

export const formattingFeature: Feature = {
  title: "Formatting",
  about:
    "what `marl tidy` writes, to the byte; only what changes is sent. There is one tidy form: tab size and the like are ignored",
  offers: () => ({ documentFormattingProvider: true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onDocumentFormatting(({ textDocument }, token) =>
      about(session, textDocument.uri, token, ({ farm, file }) =>
        tidyEdits(farm, file).map((edit) => convert.textEdit(farm, edit)),
      ),
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
      about(session, textDocument.uri, token, (look) => {
        const { farm, file } = look;
        const [from, to] = [convert.cursor(look, range.start), convert.cursor(look, range.end)];
        return tidyRangeEdits(farm, file, from, to).map((edit) => convert.textEdit(farm, edit));
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
