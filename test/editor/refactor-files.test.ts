import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { inOneGo } from "../../server/culture/keep.ts";
import { actionsAt } from "../../server/editor/code-actions.ts";
import type { Farm } from "../../server/farm.ts";
import { type Report, reportOn } from "../../server/report/report.ts";
import { filesOf, walk } from "../checks/walk.ts";
import { eastHall, shelves } from "../grammar/a-farm.ts";
import { textAfter, textsAfter, titlesAt, walkedAfter } from "./actions.ts";

const moves = (text: string, canCreate = true) => titlesAt(text, ["refactor.move"], canCreate);

/** Lines of a log that stand out of order are told so; that isn't kept. */
const withoutOrder = (farm: Farm): Farm => ({
  ...farm,
  problems: farm.problems.filter(({ code }) => code !== "log/out-of-order"),
});

const withoutPlaces = (report: Report): Report =>
  JSON.parse(JSON.stringify(report, (key, value) => (key === "file" || key === "line" ? null : value)));

/** Everything that is reported, without the places where it stands. */
function reported(farm: Farm): string {
  const report = reportOn(farm, { paths: [""], system: null });
  const problems = report.problems.map(({ code, severity, message, system }) =>
    [severity, code, system, message].join(" "),
  );
  const { solutions } = withoutPlaces(report);
  const byName = (left: { readonly name: string }, right: { readonly name: string }) =>
    left.name < right.name ? -1 : 1;
  const { systems } = withoutPlaces(report);
  return JSON.stringify(
    { problems: problems.sort(), solutions: [...solutions].sort(byName), systems: [...systems].sort(byName) },
    null,
    1,
  );
}

const shop = "solution part\n  dissolve jar 400 g\n  make up to 5 L\n";
const jar = "reagent jar\n  is calcium-chloride-dihydrate\n";

