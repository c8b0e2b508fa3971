import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { describe, expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { longestLine } from "../../grammar/line.ts";
import { statementTable } from "../../grammar/statements.ts";
import { tidyLine, tidyText } from "../../grammar/tidy.ts";
import { summaryOf } from "../../grammar/write.ts";
import { eastHall, shelves } from "./a-farm.ts";

/** A text without the line break that its first quote stands before. */
const written = (text: string): string => text.replace(/^\n/, "");

/** What a text becomes; the same again when it is tidied again. */
function tidies(before: string, after: string): void {
  const tidy = tidyText(written(before));
  expect(tidy).toBe(written(after));
  expect(tidyText(tidy)).toBe(tidy);
}
/** A text that is tidy, or that can't be made so. */
const stays = (text: string): void => tidies(text, text);

describe("the words of a line", () => {
  test("stand one space apart, two spaces in", () => {
    tidies(
      `
system   vat    "Plug  vat"
tank\u0020
   tank  main\t120 cm  x 60cm×45\u00a0cm
\t\thold alkalinity 7.6 to 8.4 dKH   aim 8.0
log vat
 2026-11-30 08:10   read alkalinity 7.8dKH ,calcium 421 mg / L
`,
      `
system vat "Plug  vat"
tank\u0020
  tank main 120 cm x 60 cm x 45 cm
  hold alkalinity 7.6 to 8.4 dKH aim 8.0

log vat
  2026-11-30 08:10 read alkalinity 7.8 dKH, calcium 421 mg/L
`,
    );
  });

  test("are spelt as the tables spell them", () => {
    tidies(
      `
system vat “Plug vat”
  hold temperature 24 to 26 °C
  cohort plating 0.6 m² uptake 210 mmol/m²/days as caco3
  measured volume 1910 L +/- 35 L
  uptake strontium 3 µmol/kg/day +- 10 %
reagent jar
  formula SrCl2.6H2O
  lead 2 weeks
log vat
  2026-10-28T6:05 note „lid open”
  2026-10-29 6:05 read temperature −1 degC
`,
      `
system vat "Plug vat"
  hold temperature 24 to 26 degC
  cohort plating 0.6 m2 uptake 210 mmol/m2/day as CaCO3
  measured volume 1910 L ± 35 L
  uptake strontium 3 umol/kg/day ± 10 %

reagent jar
  formula SrCl2·6H2O
  lead 2 week

log vat
  2026-10-28 06:05 note "lid open"
  2026-10-29 06:05 read temperature -1 degC
`,
    );
  });

  test("stand in the table's order where they may stand in any", () => {
    tidies(
      `
solution ash "Ash" from 2026-10-05
system vat
  pump one gives ash at 30 mL/min until 2026-12-01 holding 5 L between 8:00 and 20:00 from 2026-10-05 least 1 mL
log vat
  2026-10-28 read calcium 420 mg/L by mk disregard "vial" with bench
`,
      `
solution ash from 2026-10-05 "Ash"

system vat
  pump one gives ash at 30 mL/min least 1 mL between 08:00 and 20:00 holding 5 L from 2026-10-05 until 2026-12-01

log vat
  2026-10-28 read calcium 420 mg/L with bench disregard "vial" by mk
`,
    );
  });

  test("give the end of a day as the beginning of the next, but for hours of every day", () => {
    tidies(
      'system vat\n  note "x" until 2026-12-31 24:00\n  light between 8:00 and 24:00\n',
      'system vat\n  note "x" until 2027-01-01 00:00\n  light between 08:00 and 24:00\n',
    );
    stays('system vat\n  note "x" until 9999-12-31 24:00\n');
  });

  test("keep the digits of their numbers", () => {
    stays(`
system vat
  tank main 0120.50 L
  hold alkalinity 7.60 to 8 dKH aim 08.000
`);
  });

  test("are moved to the margin where they open a section", () => {
    tidies(
      "  system  vat\n  tank main 5 L\n   log vat\n    use  'x'\n\tuse “solutions.marl”\n",
      "system vat\n  tank main 5 L\n\nlog vat\n    use  'x'\nuse \"solutions.marl\"\n",
    );
  });

  test("keep their order, line by line", () => {
    stays(`
log vat
  2026-10-30 note "third"
  2026-10-28 note "first"
  2026-10-29 note "second"
`);
  });
});

describe("comments", () => {
  test("keep their text and the space before them, at least one", () => {
    tidies(
      `
system  vat# the vat   \u0020
  tank  main  5 L    #  as   built “1998”
  tank sump 5L\t\t# tabs
  tank other 5L\u00a0\u00a0# no-break
  tank last 5L# quiet: name/unused
`,
      `
system vat # the vat
  tank main 5 L    #  as   built “1998”
  tank sump 5 L\t\t# tabs
  tank other 5 L  # no-break
  tank last 5 L # quiet: name/unused
`,
    );
  });

  test("on lines of their own stand at the margin or two spaces in", () => {
    tidies(
      `
# at the margin
    # indented
system vat
# at the margin
\t# indented
`,
      `
# at the margin
  # indented

system vat
# at the margin
  # indented
`,
    );
  });

  test("right above a header stay with it, those of the section above with that", () => {
    tidies(
      `
system vat
  tank main 5 L
  # of the vat
# Day book
# of the vat
log vat
`,
      `
system vat
  tank main 5 L
  # of the vat

# Day book
# of the vat
log vat
`,
    );
  });
});

describe("blank lines", () => {
  test("stand before a header, one at a time elsewhere, none at either end", () => {
    tidies(
      `

\t
use "a.marl"
system a

  tank main 5 L



  tank sump 5 L
\u00a0
log a


log b


`,
      `
use "a.marl"

system a

  tank main 5 L

  tank sump 5 L

log a

log b
`,
    );
  });

  test("aren't put before the first thing in a file", () => {
    stays("system a\n");
    stays("# About\nsystem a\n");
    stays("# About\n\nsystem a\n");
  });

  test("are nothing in a file of nothing else", () => {
    tidies("\n\n  \n", "");
    stays("");
    tidies("\ufeff\n \n", "\ufeff");
  });
});

describe("line endings", () => {
  test("stay what they are", () => {
    tidies("system  a\r\n  tank main 5L\r\n", "system a\r\n  tank main 5 L\r\n");
    tidies("\ufeffsystem  a\n", "\ufeffsystem a\n");
    tidies("\ufeffsystem  a\r\n", "\ufeffsystem a\r\n");
  });

  test("are all that of the first line, and the last line has one", () => {
    tidies(
      "system a\r\n  tank main 5 L\n  oops\n  tank sump 5 L",
      "system a\r\n  tank main 5 L\r\n  oops\r\n  tank sump 5 L\r\n",
    );
    tidies(
      "system a\n  oops \r\n  oops\r\r\n  tank sump 5 L\r",
      "system a\n  oops \n  oops\n  tank sump 5 L\n",
    );
  });

  test("a byte order mark inside the file doesn't become the file's own", () => {
    stays("\n\ufeffsystm a\n");
  });
});

describe("what can't be read", () => {
  test("stays as it is, and costs no other line", () => {
    tidies(
      `
systm  vat   "x"
tank   main 5 L
   tank  main  5  L  L  # oops \u0020
  hold alkalinity 7,9  to 8.4 dKH\t
      2026-11-30 08:10   gave ash  5 mL
  tank   sump 5L
note  "unclosed
`,
      `
systm  vat   "x"
tank   main 5 L
   tank  main  5  L  L  # oops \u0020
  hold alkalinity 7,9  to 8.4 dKH\t
      2026-11-30 08:10   gave ash  5 mL
  tank sump 5 L
note  "unclosed
`,
    );
  });

  test("keeps the lines below a header that nobody knows", () => {
    stays(`
greenhouse  north
     tank  main  5 L
`);
  });

  test("a line with a unit that is none", () => {
    stays(
      "system vat\n  tank main 500 L\n   tank u  30x40x50cm times 2 # é海🐠\n  evaporates 4  L / dya\n  limit pH  swing 0.2 ± 0.1  foo\n",
    );
  });

  test("a header that opens its section though it can't be read has its blank line", () => {
    tidies(
      "system a\n  tank main 5 L\n  log  a  b\n  2026-11-30 note  “x”\n",
      'system a\n  tank main 5 L\n\n  log  a  b\n  2026-11-30 note "x"\n',
    );
  });

  test("merge marks stay, and the lines between them are tidied", () => {
    tidies(
      `
log vat
<<<<<<< ours
  2026-11-30 note  "a"
||||||| base
=======
  2026-11-30 note  "b"
>>>>>>> theirs
`,
      `
log vat
<<<<<<< ours
  2026-11-30 note "a"
||||||| base
=======
  2026-11-30 note "b"
>>>>>>> theirs
`,
    );
  });

  test("a line that would grow too long to be read stays", () => {
    const items = Array.from({ length: 1530 }, (_, index) => `ash${index} 5mL`).join(",");
    const line = `  2026-11-30 gave ${items}`;
    expect(line.length).toBeLessThan(longestLine);
    expect(tidyText(`log vat\n${line}\n`)).toBe(`log vat\n${line}\n`);
    expect(readDocument(`log vat\n${line}\n`).lines[1]?.statement).not.toBeNull();
  });

  test("a line of a megabyte and bytes that are no text, in good time", () => {
    const started = performance.now();
    for (const character of ["x", " ", "\r", "#", '"', "\t#", "é ", "🐠", "\0", "system ", "  # "]) {
      const line = character.repeat(2 ** 20 / character.length);
      const text = `system a\n${line}x\n  tank main  5 L\n`;
      expect(tidyText(text)).toContain("\n  tank main 5 L\n");
      expect(tidyText(text)).toContain(`${line}x`);
    }
    expect(performance.now() - started).toBeLessThan(5000);
  });
});

describe("one line", () => {
  test("is tidied by itself, for those who tidy a part of a file", () => {
    const { lines } = readDocument("system  a\n tank main  5L # x\noops  \n   \n");
    expect(lines.map(tidyLine)).toEqual(["system a", "  tank main 5 L # x", "oops  ", "", ""]);
  });
});

const root = resolve(import.meta.dirname, "../..");
const examples = readdirSync(join(root, "examples"), { recursive: true, encoding: "utf8" }).filter((name) =>
  name.endsWith(".marl"),
);

/** What a file says, in order. */
function said(text: string): readonly unknown[] {
  const { lines, sections } = readDocument(text);
  return lines.flatMap(({ statement, section }) =>
    statement ? [[section === null ? null : sections[section]?.kind, summaryOf(statement)]] : [],
  );
}

describe("files", () => {
  test.each(examples)("the example %s is tidy as it stands", (name) => {
    stays(readFileSync(join(root, "examples", name), "utf8"));
  });

  test("a farm that says everything says the same when it is tidied", () => {
    for (const text of [eastHall, shelves]) {
      const tidy = tidyText(text);
      expect(said(tidy)).toEqual(said(text));
      expect(tidyText(tidy)).toBe(tidy);
    }
  });

  /** A change of the words outside quotes. */
  const outside =
    (change: (words: string) => string) =>
    (line: string): string =>
      line
        .split(/("[^"]*")/)
        .map((words) => (words.startsWith('"') ? words : change(words)))
        .join("");
  const ways: Readonly<Record<string, (line: string) => string>> = {
    "far in, far apart": (line) => `      ${outside((words) => words.replaceAll(" ", "   "))(line)}`,
    "with no-break spaces": (line) => ` ${outside((words) => words.replaceAll(" ", "\u00a0"))(line)}`,
    "with a comment": (line) => `  ${line}#remark`,
    "by a curly hand": (line) => `  ${line.replace(/"([^"]*)"/g, "“$1”")}`,
    "with units close up": (line) => `  ${line.replace(/(\d) (mL|L|cm|kg|g|dKH|mg|%)(?![\w-])/g, "$1$2")}`,
  };
  const kinds = [...new Set(statementTable.flatMap(({ sections }) => sections))];
  const everyStatement = (write: (line: string) => string): string =>
    kinds
      .flatMap((kind) => [
        kind === "store" ? kind : `${kind} some-name`,
        ...statementTable
          .filter(({ sections }) => sections.includes(kind))
          .flatMap((row) => row.examples.map(write)),
        "",
      ])
      .join("\n");
  const plain = tidyText(everyStatement((line) => `  ${line}`));

  test.each(Object.entries(ways))("every statement of the table, written %s", (_, write) => {
    const text = everyStatement(write);
    const tidy = tidyText(text);
    expect(readDocument(text).lines.flatMap(({ findings }) => findings)).toEqual([]);
    expect(said(tidy)).toEqual(said(text));
    expect(tidyText(tidy)).toBe(tidy);
    expect(tidy.replaceAll(" #remark", "")).toBe(plain);
  });
});
