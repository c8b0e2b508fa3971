import { expect, test } from "vitest";
import { type FileSymbol, fileSymbols, namedSymbols } from "../../server/editor/symbols.ts";
import { rankOf, workspaceSymbols } from "../../server/editor/workspace-symbols.ts";
import { marked } from "./fixture.ts";
import { held, inOneGo, shown } from "./spans.ts";

const text = `
# The farm.
use "other.marl"

system vat "The vat" # é 水 🪸
  tank main 500 L # big
  hold alkalinity 7.5 to 8.5 dKH aim 8.0
  cohort tips 10 pieces uptake 1 meq/day each
  pump head-1 gives soda at 40 mL/min
  by-hand soda
  light between 09:00 and 19:00
  tankk spare 30 L

solution soda "Soda"
  dissolve sodium-carbonate 80 g
  make up to 1 L

# Logs are kept by shift.
log vat
  2026-10-30 read pH 8.1
  2026-10-31 08:00 read pH 8.2 by ao # é
  # November
  2026-11-01 gave soda 10 mL
  2026-10-29 read pH 8.0

store
  2026-11-01 mixed soda 1 L

kit
  pH scatter 0.1
// file: other.marl
system vat-2
  tank main 200 L
`;

const { farm } = marked(text);

const outline = (symbols: readonly FileSymbol[], indent = ""): readonly string[] =>
  symbols.flatMap(({ name, detail, sort, children }) => [
    `${indent}${sort}: ${name}${detail === null ? "" : ` | ${detail}`}`,
    ...outline(children, `${indent}  `),
  ]);

test("the outline stands by section, that of a log by month", () => {
  expect(outline(inOneGo(fileSymbols(farm, "farm.marl")))).toEqual([
    "system: system vat | The vat",
    "  tank: tank main | 500 L",
    "  fact: hold alkalinity | 7.5 to 8.5 dKH aim 8.0",
    "  cohort: cohort tips | 10 pieces uptake 1 meq/day each",
    "  pump: pump head-1 | gives soda at 40 mL/min",
    "  fact: by-hand soda",
    "  fact: light | between 09:00 and 19:00",
    "solution: solution soda | Soda",
    "  fact: dissolve sodium-carbonate | 80 g",
    "  fact: make | up to 1 L",
    "log: log vat",
    "  month: 2026-10 | 2 lines",
    "    event: 2026-10-30 read | pH 8.1",
    "    event: 2026-10-31 08:00 read | pH 8.2 by ao",
    "  month: 2026-11 | 1 line",
    "    event: 2026-11-01 gave | soda 10 mL",
    "  month: 2026-10 | 1 line",
    "    event: 2026-10-29 read | pH 8.0",
    "store: store",
    "  event: 2026-11-01 mixed | soda 1 L",
    "kit: kit",
    "  fact: pH | scatter 0.1",
  ]);
});

test("a symbol holds its head and its children, and ends where its lines do", () => {
  const symbols = inOneGo(fileSymbols(farm, "farm.marl"));
  const [, soda, log] = symbols;
  expect(held(farm, soda!.whole)).toBe(
    'solution soda "Soda"\n  dissolve sodium-carbonate 80 g\n  make up to 1 L',
  );
  expect(shown(farm, soda!.head)).toBe('farm.marl:13 solution [soda] "Soda"');
  expect(held(farm, log!.children[0]!.whole)).toBe(
    "  2026-10-30 read pH 8.1\n  2026-10-31 08:00 read pH 8.2 by ao # é",
  );
  expect(shown(farm, log!.children[0]!.head)).toBe("farm.marl:19 [2026-10-30 read] pH 8.1");
  const inside = ({ whole, head, children }: FileSymbol): void => {
    expect(head.line).toBeGreaterThanOrEqual(whole.first);
    expect(head.line).toBeLessThanOrEqual(whole.last);
    expect(head.end).toBeGreaterThan(head.start);
    for (const child of children) {
      expect(child.whole.first).toBeGreaterThanOrEqual(whole.first);
      expect(child.whole.last).toBeLessThanOrEqual(whole.last);
      inside(child);
    }
  };
  for (const symbol of symbols) inside(symbol);
});

test("the plain list holds sections and what systems name, unread lines included", () => {
  const named = inOneGo(namedSymbols(farm, "farm.marl"));
  expect(named.map(({ name, sort, within }) => [name, sort, within])).toEqual([
    ["vat", "system", null],
    ["main", "tank", "vat"],
    ["tips", "cohort", "vat"],
    ["head-1", "pump", "vat"],
    ["spare", "tank", "vat"],
    ["soda", "solution", null],
    ["log vat", "log", null],
    ["store", "store", null],
    ["kit", "kit", null],
  ]);
  expect(shown(farm, named[3]!.head)).toBe("farm.marl:8 pump [head-1] gives soda at 40 mL/min");
});

const found = (query: string) =>
  inOneGo(workspaceSymbols([{ farm }], query)).map(({ symbol }) => `${symbol.head.file} ${symbol.name}`);

test("letters in their order find things in every file, the best first", () => {
  expect(found("vat")).toEqual(["farm.marl vat", "other.marl vat-2", "farm.marl log vat"]);
  expect(found("MAIN")).toEqual(["farm.marl main", "other.marl main"]);
  expect(found("v2")).toEqual(["other.marl vat-2"]);
  expect(found("hd1")).toEqual(["farm.marl head-1"]);
  expect(found("zz")).toEqual([]);
  expect(found("")).toHaveLength(11);
});

test.each([
  ["soda", "soda", 0],
  ["so", "soda", 1],
  ["pa", "soda-part", 2],
  ["art", "soda-part", 3],
  ["spt", "soda-part", 4],
  ["tps", "soda-part", null],
])("%s in %s", (query, name, rank) => {
  expect(rankOf(query, name)).toBe(rank);
});

test("more than anyone reads aren't told", () => {
  const many = Array.from({ length: 300 }, (_, index) => `kit meter-${index}\n`).join("\n");
  expect(inOneGo(workspaceSymbols([{ farm: marked(many).farm }], "meter"))).toHaveLength(200);
});
