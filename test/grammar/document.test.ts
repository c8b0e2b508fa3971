import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { eastHall, shelves } from "./a-farm.ts";
import { file, inWords } from "./fixture.ts";

const outline = (text: string): string[] =>
  readDocument(text).sections.map(
    ({ kind, name, title, firstLine, lastLine }) =>
      `${[kind, name?.text, title && `"${title.text}"`].filter(Boolean).join(" ")} ${firstLine}-${lastLine}`,
  );

describe("a whole farm", () => {
  test("reads with nothing wrong", () => {
    for (const text of [eastHall, shelves]) {
      const { lines } = readDocument(text);
      expect(
        lines.flatMap((line) => line.findings.map((finding) => `${line.text}: ${inWords(finding)}`)),
      ).toEqual([]);
      const unread = lines.filter((line) => line.statement === null).map((line) => line.text.trim());
      expect(unread.filter((line) => line !== "" && !line.startsWith("#"))).toEqual([]);
    }
  });

  test("its sections, from header to header", () => {
    expect(outline(eastHall)).toEqual(['system east-hall "East hall raceways" 5-42', "log east-hall 44-59"]);
    expect(outline(shelves)).toEqual([
      'reagent soda-drum "Soda ash, 20 kg drum" 1-4',
      "reagent strontium-jar 6-7",
      'solution soda "Soda stock" 9-12',
      "solution soda 14-16",
      "solution lime 18-20",
      "solution bought 22-24",
      'saltwater vat-water "Vat" 26-30',
      'kit titrator "Bench titrator" 32-35',
      "store 37-41",
    ]);
  });

  test("the files that it uses", () => {
    expect(readDocument(eastHall).uses.map(({ line, path }) => [line, path.text])).toEqual([
      [1, "shelves.marl"],
      [2, "west.marl"],
    ]);
  });
});

describe("headers", () => {
  test("a known header word opens a section also when indented", () => {
    const { sections } = file(`
system vat
  tank main 500 L
  log vat
  2026-11-24 note "indented header"
`);
    expect(sections.map((section) => section.kind)).toEqual(["system", "log"]);
  });

  test("a misspelt header is one problem, its section keeps kind and name", () => {
    const { sections, lines } = file(`
sytem vat "Vat"
^^^^^ unknown-word sytem → system | system, solution, reagent, store, saltwater, kit, log, use
  tank main 500 L
  hold salinity 34 to 36
Kit bench
^^^ unknown-word Kit → kit | system, solution, reagent, store, saltwater, kit, log, use
  pH tolerance 0.05
`);
    expect(sections.map(({ kind, name, title }) => [kind, name?.text, title?.text])).toEqual([
      ["system", "vat", "Vat"],
      ["kit", "bench", undefined],
    ]);
    expect(lines.map((line) => line.section)).toEqual([0, 0, 0, 1, 1]);
  });

  test("a header without its name is one problem", () => {
    const { sections } = file(`
system
^^^^^^ unfinished | a name
  tank main 500 L
log "Vat"
    ^^^^^ unknown-word "Vat" → nothing | a name
  2026-11-24 stopped head-1
store shelf
      ^^^^^ unknown-word shelf → nothing | nothing
  2026-11-24 counted soda 5 kg
`);
    expect(sections.map(({ kind, name }) => [kind, name?.text])).toEqual([
      ["system", undefined],
      ["log", undefined],
      ["store", "shelf"],
    ]);
  });

  test("a header that is like none leaves its own lines out and changes no other section", () => {
    const { sections, lines } = file(`
system vat
  tank main 500 L
aquarium other
^^^^^^^^ unknown-word aquarium → nothing | system, solution, reagent, store, saltwater, kit, log, use
  tank main 900 L   # kept
log vat
  2026-11-24 stopped head-1
`);
    expect(sections.map((section) => section.kind)).toEqual(["system", "log"]);
    expect(lines[3]).toMatchObject({ statement: null, section: null, comment: { start: 20, end: 26 } });
  });
});

describe("lines at the margin", () => {
  test("a statement without its indent is left out, and the section goes on", () => {
    const { lines } = file(`
system vat
tank main 500 L
^^^^ misplaced tank margin
  tank sump 100 L
log vat
2026-11-24 08:00 stopped head-1
^^^^^^^^^^ misplaced 2026-11-24 margin
  2026-11-24 09:00 started head-1
saltwater mix
calcium 425 mg/L
^^^^^^^ misplaced calcium margin
  salinity 35
`);
    expect(lines.map((line) => line.section)).toEqual([0, 0, 0, 1, 1, 1, 2, 2, 2]);
    expect(lines.filter((line) => line.statement !== null)).toHaveLength(6);
  });

  test("a slip that is like a statement, or no header's shape, ends no section either", () => {
    file(`
solution soda
sturated calcium-hydroxide
^^^^^^^^ unknown-word sturated → saturated, started | system, solution, reagent, store, saltwater, kit, log, use
the rest is on 3 pages
^^^ unknown-word the → nothing | system, solution, reagent, store, saltwater, kit, log, use
  make up to 5 L
`);
  });

  test("lines before any header", () => {
    file(`
# a comment is at home anywhere
  tank main 500 L
  ^^^^ misplaced tank no-section → system
tank main 500 L
^^^^ misplaced tank no-section → system
  2026-11-24 gave soda 20 mL
             ^^^^ misplaced gave no-section → log
system vat
`);
  });

  test("`use` and comments open nothing", () => {
    const { sections } = file(`
system vat
use "other.marl"
# note
  tank main 500 L
`);
    expect(sections).toHaveLength(1);
  });

  test("a tab or a no-break space is an indent", () => {
    const { lines } = readDocument("system vat\n\ttank main 500 L\n\u00a0tank sump 100 L");
    expect(lines.map((line) => line.statement?.kind)).toEqual(["header", "tank", "tank"]);
  });
});

