import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { describe, expect, test } from "vitest";
import { tidyText } from "../../grammar/tidy.ts";
import { applySafeFixes } from "../../server/checks/apply-fixes.ts";
import { codes, rules } from "../../server/checks/rules.ts";
import { inOneGo } from "../../server/culture/keep.ts";
import { actionsAt } from "../../server/editor/code-actions.ts";
import type { Farm } from "../../server/farm.ts";
import { filesOf, walk } from "../checks/walk.ts";
import { offered, textAfter, textsAfter, titlesAt, walkedAfter } from "./actions.ts";

const vat = "system vat\n  tank main 500 L\n";

describe("quick fixes", () => {
  test("are those of the problems that the cursor touches, the one safe fix first to take", () => {
    const { actions } = offered(`${vat}  evaporates 7,9| L/day\n`, ["quickfix"]);
    expect(
      actions.map(({ title, kind, isPreferred, problem }) => [title, kind, isPreferred, problem?.code]),
    ).toEqual([["Write 7.9", "quickfix", true, "syntax/number-form"]]);
    expect(titlesAt(`${vat}  evap|orates 7,9 L/day\n`, ["quickfix"])).toEqual([]);
    expect(textAfter(`${vat}  evaporates 7,9| L/day # é🐠\n`, "Write 7.9")).toBe(
      `${vat}  evaporates 7.9 L/day # é🐠\n`,
    );
  });

  test("that leave a choice are all offered, none preferred", () => {
    const { actions } = offered(`${vat}  tank sump 1,2|50 L\n`, ["quickfix"]);
    expect(actions.map(({ title, isPreferred }) => [title, isPreferred])).toEqual([
      ["Write 1.250", false],
      ["Write 1250", false],
    ]);
  });

  test("are offered for all that a selection touches", () => {
    expect(titlesAt(`${vat}  ev|aporates 7,9 L/day\n  tank sump 8,5| L\n`, ["quickfix"])).toEqual([
      "Write 7.9",
      "Write 8.5",
    ]);
  });

  test("that mend two problems of a line alike are listed once", () => {
    // 0.99 dKH at once and in a day, the limits are 0.5 and 0.7 dKH: both are kept by the same two lines.
    const text = `system vat
  tank main 500 L
  by-hand ash-part
  uptake alkalinity 0 dKH/day

solution ash-part
  supplies alkalinity 1.6 meq/mL

log vat
  2026-11-30 07:00 read alkalinity 8 dKH, calcium 420 mg/L
  2026-12-01 07:50 gave |ash-part 0.11 L|
`;
    const titles = titlesAt(text, ["quickfix"]);
    expect(titles.filter((title) => title.startsWith("Split over 2 days"))).toHaveLength(1);
    expect(titles).toEqual([...new Set(titles)]);
  });

  test("of a long selection are those of its first problems only", () => {
    const lines = Array.from({ length: 20_000 }, () => "  evaporates 7,9 L/day\n");
    const { farm } = offered(`|${vat}`);
    const many = walk(new Map([["farm.marl", vat + lines.join("")]]));
    expect(many.problems.length).toBe(20_000);
    const to = { line: 20_002, column: 0 };
    const selection = { file: "farm.marl", from: { line: 0, column: 0 }, to };
    const asked = { farm: many, selection, canCreate: true, now: farm.moment.at };
    expect(inOneGo(actionsAt(asked, ["quickfix", "refactor"])).length).toBe(50);
    // Those of the whole file are worked out in slices.
    const steps = actionsAt(asked, null);
    let pauses = 0;
    while (!steps.next().done) pauses += 1;
    expect(pauses).toBeGreaterThan(300);
  });

  test("only where they are asked for", () => {
    const text = `${vat}  evaporates 7,9| L/day\n`;
    expect(titlesAt(text, ["refactor"])).toEqual([]);
    expect(titlesAt(text, ["quick"])).toEqual([]);
    expect(titlesAt(text, [])).toEqual([]);
    expect(titlesAt(text, [""])).toEqual(titlesAt(text));
  });
});

