/**
 * Every mistake that the language answers: its place, what is said, each fix that is offered and the line after it.
 * The text after a fix is the silent twin: it has no problem left but what is drawn under it.
 */
import { describe, expect, test } from "vitest";
import { isMark, mended, problems } from "./problems.ts";
import { filesOf, walk } from "./walk.ts";

/** The line, the words underlined, the code, words of the message, and by the title of a fix the line after it. */
type Mistake = readonly [
  line: string,
  underlined: string,
  code: string,
  message: string,
  fixes: Readonly<Record<string, string>>,
  /** A line without the mistake, where no fix is offered. */
  twin?: string,
];

/** The line set aside, which is told as such. */
const setAside = (line: string): Readonly<Record<string, string>> => {
  const [words = "", comment = ""] = line.split(/(?= #)/);
  const after = `${words} disregard "say why"`;
  const mark = `${" ".repeat(after.length - 9)}^^^^^^^^^ info reading/disregarded`;
  return { "Disregard this line: say why": `${after}${comment}\n${mark}` };
};

const inSystem = (lines: string): string => `system vat\n  tank main 500 L\n${lines}\n`;
const inLog = (lines: string): string =>
  `${inSystem("  cohort plugs 40 pieces uptake 0.1 meq/day each")}\nlog vat\n${lines}\n`;
const inWater = (lines: string): string =>
  `saltwater mix\n${lines}\n\n${inSystem("  flows-through 20 L/day with mix")}`;
const inSolution = (lines: string): string =>
  `solution part\n${lines}\n  make up to 5 L\n\n${inSystem("  by-hand part")}`;

const offers = (text: string, code: string): string[] =>
  walk(filesOf(text)).problems.flatMap((problem) =>
    problem.code === code ? problem.fixes.map(({ title }) => title) : [],
  );

function answered(into: (lines: string) => string, [line, underlined, code, message, fixes, twin]: Mistake) {
  const severity = walk(filesOf(into(line))).problems.find((problem) => problem.code === code)?.severity;
  const start = line.indexOf(underlined);
  const mark = `${" ".repeat(start)}${"^".repeat(underlined.length)} ${severity} ${code} ${message}`;
  problems(into(`${line}\n${mark}`));
  expect(offers(into(line), code)).toEqual(Object.keys(fixes));
  for (const [title, after] of Object.entries(fixes)) {
    const unmarked = after.split("\n").filter((each) => !isMark(each));
    expect(mended(into(line), code, title), title).toBe(into(unmarked.join("\n")));
    problems(into(after));
  }
  if (twin !== undefined) problems(into(twin));
  expect(Object.keys(fixes).length + (twin === undefined ? 0 : 1)).toBeGreaterThan(0);
}

const named = (rows: readonly Mistake[]): (readonly [string, Mistake])[] => rows.map((row) => [row[0], row]);

describe("in a system", () => {
  test.each(
    named([
      [
        ...(["  tnak sump 80 L", "tnak", "syntax/unknown-word", "Is tank meant?"] as const),
        { "Write tank": "  tank sump 80 L" },
      ],
      [
        ...(["  hold alkalinty 7 to 8 dKH", "alkalinty", "syntax/unknown-word", "is no parameter."] as const),
        { "Write alkalinity": "  hold alkalinity 7 to 8 dKH" },
        "  hold temperature 24 to 26 degC",
      ],
      [
        ...(["  cohort plugs 40 piecs uptake 1 meq/day", "piecs", "syntax/unknown-word", "pieces"] as const),
        { "Write pieces": "  cohort plugs 40 pieces uptake 1 meq/day" },
      ],
      [
        ...(["  feeds 3 g/day protien 45 %", "protien", "syntax/unknown-word", "Is protein meant?"] as const),
        { "Write protein": "  feeds 3 g/day protein 45 %" },
      ],
      [
        ...(["  tank sump 80 galo", "galo", "unit/unknown", '"galo" is no unit.'] as const),
        { "Write gal": "  tank sump 80 gal" },
      ],
      [
        ...(["  evaporates 4 L/wek", "L/wek", "unit/unknown", '"wek" is no unit.'] as const),
        { "Write week": "  evaporates 4 L/week" },
      ],
      [
        ...(["  tank sump 20x30x40 cm", "x30x40", "syntax/unknown-word", "without spaces"] as const),
        { "Put spaces round x": "  tank sump 20 x 30 x 40 cm" },
      ],
      [
        ...(["  tank sump 20x30x40.5 cm", ".5", "syntax/number-form", "on either side of an x."] as const),
        { "Put spaces round x": "  tank sump 20 x 30 x 40.5 cm" },
      ],
    ]),
  )("a misspelt word or unit: %s", (_, mistake) => answered(inSystem, mistake));

  test.each(
    named([
      [
        ...(["  tank sump 20 kg", "kg", "unit/dimension", "doesn't measure a volume."] as const),
        {},
        "  tank sump 20 L",
      ],
      [
        ...(["  evaporates 4 L", "L", "unit/dimension", "Write it in mL/min or L/day."] as const),
        { "Write L/day": "  evaporates 4 L/day" },
      ],
      [
        ...(["  tank sump 80", "80", "unit/missing", "Write 80 L or 80 mL."] as const),
        { "Add L": "  tank sump 80 L", "Add mL": "  tank sump 80 mL" },
      ],
      [
        ...(["  cohort plugs 4 pieces uptake 2 mmol/day", "mmol/day", "unit/as-caco3", "as CaCO3"] as const),
        { "Add as CaCO3": "  cohort plugs 4 pieces uptake 2 mmol/day as CaCO3" },
      ],
      [
        ...([
          "  cohort plugs 4 pieces uptake 2 g/day each",
          "g/day",
          "unit/as-caco3",
          "g/day as CaCO3",
        ] as const),
        { "Add as CaCO3": "  cohort plugs 4 pieces uptake 2 g/day as CaCO3 each" },
      ],
      [
        ...(["  uptake calcium 5 ppm/day", "ppm/day", "unit/ppm", "5 ppm is read as 5 mg/L."] as const),
        { "Write mg/L": "  uptake calcium 5 mg/L/day", "Write mg/kg": "  uptake calcium 5 mg/kg/day" },
      ],
    ]),
  )("a unit that is missing or measures something else: %s", (_, mistake) => answered(inSystem, mistake));

  test.each(
    named([
      [
        ...(["  tank sump 7,9 L", "7,9", "syntax/number-form", "Write 7.9."] as const),
        { "Write 7.9": "  tank sump 7.9 L" },
      ],
      [
        ...(["  tank sump 1,250 L", "1,250", "syntax/number-form", "Write 1.250 or 1250."] as const),
        { "Write 1.250": "  tank sump 1.250 L", "Write 1250": "  tank sump 1250 L" },
      ],
      [
        ...(["  tank sump .9 L", ".9", "syntax/number-form", "Write 0.9."] as const),
        { "Write 0.9": "  tank sump 0.9 L" },
      ],
      [
        ...(["  tank sump 1e3 mL", "1e3", "syntax/number-form", "Write 1000."] as const),
        { "Write 1000": "  tank sump 1000 mL" },
      ],
      [
        ...(["  tank sump 1 250 mL", "1 250", "syntax/number-form", "Write 1250."] as const),
        { "Write 1250": "  tank sump 1250 mL" },
      ],
      [
        ...(["  tank sump 1.250,5 L", "1.250,5", "syntax/number-form", "Write 1250.5."] as const),
        { "Write 1250.5": "  tank sump 1250.5 L" },
      ],
      [
        ...(["  displace rock -5 L", "-5", "syntax/number-form", "is below zero."] as const),
        { "Write 5": "  displace rock 5 L" },
      ],
    ]),
  )("another form of number: %s", (_, mistake) => answered(inSystem, mistake));

  test.each(
    named([
      [
        ...([
          "  tank sump 8 L from 2026-11-31",
          "2026-11-31",
          "syntax/date-form",
          "of a day that exists",
        ] as const),
        {},
        "  tank sump 8 L from 2026-11-30",
      ],
      [
        ...([
          "  tank sump 8 L from 03.04.2026",
          "03.04.2026",
          "syntax/date-form",
          "2026-04-03 or 2026-03-04",
        ] as const),
        {
          "Write 2026-04-03": "  tank sump 8 L from 2026-04-03",
          "Write 2026-03-04": "  tank sump 8 L from 2026-03-04",
        },
      ],
      [
        ...([
          "  tank sump 8 L from 31/1/2026",
          "31/1/2026",
          "syntax/date-form",
          "Write 2026-01-31.",
        ] as const),
        { "Write 2026-01-31": "  tank sump 8 L from 2026-01-31" },
      ],
      [
        ...(["  light between 8:10pm and 22:00", "8:10pm", "syntax/date-form", "Write 20:10."] as const),
        { "Write 20:10": "  light between 20:10 and 22:00" },
      ],
    ]),
  )("another form of date or time: %s", (_, mistake) => answered(inSystem, mistake));

  test.each(
    named([
      [
        ...(["  hold temperature 26 to 24 degC", "26 to 24 degC", "system/empty-hold", "is empty"] as const),
        { "Swap the two values": "  hold temperature 24 to 26 degC" },
      ],
      [
        ...([
          "  hold temperature 79 degF to 24 degC",
          "79 degF to 24 degC",
          "system/empty-hold",
          "is empty",
        ] as const),
        { "Swap the two values": "  hold temperature 24 degC to 79 degF" },
      ],
      [
        ...([
          "  hold temperature 24 to 26 degC aim 27",
          "27",
          "system/aim-outside",
          "outside its band",
        ] as const),
        { "Leave out the aim": "  hold temperature 24 to 26 degC" },
      ],
      [
        ...([
          "  evaporates 3 L/day from 2026-11-01 until 2026-10-01",
          "2026-10-01",
          "system/until-before-from",
          "This ends before it begins",
        ] as const),
        { "Swap the two dates": "  evaporates 3 L/day from 2026-10-01 until 2026-11-01" },
      ],
    ]),
  )("what can't be: %s", (_, mistake) => answered(inSystem, mistake));

  test.each(
    named([
      [
        ...(["  tank pump 80 L", "pump", "syntax/misplaced", "can't be a name"] as const),
        { "Write pump-1": "  tank pump-1 80 L" },
      ],
      [
        ...(["  2026-11-30 tank sump 80 L # new", "tank", "syntax/misplaced", "from 2026-11-30."] as const),
        { "Write from 2026-11-30 at its end": "  tank sump 80 L from 2026-11-30 # new" },
      ],
      [
        ...(["evaporates 4 L/day", "evaporates", "syntax/misplaced", "stands at the margin"] as const),
        { "Indent the line": "  evaporates 4 L/day" },
      ],
      [
        ...(['  note "by the door', '"by the door', "syntax/unfinished", "isn't closed"] as const),
        { 'Add "': '  note "by the door"' },
      ],
      [
        ...(["  evaporates", "evaporates", "syntax/unfinished", "Next comes a quantity."] as const),
        {},
        "  evaporates 4 L/day",
      ],
      [
        ...([
          "  evaporates 4 L/day each",
          "each",
          "syntax/unknown-word",
          '"each" has no meaning here.',
        ] as const),
        {},
        "  evaporates 4 L/day",
      ],
    ]),
  )("a line that stands or ends wrongly: %s", (_, mistake) => answered(inSystem, mistake));
});

describe("in a log", () => {
  test.each(
    named([
      [
        ...([
          "  2026-11-30 08:00 read alkalinity 79 dKH",
          "alkalinity 79 dKH",
          "reading/impossible",
          "Is this 7.9?",
        ] as const),
        {
          "Write 7.9": "  2026-11-30 08:00 read alkalinity 7.9 dKH",
          ...setAside("  2026-11-30 08:00 read alkalinity 79 dKH"),
        },
      ],
      [
        ...([
          "  2026-11-30 08:00 read calcium 4250 mg/L ± 80",
          "calcium 4250 mg/L ± 80",
          "reading/impossible",
          "Is this 425?",
        ] as const),
        {
          "Write 425": "  2026-11-30 08:00 read calcium 425 mg/L ± 80",
          ...setAside("  2026-11-30 08:00 read calcium 4250 mg/L ± 80"),
        },
      ],
      [
        ...([
          "  2026-11-30 08:00 read calcium 42 mg/L",
          "calcium 42 mg/L",
          "reading/unusual",
          "42 mg/L is unusual for calcium; usual is 300 to 600 mg/L.",
        ] as const),
        setAside("  2026-11-30 08:00 read calcium 42 mg/L"),
        "  2026-11-30 08:00 read calcium 420 mg/L",
      ],
      [
        ...([
          "  2026-11-30 08:00 read temperature 77 degC",
          "temperature 77 degC",
          "reading/impossible",
          "possible is -2 to 45 °C",
        ] as const),
        setAside("  2026-11-30 08:00 read temperature 77 degC"),
        "  2026-11-30 08:00 read temperature 77 degF",
      ],
      [
        ...([
          "  2026-11-30 08:00 read alkalinity 140 mg/L",
          "mg/L",
          "unit/as-caco3",
          "Write mg/L as CaCO3",
        ] as const),
        { "Add as CaCO3": "  2026-11-30 08:00 read alkalinity 140 mg/L as CaCO3" },
      ],
      [
        ...([
          "  2026-11-30 8.10 stocked plugs 3 pieces",
          "8.10",
          "syntax/date-form",
          "Write 08:10.",
        ] as const),
        { "Write 08:10": "  2026-11-30 08:10 stocked plugs 3 pieces" },
      ],
      [
        ...([
          "  2026-30-11 stocked plugs 3 pieces",
          "2026-30-11",
          "syntax/date-form",
          "Write 2026-11-30.",
        ] as const),
        { "Write 2026-11-30": "  2026-11-30 stocked plugs 3 pieces" },
      ],
      [
        ...(["  stocked plugs 3 pieces", "stocked", "syntax/misplaced", "starts with its date"] as const),
        {},
        "  2026-11-30 stocked plugs 3 pieces",
      ],
      [
        ...([
          "  2026-11-30 08:00 stocked plogs 3 pieces",
          "plogs",
          "name/undeclared",
          "Is plugs meant?",
        ] as const),
        { "Write plugs": "  2026-11-30 08:00 stocked plugs 3 pieces" },
      ],
    ]),
  )("%s", (_, mistake) => answered(inLog, mistake));
});

describe("in other sections", () => {
  test.each(
    named([
      [
        ...(["  calcium 425 ppm", "ppm", "unit/ppm", "Write mg/L or mg/kg"] as const),
        { "Write mg/L": "  calcium 425 mg/L", "Write mg/kg": "  calcium 425 mg/kg" },
      ],
      [
        ...(["  strontium 8 mg/L as CaCO3", "as CaCO3", "unit/as-caco3", "Remove it"] as const),
        { "Remove it": "  strontium 8 mg/L " },
      ],
    ]),
  )("salt water: %s", (_, mistake) => answered(inWater, mistake));

  test("a reagent that may be several is offered as each", () =>
    answered(inSolution, [
      ...([
        "  dissolve magnesium-sulfate 400 g",
        "magnesium-sulfate",
        "name/ambiguous-reagent",
        "Write ",
      ] as const),
      {
        "Write magnesium-sulfate-anhydrous": "  dissolve magnesium-sulfate-anhydrous 400 g",
        "Write magnesium-sulfate-heptahydrate": "  dissolve magnesium-sulfate-heptahydrate 400 g",
      },
    ]));
});

describe("lines in the wrong section", () => {
  const moved = (text: string, title: string, after: string) => {
    expect(offers(text, "syntax/misplaced")).toEqual([title]);
    expect(mended(text, "syntax/misplaced", title)).toBe(after);
    problems(after);
  };

  test("an event among the facts goes to that system's log", () => {
    problems(
      "system vat\n  tank main 500 L\n  2026-11-30 read salinity 35\n             ^^^^ error syntax/misplaced belongs in a log or saltwater section. This line is left out. Move it under the header of a log or saltwater.\n",
    );
    moved(
      "system vat\n  tank main 500 L\n  2026-11-30 read salinity 35\n\nsystem pool\n  tank main 90 L\n\nlog pool\n\nlog vat\n  2026-11-29 read salinity 35\n",
      "Move it under log vat",
      "system vat\n  tank main 500 L\n\nsystem pool\n  tank main 90 L\n\nlog pool\n\nlog vat\n  2026-11-29 read salinity 35\n  2026-11-30 read salinity 35\n",
    );
  });

  test("a dated fact in the log takes its standing form with it", () => {
    problems(
      "system vat\n  tank main 500 L\n\nlog vat\n  2026-11-30 evaporates 4 L/day\n             ^^^^^^^^^^ error syntax/misplaced Move it under the header of a system, with its date at the end behind from.\n",
    );
    moved(
      "system vat\n  tank main 500 L\n\nlog vat\n  2026-11-30 evaporates 4 L/day\n",
      "Move it under system vat",
      "system vat\n  tank main 500 L\n  evaporates 4 L/day from 2026-11-30\n\nlog vat\n",
    );
  });

  test("a fact written as an event's date in the wrong place", () => {
    const text = "system vat\n  tank main 500 L\n\nlog vat\n  read salinity 35 from 2026-11-30\n";
    moved(
      text,
      "Write 2026-11-30 in front",
      "system vat\n  tank main 500 L\n\nlog vat\n  2026-11-30 read salinity 35\n",
    );
  });

  test("where two sections fit, none is chosen", () => {
    const text =
      "system vat\n  tank main 500 L\n  by-hand a\n  by-hand b\n  keep at 20 degC\n\nsolution a\n  supplies calcium 9 mg/mL\n\nsolution b\n  supplies calcium 9 mg/mL\n";
    expect(offers(text, "syntax/misplaced")).toEqual([]);
  });

  test("a header with a date loses it", () => {
    const text = "2026-11-30 system vat\n  tank main 500 L\n";
    expect(mended(text, "syntax/misplaced", "Leave out the date")).toBe("system vat\n  tank main 500 L\n");
  });
});

describe("headers", () => {
  test("a misspelt one is one problem, and its lines count", () => {
    const drawn =
      "sytem vat\n^^^^^ error syntax/unknown-word Is system meant?\n  tank main 500 L\n  evaporates 4 L/day\n";
    problems(drawn);
    const after = mended("sytem vat\n  tank main 500 L\n", "syntax/unknown-word", "Write system");
    problems(after);
  });

  test("one without its name", () => {
    problems(
      "system vat\n  tank main 500 L\n\nsolution\n^^^^^^^^ error syntax/unfinished Next comes a name.\n  make up to 5 L\n",
    );
  });
});

describe("names and files", () => {
  test("a used file that is a slip away", () => {
    const parts = "// file: shared/parts.marl\nsolution part\n  supplies alkalinity 1.6 meq/mL\n";
    const farm = (path: string) => `use "${path}"\n\n${inSystem("  by-hand part")}${parts}`;
    const code = "use/missing-file";
    expect(walk(filesOf(farm("shared/part.marl"))).problems[0]?.todo).toBe("Is shared/parts.marl meant?");
    const after = mended(farm("shared/part.marl"), code, 'Write "shared/parts.marl"');
    expect(walk(new Map([...filesOf(farm("")), ["farm.marl", after]])).problems).toEqual([]);
  });

  test("a name of a file that isn't used: the way to its declaration", () => {
    const parts = "// file: parts.marl\n\nsolution part\n  supplies alkalinity 1.6 meq/mL\n";
    const farm = walk(filesOf(`${inSystem("  by-hand part")}${parts}`));
    const problem = farm.problems.find(({ code }) => code === "name/undeclared");
    expect(problem?.related).toEqual([
      {
        place: { file: "parts.marl", line: 1, span: { start: 9, end: 13 } },
        message: 'Here "part" is declared',
      },
    ]);
  });

  test("a fact said twice alike may go unasked, one that says something else may not", () => {
    const fixes = (lines: string) =>
      walk(filesOf(inSystem(lines))).problems.flatMap((problem) => problem.fixes);
    const [fix] = fixes("  evaporates 4 L/day\n  evaporates  4 L / day");
    expect(fix).toMatchObject({ title: "Remove this line", safe: true });
    expect(fixes("  evaporates 4 L/day\n  evaporates 5 L/day")).toEqual([]);
    expect(fixes("  evaporates 4 L/day\n  evaporates 4 L/day # in winter")[0]?.safe).toBe(false);
  });

  test("a doubled line of the log is removed whole", () => {
    const line = "  2026-11-30 08:00 stocked plugs 3 pieces";
    const text = inLog(`${line}\n${line} # again\n  2026-11-30 09:00 stocked plugs 1 pieces`);
    expect(mended(text, "log/twice", "Remove this line")).toBe(
      inLog(`${line}\n  2026-11-30 09:00 stocked plugs 1 pieces`),
    );
    const safe = (doubled: string) =>
      walk(filesOf(inLog(`${line} # weighed\n${doubled}`))).problems.flatMap((problem) =>
        problem.fixes.map((fix) => fix.safe),
      );
    expect(safe(line)).toEqual([true]);
    expect(safe(`${line} # weighed`)).toEqual([true]);
    expect(safe(`${line} # by the window`)).toEqual([false]);
  });
});

test("what isn't tidy and can only mean one thing is read without a word", () =>
  void problems(`
saltwater mix
  alkalinity 2300 µmol / kg
  calcium 10 mmol/kg
  magnesium 53 mmol / kg
  potassium 9900 μmol/kg

kit strips
  alkalinity scatter 0.2 dKH

system vat “Vat”
  tank a 20 × 30 × 40 cm times 20
  cohort plating 0.1 m² uptake 20 mmol / m² / day as CaCO3
  displace rubble 10 kg at 2.5 kg/L
  measured volume 471 L +- 5 L
  hold temperature 24 to 26 °C
  flows-through 20 L / day with mix
  light between 9:00 and 19:00

log vat
  2026-11-30 8:05 read temperature 25 ℃ with strips
  2026-11-30T09:05 read temperature 77 °F +/- 1 °F
`));
