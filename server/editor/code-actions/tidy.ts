/** Tidies the file. */
import { tidyEdits } from "../formatting.ts";
import { type FindActions, inLines } from "./action.ts";

export const tidying: FindActions = ({ farm, selection: { file } }) => {
  const edits = tidyEdits(farm, file);
  if (edits.length === 0) return [];
  const edit = () => inLines(edits);
  return [{ title: "Tidy this file", kind: "source.tidy", problem: null, isPreferred: false, edit }];
};
