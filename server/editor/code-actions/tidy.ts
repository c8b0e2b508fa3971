/** Tidies the file. */
import { tidyEdits } from "../formatting.ts";
import { type FindInSteps, inLines } from "./action.ts";

export const tidying: FindInSteps = function* ({ farm, selection: { file } }) {
  const edits = yield* tidyEdits(farm, file);
  if (edits.length === 0) return [];
  const edit = () => inLines(edits);
  return [{ title: "Tidy this file", kind: "source.tidy", problem: null, isPreferred: false, edit }];
};
