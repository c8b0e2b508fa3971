/** What the extension says, by the parts of it that know no VS Code. */
import { existsSync } from "node:fs";
import { describe, expect, test, vi } from "vitest";
import { once } from "../../client/once.ts";
import { pageOf } from "../../client/problem-page.ts";
import {
  itemChoices,
  lastChoices,
  lastQuestion,
  promptFor,
  said,
  whatChoices,
} from "../../client/reading-words.ts";
import { restarts } from "../../client/restarts.ts";
import { schemesOf } from "../../client/schemes.ts";
import { addressOf, placeOf } from "../../client/sheet-place.ts";
import { barLabel, barText, barTooltip } from "../../client/state-words.ts";
import { codes } from "../../server/checks/rules.ts";
import type { ReadingAnswer, StateAnswer, UsualReadingAnswer } from "../../server/protocol/requests.ts";

const state: StateAnswer = {
  name: "vat",
  ref: "vat",
  worst: null,
  errors: 0,
  warnings: 0,
  message: null,
  doses: "Today: head-1 112 mL",
  asAt: "2026-12-01 08:00",
  lastRead: "2026-12-01 07:30",
};

describe("the state of a system in the status bar", () => {
  test.each([
    [{}, "$(check) vat: in order, 08:00"],
    [{ worst: "warning", warnings: 1 }, "$(warning) vat: 1 warning, 08:00"],
    [{ worst: "warning", warnings: 3 }, "$(warning) vat: 3 warnings, 08:00"],
    [{ worst: "error", errors: 2, warnings: 3 }, "$(error) vat: 2 errors, 08:00"],
  ] as const)("%j is %s", (more, text) => {
    expect(barText({ ...state, ...more })).toBe(text);
  });

  test("who hears the screen is told the day too", () => {
    expect(barLabel(state)).toBe("Marl: vat: in order, as at 2026-12-01 08:00");
  });

  test("the pointer finds the worst, the doses and how old it is", () => {
    expect(barTooltip({ ...state, message: "Alkalinity leaves its band." })).toBe(
      "Alkalinity leaves its band.\n\nToday: head-1 112 mL\n\nAs at 2026-12-01 08:00; the water was last read at 2026-12-01 07:30.\n\nClick for the dose sheet.",
    );
    expect(barTooltip({ ...state, doses: null, lastRead: null })).toBe(
      "As at 2026-12-01 08:00; the water was never read.\n\nClick for the dose sheet.",
    );
  });
});

const usual: UsualReadingAnswer = {
  now: "2026-12-01 08:00",
  usual: [
    { parameters: ["alkalinity", "calcium"], kit: "bench" },
    { parameters: ["pH"], kit: null },
  ],
  items: [
    { parameter: "alkalinity", unit: "dKH", last: { text: "7.8 dKH", moment: "2026-12-01 07:30" } },
    { parameter: "calcium", unit: "mg/L", last: { text: "425 mg/L", moment: "2026-11-30 07:30" } },
    { parameter: "pH", unit: "", last: null },
    { parameter: "nitrate", unit: "mg/L", last: null },
  ],
  kits: ["bench"],
  people: ["mk"],
};

const answer: ReadingAnswer = {
  line: "2026-12-01 08:00 read alkalinity 7.9 dKH",
  notes: [],
  edit: {},
  uri: "file:///farm/vat.marl",
};

