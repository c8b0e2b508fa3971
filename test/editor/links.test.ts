import { expect, test } from "vitest";
import { links } from "../../server/editor/links.ts";
import { marked } from "./fixture.ts";
import { inOneGo, shown } from "./spans.ts";

test("paths of files that are there, and codes of quiet comments", () => {
  const { farm } = marked(`
use "sub/a.marl" # é 水 🪸 quiet: water/stale
use "gone.marl"
use "../out.marl"
use “./sub/a.marl” # é 水 🪸 # quiet: name/unused, no/such
# quiet file: water/stale # no quiet: name/unused
# about water/stale
// file: sub/a.marl
use "../farm.marl"
`);
  const shownLinks = (file: string) =>
    inOneGo(links(farm, file)).map(({ span, to }) => [shown(farm, span), "file" in to ? to.file : to.code]);
  expect(shownLinks("farm.marl")).toEqual([
    ['farm.marl:1 use "[sub/a.marl]" # é 水 🪸 quiet: water/stale', "sub/a.marl"],
    ["farm.marl:4 use “[./sub/a.marl]” # é 水 🪸 # quiet: name/unused, no/such", "sub/a.marl"],
    ["farm.marl:4 use “./sub/a.marl” # é 水 🪸 # quiet: [name/unused], no/such", "name/unused"],
    ["farm.marl:5 # quiet file: [water/stale] # no quiet: name/unused", "water/stale"],
  ]);
  expect(shownLinks("sub/a.marl")).toEqual([['sub/a.marl:1 use "[../farm.marl]"', "farm.marl"]]);
});
