/** Writes the pumps' part of today's plan into the log. */
import { lineIn } from "../cursor.ts";
import { planEdits } from "../plan-edits.ts";
import { systemOfLine } from "../things.ts";
import { type FindActions, inLines } from "./action.ts";

/** Offered on the header of a system or of its log. */
export const planning: FindActions = ({ farm, selection: { file, from } }) => {
  const line = lineIn(farm, file, from.line);
  const system = line && line.section?.headerLine === from.line ? systemOfLine(farm, line) : null;
  if (!system) return [];
  return planEdits(farm, system).map(({ title, edits }) => ({
    title: `Write today's plan into the log: ${title.charAt(0).toLowerCase()}${title.slice(1)}`,
    kind: "source.writePlan",
    problem: null,
    isPreferred: false,
    edit: () => inLines(edits),
  }));
};
