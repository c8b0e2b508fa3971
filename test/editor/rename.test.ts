import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { editedText } from "../../server/checks/apply-fixes.ts";
import type { Cursor } from "../../server/editor/cursor.ts";
import { linesOf } from "../../server/editor/cursor.ts";
import { renamable, rename } from "../../server/editor/rename.ts";
import { lookUp } from "../../server/editor/things.ts";
import { namesIn } from "../../server/editor/words.ts";
import type { Farm } from "../../server/farm.ts";
import { reportOn } from "../../server/report/report.ts";
import { wholeFarm } from "../../server/report/scope.ts";
import { walk } from "../checks/walk.ts";
import { cursorIn } from "./fixture.ts";
import { inOneGo, shown } from "./spans.ts";

/** The files that a renaming changes, as they are afterwards. */
function renamed(farm: Farm, cursor: Cursor, newName: string): ReadonlyMap<string, string> {
  const answer = inOneGo(rename(farm, cursor, newName));
  if (!answer.ok) throw new Error(answer.reason);
  const files = new Set(answer.edits.map(({ file }) => file));
  const editsOf = (file: string) => answer.edits.filter((edit) => edit.file === file);
  return new Map([...files].map((file) => [file, editedText(farm.texts.get(file)!, editsOf(file))]));
}

function afterRenaming(text: string, newName: string): string {
  const { farm, cursor } = cursorIn(text);
  return [...renamed(farm, cursor, newName)].map(([file, after]) => `// ${file}\n${after}`).join("");
}

function refusal(text: string, newName: string): string | null {
  const { farm, cursor } = cursorIn(text);
  const answer = inOneGo(rename(farm, cursor, newName));
  return answer.ok ? null : answer.reason;
}

function target(text: string): string {
  const { farm, cursor } = cursorIn(text);
  const answer = renamable(farm, cursor);
  return answer.ok ? `${answer.thing.kind} ${shown(farm, answer.span)}` : answer.reason;
}

const farm = (place: string) => {
  const text = `
use "stock.marl"

system vat "The vat" # é 水 🪸
  tank main 500 L
  pump head-1 gives soda at 40 mL/min
  cohort tips 10 pieces uptake 1 meq/day each

log vat
  2026-11-01 08:00 set soda 40 mL/day by soda
  2026-11-02 gave soda 10 mL and more
// file: stock.marl
solution soda "soda"
  dissolve sodium-carbonate 80 g
  make up to 1 L
`;
  return text.replace(place.replace("|", ""), place);
};

test("every mention gets the new name, in every file, and nothing else does", () => {
  expect(afterRenaming(farm('solution so|da "soda"'), "ash-part")).toBe(`// farm.marl
use "stock.marl"

system vat "The vat" # é 水 🪸
  tank main 500 L
  pump head-1 gives ash-part at 40 mL/min
  cohort tips 10 pieces uptake 1 meq/day each

log vat
  2026-11-01 08:00 set ash-part 40 mL/day by soda
  2026-11-02 gave ash-part 10 mL and more
// stock.marl
solution ash-part "soda"
  dissolve sodium-carbonate 80 g
  make up to 1 L
`);
});

test("a system takes its logs along", () => {
  const text =
    'use "b.marl"\n\nlog va|t\n  2026-11-01 read pH 8\n// file: b.marl\nsystem vat\n  tank vat 500 L\n\nlog vat\n';
  expect(afterRenaming(text, "big-vat")).toBe(
    '// b.marl\nsystem big-vat\n  tank vat 500 L\n\nlog big-vat\n// farm.marl\nuse "b.marl"\n\nlog big-vat\n  2026-11-01 read pH 8\n',
  );
});