describe("merge marks", () => {
  test("one conflict is one problem, and its lines are read", () => {
    const { lines } = file(`
log vat
<<<<<<< ours
^^^^^^^ merge-marks
  2026-11-24 08:00 stopped head-1
||||||| before
  2026-11-24 08:00 note "x"
=======
  2026-11-24 08:00 started head-1
>>>>>>> theirs
  2026-11-24 09:00 started head-1
<<<<<<< ours
^^^^^^^ merge-marks
=======
>>>>>>> theirs
`);
    expect(lines.filter((line) => line.statement?.kind === "started")).toHaveLength(2);
  });

  test("marks that lost their beginning", () => {
    file(`
=======
^^^^^^^ merge-marks
>>>>>>> theirs
>>>>>>> theirs
^^^^^^^ merge-marks
======= is longer
^^^^^^^ merge-marks
========
^ unknown-word = → nothing | system, solution, reagent, store, saltwater, kit, log, use
`);
  });
});

describe("files as they come", () => {
  test("line endings and a byte order mark are noted and kept out of the lines", () => {
    const windows = readDocument("\ufeffsystem vat\r\n  tank main 500 L\r\n");
    expect(windows).toMatchObject({ lineEnding: "\r\n", hasByteOrderMark: true });
    expect(windows.lines.map((line) => line.text)).toEqual(["system vat", "  tank main 500 L", ""]);
    expect(readDocument("system vat\n")).toMatchObject({ lineEnding: "\n", hasByteOrderMark: false });
    expect(readDocument("").lines).toHaveLength(1);
  });

  test("a line that no person wrote is one problem and unread", () => {
    const document = readDocument(`system vat\n  note "${"x".repeat(1_000_000)}"\n  tank main 500 L`);
    expect(document.lines.map((line) => line.findings.map(inWords))).toEqual([[], ["too-long"], []]);
  });

  test("a file that isn't text is read to its end", () => {
    const bytes = Array.from({ length: 20_000 }, (_, index) =>
      String.fromCharCode((index * 7919) % 256),
    ).join("");
    const started = performance.now();
    expect(readDocument(bytes).lines.length).toBeGreaterThan(50);
    expect(performance.now() - started).toBeLessThan(5000);
  });
});

/** What two readings of one text must share. */
const contents = (document: ReturnType<typeof readDocument>) => {
  const { kept: _, ...rest } = document;
  return rest;
};

describe("an edit", () => {
  test("reads only the lines that it touches", () => {
    const before = readDocument(eastHall);
    const after = readDocument(
      eastHall.replace("tank sump 280 L", "tank sump 290 L\n  tank extra 20 L"),
      before,
    );
    const old = new Set(before.lines.map((line) => line.statement));
    const fresh = after.lines.filter((line) => !old.has(line.statement)).map((line) => line.text.trim());
    expect(fresh).toEqual(["tank sump 290 L", "tank extra 20 L"]);
  });

  test("leaves lines above it the very same", () => {
    const before = readDocument(eastHall);
    const after = readDocument(`${eastHall}  2026-11-01 stopped line-1\n`, before);
    expect(after.lines[7]).toBe(before.lines[7]);
  });

  test("a changed header changes how the lines below it read", () => {
    const text = "log vat\n  salinity 35\n  2026-11-24 read salinity 35";
    const before = readDocument(text);
    const after = readDocument(text.replace("log vat", "saltwater vat"), before);
    expect(before.lines.map((line) => line.statement?.kind ?? null)).toEqual(["header", null, "read"]);
    expect(after.lines.map((line) => line.statement?.kind ?? null)).toEqual(["header", "value", "read"]);
  });

  test("after edit, as if read afresh", () => {
    const whole = eastHall.split("\n");
    const piece = fc.constantFrom(
      ...whole,
      "",
      "<<<<<<< ours",
      "=======",
      ">>>>>>> theirs",
      "systm vat",
      "aquarium vat",
      "tank a 5 L",
      ...shelves.split("\n"),
    );
    const edit = fc.tuple(fc.nat(whole.length), fc.nat(3), fc.array(piece, { maxLength: 4 }));
    fc.assert(
      fc.property(fc.array(edit, { minLength: 1, maxLength: 8 }), (edits) => {
        const text = [...whole];
        let document = readDocument(text.join("\n"));
        for (const [at, removed, added] of edits) {
          text.splice(at, removed, ...added);
          document = readDocument(text.join("\n"), document);
        }
        expect(contents(document)).toEqual(contents(readDocument(text.join("\n"))));
      }),
      { numRuns: 60 },
    );
  });

  test("ten thousand edits keep no more readings than a file needs", () => {
    let document = readDocument("system vat\n  tank main 1 L");
    for (let volume = 2; volume < 10_000; volume += 1)
      document = readDocument(`system vat\n  tank main ${volume} L`, document);
    const kept = [...document.kept.readings.values()].reduce((sum, ofKind) => sum + ofKind.size, 0);
    expect(kept).toBeLessThan(2000);
  });
});