describe("keeping a problem quiet", () => {
  const unused = "solution ash|-part\n  supplies alkalinity 1.6 meq/mL\n";

  test("on its line, or in its file", () => {
    expect(titlesAt(unused, ["quickfix"])).toEqual([
      "Keep name/unused quiet on this line",
      "Keep name/unused quiet in this file",
    ]);
    expect(textAfter(unused, "Keep name/unused quiet on this line")).toBe(
      "solution ash-part # quiet: name/unused\n  supplies alkalinity 1.6 meq/mL\n",
    );
    expect(textAfter(unused, "Keep name/unused quiet in this file")).toBe(
      "# quiet file: name/unused\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n",
    );
  });

  test("joins a comment that is there", () => {
    const line = "solution ash|-part # quiet: water/stale # new kit\n  supplies alkalinity 1.6 meq/mL\n";
    expect(textAfter(line, "Keep name/unused quiet on this line")).toBe(
      "solution ash-part # quiet: water/stale, name/unused # new kit\n  supplies alkalinity 1.6 meq/mL\n",
    );
    expect(
      textAfter(`# é海🐠\n# quiet file: water/stale\n${unused}`, "Keep name/unused quiet in this file"),
    ).toBe(
      "# é海🐠\n# quiet file: water/stale, name/unused\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n",
    );
  });

  test("comes behind a remark, and below the comments that the file begins with", () => {
    const text =
      "# Shelf.\n# Invented.\n\nsolution ash|-part # old sack  \n  supplies alkalinity 1.6 meq/mL\n";
    expect(textAfter(text, "Keep name/unused quiet on this line")).toBe(
      "# Shelf.\n# Invented.\n\nsolution ash-part # old sack # quiet: name/unused  \n  supplies alkalinity 1.6 meq/mL\n",
    );
    expect(textAfter(text, "Keep name/unused quiet in this file")).toBe(
      "# Shelf.\n# Invented.\n# quiet file: name/unused\n\nsolution ash-part # old sack  \n  supplies alkalinity 1.6 meq/mL\n",
    );
  });

  test("is never offered for an error, nor for a comment that quietens nothing", () => {
    expect(titlesAt("system vat\n  tank main 5|00\n", ["quickfix"])).toEqual(["Add L", "Add mL"]);
    expect(titlesAt(`${vat}  evaporates 4 L/day # quiet: water/st|ale\n`, ["quickfix"])).toEqual([
      "Remove water/stale",
    ]);
  });
});

describe("the whole file", () => {
  test("has all its safe fixes done at once, and only those", () => {
    const text = `|${vat}  evaporates 7,9 L/day\n  tank sump 1,250 L\n  displace rock 5 L from 2026/11/02\n`;
    expect(textAfter(text, "Do the 2 safe fixes of this file")).toBe(
      `${vat}  evaporates 7.9 L/day\n  tank sump 1,250 L\n  displace rock 5 L from 2026-11-02\n`,
    );
    expect(titlesAt(text, ["source.fixAll"])).toEqual(["Do the 2 safe fixes of this file"]);
    expect(titlesAt(text, ["source.fixAll.marl"])).toEqual(["Do the 2 safe fixes of this file"]);
    expect(titlesAt(`${vat}  evaporates 7,9 L/day|\n`, ["source.fixAll"])).toEqual([
      "Do the one safe fix of this file",
    ]);
    expect(titlesAt(`${vat}|`, ["source.fixAll"])).toEqual([]);
  });

  test("is tidied", () => {
    const text = "|system  vat\n  tank  main 500 L\n\n\n";
    expect(titlesAt(text, ["source"])).toEqual(["Tidy this file"]);
    expect(textAfter(text, "Tidy this file")).toBe(vat);
    expect(titlesAt(`|${vat}`, ["source.tidy"])).toEqual([]);
  });
});

describe("a log", () => {
  const log = "system vat\n  tank main 500 L\n\nlog vat\n";

  test("gets a read line dated now, up to what is usually read first", () => {
    const text = `${log}|  2026-11-28 08:10 read calcium 421 mg/L, alkalinity 7.9 dKH\n\n# Shelf.\nkit bench\n  alkalinity scatter 0.1 dKH\n`;
    expect(textAfter(text, "Add a read line dated now")).toBe(
      `${log}  2026-11-28 08:10 read calcium 421 mg/L, alkalinity 7.9 dKH\n  2026-12-01 08:00 read calcium \n\n# Shelf.\nkit bench\n  alkalinity scatter 0.1 dKH\n`,
    );
    expect(textAfter("system vat\n  tank main 500 L\nlog v|at", "Add a read line dated now")).toBe(
      "system vat\n  tank main 500 L\nlog vat\n  2026-12-01 08:00 read ",
    );
    expect(titlesAt(`${vat}|`, ["source.recordReading"])).toEqual([]);
  });
});

const examples = resolve(import.meta.dirname, "../../examples");
const exampleFarm = (): Farm =>
  walk(
    new Map(
      readdirSync(examples, { recursive: true, encoding: "utf8" })
        .filter((name) => name.endsWith(".marl"))
        .sort()
        .map((name) => [name, readFileSync(join(examples, name), "utf8")]),
    ),
  );

