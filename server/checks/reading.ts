/** Readings that sea water can't have, rarely has, or that a technician set aside. */
import { parameterOf } from "../../grammar/parameters.ts";
import type { Files } from "../culture/names.ts";
import { bandFigure } from "./figures.ts";
import { lineAt, replacing } from "./fixing.ts";
import { disregarding } from "./mending.ts";
import type { LineFix } from "./problem.ts";
import type { Of, Rules } from "./rule.ts";
import { inQuotes } from "./words.ts";

const vat = "system vat\n  tank main 500 L\n\nlog vat\n";

type OffRange = Of<"reading/impossible" | "reading/unusual">;

const isDissolved = ({ parameter }: OffRange): boolean => {
  const measure = parameterOf(parameter)?.measure;
  return measure === "alkalinity" || measure === "dissolved";
};

/** The value in the digits and the unit of the file. */
const asWritten = ({ written, writtenUnit }: OffRange): string => `${written} ${writtenUnit}`.trim();

const range = ({ parameter, range: [low, high], unit }: OffRange): string =>
  // Nitrate and phosphate have no upper end.
  high === Number.MAX_VALUE ? "0 and above" : bandFigure(parameter, low, high, unit);

/** The point may have been forgotten: offered, never done unasked. */
function pointSet({ place, written, tenth }: OffRange, files: Files): readonly LineFix[] {
  const { span } = place;
  const text = lineAt(files, place)?.text;
  if (tenth === null || !span || text === undefined) return [];
  // No parameter's name has a digit in it: the first number is the one meant.
  const digits = /\d+(?:\.\d+)?/.exec(text.slice(span.start, span.end));
  if (digits?.[0] !== written) return [];
  const start = span.start + digits.index;
  return replacing({ ...place, span: { start, end: start + written.length } }, tenth, false);
}

const setRightOrAside = (finding: OffRange, files: Files): readonly LineFix[] => [
  ...pointSet(finding, files),
  ...disregarding(finding.place, files),
];

export const readingRules: Rules<"reading/impossible" | "reading/unusual" | "reading/disregarded"> = {
  "reading/impossible": {
    severity: "error",
    title: "A value that sea water can't have",
    says: (finding) =>
      isDissolved(finding)
        ? `Sea water can't have ${asWritten(finding)} of ${finding.parameter}.`
        : `Sea water can't have a ${finding.parameter} of ${asWritten(finding)}.`,
    why: "It stays in the report and is left out of every estimate.",
    todo: "Check the number and its unit.",
    todoHere: (finding) =>
      finding.tenth
        ? `Is this ${finding.tenth}?`
        : `Check the number and its unit; possible is ${range(finding)}.`,
    fixes: setRightOrAside,
    background:
      "Possible, as common practice without a source: alkalinity 0 to 20 meq/L, calcium 0 to 1000 mg/L, magnesium 0 to 3000, potassium 0 to 1500, strontium 0 to 100, salinity 0 to 60, temperature −2 to 45 °C, pH 4 to 11.",
    example: {
      fires: `${vat}  2026-11-30 08:00 read calcium 4210 mg/L\n`,
      silent: `${vat}  2026-11-30 08:00 read calcium 421 mg/L\n`,
    },
  },
  "reading/unusual": {
    severity: "warning",
    title: "A value that is rare in coral culture",
    says: (finding) =>
      `${asWritten(finding)} is unusual for ${finding.parameter}; usual is ${range(finding)}.`,
    why: "It counts as it stands, and a slip in it would set the doses wrong.",
    todo: "Test again; if the reading was wrong, end its line with disregard and the reason.",
    todoHere: ({ tenth }) =>
      tenth
        ? `Is this ${tenth}?`
        : "Test again; if the reading was wrong, end its line with disregard and the reason.",
    fixes: setRightOrAside,
    background: "What is usual is common practice without a source.",
    example: {
      fires: `${vat}  2026-11-30 08:00 read salinity 22\n`,
      silent: `${vat}  2026-11-30 08:00 read salinity 34.8\n`,
    },
  },
  "reading/disregarded": {
    severity: "info",
    title: "A reading that is set aside",
    says: ({ reason }) =>
      reason.trim() === ""
        ? "The readings of this line are disregarded, without a reason."
        : `The readings of this line are disregarded: ${inQuotes(reason)}.`,
    why: "They stay in the report and count in no estimate.",
    todo: "Nothing needs to be done; remove the word disregard if they were right after all.",
    example: {
      fires: `${vat}  2026-11-30 08:00 read calcium 398 mg/L disregard "reagent out of date"\n`,
      silent: `${vat}  2026-11-30 08:00 read calcium 398 mg/L\n`,
    },
  },
};
