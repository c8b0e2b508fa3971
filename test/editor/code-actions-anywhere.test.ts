import fc from "fast-check";
import { expect, test } from "vitest";
import { inOneGo } from "../../server/culture/keep.ts";
import { actionsAt } from "../../server/editor/code-actions.ts";
import { walk } from "../checks/walk.ts";
import { mutatedFile, type Random } from "../grammar/mutate.ts";
import { textsAfter } from "./actions.ts";

function randomFrom(seed: number): Random {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

test("whatever a file holds, every action's edits fit it, and a quantity in another unit still reads", () => {
  let done = 0;
  fc.assert(
    fc.property(fc.nat(), fc.nat(), fc.nat(), fc.nat(3), (seed, lineSeed, columnSeed, length) => {
      const text = mutatedFile(randomFrom(seed));
      const other = mutatedFile(randomFrom(seed + 1));
      const farm = walk(
        new Map([
          ["a.marl", text],
          ["b/c.marl", other],
        ]),
      );
      const { lines } = farm.documents.get("a.marl")!;
      const from = { line: lineSeed % lines.length, column: 0 };
      from.column = columnSeed % (lines[from.line]!.text.length + 1);
      const to = length === 0 ? from : { line: Math.min(from.line + length, lines.length - 1), column: 0 };
      if (to !== from)
        to.column = Math.max(lines[to.line]!.text.length, to.line === from.line ? from.column : 0);
      const selection = { file: "a.marl", from, to };
      for (const action of inOneGo(
        actionsAt({ farm, selection, canCreate: true, now: farm.moment.at }, null),
      )) {
        const texts = textsAfter(farm, action);
        expect(
          [...texts].some(([file, after]) => farm.texts.get(file) !== after),
          action.title,
        ).toBe(true);
        done += 1;
        if (action.kind !== "refactor.rewrite" || !action.title.startsWith("Write ")) continue;
        const after = walk(texts).documents.get("a.marl")!;
        for (const [number, line] of lines.entries())
          expect(after.lines[number]!.statement?.kind, action.title).toBe(line.statement?.kind);
      }
    }),
    { numRuns: 150 },
  );
  expect(done).toBeGreaterThan(50);
});
