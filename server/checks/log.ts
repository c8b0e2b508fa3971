/** Lines of a log that are doubled, dated ahead, out of order, or change nothing. */
import { writeDate } from "../../grammar/dates.ts";
import { doseFigure } from "./figures.ts";
import { removingDoubled } from "./fixing.ts";
import type { Rules } from "./rule.ts";
import { sourceName } from "./words.ts";

const vat = "system vat\n  tank main 500 L\n  cohort plugs 40 pieces uptake 0.8 meq/day each\n\nlog vat\n";

export const logRules: Rules<"log/twice" | "log/future" | "log/out-of-order" | "log/no-effect"> = {
  "log/twice": {
    severity: "warning",
    title: "Two lines of a log that say the same",
    says: () => "Another line of the log says the same at the same minute.",
    why: "A merge may have doubled it, so both count as one.",
    todo: "Remove one of them; if it did happen twice, give the second its own minute.",
    related: ({ first }) => [{ place: first, message: "The line that counts" }],
    fixes: ({ place, first }, files) => removingDoubled(place, first, files),
    example: {
      fires: `${vat}  2026-11-28 08:00 removed plugs 3 pieces\n  2026-11-28 08:00 removed plugs 3 pieces\n`,
      silent: `${vat}  2026-11-28 08:00 removed plugs 3 pieces\n  2026-11-28 08:05 removed plugs 3 pieces\n`,
    },
  },
  "log/future": {
    severity: "warning",
    title: "A line dated ahead",
    says: ({ minute }) => `This line is dated ${writeDate(minute)}, more than a day ahead.`,
    why: "It is left out until then, so a slip in the date hides what was done.",
    todo: "Check the date.",
    example: {
      fires: `${vat}  2027-11-28 08:00 removed plugs 3 pieces\n`,
      silent: `${vat}  2026-11-28 08:00 removed plugs 3 pieces\n`,
    },
  },
  "log/out-of-order": {
    severity: "hint",
    title: "A line below a later one",
    says: () => "This line is earlier than one above it.",
    why: "Lines count in the order of their times, wherever they stand; people read them in the file's.",
    todo: "Move it up to its place, or leave it.",
    example: {
      fires: `${vat}  2026-11-28 08:00 removed plugs 3 pieces\n  2026-11-27 08:00 stocked plugs 10 pieces\n`,
      silent: `${vat}  2026-11-27 08:00 stocked plugs 10 pieces\n  2026-11-28 08:00 removed plugs 3 pieces\n`,
    },
  },
  "log/no-effect": {
    severity: "info",
    title: "A line of a log that can't be counted in full",
    says: (finding) =>
      "why" in finding
        ? `This line can't be counted in full: ${finding.why}.`
        : `${sourceName(finding.source)} can give at most ${doseFigure(finding.mostLPerDay)} a day in its hours, and counts as giving that.`,
    why: "It counts as far as it can, and what is worked out rests on that.",
    todo: "Correct the line, or the fact in the system's section that it runs against.",
    example: {
      fires: `${vat}  2026-11-28 08:00 removed plugs 0.2 m2\n`,
      silent: `${vat}  2026-11-28 08:00 removed plugs 3 pieces\n`,
    },
  },
};