test("cohorts that corals move between keep the same name", () => {
  const text = `
system north
  tank main 500 L
  cohort ti|ps 10 pieces uptake 1 meq/day each

system south
  tank main 500 L
  cohort tips 10 pieces uptake 1 meq/day each

system west
  tank main 500 L
  cohort tips 10 pieces uptake 1 meq/day each

log north
  2026-11-01 moved tips 2 pieces to south
`;
  expect(afterRenaming(text, "frags")).toBe(`// farm.marl
system north
  tank main 500 L
  cohort frags 10 pieces uptake 1 meq/day each

system south
  tank main 500 L
  cohort frags 10 pieces uptake 1 meq/day each

system west
  tank main 500 L
  cohort tips 10 pieces uptake 1 meq/day each

log north
  2026-11-01 moved frags 2 pieces to south
`);
});

test("the same name again changes nothing", () => {
  expect(refusal(farm("system v|at"), "vat")).toBeNull();
  expect(afterRenaming(farm("system v|at"), "vat")).toBe("");
});

describe("what can be renamed", () => {
  test.each([
    ["system v|at", 'system farm.marl:3 system [vat] "The vat" # é 水 🪸'],
    ["set so|da", "solution farm.marl:9 2026-11-01 08:00 set [soda] 40 mL/day by soda"],
    ["head-1|", "pump farm.marl:5 pump [head-1] gives soda at 40 mL/min"],
    [
      "tan|k main",
      '"tank" is a word of the language. Only names that the farm\'s files declare can be renamed.',
    ],
    ["5|00 L", '"500" is no name. Only names that the farm\'s files declare can be renamed.'],
    ["by so|da", '"soda" is no name. Only names that the farm\'s files declare can be renamed.'],
    ["🪸|", "There is no name here. Only names that the farm's files declare can be renamed."],
    ['"stock.m|arl"', "This is a file's path. Rename the file itself, and the use lines follow."],
    [
      "sodium-carb|onate",
      '"sodium-carbonate" is a reagent that every farm has, so its name stays. Declare a reagent of your own to use another name.',
    ],
  ])("%s", (place, answer) => {
    expect(target(farm(place))).toBe(answer);
  });

  test("no parameter, and nothing that isn't declared", () => {
    expect(target("system vat\n  hold alk|alinity 8 to 9 dKH\n")).toBe(
      '"alkalinity" is a parameter of the language. Only names that the farm\'s files declare can be renamed.',
    );
    expect(target("system vat\n  by-hand so|da\n")).toBe(
      '"soda" isn\'t declared here, so nothing is known to rename. Declare it, or correct the name.',
    );
  });
});

describe("new names that are refused", () => {
  const form = "A name begins with a letter from a to z and goes on with letters, digits, - or _.";
  test.each([
    ["", form],
    ["9lives", form],
    ["big vat", form],
    ["søl", form],
    ["vat ", form],
    ["vat#2", form],
    ["x", form],
    ["水", form],
    ["tank", '"tank" is a word of the language, so it can\'t be a name. Choose another name.'],
    ["with", '"with" is a word of the language, so it can\'t be a name. Choose another name.'],
  ])("%j", (name, reason) => {
    expect(refusal(farm("system v|at"), name)).toContain(reason);
  });

  test.each(["carbonate", "alkalinity", "L", "vat_2", "constructor"])("not %s", (name) => {
    expect(refusal(farm("system v|at"), name)).toBeNull();
  });

  test("a name that a file sees which sees the thing", () => {
    const text =
      'use "a.marl"\nuse "b.marl"\n// file: a.marl\nkit be|nch\n// file: b.marl\nsaltwater mix\n// file: c.marl\nkit alone\n';
    expect(refusal(text, "mix")).toBe(
      '"mix" is a salt water in b.marl already, and farm.marl sees both. Choose another name.',
    );
    expect(refusal(text, "alone")).toBeNull();
  });

  test("a system's own names clash within it and within their kind", () => {
    const text = `
solution soda
  supplies alkalinity 1.6 meq/mL

system vat
  tank main 500 L
  pump he|ad-1 gives soda at 40 mL/min
  pump head-2 gives soda at 40 mL/min

system vat-2
  tank main 500 L
  pump head-3 gives soda at 40 mL/min
`;
    expect(refusal(text, "head-2")).toBe(
      'The system "vat" has a pump "head-2" already. Choose another name.',
    );
    for (const free of ["head-3", "main", "soda"]) expect(refusal(text, free)).toBeNull();
  });

  test("pumps and solutions that set lines would mix up", () => {
    const text = (pump: string, solution: string) => `
system vat
  tank main 500 L
  pump ${pump} gives lime at 40 mL/min
  by-hand soda

solution ${solution}
  supplies alkalinity 1.6 meq/mL

solution lime
  saturated calcium-hydroxide

log vat
  2026-11-01 set head-1 30 mL/day, soda 40 mL/day
`;
    expect(refusal(text("he|ad-1", "soda"), "soda")).toBe(
      'Set lines in farm.marl mean the solution "soda", and would mean the pump. Choose another name.',
    );
    expect(refusal(text("head-1", "so|da"), "head-1")).toBe(
      'The system "vat" has a pump "head-1", and its set lines would mean the pump. Choose another name.',
    );
    expect(refusal(text("he|ad-1", "soda"), "lime")).toBeNull();
  });

  test("a reagent can't take the name of one that every farm has; a solution can", () => {
    const text = (place: string) =>
      place === "dr|um"
        ? `reagent ${place}\n  is sodium-carbonate\n`
        : `solution ${place}\n  supplies alkalinity 1 meq/mL\n`;
    expect(refusal(text("dr|um"), "calcium-chloride")).toBe(
      '"calcium-chloride" is the name of a reagent that every farm has. Choose another name.',
    );
    expect(refusal(text("dr|um"), "sodium-chloride")).toContain("every farm has");
    expect(refusal(text("so|da"), "sodium-chloride")).toBeNull();
  });
});

