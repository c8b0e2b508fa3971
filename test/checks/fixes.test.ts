import { describe, expect, test } from "vitest";
import type { Rule } from "../../server/checks/rule.ts";
import { codes, rules } from "../../server/checks/rules.ts";
import { mended, problems } from "./problems.ts";
import { filesOf, walk } from "./walk.ts";

const vat = (line: string, before = ""): string => `${before}system vat\n  tank main 500 L\n  ${line}\n`;

describe("a fix mends its line", () => {
  test.each([
    ["evaportes 4 L/day", "syntax/unknown-word", "Write evaporates", "evaporates 4 L/day"],
    ["evaporates 7,9 L/day", "syntax/number-form", "Write 7.9", "evaporates 7.9 L/day"],
    ["tank sump 1,250 L", "syntax/number-form", "Write 1250", "tank sump 1250 L"],
    [
      "evaporates 4 L/day from 2026/11/02",
      "syntax/date-form",
      "Write 2026-11-02",
      "evaporates 4 L/day from 2026-11-02",
    ],
    ["tank sump 80", "unit/missing", "Add L", "tank sump 80 L"],
    [
      "cohort plugs 4 pieces uptake 2 mmol/day",
      "unit/as-caco3",
      "Add as CaCO3",
      "cohort plugs 4 pieces uptake 2 mmol/day as CaCO3",
    ],
  ])("%s", (line, code, title, expected) => {
    const text = vat(line);
    const after = mended(text, code, title);
    expect(after).toBe(vat(expected));
    expect(walk(filesOf(after)).problems).toEqual([]);
  });

  test.each([
    ["tank u 30x40x50cm times 2", "unit/unknown", "tank u 30 x 40 x 50 cm times 2"],
    ["tank u 30x40x50 cm", "syntax/unknown-word", "tank u 30 x 40 x 50 cm"],
    ["tank u 30cmx40cmx50cm", "unit/unknown", "tank u 30 cm x 40 cm x 50 cm"],
  ])("%s: the x has its spaces", (line, code, expected) => {
    expect(mended(vat(line), code, "Put spaces round x")).toBe(vat(expected));
    expect(walk(filesOf(vat(expected))).problems.map((problem) => problem.code)).toEqual([]);
  });

  /** What the fixes of a reading's only error would write. */
  const offers = (reading: string): readonly string[] =>
    walk(filesOf(`system vat\n  tank main 500 L\n\nlog vat\n  2026-12-01 read ${reading}\n`))
      .problems.filter(({ severity }) => severity === "error")
      .flatMap(({ fixes }) => fixes.map(({ title }) => title));

  test.each([
    ["temperature 25 C", ["Write degC"]],
    ["temperature 77 F", ["Write degF"]],
    ["alkalinity 8 KH", ["Write dKH"]],
    ["calcium 420 mgl", ["Write mg/L"]],
    ["alkalinity 2.9 meq/l", ["Write L"]],
    ["alkalinity 8 dKH ± 0.1 KH", ["Write dKH"]],
    ["salinity 35 psu", ["Remove it"]],
    ["alkalinity 8 L", ["Write dKH", "Write mg/L as CaCO3", "Write meq/L"]],
    ["temperature 25 kg", ["Write degC", "Write degF"]],
  ])("%s: only units that measure it are offered", (reading, expected) => {
    expect(offers(reading)).toEqual(expected);
  });

  test("a volume spelt as people spell it", () => {
    expect(mended(vat("evaporates 3 ltr/day"), "unit/unknown", "Write L")).toBe(vat("evaporates 3 L/day"));
    expect(mended(vat("evaporates 3 L/d"), "unit/unknown", "Write day")).toBe(vat("evaporates 3 L/day"));
  });

  test("a use line comes below what the file says of itself", () => {
    const text = `# Our vat.\n\n${vat("by-hand part")}\n// file: stock.marl\nsolution part\n  supplies calcium 60 g/L\n`;
    const use = 'Add use "stock.marl"';
    expect(mended(text, "name/undeclared", use)).toContain('# Our vat.\n\nuse "stock.marl"\n\nsystem vat\n');
  });

  test("ppm over a time keeps its time", () => {
    const text = vat("uptake calcium 5 ppm/day");
    expect(mended(text, "unit/ppm", "Write mg/L")).toBe(vat("uptake calcium 5 mg/L/day"));
  });

  test("a line at the margin is indented", () => {
    const text = "system vat\n  tank main 500 L\nevaporates 4 L/day\n";
    const after = mended(text, "syntax/misplaced", "Indent the line");
    expect(walk(filesOf(after)).problems).toEqual([]);
  });

  test("as CaCO3 where it can't be is removed", () => {
    const text = vat("flows-through 20 L/day with mix", "saltwater mix\n  strontium 8 mg/L as CaCO3\n\n");
    const after = mended(text, "unit/as-caco3", "Remove it");
    expect(walk(filesOf(after)).problems).toEqual([]);
  });

  test("a reagent that may be several becomes one of them", () => {
    const text = vat(
      "by-hand part",
      "solution part\n  dissolve calcium-chloride 400 g\n  make up to 5 L\n\n",
    );
    const after = mended(text, "name/ambiguous-reagent", "Write calcium-chloride-dihydrate");
    expect(walk(filesOf(after)).problems).toEqual([]);
  });

  test("a file that declares the name is used", () => {
    const others = "// file: common/parts.marl\nsolution part\n  supplies alkalinity 1.6 meq/mL\n";
    const text = `// file: north/system.marl\n${vat("by-hand part")}${others}`;
    const title = 'Add use "../common/parts.marl"';
    const after = mended(text, "name/undeclared", title, "north/system.marl");
    const files = new Map([...filesOf(text), ["north/system.marl", after]]);
    expect(walk(files).problems).toEqual([]);
  });
});

describe("what a fix may do unasked", () => {
  const fixesOf = (text: string) => walk(filesOf(text)).problems.flatMap(({ fixes }) => fixes);
  const safe = (line: string) => fixesOf(vat(line)).map((fix) => fix.safe);

  test("write a number or date that can have meant one thing only", () => {
    expect(safe("evaporates 7,9 L/day")).toEqual([true]);
    expect(safe("evaporates 4 L/day from 2026/11/02")).toEqual([true]);
  });

  test("no choice between two readings, no dropped sign, no guessed word", () => {
    expect(safe("tank sump 1,250 L")).toEqual([false, false]);
    expect(safe("displace rock -5 L")).toEqual([false]);
    expect(safe("evaporates 4 L/day from 03.04.2026")).toEqual([false, false]);
    expect(safe("evaportes 4 L/day")).toEqual([false]);
  });
});

test("every edit of an example stays inside its line", () => {
  let edits = 0;
  for (const code of codes) {
    const { example } = rules[code] as unknown as Rule;
    if (!example) continue;
    const files = filesOf(example.fires);
    for (const fix of walk(files).problems.flatMap((problem) => problem.fixes)) {
      for (const { file, line, start, end } of fix.edits) {
        const text = files.get(file)!.split("\n")[line]!;
        expect(start).toBeLessThanOrEqual(end);
        expect(end).toBeLessThanOrEqual(text.length);
        edits += 1;
      }
    }
  }
  expect(edits).toBeGreaterThan(5);
});

test("the helper fails on a problem that isn't drawn, and on one that isn't there", () => {
  expect(() => problems("system vat\n  tank main 500\n  tank sump 80 L\n")).toThrow();
  expect(() => problems("system vat\n  tank main 500 L\n            ^^^ error unit/missing\n")).toThrow();
});
