/** For an extension: which systems a place speaks of, and how one of them is. */
import { systemState } from "../../editor/system-state.ts";
import { systemsMeant } from "../../editor/systems-meant.ts";
import {
  marlRequest,
  type OfSystem,
  type StateAnswer,
  type SystemChoice,
  type SystemsParams,
} from "../requests.ts";
import { about, type Feature } from "../session.ts";

export const systemsFeature: Feature = {
  title: "Systems and their state",
  about:
    "for an extension, `marl/systems` and `marl/state`: which systems a place speaks of, and the worst that is told of one, as at when. An editor without has the symbols, problems and lenses",
  offers: () => ({}),
  listen: (session) => {
    const { connection } = session;
    connection.onRequest(marlRequest.systems, ({ uri, line, name }: SystemsParams, token) =>
      about(session, uri, token, ({ farm, file }): readonly SystemChoice[] =>
        systemsMeant(farm, file, line, name).map(({ ref, name: called, title }) => ({
          ref,
          name: called,
          title,
        })),
      ),
    );
    connection.onRequest(marlRequest.state, ({ uri, system }: OfSystem, token) =>
      about(session, uri, token, ({ farm }): StateAnswer | null => {
        const found = farm.bound.model.systems.get(system);
        return found ? systemState(farm, found) : null;
      }),
    );
  },
};
