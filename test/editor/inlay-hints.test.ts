import { expect, test } from "vitest";
import { type HintKind, hintTable, inlayHints } from "../../server/editor/inlay-hints.ts";
import { marked } from "./fixture.ts";

const all = new Set(Object.keys(hintTable) as HintKind[]);

/** Each line that has hints, with them behind its words in « ». */
function hinted(
  text: string,
  kinds: ReadonlySet<HintKind> = all,
  range: readonly [number, number] = [0, 1000],
) {
  const { farm, files } = marked(text);
  const lines = files.get("farm.marl")!.split("\n");
  return inlayHints(farm, "farm.marl", range[0], range[1], kinds).map(({ line, column, text: hint }) => {
    const own = lines[line]!;
    return `${own.slice(0, column).trim()} «${hint}»${own.slice(column)}`;
  });
}

const system = `
system vat
  tank trough 310 cm x 80 cm x 28 cm times 3
  tank vat round 1.2 m x 60 cm # é 鉢 🪸
  tank sump 280 L
  tank barrel 55 gal
  hold alkalinity 7.5 to 8.5 dKH
  hold salinity 34 to 36 aim 35
  cohort plugs 300 pieces uptake 0.8 meq/day each grows 1 %/week from 2026-11-24
  cohort mats 0.5 m2 uptake 50 mmol/m2/day as CaCO3
`;

test("a volume stands behind a tank's measures, not behind litres", () => {
  expect(hinted(system, new Set(["volume"]))).toEqual([
    "tank trough 310 cm x 80 cm x 28 cm times 3 «= 2083 L»",
    "tank vat round 1.2 m x 60 cm «= 679 L» # é 鉢 🪸",
    "tank barrel 55 gal «= 208 L»",
  ]);
});

test("an uptake stands behind a cohort, in the system's unit of alkalinity", () => {
  expect(hinted(system, new Set(["uptake"]))).toEqual([
    // 300 × 0.8 meq, grown by 1 % in a week, in 3250 L, 0.35665 meq/L in a dKH.
    "cohort plugs 300 pieces uptake 0.8 meq/day each grows 1 %/week from 2026-11-24 «0.21 dKH/day»",
    // 0.5 × 50 mmol of CaCO3 are 50 meq.
    "cohort mats 0.5 m2 uptake 50 mmol/m2/day as CaCO3 «0.04 dKH/day»",
  ]);
  const again = `${system}  cohort mats 0.9 m2 uptake 50 mmol/m2/day as CaCO3 from 2026-11-30\n`;
  expect(hinted(again, new Set(["uptake"])).slice(1)).toEqual([
    "cohort mats 0.9 m2 uptake 50 mmol/m2/day as CaCO3 from 2026-11-30 «0.08 dKH/day»",
  ]);
  expect(hinted("system dry\n  cohort mats 0.5 m2 uptake 50 mmol/m2/day as CaCO3\n")).toEqual([]);
});

test("a strength stands behind a recipe's volume", () => {
  const recipes = `
solution soda
  dissolve sodium-carbonate 424 g
  make up to 4 L # the large can

solution blend
  dissolve calcium-chloride-dihydrate 500 g
  dissolve magnesium-chloride-hexahydrate 100 g
  make up to 4 L

solution unknown
  dissolve nothing-known 4 g
  make up to 4 L

solution soda from 2026-11-01
  dissolve sodium-carbonate 212 g
  make up to 4 L
`;
  expect(hinted(recipes)).toEqual([
    // 424 g / 105.99 g/mol × 2 / 4 L.
    "make up to 4 L «= alkalinity 2.00 meq/mL» # the large can",
    "make up to 4 L «= calcium 34.1 mg/mL, magnesium 2.99 mg/mL»",
    "make up to 4 L «= alkalinity 1.00 meq/mL»",
  ]);
});

test("a reading taken while salinity was out of its hold is told at the aim", () => {
  const log = `${system}
log vat
  2026-11-28 08:00 read alkalinity 8.0 dKH, calcium 420 mg/L with bench
  2026-11-28 08:05 read salinity 32, temperature 25 degC
  2026-11-30 08:00 read salinity 35, alkalinity 8.0 dKH
  2026-12-01 07:00 read salinity 32, calcium 380 mg/L, nitrate below 2 mg/L
`;
  expect(hinted(log, new Set(["atSalinityAim"]))).toEqual([
    // × 35 / 32, and the densities of both.
    "2026-11-28 08:00 read alkalinity 8.0 dKH, calcium 420 mg/L with bench «at salinity 35: alkalinity 8.8 dKH, calcium 460 mg/L»",
    "2026-12-01 07:00 read salinity 32, calcium 380 mg/L, nitrate below 2 mg/L «at salinity 35: calcium 417 mg/L»",
  ]);
});

test("only the lines asked for, and none that doesn't read", () => {
  expect(hinted(system, all, [1, 2])).toEqual([
    "tank trough 310 cm x 80 cm x 28 cm times 3 «= 2083 L»",
    "tank vat round 1.2 m x 60 cm «= 679 L» # é 鉢 🪸",
  ]);
  expect(hinted(system.replace("28 cm times", "28 cm tim"), new Set(["volume"]))).toHaveLength(2);
  expect(hinted(system, new Set())).toEqual([]);
});
