import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { tidyText } from "../../grammar/tidy.ts";
import { inOneGo } from "../../server/culture/keep.ts";
import { tidyEdits, tidyRangeEdits, tidyTypedEdits } from "../../server/editor/formatting.ts";
import { changesBetween, editsBetween, editsOf, rawLines } from "../../server/editor/text-edits.ts";
import { mutatedFile, type Random, smallFile } from "../grammar/mutate.ts";
import { applied } from "./apply.ts";

const farmOf = (text: string) => ({
  texts: new Map([["farm.marl", text]]),
  documents: new Map([["farm.marl", readDocument(text)]]),
});
const edits = (text: string) => inOneGo(tidyEdits(farmOf(text), "farm.marl"));
const at = (line: number, column: number) => ({ line, column });

describe("a whole file", () => {
  test("has only what changes changed", () => {
    expect(edits("use “a.marl”\nsystem vat\n  tank  main 500 L\n  light between 9:00 and 19:00\n")).toEqual([
      { file: "farm.marl", from: at(0, 4), to: at(0, 12), text: '"a.marl"' },
      { file: "farm.marl", from: at(1, 0), to: at(1, 0), text: "\n" },
      { file: "farm.marl", from: at(2, 7), to: at(2, 8), text: "" },
      { file: "farm.marl", from: at(3, 16), to: at(3, 16), text: "0" },
    ]);
  });

  test("loses surplus blank lines and gains its last line's end", () => {
    expect(edits("system vat\n\n\n  tank main 500 L")).toEqual([
      { file: "farm.marl", from: at(1, 0), to: at(2, 0), text: "" },
      { file: "farm.marl", from: at(3, 17), to: at(3, 17), text: "\n" },
    ]);
  });

  test("keeps its line endings and byte order mark", () => {
    expect(edits("\ufeffsystem  vat\r\n  tank main 500 L\n")).toEqual([
      { file: "farm.marl", from: at(0, 7), to: at(0, 8), text: "" },
      { file: "farm.marl", from: at(1, 0), to: at(2, 0), text: "  tank main 500 L\r\n" },
    ]);
  });

  test("has no edits where it is tidy", () => {
    expect(edits("system vat\n  tank main 500 L\n")).toEqual([]);
    expect(edits("")).toEqual([]);
    expect(edits("\ufeffsystem vat\r\n  tank main 500 L\r\n")).toEqual([]);
  });

  test("becomes what marl tidy makes of it, whatever its text", () => {
    const ending = fc.constantFrom("\n", "\r\n", "mixed");
    fc.assert(
      fc.property(randomText, ending, fc.boolean(), (text, kind, mark) => {
        let flip = false;
        const ended = text.replace(/\n/g, () => {
          flip = !flip;
          return kind === "\r\n" || (kind === "mixed" && flip) ? "\r\n" : "\n";
        });
        const given = (mark ? "\ufeff" : "") + ended;
        expect(applied(given, edits(given))).toBe(tidyText(given));
      }),
      { numRuns: 600 },
    );
  });

  test("an edit never cuts a character of two units", () => {
    expect(edits('system vat "🐠"\n  note  “🐡”\n')).toEqual([
      { file: "farm.marl", from: at(1, 7), to: at(1, 12), text: '"🐡"' },
    ]);
    expect(editsBetween("a", "🐠", "🐡")).toEqual([{ file: "a", from: at(0, 0), to: at(0, 2), text: "🐡" }]);
  });
});

