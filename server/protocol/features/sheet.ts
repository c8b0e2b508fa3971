/** For an extension: the dose sheet as text. */
import { sheetOf } from "../../report/sheet.ts";
import { textSheet } from "../../report/text.ts";
import { marlRequest, type OfSystem, type SheetAnswer } from "../requests.ts";
import { about, type Feature } from "../session.ts";

export const sheetFeature: Feature = {
  title: "Dose sheet",
  about:
    "for an extension, `marl/sheet`: the sheet of a system as text. An editor without has the doses in lens and hover, and `marl sheet`",
  offers: () => ({}),
  listen: (session) => {
    session.connection.onRequest(marlRequest.sheet, ({ uri, system }: OfSystem, token) =>
      about(session, uri, token, ({ farm }): SheetAnswer | null => {
        const found = farm.bound.model.systems.get(system);
        return found ? { text: textSheet(sheetOf(farm, { paths: [""], system: found.name }), false) } : null;
      }),
    );
  },
};