describe("a solution is moved", () => {
  test("to a new file, which its old one then uses", () => {
    const text = `system vat\n  tank main 500 L\n  by-hand part\n\n# Mixed on Mondays é🐠.\n|${shop}`;
    expect(moves(text)).toEqual(["Move part to a new file solutions.marl"]);
    expect(moves(text, false)).toEqual([]);
    expect(
      textAfter(
        text.replace(/dissolve[\s\S]*/, "supplies alkalinity 1.6 meq/mL\n"),
        "Move part to a new file solutions.marl",
      ),
    ).toBe(
      '// file: farm.marl\nuse "solutions.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand part\n// file: solutions.marl\n# Mixed on Mondays é🐠.\nsolution part\n  supplies alkalinity 1.6 meq/mL\n',
    );
  });

  test("though a file that won't see it holds its letters in another word", () => {
    const text = `|solution part\n  supplies alkalinity 1.6 meq/mL\n\n// file: other.marl\nuse "farm.marl"\n\nsystem vat\n  tank partly 500 L\n  note "part"\n// file: stock.marl\nkit bench\n  pH scatter 0.1\n`;
    expect(moves(text)).toEqual([
      "Move part to a new file solutions.marl",
      "Move part to other.marl",
      "Move part to stock.marl",
    ]);
  });

  test("from a file of the usual name to one of its own name", () => {
    const text =
      "// file: solutions.marl\n|solution part\n  supplies alkalinity 1.6 meq/mL\n\nsolution two\n  supplies calcium 60 g/L\n";
    expect(moves(text)).toEqual(["Move part to a new file part.marl"]);
  });

  test("to one that has to see what its recipe names", () => {
    const text = `system vat\n  tank main 500 L\n\n|${shop}\n// file: bench/shelf.marl\n# Shelf.\n\nkit bench\n  alkalinity scatter 0.1 dKH\n// file: store/jars.marl\n${jar}`;
    const known = `use "store/jars.marl"\n\n${text}`;
    expect(moves(known)).toEqual([
      "Move part to a new file solutions.marl",
      "Move part to bench/shelf.marl",
      "Move part to store/jars.marl",
    ]);
    expect(textAfter(known, "Move part to bench/shelf.marl")).toBe(
      `// file: farm.marl\nuse "store/jars.marl"\n\nsystem vat\n  tank main 500 L\n// file: bench/shelf.marl\n# Shelf.\n\nuse "../store/jars.marl"\n\nkit bench\n  alkalinity scatter 0.1 dKH\n\n${shop}// file: store/jars.marl\n${jar}`,
    );
  });

  test("for others that saw it through its old file, by that file", () => {
    const text = `|solution part\n  supplies alkalinity 1.6 meq/mL\n\nkit bench\n  pH scatter 0.1\n// file: vat.marl\nuse "farm.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand part\n// file: z.marl\nkit other\n  pH scatter 0.1\n`;
    expect(textAfter(text, "Move part to z.marl")).toBe(
      '// file: farm.marl\nuse "z.marl"\n\nkit bench\n  pH scatter 0.1\n// file: vat.marl\nuse "farm.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand part\n// file: z.marl\nkit other\n  pH scatter 0.1\n\nsolution part\n  supplies alkalinity 1.6 meq/mL\n',
    );
  });

  test("with all its recipes", () => {
    const recipes =
      "solution part\n  supplies alkalinity 1.6 meq/mL\n\nsolution part from 2026-10-01\n  supplies alkalinity 1.8 meq/mL\n";
    const text = `system vat\n  tank main 500 L\n  by-hand part\n\n|${recipes}\nkit bench\n  pH scatter 0.1\n`;
    expect(textAfter(text, "Move part to a new file solutions.marl")).toBe(
      `// file: farm.marl\nuse "solutions.marl"\n\nsystem vat\n  tank main 500 L\n  by-hand part\n\nkit bench\n  pH scatter 0.1\n// file: solutions.marl\n${recipes}`,
    );
  });

  test("never where another of its name would be seen, or files would use each other", () => {
    const other = "// file: other.marl\nsolution part\n  supplies alkalinity 1.5 meq/mL\n";
    expect(
      moves(`|${shop}
${jar}${other}`),
    ).toEqual(["Move part to a new file solutions.marl"]);
    const circle = `system vat\n  tank main 500 L\n  by-hand part\n\n|solution part\n  supplies alkalinity 1.6 meq/mL\n// file: b.marl\nuse "farm.marl"\n`;
    expect(moves(circle)).toEqual(["Move part to a new file solutions.marl"]);
  });

  test("keeps the line endings and byte order mark of each file", () => {
    const text =
      "\ufeff|solution part\r\n  supplies alkalinity 1.6 meq/mL\r\n\r\nkit bench\r\n  pH scatter 0.1\r\n// file: b.marl\nkit other\n  pH scatter 0.1";
    const { farm } = { farm: walk(filesOf(text.replace("|", ""))) };
    const at = { line: 0, column: 0 };
    const found = inOneGo(
      actionsAt({ farm, selection: { file: "farm.marl", from: at, to: at }, canCreate: true, now: 0 }, [
        "refactor",
      ]),
    );
    expect(found.map(({ title }) => title)).toEqual([
      "Move part to a new file solutions.marl",
      "Move part to b.marl",
    ]);
    expect([...textsAfter(farm, found[1]!)]).toEqual([
      ["farm.marl", "\ufeffkit bench\r\n  pH scatter 0.1\r\n"],
      ["b.marl", "kit other\n  pH scatter 0.1\n\nsolution part\n  supplies alkalinity 1.6 meq/mL\n"],
    ]);
    expect(textsAfter(farm, found[0]!).get("solutions.marl")).toBe(
      "\ufeffsolution part\r\n  supplies alkalinity 1.6 meq/mL\r\n",
    );
  });
});

