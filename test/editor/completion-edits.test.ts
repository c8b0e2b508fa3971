/** Whatever is offered can be taken: the line reads with it, or can be read on. */
import fc from "fast-check";
import { expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { readLine } from "../../grammar/line.ts";
import { aParameter, statementTable } from "../../grammar/statements.ts";
import type { SectionKind } from "../../grammar/syntax.ts";
import type { CompletionItem } from "../../server/editor/completion/item.ts";
import { completions } from "../../server/editor/completion.ts";
import { signatureHelp } from "../../server/editor/signature-help.ts";
import type { Farm } from "../../server/farm.ts";
import { walk } from "../checks/walk.ts";

const things = `
system east-hall
  tank trough 500 L
  hold alkalinity 7.5 to 8.5 dKH
  cohort staghorn-tips 30 pieces uptake 0.5 meq/day each
  cohort plating 0.6 m2 uptake 210 mmol/m2/day as CaCO3
  pump line-1 gives soda at 31.5 mL/min
  by-hand epsom

system west-hall
  tank trough 500 L

solution soda
  supplies alkalinity 1.6 meq/mL

solution epsom
  supplies magnesium 40 g/L

reagent soda-drum
  is sodium-carbonate

kit titrator

saltwater vat-water

log east-hall
  2026-10-20 08:00 read alkalinity 8 dKH, calcium 420 mg/L with titrator by ina
  2026-10-21 08:00 read salinity 35, pH 8.1 by ro
`;

const headers: Readonly<Record<SectionKind, string>> = {
  system: "system another",
  log: "log east-hall",
  solution: "solution another",
  reagent: "reagent another",
  store: "store",
  saltwater: "saltwater another",
  kit: "kit another",
};

/** Every example of the statement table, in its section. */
interface Example {
  readonly section: SectionKind | null;
  readonly line: string;
}
const lines: readonly Example[] = statementTable.flatMap((row): Example[] =>
  row.examples.flatMap((example): Example[] =>
    row.form === "header"
      ? [{ section: null, line: example }]
      : row.sections.map((section) => ({ section, line: `  ${example}` })),
  ),
);

const aboves = new Map<SectionKind | null, { readonly farm: Farm; readonly above: string }>();

/** One walk a section; each line in it is read alone, since only its own words change. */
function farmWith(section: SectionKind | null, line: string): { farm: Farm; number: number } {
  const above = `${things}\n${section === null ? "" : headers[section]}`;
  const walked = aboves.get(section) ?? { above, farm: walk(new Map([["farm.marl", `${above}\n`]])) };
  aboves.set(section, walked);
  const document = readDocument(`${above}\n${line}\n`, walked.farm.documents.get("farm.marl"));
  const farm = { ...walked.farm, documents: new Map([["farm.marl", document]]) };
  return { farm, number: above.split("\n").length };
}

function offered(section: SectionKind | null, line: string, column: number) {
  const { farm, number } = farmWith(section, line);
  return completions(farm, { file: "farm.marl", line: number, column }, farm.moment.at);
}

const taken = (line: string, { replace }: CompletionItem, text: string): string =>
  line.slice(0, replace.start) + text + line.slice(replace.end);

const findingsIn = (section: SectionKind | null, line: string) =>
  readLine(section, line).findings.map(({ code }) => code);

test("an item taken at the end of what is typed can be read, or read on", () => {
  let count = 0;
  for (const { section, line } of lines) {
    const ends = [...line.matchAll(/ (?=\S)/g)].map(({ index }) => index + 1);
    for (const column of ends) {
      const typed = line.slice(0, column);
      for (const item of offered(section, typed, column)) {
        const after = taken(typed, item, item.text);
        const wrong = findingsIn(section, after).filter((code) => code !== "syntax/unfinished");
        expect([after, wrong]).toEqual([after, []]);
        // A place of a snippet is for those only who take snippets.
        expect(item.text).not.toContain("$");
        count += 1;
      }
    }
  }
  expect(count).toBeGreaterThan(2000);
});

test("a unit, a parameter or a name taken in the place of another leaves the line readable", () => {
  let count = 0;
  const swapped = new Set([
    "unit",
    "parameter",
    "system",
    "solution",
    "reagent",
    "saltwater",
    "kit",
    "cohort",
    "pump",
    "person",
  ]);
  for (const { section, line } of lines) {
    for (const { index } of line.matchAll(/(?<=\S )(?=[A-Za-z])/g)) {
      for (const item of offered(section, line, index)) {
        if (!swapped.has(item.kind)) continue;
        // Where the whole of a unit is two words, only its first is at the cursor.
        if (item.text.trim().endsWith("as CaCO3") || / as CaCO3/.test(line)) continue;
        const after = taken(line, item, item.text);
        expect([after, findingsIn(section, after)]).toEqual([after, []]);
        count += 1;
      }
    }
  }
  expect(count).toBeGreaterThan(500);
});

/** What a person might fill in. */
const fillers: Readonly<Record<string, string>> = {
  PARAMETER: "alkalinity",
  N: "3",
  q: "5 L",
  volume: "5 L",
  mass: "5 g",
  temperature: "16 degC",
  TIME: "08:00",
  FORMULA: "CaO",
  pieces: "pieces",
};

const filled = (snippet: string): string =>
  snippet
    .replace(/\$0/g, "")
    .replace(/\$\{\d+\|([^,|]*)[^|]*\|\}/g, "$1")
    .replace(/\$\{\d+:([^}]*)\}/g, (_, word: string) => fillers[word] ?? `any-${word}`)
    .replace(/\$\d+/g, "7.5");

