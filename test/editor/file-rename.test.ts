import { expect, test } from "vitest";
import { editedText } from "../../server/checks/apply-fixes.ts";
import { mendedUses, movesOf } from "../../server/editor/file-rename.ts";
import { walk } from "../checks/walk.ts";
import { marked } from "./fixture.ts";

const { farm, files } = marked(`
use "stock-room/solutions.marl"
use "./vats/vat.marl" # é 水 🪸
use "gone.marl"
// file: stock-room/solutions.marl
use "../farm.marl"
// file: vats/vat.marl
use “../stock-room/solutions.marl”
use "log.marl"
// file: vats/log.marl
use "vat.marl"
use "deep/../vat.marl"
`);

/** The changed texts by their new paths. */
function mended(...renames: readonly (readonly [string, string | null])[]) {
  const moves = movesOf(farm, renames);
  const edits = mendedUses(farm, moves);
  const changed = [...new Set(edits.map(({ file }) => file))].map((file) => {
    const text = editedText(
      files.get(file)!,
      edits.filter((edit) => edit.file === file),
    );
    return [moves.get(file) ?? file, text.trimEnd()];
  });
  return Object.fromEntries(changed) as Readonly<Record<string, string>>;
}

test("a file that is used gets another name in the same folder", () => {
  expect(mended(["stock-room/solutions.marl", "stock-room/stock.marl"])).toEqual({
    "farm.marl": 'use "stock-room/stock.marl"\nuse "./vats/vat.marl" # é 水 🪸\nuse "gone.marl"',
    "vats/vat.marl": 'use “../stock-room/stock.marl”\nuse "log.marl"',
  });
});

test("a file that goes to another folder takes its own uses along", () => {
  expect(mended(["vats/vat.marl", "vat.marl"])).toEqual({
    "farm.marl": 'use "stock-room/solutions.marl"\nuse "./vat.marl" # é 水 🪸\nuse "gone.marl"',
    "vat.marl": 'use “stock-room/solutions.marl”\nuse "vats/log.marl"',
    "vats/log.marl": 'use "../vat.marl"\nuse "../vat.marl"',
  });
});

test("a folder takes all its files along; what they use of each other stays", () => {
  expect(mended(["vats", "halls/east"])).toEqual({
    "farm.marl": 'use "stock-room/solutions.marl"\nuse "./halls/east/vat.marl" # é 水 🪸\nuse "gone.marl"',
    "halls/east/vat.marl": 'use “../../stock-room/solutions.marl”\nuse "log.marl"',
  });
  expect(mended(["vat", "halls"])).toEqual({});
});

test("two files change places", () => {
  expect(mended(["vats/vat.marl", "vats/log.marl"], ["vats/log.marl", "vats/vat.marl"])).toEqual({
    "farm.marl": 'use "stock-room/solutions.marl"\nuse "./vats/log.marl" # é 水 🪸\nuse "gone.marl"',
    "vats/log.marl": 'use “../stock-room/solutions.marl”\nuse "vat.marl"',
    "vats/vat.marl": 'use "log.marl"\nuse "log.marl"',
  });
});

test("what leaves the farm can't be led to, nor can a path with a quote in it be written", () => {
  expect(mended(["stock-room/solutions.marl", null])).toEqual({});
  expect(mended(["stock-room/solutions.marl", 'stock-room/"new".marl'])).toEqual({});
});

test("after the files have moved, every use leads where it led", () => {
  const renames = [
    ["vats", "halls/east"],
    ["stock-room/solutions.marl", "stock.marl"],
  ] as const;
  const moves = movesOf(farm, renames);
  const edits = mendedUses(farm, moves);
  const after = new Map(
    [...files].map(([file, text]) => [
      moves.get(file) ?? file,
      editedText(
        text,
        edits.filter((edit) => edit.file === file),
      ),
    ]),
  );
  const moved = walk(after);
  for (const [file, uses] of farm.bound.uses)
    expect(moved.bound.uses.get(moves.get(file) ?? file)).toEqual(
      uses.map((each) => moves.get(each) ?? each),
    );
});
