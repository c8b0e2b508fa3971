/** Whatever stands in a file and wherever the cursor is: every question about places has an answer inside the text. */
import { readFileSync } from "node:fs";
import fc from "fast-check";
import { expect, test } from "vitest";
import type { LineSpan, LinesSpan } from "../../server/editor/cursor.ts";
import { definition } from "../../server/editor/definition.ts";
import { folds } from "../../server/editor/folding.ts";
import { highlights } from "../../server/editor/highlight.ts";
import { links } from "../../server/editor/links.ts";
import { references } from "../../server/editor/references.ts";
import { rename } from "../../server/editor/rename.ts";
import { selections } from "../../server/editor/selection.ts";
import { type FileSymbol, fileSymbols, namedSymbols } from "../../server/editor/symbols.ts";
import { walk } from "../checks/walk.ts";
import { inOneGo } from "./spans.ts";

const file = "farm.marl";
const log = readFileSync("examples/raceways/log.marl", "utf8").split("\n").slice(0, 30).join("\n");
const lines = [
  ...readFileSync("examples/farm.marl", "utf8").split("\n"),
  ...readFileSync("examples/solutions.marl", "utf8").split("\n"),
  ...readFileSync("examples/raceways/system.marl", "utf8").split("\n"),
  ...log.split("\n"),
  ...[
    "log",
    "solution",
    "use",
    'use "farm.marl"',
    "\ufeff",
    "\r",
    "# quiet:",
    "# quiet: water/stale",
    "<<<<<<< a",
  ],
  ...[
    "  set",
    "  2026-11-01",
    "  2026-11-01 moved",
    "é 水 🪸",
    "  tank é 5 L",
    '  note "',
    "constructor toString",
  ],
];
const text = fc.array(fc.constantFrom(...lines), { minLength: 1, maxLength: 40 });
const cut = fc.record({ line: fc.nat(39), column: fc.nat(60) });

test("no answer leads out of the text", () => {
  fc.assert(
    fc.property(text, cut, fc.nat(70), (whole, at, cursorColumn) => {
      // One line is cut off somewhere, as if it were just being typed.
      const typed = whole.map((line, number) => (number === at.line ? line.slice(0, at.column) : line));
      const farm = walk(new Map([[file, typed.join("\n")]]));
      const { lines: read } = farm.documents.get(file)!;
      const column = Math.min(cursorColumn, read[at.line]?.text.length ?? 0);
      const cursor = { file, line: at.line, column };

      const expectInside = ({ line, start, end }: Omit<LineSpan, "file">): void => {
        expect(read[line]).toBeDefined();
        expect([0 <= start, start <= end, end <= read[line]!.text.length]).toEqual([true, true, true]);
      };
      const expectLines = ({ first, start, last, end }: LinesSpan): void => {
        expect(first).toBeLessThanOrEqual(last);
        expectInside({ line: first, start, end: read[first]!.text.length });
        expectInside({ line: last, start: 0, end });
      };
      for (const { name, whole: all } of definition(farm, cursor)?.found ?? []) {
        expectInside(name);
        expectLines(all);
      }
      for (const span of inOneGo(references(farm, cursor, true)) ?? []) expectInside(span);
      for (const { span } of inOneGo(highlights(farm, cursor))) expectInside(span);
      for (const { span } of inOneGo(links(farm, file))) expectInside(span);
      for (const { first, last } of inOneGo(folds(farm, file))) {
        expect(first).toBeLessThan(last);
        expectInside({ line: last, start: 0, end: 0 });
      }
      for (const span of inOneGo(selections(farm, [cursor]))[0]!) expectLines(span);
      const expectSymbol = ({ name, head, whole: all, children }: FileSymbol): void => {
        expect(name).not.toBe("");
        expectInside(head);
        expectLines(all);
        for (const child of children) expectSymbol(child);
      };
      for (const symbol of inOneGo(fileSymbols(farm, file))) expectSymbol(symbol);
      for (const symbol of inOneGo(namedSymbols(farm, file)))
        expectSymbol({ ...symbol, detail: null, children: [] });
      const answer = inOneGo(rename(farm, cursor, "q7w"));
      if (answer.ok) for (const edit of answer.edits) expectInside(edit);
      else expect(answer.reason).toMatch(/\.$/);
    }),
    { numRuns: 150 },
  );
}, 120_000);
