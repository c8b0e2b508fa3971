import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { describe, expect, test } from "vitest";
import { statementTable } from "../../grammar/statements.ts";
import { inOneGo } from "../../server/culture/keep.ts";
import { inUnit } from "../../server/editor/code-actions/other-units.ts";
import { actionsAt } from "../../server/editor/code-actions.ts";
import { quantitiesOf } from "../../server/editor/quantities.ts";
import { walk } from "../checks/walk.ts";
import { offered, textAfter, textsAfter, titlesAt } from "./actions.ts";

const rewrites = (text: string) => titlesAt(text, ["refactor.rewrite"]);
const vat = (line: string) => `system vat\n  tank main 500 L\n  ${line}\n`;
const log = (line: string) => `system vat\n  tank main 500 L\n\nlog vat\n  2026-11-28 08:10 ${line}\n`;

describe("a quantity is offered in the other units of its kind, with the digits that are known", () => {
  test.each([
    // 1 dKH = 20 / 56.077 meq/L; 1 meq/L = 50.04 mg/L as CaCO3 (M = 100.086 g/mol, IUPAC abridged weights).
    [
      "read alkalinity 8.|0 dKH",
      ["2.85 meq/L", "2.85 mmol/L", "2790 umol/kg at density 1.0233 kg/L", "143 mg/L as CaCO3"],
    ],
    // 421 / 40.078 = 10.504; at 35 and 25 °C sea water has 1.0233 kg/L (EOS-80).
    [
      "read calcium 42|1 mg/L, salinity 35, temperature 25 degC",
      [
        ...["10.50 mmol/L", "10500 umol/L", "411.4 mg/kg at density 1.0233 kg/L"],
        ...["10.26 mmol/kg at density 1.0233 kg/L", "10260 umol/kg at density 1.0233 kg/L"],
        "1051 mg/L as CaCO3",
      ],
    ],
    ["read salinity 3|5.0", ["35.0 ppt", "1.02637 SG", "1.02660 SG20", "1.02686 SG60F", "53.1 mS/cm"]],
    [
      "read salinity 1.02|64 SG",
      ["35.0 without a unit", "35.0 ppt", "1.0266 SG20", "1.0269 SG60F", "53.1 mS/cm"],
    ],
    ["read temperature 25.|4 degC", ["77.72 degF"]],
    ["read temperature 78| degF", ["25.6 degC"]],
    ["read pH 8.1|2", []],
    ["renewed 18|0 L with mix", ["0.18 m3", "47.6 gal", "39.6 impgal", "6090 floz"]],
    ["calibrated head 48.|5 mL in 60 s", ["0.0485 L", "0.01281 gal", "0.01067 impgal", "1.640 floz"]],
  ])("%s", (line, expected) => {
    expect(rewrites(log(line))).toEqual(expected.map((text) => `Write ${text}`));
  });

  test.each([
    ["tank sump 120 cm x 8|0 cm x 45 cm", ["800 mm", "0.8 m", "31.5 inch", "2.62 ft"]],
    [
      "measured volume 174|0 L ± 40 L",
      ["1.74 m3 ± 0.04 m3", "459.7 gal ± 10.6 gal", "382.7 impgal ± 8.8 impgal", "58840 floz ± 1350 floz"],
    ],
    ["measured volume 174|0 L ± 2 %", ["1.74 m3", "459.7 gal", "382.7 impgal", "58840 floz"]],
    ["limit temperature swing 2| degF", ["1.1 degC"]],
    [
      "cohort a 12 pieces uptake 0.|9 meq/day each",
      [
        ...["1.9 mg/h as CaCO3", "0.45 mmol/day as CaCO3", "45 mg/day as CaCO3", "6.3 meq/week"],
        ...["3.2 mmol/week as CaCO3", "320 mg/week as CaCO3", "0.32 g/week as CaCO3"],
      ],
    ],
    ["air CO2 52|0 ppm", []],
    ["light between 09:00| and 19:00", []],
  ])("%s", (line, expected) => {
    expect(rewrites(vat(line))).toEqual(expected.map((text) => `Write ${text}`));
  });

  test("where the cursor is on a quantity only", () => {
    expect(rewrites(log("re|ad alkalinity 8.0 dKH"))).toEqual([]);
    expect(rewrites(log("read alkalinity 8,0| dKH"))).toEqual([]);
  });
});

