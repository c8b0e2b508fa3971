/** `# quiet:` comments that quieten nothing. What quietens is in `quieten.ts`. */
import { replacing } from "./fixing.ts";
import type { LineFix } from "./problem.ts";
import type { Of, QuietFinding, Rules } from "./rule.ts";
import { inQuotes, oneOf } from "./words.ts";

type Unused = Of<"quiet/unused">;

const saying: Readonly<
  Record<QuietFinding["why"], { says: (finding: Unused) => string; todo: (finding: Unused) => string }>
> = {
  "nothing-here": {
    says: ({ word, wholeFile }) =>
      `${wholeFile ? "In this file" : "On this line"} there is no ${word} to quieten.`,
    todo: () => "Remove it, or leave it if the problem will come back.",
  },
  error: {
    says: ({ word }) => `${word} is an error, and errors can't be quietened.`,
    todo: () => "Mend what it tells of, and remove this.",
  },
  unknown: {
    says: ({ word }) => `${inQuotes(word)} is no code of a problem.`,
    todo: ({ nearest }) =>
      nearest.length > 0
        ? `Is ${oneOf(nearest)} meant?`
        : "Write the code as the problem shows it, such as water/stale; a reason goes behind another #.",
  },
  "no-code": {
    says: () => "This names no problem to quieten.",
    todo: () => "Write the code of the problem behind the colon, such as water/stale.",
  },
  "no-line": {
    says: ({ word }) => `${word} can't be quietened on a line of its own: nothing else stands here.`,
    todo: ({ word }) => `Put it at the end of the line that it is for, or write quiet file: ${word}.`,
  },
};

/** Takes the code out, or puts a known one in its place. Neither unasked: the problem may come back. */
function unusedFixes({ place, word, nearest, without }: Unused): readonly LineFix[] {
  const meant = nearest.flatMap((code) => replacing(place, code, false));
  const { file, line } = place;
  const title = word === "" ? "Remove the comment" : `Remove ${word}`;
  return [...meant, { title, safe: false, edits: [{ file, line, ...without, text: "" }] }];
}

export const quietRules: Rules<"quiet/unused"> = {
  "quiet/unused": {
    severity: "hint",
    title: "A quiet comment that quietens nothing",
    says: (finding) => saying[finding.why].says(finding),
    why: "It may be left over, and would hide the problem if that came again.",
    whyHere: ({ why }) =>
      why === "nothing-here" ? "It would hide the problem if that came again." : "So it changes nothing.",
    todo: "Remove it, or correct the code.",
    todoHere: (finding) => saying[finding.why].todo(finding),
    fixes: unusedFixes,
    background:
      "`# quiet: CODE, CODE` at a line's end keeps warnings, notes and hints of these codes on that line to itself; `# quiet file: CODE` anywhere does so for the whole file. Errors are always told. A reason may stand behind another `#`: `# quiet: water/stale # new kit is on its way`.",
    example: {
      fires: "system vat\n  tank main 500 L # quiet: system/volume-differs\n",
      silent:
        "system vat\n  tank main 500 L\n  measured volume 410 L # quiet: system/volume-differs # racks not entered yet\n",
    },
  },
};
