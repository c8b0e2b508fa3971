/** Files that can't be read, and problems that aren't shown. */
import type { Rules } from "./rule.ts";

const place = { file: "farm.marl", line: 0, span: null };

export const fileRules: Rules<"file/unreadable" | "file/more"> = {
  "file/unreadable": {
    severity: "error",
    title: "A file or a line that can't be read",
    says: ({ reason }) => `This can't be read: ${reason}.`,
    why: "Nothing in it counts, so what is worked out for the farm may be wrong.",
    todo: "Mend it or restore an older version, and check that the file may be read.",
    background:
      "A file is read as UTF-8 text. Of a file with a line of more than 20 000 characters only that line is left out.",
    example: null,
    sample: { code: "file/unreadable", place, system: null, reason: "it isn't UTF-8 text" },
  },
  "file/more": {
    severity: "info",
    title: "More problems than are shown",
    says: ({ hidden }) =>
      hidden === 1
        ? "One more problem of this file isn't shown."
        : `${hidden} more problems of this file aren't shown.`,
    why: "A long list hides the problems that matter most.",
    todo: "Mend those shown first.",
    example: null,
    sample: { code: "file/more", place, system: null, hidden: 120 },
  },
};