test("kits, salt waters and reagents are moved likewise, a system isn't", () => {
  expect(moves(`|${jar}`)).toEqual(["Move jar to a new file reagents.marl"]);
  expect(moves("|kit bench\n  pH scatter 0.1\n")).toEqual(["Move bench to a new file kits.marl"]);
  expect(moves("|saltwater mix\n  salinity 35\n")).toEqual(["Move mix to a new file salt-waters.marl"]);
  expect(moves("|system vat\n  tank main 500 L\n")).toEqual([]);
  expect(moves("kit bench\n  |pH scatter 0.1\n")).toEqual([]);
});

const examples = resolve(import.meta.dirname, "../../examples");
const exampleTexts = new Map(
  readdirSync(examples, { recursive: true, encoding: "utf8" })
    .filter((name) => name.endsWith(".marl"))
    .sort()
    .map((name) => [name, readFileSync(join(examples, name), "utf8")]),
);

/** The same farm with every sixth line of its logs. */
const shortTexts = new Map(
  [...exampleTexts].map(([file, text]) => [
    file,
    text
      .split("\n")
      .filter((line, index) => !/^ {2}\d/.test(line) || index % 6 === 0)
      .join("\n"),
  ]),
);

/** Does every move and split of a farm, each by itself. */
function checkMoves(texts: ReadonlyMap<string, string>): number {
  const farm = walk(texts);
  const before = reported(withoutOrder(farm));
  let done = 0;
  for (const [file, document] of farm.documents) {
    for (const { headerLine } of document.sections) {
      const at = { line: headerLine, column: 0 };
      const selection = { file, from: at, to: at };
      for (const action of inOneGo(
        actionsAt({ farm, selection, canCreate: true, now: 0 }, ["refactor.move", "refactor.rewrite"]),
      )) {
        expect(reported(withoutOrder(walkedAfter(farm, action))), `${file}: ${action.title}`).toBe(before);
        done += 1;
      }
    }
  }
  return done;
}

describe("the report is the same afterwards, apart from places", () => {
  test("for every move and split in the example farm", () => {
    expect(checkMoves(shortTexts)).toBeGreaterThan(30);
  });

  test("for every move and split in a farm of two files", () => {
    const texts = new Map([
      ["east.marl", eastHall],
      ["shelves.marl", shelves],
    ]);
    expect(checkMoves(texts)).toBeGreaterThan(5);
  });

  test("for a log whose lines were thrown about", () => {
    const system = exampleTexts.get("raceways/system.marl")!;
    const lines = exampleTexts
      .get("raceways/log.marl")!
      .split("\n")
      .filter((line) => /^ {2}\d/.test(line))
      .slice(0, 40);
    fc.assert(
      fc.property(fc.shuffledSubarray(lines, { minLength: 12 }), fc.boolean(), (some, comments) => {
        const body = some.flatMap((line, index) =>
          comments && index % 5 === 0 ? ["", `  # Remark ${index}.`, line] : [line],
        );
        const texts = new Map([
          ...shortTexts,
          ["raceways/system.marl", system],
          ["raceways/log.marl", ['use "system.marl"', "", "log raceways", ...body, ""].join("\n")],
        ]);
        const farm = walk(texts);
        const at = { line: 2, column: 0 };
        const selection = { file: "raceways/log.marl", from: at, to: at };
        const found = inOneGo(actionsAt({ farm, selection, canCreate: true, now: 0 }, ["refactor.rewrite"]));
        for (const action of found) {
          const sorted = textsAfter(farm, action);
          const log = sorted.get("raceways/log.marl")!.split("\n");
          expect([...log].sort()).toEqual(texts.get("raceways/log.marl")!.split("\n").sort());
          const minutes = log.filter((line) => /^ {2}\d/.test(line)).map((line) => line.slice(2, 18));
          expect(minutes).toEqual([...minutes].sort());
          expect(reported(withoutOrder(walkedAfter(farm, action)))).toBe(reported(withoutOrder(farm)));
        }
        const isSorted = some.every(
          (line, index) => index === 0 || some[index - 1]!.slice(2, 18) <= line.slice(2, 18),
        );
        expect(found.length).toBe(isSorted ? 0 : 1);
      }),
      { numRuns: 12 },
    );
  });
});