/** Every quick fix at every problem of a farm, each checked by itself. */
function checkQuickFixes(farm: Farm): number {
  let checked = 0;
  const places = new Map(farm.problems.map(({ place }) => [JSON.stringify(place), place]));
  for (const { file, line, span } of places.values()) {
    const at = { line, column: span?.start ?? 0 };
    const selection = { file, from: { line, column: 0 }, to: { line, column: Math.max(at.column, 10_000) } };
    for (const action of inOneGo(actionsAt({ farm, selection, canCreate: false, now: 0 }, ["quickfix"]))) {
      const { problem, title } = action;
      const fixed = walkedAfter(farm, action);
      const unreadBefore = farm.problems.filter(({ code }) => code.startsWith("syntax/"));
      const unread = fixed.problems.filter(({ code }) => code.startsWith("syntax/"));
      expect(unread.length, `${title}: ${unread[0]?.message}`).toBeLessThanOrEqual(unreadBefore.length);
      const isSafe = problem?.fixes.some((fix) => fix.safe && fix.title === title) ?? false;
      const isQuieting = title.startsWith("Keep ");
      const same = (farmNow: Farm) =>
        farmNow.problems.filter(
          ({ code, place }) => code === problem?.code && place.file === problem.place.file,
        ).length;
      if (isSafe || isQuieting) expect(same(fixed), title).toBeLessThan(same(farm));
      if (isQuieting)
        expect(
          fixed.problems.some(({ code }) => code === "quiet/unused"),
          title,
        ).toBe(false);
      checked += 1;
    }
  }
  return checked;
}

describe("every quick fix gives a text that reads, and a safe one leaves its problem behind", () => {
  test.each(codes.filter((code) => rules[code].example !== null))("of %s", (code) => {
    const farm = walk(filesOf(rules[code].example!.fires));
    const quietable = farm.problems.some(
      ({ severity, code: found }) => severity !== "error" && found !== "quiet/unused",
    );
    const checked = checkQuickFixes(farm);
    expect(checked > 0 || !quietable).toBe(true);
  });

  test("of the example farm", () => {
    const farm = exampleFarm();
    expect(farm.problems.length).toBeGreaterThan(0);
    expect(checkQuickFixes(farm)).toBeGreaterThan(0);
  });
});

test.each(codes.filter((code) => rules[code].example !== null))(
  "all safe fixes of the file are those of marl check --fix, in the example of %s",
  (code) => {
    const farm = walk(filesOf(rules[code].example!.fires));
    for (const [file, text] of farm.texts) {
      const at = { line: 0, column: 0 };
      const selection = { file, from: at, to: at };
      const own = farm.problems.filter(({ place }) => place.file === file);
      const expected = applySafeFixes(new Map([[file, text]]), own).texts.get(file) ?? text;
      const [action, ...others] = inOneGo(
        actionsAt({ farm, selection, canCreate: false, now: 0 }, ["source.fixAll"]),
      );
      expect(others).toEqual([]);
      expect(action ? textsAfter(farm, action).get(file) : text).toBe(expected);
    }
  },
);

test("all files of the example farm are tidy, and tidying one that isn't is what marl tidy does", () => {
  const farm = exampleFarm();
  const untidy = new Map([...farm.texts].map(([file, text]) => [file, text.replace(/^ {2}/gm, "   ")]));
  for (const [file, text] of untidy) {
    const selection = { file, from: { line: 0, column: 0 }, to: { line: 0, column: 0 } };
    expect(inOneGo(actionsAt({ farm, selection, canCreate: true, now: 0 }, ["source.tidy"]))).toEqual([]);
    const other = walk(untidy);
    const [action] = inOneGo(actionsAt({ farm: other, selection, canCreate: true, now: 0 }, ["source.tidy"]));
    expect(textsAfter(other, action!).get(file)).toBe(tidyText(text));
  }
});

describe("today's plan", () => {
  const farm = (log: string) => `system vat
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH aim 8.0
  uptake alkalinity 0.5 dKH/day
  pump head gives ash-part at 48 mL/min

solution ash-part
  supplies alkalinity 1.6 meq/mL

${log}`;
  const log = "log vat\n  2026-12-01 07:00 read alkalinity 8.0 dKH\n";

  test("is written into the log from its header or the system's, where a pump is set to something else", () => {
    // 0.5 dKH/day × 500 L × 20 / 56.077 meq/L ÷ 1.6 meq/mL = 55.7 mL/day.
    const title = "Write today's plan into the log: set head to 56 mL/day from now on";
    expect(titlesAt(farm(log.replace("log", "|log")), ["source.writePlan"])).toEqual([title]);
    expect(titlesAt(`|${farm(log)}`, ["source.writePlan"])).toEqual([title]);
    const set = "  2026-12-01 08:00 set head 56 mL/day\n";
    expect(textAfter(`|${farm(log)}`, title)).toBe(farm(log + set));
    expect(titlesAt(`|${farm(log + set)}`, ["source.writePlan"])).toEqual([]);
    expect(titlesAt(farm(log.replace("07:00", "07:|00")), ["source.writePlan"])).toEqual([]);
  });
});