describe("the example farm", () => {
  const files = new Map(
    readdirSync("examples", { recursive: true, encoding: "utf8" })
      .filter((name) => name.endsWith(".marl"))
      .map((name) => [name, readFileSync(`examples/${name}`, "utf8")] as const),
  );
  const example = walk(files);
  // What is offered for a slip goes by how names are spelt: of those problems only the place is compared.
  const told = (of: Farm): string => {
    const report = reportOn(of, wholeFarm);
    const isSlip = ({ code }: { readonly code: string }): boolean => code === "name/undeclared";
    const slips = of.problems.filter(isSlip).map(({ place }) => place);
    const rest = [of.problems, report.problems].map((list) => list.filter((problem) => !isSlip(problem)));
    return JSON.stringify([slips, rest, { ...report, problems: [] }]);
  };
  const before = told(example);

  /** One mention of each thing, the last one, so that renaming starts from uses too. */
  function mentionOfEach(): ReadonlyMap<string, { readonly name: string; readonly cursor: Cursor }> {
    const names = lookUp(example);
    const found = new Map<string, { readonly name: string; readonly cursor: Cursor }>();
    for (const file of example.documents.keys())
      for (const line of linesOf(example, file))
        for (const word of namesIn(line.line)) {
          const thing = names.thingOf(line, word);
          if (!thing || thing.builtIn) continue;
          found.set(thing.key, { name: thing.name, cursor: { file, line: line.number, column: word.end } });
        }
    return found;
  }

  const each = [...mentionOfEach()];

  test("names systems, solutions, kits, waters and what the systems hold", () => {
    expect(each.length).toBeGreaterThan(25);
    expect(new Set(each.map(([key]) => key.split(" ")[0]))).toEqual(
      new Set([
        "system",
        "solution",
        "saltwater",
        "kit",
        "tank",
        "displacement",
        "cohort",
        "pump",
        "reagent",
      ]),
    );
  });

  test.each(each)("%s: another name and back", (_key, { name, cursor }) => {
    // As long as the old one, so that every place stays where it was.
    const fresh = "q7w".repeat(name.length).slice(0, name.length);
    const changed = renamed(example, cursor, fresh);
    const there = walk(new Map([...files, ...changed]));
    expect(told(there).replaceAll(fresh, name)).toBe(before);
    const back = renamed(there, cursor, name);
    expect([...back.keys()].sort()).toEqual([...changed.keys()].sort());
    for (const [file, text] of back) expect(text).toBe(files.get(file));
  });
});
