/** For an extension: what is usually read, and the line that records it. */
import { askedItems, notesOn, readingEdit, usuallyTogether } from "../../editor/record-reading.ts";
import { momentText, usualReadings } from "../../editor/usual-reading.ts";
import {
  marlRequest,
  type OfSystem,
  type ReadingAnswer,
  type ReadingParams,
  type Refusal,
  type UsualReadingAnswer,
} from "../requests.ts";
import { about, type Feature } from "../session.ts";
import { inTurns } from "../turns.ts";

type Reply = ReadingAnswer | Refusal | null;

export const recordReadingFeature: Feature = {
  title: "Recording a reading",
  about:
    "for an extension, `marl/usualReading` and `marl/readingEdit`: what is usually read, and the tidy line that records it where its time belongs. An editor without has completion and the action of a `read` line dated now",
  offers: () => ({}),
  listen: (session) => {
    const { connection, convert, now } = session;
    connection.onRequest(marlRequest.usualReading, ({ uri, system: ref }: OfSystem, token) =>
      about(session, uri, token, ({ farm, file }): UsualReadingAnswer | null => {
        const system = farm.bound.model.systems.get(ref);
        if (!system) return null;
        const at = now();
        const seen = farm.bound.names.visible.get(system.logFiles[0] ?? file) ?? new Map();
        return {
          now: momentText(at),
          usual: usuallyTogether(farm, system, at),
          items: askedItems(farm, system, at),
          kits: [...seen.values()].filter(({ kind }) => kind === "kit").map(({ name }) => name),
          people: [...new Set(usualReadings(farm, system, at).flatMap(({ by }) => by))],
        };
      }),
    );
    connection.onRequest<Reply, void>(
      marlRequest.readingEdit,
      ({ uri, system: ref, ...reading }: ReadingParams, token) =>
        about(session, uri, token, async (look): Promise<Reply> => {
          const { farm } = look;
          const system = farm.bound.model.systems.get(ref);
          if (!system) return null;
          const made = readingEdit(farm, system, reading, now());
          if ("refusal" in made) return made;
          const { line, edit } = made;
          return {
            line,
            notes: await inTurns(notesOn(farm, made), token),
            edit: convert.workspaceEdit(look, [edit]),
            uri: look.uriOf(edit.file),
          };
        }),
    );
  },
};