describe("recording a reading", () => {
  test("what is usually read is offered with its last values, then anything else", () => {
    expect(whatChoices(usual)).toEqual([
      {
        label: "alkalinity, calcium",
        description: "with bench",
        detail: "last: 7.8 dKH, 425 mg/L",
        value: usual.usual[0],
      },
      { label: "pH", detail: "last: never read", value: usual.usual[1] },
      { label: "Something else…", value: null },
    ]);
    expect(itemChoices(usual).map(({ label, description }) => [label, description])).toEqual([
      ["alkalinity", "last 7.8 dKH, 2026-12-01 07:30"],
      ["calcium", "last 425 mg/L, 2026-11-30 07:30"],
      ["pH", ""],
      ["nitrate", "in mg/L"],
    ]);
  });

  test("each value is asked for with its unit and the last one", () => {
    expect(usual.items.slice(0, 3).map(promptFor)).toEqual([
      "alkalinity in dKH. Last 7.8 dKH, 2026-12-01 07:30. Leave it empty to skip it.",
      "calcium in mg/L. Last 425 mg/L, 2026-11-30 07:30. Leave it empty to skip it.",
      "pH. Never read before. Leave it empty to skip it.",
    ]);
  });

  test("the line is shown while it is typed, with what is unusual about it, or why it can't be read", () => {
    expect(said(answer)).toEqual({ message: answer.line, kind: "preview" });
    expect(said({ ...answer, notes: ["79 is unusual."] })).toEqual({
      message: `${answer.line} · 79 is unusual.`,
      kind: "note",
    });
    expect(said({ refusal: "No value." })).toEqual({ message: "No value.", kind: "refusal" });
  });

  test("before it is written, kit, person and time can be changed", () => {
    const draft = { kit: "bench", by: null, moment: "2026-12-01 08:00" };
    expect(lastChoices(draft, answer, true)).toEqual([
      { label: "$(check) Write this line into the log", detail: answer.line, value: "write" },
      { label: "$(beaker) Tested with", description: "bench", value: "kit" },
      { label: "$(person) Read by", description: "nobody named", value: "by" },
      { label: "$(clock) Read at", description: "2026-12-01 08:00", value: "moment" },
    ]);
    expect(lastChoices(draft, answer, false).map(({ value }) => value)).toEqual(["write", "by", "moment"]);
    expect(lastQuestion(answer)).toBe("Is this right?");
    expect(lastQuestion({ ...answer, notes: ["79 is unusual."] })).toBe("Is this right? 79 is unusual.");
  });

  test("what is refused can't be written", () => {
    const draft = { kit: null, by: null, moment: "soon" };
    const choices = lastChoices(draft, { refusal: "That is no time." }, true);
    expect(choices[0]).toMatchObject({ detail: "That is no time." });
    expect(choices.map(({ value }) => value)).not.toContain("write");
  });
});

test("a sheet's address says which system it is of, and shows its name", () => {
  const place = { uri: "file:///farm/é 鉢.marl", system: "vat farm/é.marl", name: "vat" };
  const { path, query } = addressOf(place);
  expect(path).toBe("/Dose sheet of vat");
  expect(placeOf(query)).toEqual(place);
  for (const other of ["", "{}", "[1]", "null", '{"uri":1,"system":"a","name":"b"}'])
    expect(placeOf(other)).toBeNull();
});

test("the page of every problem is there; what is no code has none", () => {
  expect(codes.length).toBeGreaterThan(40);
  for (const code of codes) expect(existsSync(pageOf(code)!), code).toBe(true);
  for (const other of ["", "../../etc/passwd", "a/../b", "water", "https://x.y/z"])
    expect(pageOf(other)).toBeNull();
});

test("the server is told of files, of what isn't saved yet, and of the open folders' documents", () => {
  expect(schemesOf([])).toEqual(["file", "untitled"]);
  expect(schemesOf(["file", "memory", "file"])).toEqual(["file", "untitled", "memory"]);
});

test("a server that ends is started again, four times within three minutes", () => {
  const mayStart = restarts();
  const minute = 60_000;
  expect([0, 1, 2, 3, 4].map((second) => mayStart(second * 1000))).toEqual([true, true, true, true, false]);
  expect(mayStart(2 * minute)).toBe(false);
  expect(mayStart(6 * minute)).toBe(true);
});

test("what is asked for many times within a moment is done once, and not after its end", () => {
  vi.useFakeTimers();
  try {
    let done = 0;
    const work = once(() => {
      done += 1;
    });
    for (let times = 0; times < 5; times += 1) work.soon();
    vi.runAllTimers();
    expect(done).toBe(1);
    work.soon();
    work.dispose();
    vi.runAllTimers();
    expect(done).toBe(1);
  } finally {
    vi.useRealTimers();
  }
});