describe("a range", () => {
  const text = "system  vat\n  tank  main 500 L\n\n\n  tank  sump 80 L\n";
  const range = (from: ReturnType<typeof at>, to: ReturnType<typeof at>) =>
    applied(text, inOneGo(tidyRangeEdits(farmOf(text), "farm.marl", from, to)));

  test("has the lines tidied that stand whole in it", () => {
    expect(range(at(1, 0), at(2, 0))).toBe("system  vat\n  tank main 500 L\n\n\n  tank  sump 80 L\n");
    expect(range(at(0, 3), at(1, 18))).toBe("system  vat\n  tank main 500 L\n\n\n  tank  sump 80 L\n");
    expect(range(at(0, 3), at(1, 17))).toBe(text);
    expect(range(at(0, 0), at(4, 4))).toBe("system vat\n  tank main 500 L\n\n  tank  sump 80 L\n");
  });

  test("of the whole file is the whole file", () => {
    expect(range(at(0, 0), at(5, 0))).toBe(tidyText(text));
    expect(range(at(0, 0), at(9, 0))).toBe(tidyText(text));
  });

  test("of nothing changes nothing", () => {
    expect(range(at(1, 7), at(1, 7))).toBe(text);
  });

  test("changes no line outside it, and and inside it only what tidying changes", () => {
    fc.assert(
      fc.property(randomText, fc.nat(12), fc.nat(12), (text, first, count) => {
        const given = text.replaceAll("\r", "");
        const lines = rawLines(given);
        const farm = farmOf(given);
        const [from, to] = [Math.min(first, lines.length - 1), Math.min(first + count, lines.length - 1)];
        const found = inOneGo(tidyRangeEdits(farm, "farm.marl", at(from, 0), at(to, 0)));
        for (const edit of found) {
          expect(edit.from.line).toBeGreaterThanOrEqual(from);
          expect(edit.to.line).toBeLessThanOrEqual(to);
        }
        expect(tidyText(applied(given, found))).toBe(tidyText(given));
      }),
      { numRuns: 400 },
    );
  });
});

describe("while typing", () => {
  const typed = (text: string, line: number) =>
    applied(text, tidyTypedEdits(farmOf(text), "farm.marl", line));

  test("the line just left becomes tidy and the new one is indented", () => {
    expect(typed("system vat\n  tank  main 500 L\n\n", 2)).toBe("system vat\n  tank main 500 L\n  \n");
    expect(typed("system  vat\n\n", 1)).toBe("system vat\n  \n");
    expect(typed("system vat\r\n  tank  main 500 L\r\n\r\n", 2)).toBe(
      "system vat\r\n  tank main 500 L\r\n  \r\n",
    );
  });

  test("behind a blank line or a use line nothing is indented", () => {
    expect(typed("system vat\n  tank main 500 L\n  \n\n", 3)).toBe("system vat\n  tank main 500 L\n\n\n");
    expect(typed('use  "a.marl"\n\n', 1)).toBe('use "a.marl"\n\n');
    expect(typed("# remark\n\n", 1)).toBe("# remark\n\n");
  });

  test("what stands on the new line, and every other line, stays", () => {
    expect(typed("system  vat\n  tank  main\n500  L\n", 2)).toBe("system  vat\n  tank  main\n500  L\n");
    expect(typed("log vat\n  2026-11-30  note “é🐠”\n    2026-12-01  note “a”\n", 2)).toBe(
      'log vat\n  2026-11-30 note "é🐠"\n    2026-12-01  note “a”\n',
    );
  });
});

describe("edits between two texts", () => {
  const lines = fc.array(fc.constantFrom("a", "b", "c", "  d", "🐠"), { maxLength: 14 });

  test("make one of the other", () => {
    fc.assert(
      fc.property(lines, lines, (left, right) => {
        const [before, after] = [left.join("\n"), right.join("\n")];
        expect(applied(before, editsBetween("a", before, after))).toBe(after);
      }),
      { numRuns: 600 },
    );
  });

  test("touch only what differs", () => {
    expect(changesBetween(["a", "b", "c", "d"], ["a", "x", "c", "d", "e"])).toEqual([
      { from: 1, to: 2, lines: ["x"] },
      { from: 4, to: 4, lines: ["e"] },
    ]);
    expect(editsBetween("a", "a\nb\n", "a\nb\n")).toEqual([]);
  });

  test("beyond what is quick to compare replace the block, rightly", () => {
    const old = Array.from({ length: 900 }, (_, index) => `old ${index}`);
    const next = Array.from({ length: 1000 }, (_, index) => (index % 3 ? `new ${index}` : `old ${index}`));
    const [before, after] = [old.join("\n"), next.join("\n")];
    expect(applied(before, editsOf("a", old, changesBetween(old, next)))).toBe(after);
  });
});

/** Pieces of real files with the slips of hand, editor and disk. */
const randomText = fc.nat().map((seed) => {
  const random = randomFrom(seed);
  return random() < 0.5 ? smallFile(random) : mutatedFile(random);
});

function randomFrom(seed: number): Random {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}