describe("the line after it", () => {
  test.each([
    ['note "é海🐠"', 'note "é海🐠"', null],
    [
      "read calcium 421 mg/L, alkalinity 8.|0 dKH with bench # é🐠",
      "read calcium 421 mg/L, alkalinity 2.85 meq/L with bench # é🐠",
      "Write 2.85 meq/L",
    ],
    ["read calcium 105|1 mg/L as CaCO3", "read calcium 420.9 mg/L", "Write 420.9 mg/L"],
    ["read salinity 3|5", "read salinity 1.0264 SG", "Write 1.0264 SG"],
    ["read salinity 1.02|64 SG, pH 8.1", "read salinity 35.0, pH 8.1", "Write 35.0 without a unit"],
    ["read alkalinity below| 8 dKH", "", null],
  ])("%s", (line, expected, title) => {
    if (title === null) expect(rewrites(log(line.includes("|") ? line : `|${line}`))).toEqual([]);
    else expect(textAfter(log(line), title)).toBe(log(expected));
  });

  test("has a band or measures that share a unit changed together", () => {
    expect(textAfter(vat("hold alkalinity 7.6| to 8.4 dKH aim 8.0"), "Write 2.71 meq/L")).toBe(
      vat("hold alkalinity 2.71 to 3.00 meq/L aim 2.85"),
    );
    expect(textAfter(vat("hold salinity 34| to 35.5"), "Write 1.0256 SG")).toBe(
      vat("hold salinity 1.0256 SG to 1.02675 SG"),
    );
    expect(textAfter(vat("tank sump 120 x 8|0 x 45 cm times 2"), "Write 31.5 inch")).toBe(
      vat("tank sump 47.2 x 31.5 x 17.7 inch times 2"),
    );
    expect(textAfter(vat("tank sump 120 cm x 8|0 cm x 45 inch"), "Write 800 mm")).toBe(
      vat("tank sump 1200 mm x 800 mm x 45 inch"),
    );
  });

  test("has what stands behind ± changed too", () => {
    expect(textAfter(vat("measured volume 174|0 L ± 40 L"), "Write 459.7 gal ± 10.6 gal")).toBe(
      vat("measured volume 459.7 gal ± 10.6 gal"),
    );
    expect(textAfter(vat("measured volume 174|0 L ± 40"), "Write 459.7 gal ± 10.6 gal")).toBe(
      vat("measured volume 459.7 gal ± 10.6"),
    );
    expect(textAfter(vat("measured volume 174|0 L ± 2 %"), "Write 459.7 gal")).toBe(
      vat("measured volume 459.7 gal ± 2 %"),
    );
  });
});

test("all of one kind and unit in a selection", () => {
  const text = (first: string, second: string, marks = "|") =>
    `system vat\n  tank main 500 L\n\nlog vat\n${marks}  2026-11-27 08:10 read alkalinity 7.9 meq/L\n  2026-11-28 08:10 read alkalinity ${first}, calcium 421 mg/L\n  2026-11-29 08:10 read alkalinity ${second}, salinity 35${marks}\n`;
  expect(
    textAfter(text("2.85 meq/L", "8.1 dKH"), "Write the 2 selected values of alkalinity in meq/L in dKH"),
  ).toBe(text("7.99 dKH", "8.1 dKH", "").replace("7.9 meq/L", "22.2 dKH"));
  const volumes = "log vat\n  |2026-11-27 08:10 gave a 250 mL, b 30 mL\n  2026-11-28 gave a 100 mL|\n";
  expect(textAfter(volumes, "Write the 3 selected values in mL in L")).toBe(
    "log vat\n  2026-11-27 08:10 gave a 0.25 L, b 0.03 L\n  2026-11-28 gave a 0.1 L\n",
  );
  const readings =
    "system vat\n  tank main 500 L\n\nlog vat\n  |2026-11-27 08:10 read alkalinity 8.0 dKH, salinity 33, temperature 25 degC\n  2026-11-28 08:10 read alkalinity 8.0 dKH, salinity 36, temperature 25 degC|\n";
  expect(rewrites(readings)).toContain(
    "Write the 2 selected values of alkalinity in dKH in umol/kg at density 1.0218 to 1.0241 kg/L",
  );
});

test("nothing that a statement can hold is offered in a unit in which it can't be read, or as another value", () => {
  const lines = statementTable.flatMap(({ form, sections, examples }) =>
    form === "header"
      ? []
      : sections.flatMap((section) =>
          examples.map((line) => `${section === "store" ? section : `${section} some-name`}\n  ${line}\n`),
        ),
  );
  const examples = resolve(import.meta.dirname, "../../examples");
  const files = readdirSync(examples, { recursive: true, encoding: "utf8" }).filter((name) =>
    name.endsWith("system.marl"),
  );
  const texts = [...lines, ...files.map((name) => readFileSync(join(examples, name), "utf8"))];
  let checked = 0;
  for (const text of texts) {
    const farm = walk(new Map([["farm.marl", text]]));
    const document = farm.documents.get("farm.marl")!;
    for (const [number, { statement }] of document.lines.entries()) {
      for (const [index, { quantity, measured }] of (statement ? quantitiesOf(statement) : []).entries()) {
        const at = { line: number, column: quantity.number.start };
        const selection = { file: "farm.marl", from: at, to: at };
        for (const action of inOneGo(
          actionsAt({ farm, selection, canCreate: false, now: 0 }, ["refactor.rewrite"]),
        )) {
          const changed = walk(textsAfter(farm, action));
          const line = changed.documents.get("farm.marl")!.lines[number]!;
          expect(line.statement?.kind, `${action.title}: ${line.text}`).toBe(statement!.kind);
          const here = quantitiesOf(line.statement!)[index];
          expect(here, line.text).toBeDefined();
          const density = Number(/density (\S+)/.exec(action.title)?.[1] ?? 1);
          const unit = { unit: quantity.unit?.text ?? "", asCaCO3: quantity.asCaCO3 !== null };
          const back = inUnit(here!.quantity, measured, unit, () => density);
          // Beyond the numbers that are read with ease there is no way back.
          if (!back) continue;
          const decimals = quantity.number.text.split(".")[1]?.length ?? 0;
          const written = Number(quantity.number.text);
          expect(
            Math.abs(Number(back.number) - written),
            `${action.title}: ${line.text}`,
          ).toBeLessThanOrEqual(0.75 * 10 ** -decimals + Math.abs(written) * 1e-4);
          checked += 1;
        }
      }
    }
  }
  expect(checked).toBeGreaterThan(200);
});

test("a conversion with a density that nothing says names it", () => {
  const { actions } = offered(log("read alkalinity 8.|0 dKH"), ["refactor.rewrite"]);
  for (const { title } of actions)
    expect(title.includes("/kg")).toBe(title.includes("at density 1.0233 kg/L"));
});
