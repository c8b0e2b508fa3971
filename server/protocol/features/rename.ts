/** Rename, and whether a word can be renamed. */
import { LSPErrorCodes, ResponseError } from "vscode-languageserver/node";
import { renamable, rename } from "../../editor/rename.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

const refuse = (reason: string): never => {
  throw new ResponseError(LSPErrorCodes.RequestFailed, reason);
};

export const renameFeature: Feature = {
  title: "Rename",
  about:
    "another name for a thing, in every file that speaks of it; refused, with the reason, where it would be mixed up with another",
  offers: ({ preparesRename }) => ({ renameProvider: preparesRename ? { prepareProvider: true } : true }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onPrepareRename(({ textDocument, position }, token) =>
      about(session, textDocument.uri, token, (look) => {
        const answer = renamable(look.farm, convert.cursor(look, position));
        if (!answer.ok) return refuse(answer.reason);
        return { range: convert.range(look.farm, answer.span), placeholder: answer.thing.name };
      }),
    );
    connection.onRenameRequest(({ textDocument, position, newName }, token) =>
      about(session, textDocument.uri, token, async (look) => {
        const versions = new Map([...look.farm.documents.keys()].map((file) => [file, look.versionOf(file)]));
        const answer = await inTurns(rename(look.farm, convert.cursor(look, position), newName), token);
        if (!answer.ok) return refuse(answer.reason);
        // What was typed meanwhile has moved the places.
        if (answer.edits.some(({ file }) => versions.get(file) !== look.versionOf(file)))
          throw new ResponseError(LSPErrorCodes.ContentModified, "The text has changed. Rename again.");
        return convert.workspaceEdit(look, answer.edits);
      }),
    );
  },
};