test("every statement's snippet, filled in, reads; as it is, none holds a number", () => {
  const texts = [
    ...(Object.keys(headers) as SectionKind[]).flatMap((section) =>
      ["  ", "  2026-12-01 08:00 "].flatMap((typed) =>
        offered(section, typed, typed.length).flatMap((item) =>
          item.snippet === null ? [] : [{ section, line: taken(typed, item, item.snippet) }],
        ),
      ),
    ),
    ...offered(null, "", 0).flatMap(({ kind, snippet, text }) =>
      kind === "statement" ? [{ section: null, line: snippet ?? text }] : [],
    ),
  ];
  expect(texts.length).toBeGreaterThan(statementTable.filter(({ word }) => word !== aParameter).length);
  for (const { section, line } of texts) {
    expect([line, findingsIn(section, filled(line))]).toEqual([line, []]);
    const isWhole = /\$\d|\$\{\d+:(q|volume|mass|N|TIME)\}/.test(line.replace(/\$0|"\$1"/g, ""));
    // What is jumped over in haste is no reading and no dose.
    if (isWhole)
      expect([
        line,
        findingsIn(section, line.replace(/\$0|\$\d/g, "").replace(/\$\{\d+[:|]([^,|}]*)[^}]*\}/g, "$1"))
          .length,
      ]).not.toEqual([line, 0]);
  }
});

test("whatever a line holds, wherever the cursor is, there is an answer", () => {
  const piece = fc.constantFrom(
    "#",
    '"',
    ",",
    "±",
    "é",
    "鉢",
    "🪸",
    "/",
    " quiet: ",
    "x",
    "3",
    "as CaCO3",
    " ",
  );
  fc.assert(
    fc.property(
      fc.constantFrom(...lines),
      fc.array(fc.tuple(fc.nat(60), fc.nat(4), piece), { maxLength: 4 }),
      fc.nat(80),
      ({ section, line }, edits, at) => {
        const text = edits.reduce(
          (before, [start, gone, put]) => before.slice(0, start) + put + before.slice(start + gone),
          line,
        );
        const { farm, number } = farmWith(section, text);
        const cursor = { file: "farm.marl", line: number, column: Math.min(at, text.length) };
        for (const { insert, replace } of completions(farm, cursor, farm.moment.at)) {
          expect(insert.end).toBe(cursor.column);
          expect(replace.start).toBe(insert.start);
          expect(insert.start).toBeLessThanOrEqual(insert.end);
          expect(replace.end).toBeGreaterThanOrEqual(insert.end);
          expect(replace.end).toBeLessThanOrEqual(text.length);
        }
        const help = signatureHelp(farm, cursor);
        if (!help) return;
        expect(help.signatures[help.active]).toBeDefined();
        for (const { label, parts, active } of help.signatures) {
          for (const { start, end } of parts) expect(label.slice(start, end).trim().length).toBe(end - start);
          if (active !== null) expect(parts[active]).toBeDefined();
        }
      },
    ),
    { numRuns: 1000, seed: 1 },
  );
});
