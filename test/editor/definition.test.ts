import { expect, test } from "vitest";
import { definition } from "../../server/editor/definition.ts";
import { cursorIn } from "./fixture.ts";
import { held, shown } from "./spans.ts";

/** The declared names, and what declares them. */
function defined(text: string) {
  const { farm, cursor } = cursorIn(text);
  const answer = definition(farm, cursor);
  return (
    answer && {
      origin: shown(farm, answer.origin),
      names: answer.found.map(({ name }) => shown(farm, name)),
      wholes: answer.found.map(({ whole }) => held(farm, whole)),
    }
  );
}

test("a solution leads to all its recipes, those of other files too", () => {
  expect(
    defined(`
use "solutions.marl"

system vat
  tank main 500 L
  by-hand so|da

solution soda from 2026-11-01
  dissolve sodium-carbonate 90 g
  make up to 1 L

# end
// file: solutions.marl
solution soda "Soda, first"
  dissolve sodium-carbonate 80 g
  make up to 1 L

solution soda from 2026-10-01
  dissolve sodium-carbonate 85 g
  make up to 1 L
`),
  ).toEqual({
    origin: "farm.marl:5 by-hand [soda]",
    names: [
      "farm.marl:7 solution [soda] from 2026-11-01",
      'solutions.marl:1 solution [soda] "Soda, first"',
      "solutions.marl:5 solution [soda] from 2026-10-01",
    ],
    wholes: [
      "solution soda from 2026-11-01\n  dissolve sodium-carbonate 90 g\n  make up to 1 L",
      'solution soda "Soda, first"\n  dissolve sodium-carbonate 80 g\n  make up to 1 L',
      "solution soda from 2026-10-01\n  dissolve sodium-carbonate 85 g\n  make up to 1 L",
    ],
  });
});

test("a pump named in a log of another file leads to its lines in the system", () => {
  expect(
    defined(`
use "vat.marl"

log vat
  2026-11-01 08:00 set |head-1 40 mL/day
// file: vat.marl
system vat
  tank main 500 L
  pump head-1 gives soda at 40 mL/min until 2026-10-01 # old hose
  pump head-1 gives soda at 42 mL/min from 2026-10-01

solution soda
  supplies alkalinity 1.6 meq/mL
`),
  ).toEqual({
    origin: "farm.marl:4 2026-11-01 08:00 set [head-1] 40 mL/day",
    names: [
      "vat.marl:3 pump [head-1] gives soda at 40 mL/min until 2026-10-01 # old hose",
      "vat.marl:4 pump [head-1] gives soda at 42 mL/min from 2026-10-01",
    ],
    wholes: [
      "pump head-1 gives soda at 40 mL/min until 2026-10-01",
      "pump head-1 gives soda at 42 mL/min from 2026-10-01",
    ],
  });
});

const several = (line: string) => `
kit bench
  alkalinity scatter 0.1 dKH

saltwater mix
  salinity 35

reagent drum
  is sodium-carbonate purity 99 %

solution soda
  dissolve drum 80 g
  make up to 1 L

system vat
  tank main 500 L
  cohort tips 10 pieces uptake 1 meq/day each
  by-hand soda

system vat-2
  tank main 200 L
  cohort tips 10 pieces uptake 1 meq/day each

store
  2026-11-01 received drum 5 kg

log vat
  ${line}
`;

test.each([
  ["2026-11-01 read alkalinity 8 dKH with b|ench", ["farm.marl:1 kit [bench]"]],
  ["2026-11-01 renewed 10 L with |mix", ["farm.marl:4 saltwater [mix]"]],
  ["2026-11-01 renewed 10 L with vat-2|", ["farm.marl:19 system [vat-2]"]],
  ["2026-11-01 set s|oda 10 mL/day", ["farm.marl:10 solution [soda]"]],
  [
    "2026-11-01 moved ti|ps 2 pieces to vat-2",
    ["farm.marl:16 cohort [tips] 10 pieces uptake 1 meq/day each"],
  ],
  ["2026-11-01 moved tips 2 pieces to |vat-2", ["farm.marl:19 system [vat-2]"]],
  // The rest of the line can't be read; its names still lead where they are declared.
  ["2026-11-01 gave s|oda 10 mL twice", ["farm.marl:10 solution [soda]"]],
  ["2026-11-01 set soda| ten", ["farm.marl:10 solution [soda]"]],
])("%s", (line, names) => {
  expect(defined(several(line))?.names).toEqual(names);
});

test.each([
  "2026-11-01 gave nothing-|known 10 mL",
  "2026-11-01 r|ead alkalinity 8 dKH",
  "2026-11-01 read alk|alinity 8 dKH",
  "2026-11-01 read alkalinity 8 dKH by a|o",
  "2026-11-01 read alkalinity 8 dKH # so|da",
])("nothing is declared of %s", (line) => {
  expect(defined(several(line))).toBeNull();
});

test("a reagent of every farm has no place; one of the farm's own has", () => {
  const recipe = (dissolve: string) =>
    `reagent drum\n  is sodium-carbonate purity 99 %\n\nsolution soda\n  dissolve ${dissolve} 80 g\n  make up to 1 L\n`;
  expect(defined(recipe("sodium|-carbonate"))?.names).toEqual([]);
  expect(defined(recipe("dr|um"))?.names).toEqual(["farm.marl:1 reagent [drum]"]);
});

test("a name in two parts of a farm that don't see each other stays in its part", () => {
  const part = (mark: string) =>
    `solution soda\n  supplies alkalinity 1.6 meq/mL\n\nsystem vat\n  tank main 500 L\n  by-hand ${mark}soda\n`;
  expect(defined(`${part("")}// file: other.marl\n${part("|")}`)?.names).toEqual([
    "other.marl:1 solution [soda]",
  ]);
});

test("a path leads to its file, one that leads nowhere doesn't", () => {
  expect(defined('use "so|da.marl"\n// file: soda.marl\n# empty\n')).toEqual({
    origin: 'farm.marl:1 use ["soda.marl"]',
    names: ["soda.marl:1 []# empty"],
    wholes: [""],
  });
  expect(defined('use "so|da.marl"\n')).toBeNull();
  expect(defined('use "../so|da.marl"\n')).toBeNull();
});

test("a header declared twice leads to the one that counts", () => {
  expect(defined("kit bench\n  pH scatter 0.1\n\nkit ben|ch\n  pH scatter 0.2\n")?.names).toEqual([
    "farm.marl:1 kit [bench]",
  ]);
});

test("a header whose line can't be read is still where its section is declared", () => {
  expect(defined("sytem vat\n  tank main 500 L\n\nlog v|at\n  2026-11-01 read pH 8\n")?.names).toEqual([
    "farm.marl:1 sytem [vat]",
  ]);
});
