/** A reading becomes one line in its place, whatever the file looks like. */
import { expect, test } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { editedText } from "../../server/checks/apply-fixes.ts";
import { inOneGo } from "../../server/culture/keep.ts";
import { notesOn, type Reading, readingEdit } from "../../server/editor/record-reading.ts";
import { marked } from "./fixture.ts";

const noted = { kit: null, by: null, moment: null };

/** The file that holds the log, with the line in it, and the notes on it. */
function recorded(text: string, values: Reading["values"], more: Partial<Reading> = {}) {
  const { farm, files } = marked(text);
  const system = farm.bound.model.systems.get("vat")!;
  const made = readingEdit(farm, system, { ...noted, ...more, values }, farm.moment.at);
  if ("refusal" in made) return { refusal: made.refusal };
  const { file } = made.edit;
  return { file, text: editedText(files.get(file)!, [made.edit]), notes: inOneGo(notesOn(farm, made)) };
}

const pH = [{ parameter: "pH", text: "8.1" }];
const vat = "system vat\n  tank main 500 L\n";

test("it goes behind the last line that isn't later, before comments that stand apart", () => {
  const text = `${vat}\nlog vat\n    2026-11-30 08:00 read pH 8.0 # é 鉢 🪸\n    2026-11-30 20:00 read pH 8.2\n\n# the end\n`;
  expect(recorded(text, pH, { moment: "2026-11-30 09:00" })).toEqual({
    file: "farm.marl",
    text: text.replace("🪸\n", "🪸\n    2026-11-30 09:00 read pH 8.1\n"),
    notes: [],
  });
  expect(recorded(text, pH).text).toBe(text.replace("8.2\n", "8.2\n    2026-12-01 08:00 read pH 8.1\n"));
});

test("it goes into the file that the log stands in, with or without lines", () => {
  const text = `// file: farm.marl\n${vat}\n// file: book.marl\nuse "farm.marl"\n\nlog vat\n`;
  for (const before of ["", '  2026-11-30 note "x"\n']) {
    const { file, text: after } = recorded(text + before, pH);
    expect(file).toBe("book.marl");
    expect(after).toBe(`use "farm.marl"\n\nlog vat\n${before}  2026-12-01 08:00 read pH 8.1\n`);
  }
});

test("line endings stay as they are", () => {
  const text = `${vat}\nlog vat\n  2026-11-30 08:00 read pH 8.0\n`.replaceAll("\n", "\r\n");
  const after = recorded(text, pH).text!;
  expect(after).toBe(`${text}  2026-12-01 08:00 read pH 8.1\r\n`);
});

test("what is told of the line says what, and leaves why and what to do for later", () => {
  const text = `${vat}  hold pH 7.9 to 8.3\n\nlog vat\n  2026-11-30 08:00 read pH 8.0\n`;
  expect(recorded(text, [{ parameter: "pH", text: "81" }]).notes).toEqual([
    "Sea water can't have a pH of 81.",
  ]);
});

test("nothing that can be typed breaks it, and what is written reads back", () => {
  const odd = [
    "",
    " ",
    "8",
    "8.",
    ".8",
    "-8",
    "8 8",
    "1e3",
    "below",
    "below 8",
    "8 ±",
    "8 ± 1 %",
    '"',
    "#",
    "8 # x",
    "é",
    "鉢",
    "🪸",
    "8\n9",
    "NaN",
    "Infinity",
    "8 with kit",
    "8 by me",
    "8, calcium 4",
    "9".repeat(400),
  ];
  for (const typed of odd)
    for (const parameter of ["pH", "alkalinity", "nothing of the sort"]) {
      const made = recorded(`${vat}\nlog vat\n`, [{ parameter, text: typed }]);
      if (made.refusal !== undefined) {
        expect(made.refusal).toMatch(/\.$/);
        continue;
      }
      const { lines } = readDocument(made.text!);
      const written = lines.filter(({ statement }) => statement?.kind === "read");
      expect(written, typed).toHaveLength(1);
      expect(
        lines.every(({ findings }) => findings.length === 0),
        typed,
      ).toBe(true);
    }
});
