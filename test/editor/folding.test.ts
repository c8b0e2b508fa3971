import { expect, test } from "vitest";
import { folds } from "../../server/editor/folding.ts";
import { marked } from "./fixture.ts";
import { inOneGo } from "./spans.ts";

/** `sort first-last`, lines from 1. */
const folded = (text: string) =>
  inOneGo(folds(marked(text).farm, "farm.marl")).map(
    ({ sort, first, last }) => `${sort} ${first + 1}-${last + 1}`,
  );

test("sections, months, comments and use lines fold", () => {
  expect(
    folded(`
# One
# two
use "a.marl"
use "b.marl"

system vat
  tank main 500 L
  # inside
  # too

# before the log
log vat
  2026-10-30 read pH 8.1
  2026-10-31 read pH 8.1

  2026-11-01 read pH 8.1
  2026-11-02 rread pH 8.1
  2026-12-01 read pH 8.1

store
`),
  ).toEqual([
    "comment 1-2",
    "use 3-4",
    "section 6-9",
    "comment 8-9",
    "section 12-18",
    "month 13-14",
    "month 16-17",
  ]);
});

test("a log of one month folds whole only, and one line never", () => {
  expect(folded("log vat\n  2026-10-30 read pH 8.1\n  2026-10-31 read pH 8.1\n")).toEqual(["section 1-3"]);
  expect(folded('# alone\nuse "a.marl"\nstore\n\nkit bench\n')).toEqual([]);
});
