import { expect, test } from "vitest";
import { mended, problems } from "./problems.ts";
import { filesOf, walk } from "./walk.ts";

const vat = "\nsystem vat\n  tank main 500 L\n";

test("a warning, an info and a hint are quietened where they stand, with or without a reason", () =>
  void problems(`${vat}
  measured volume 410 L # quiet: system/volume-differs
  uptake calcium 5 ppm/day # the kit says so # quiet: unit/ppm

solution spare # quiet: name/unused # mixed next week
  supplies calcium 40 mg/mL
`));

test("without the comments they are told", () =>
  void problems(`${vat}
  measured volume 410 L
  ^^^^^^^^^^^^^^^^^^^^^ warning system/volume-differs 410 L are measured
  uptake calcium 5 ppm/day
                   ^^^^^^^ info unit/ppm 5 ppm is read as 5 mg/L.

solution spare
         ^^^^^ hint name/unused Nothing uses the solution "spare".
  supplies calcium 40 mg/mL
`));

test("several codes on one line, and a whole file", () =>
  void problems(`${vat}
  uptake calcium 5 ppm/day

log vat
  # quiet file: unit/ppm, log/out-of-order
  2026-11-30 08:00 read calcium 422 ppm
  2026-11-29 08:00 read calcium 42 ppm # quiet: reading/unusual
  2026-11-28 08:00 read calcium 420 mg/L
`));

test("a line's comment is for its line, a file's for its file, and only for the code that it names", () =>
  void problems(`
# quiet file: unit/ppm
use "pool.marl"

system vat
  tank main 500 L
  uptake calcium 5 ppm/day # quiet: name/unused
                                    ^^^^^^^^^^^ hint quiet/unused On this line there is no name/unused to quieten.
// file: pool.marl
system pool
  tank main 500 L
  uptake calcium 5 ppm/day
                   ^^^^^^^ info unit/ppm 5 ppm is read as 5 mg/L.
  # quiet: unit/ppm
           ^^^^^^^^ hint quiet/unused unit/ppm can't be quietened on a line of its own: nothing else stands here. So it changes nothing. Put it at the end of the line that it is for, or write quiet file: unit/ppm.
`));

test("errors are told all the same, and so is the comment", () =>
  void problems(`${vat}
  # quiet file: syntax/unknown-word
                ^^^^^^^^^^^^^^^^^^^ hint quiet/unused syntax/unknown-word is an error, and errors can't be quietened. So it changes nothing. Mend what it tells of, and remove this.
  evaportes 4 L/day # quiet: syntax/unknown-word
  ^^^^^^^^^ error syntax/unknown-word "evaportes" has no meaning here.
                             ^^^^^^^^^^^^^^^^^^^ hint quiet/unused errors can't be quietened
`));

test("codes that aren't, and none at all", () =>
  void problems(`${vat}
  uptake calcium 5 ppm/day # quiet: unit/pmp, water/*
                   ^^^^^^^ info unit/ppm 5 ppm is read as 5 mg/L.
                                    ^^^^^^^^ hint quiet/unused "unit/pmp" is no code of a problem. So it changes nothing. Is unit/ppm meant?
                                              ^^^^^^^ hint quiet/unused "water/*" is no code of a problem.
  evaporates 4 L/day # quiet:
                     ^^^^^^^^ hint quiet/unused This names no problem to quieten.
`));

test("what only looks like it is a comment or a text", () =>
  void problems(`${vat}
  note "# quiet: unit/ppm"
  evaporates 4 L/day # quietly
  feeds 3 g/day protein 45 % # quiet
`));

test("a comment that quietens nothing is quietened like any hint", () => {
  problems(`${vat}
  # quiet file: quiet/unused
  evaporates 4 L/day # quiet: unit/ppm
`);
  problems(`${vat}
  # quiet file: quiet/unused
                ^^^^^^^^^^^^ hint quiet/unused In this file there is no quiet/unused to quieten.
`);
});

test("its fixes take the code out, or put the near one in its place", () => {
  const text = (end: string) => `system vat\n  tank main 500 L\n  uptake calcium 5 ppm/day${end}\n`;
  const fixed = (given: string, title: string) => mended(text(given), "quiet/unused", title);
  expect(fixed(" # quiet: unit/pmp", "Write unit/ppm")).toBe(text(" # quiet: unit/ppm"));
  expect(fixed(" # quiet: log/twice", "Remove log/twice")).toBe(text(""));
  expect(fixed(" # quiet: unit/ppm, log/twice", "Remove log/twice")).toBe(text(" # quiet: unit/ppm"));
  expect(fixed(" # quiet: log/twice, unit/ppm", "Remove log/twice")).toBe(text(" # quiet: unit/ppm"));
  expect(fixed(" # lab # quiet: log/twice", "Remove log/twice")).toBe(text(" # lab"));
});

test("CRLF, a byte order mark and a comment on a line that can't be read", () => {
  const file = "\ufeffsystem vat # quiet: name/unused\r\n  tank main 500 L\r\n  tnak # quiet: unit/ppm\r\n";
  const found = walk(filesOf(file)).problems.map(({ code, place }) => [code, place.line, place.span]);
  expect(found).toEqual([
    ["quiet/unused", 0, { start: 20, end: 31 }],
    ["syntax/unknown-word", 2, { start: 2, end: 6 }],
    ["quiet/unused", 2, { start: 16, end: 24 }],
  ]);
});
