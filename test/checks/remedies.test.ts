/**
 * What would mend water, doses and plans: the title of each fix, the text after it, and what is left to be told.
 * Everything is seen at 2026-12-01 08:00.
 */
import { describe, expect, test } from "vitest";
import { editedText } from "../../server/checks/apply-fixes.ts";
import type { Problem } from "../../server/checks/rules.ts";
import { filesOf, walk } from "./walk.ts";

const problemIn = (text: string, code: string, at?: string): Problem => {
  const problem = walk(filesOf(text), at).problems.find((other) => other.code === code);
  expect(problem, code).toBeDefined();
  return problem!;
};
const titles = (text: string, code: string, at?: string): string[] =>
  problemIn(text, code, at).fixes.map(({ title }) => title);

/** The farm after a fix: the lines that it adds or changes, and the codes of what is still told. */
function done(text: string, code: string, title: string | RegExp, at?: string) {
  const files = filesOf(text);
  const { fixes } = problemIn(text, code, at);
  const fix = fixes.find((other) =>
    typeof title === "string" ? other.title === title : title.test(other.title),
  );
  expect(fix, fixes.map((other) => other.title).join(", ")).toBeDefined();
  expect(fix!.safe).toBe(false);
  const file = fix!.edits[0]!.file;
  expect(fix!.edits.every((edit) => edit.file === file)).toBe(true);
  const before = files.get(file)!;
  const after = editedText(before, fix!.edits);
  const had = new Set(before.split("\n"));
  return {
    after,
    file,
    lines: after.split("\n").filter((line) => !had.has(line)),
    left: walk(new Map([...files, [file, after]]), at).problems.map((problem) => problem.code),
  };
}

const solutions = `
solution ash-part
  supplies alkalinity 1.6 meq/mL as bicarbonate

solution lime-part
  supplies calcium 40 mg/mL
`;
const vat = (facts: string, log: string, more = ""): string =>
  `system vat\n  tank main 500 L\n${facts}\n${more === "" ? solutions : more}\nlog vat\n${log}`;
const pumps =
  "  pump head-1 gives ash-part at 40 mL/min\n  pump head-2 gives lime-part at 40 mL/min\n  uptake alkalinity 0.2 dKH/day\n  uptake calcium 2 mg/L/day\n";

describe("the recommended rates", () => {
  const facts = `  hold alkalinity 7.5 to 8.5 dKH\n  hold calcium 400 to 440 mg/L\n${pumps}`;
  const read = "  2026-12-01 07:00 read alkalinity 8 dKH, calcium 420 mg/L # before feeding\n";
  const code = "water/leaves-hold-soon";

  test("are set for all pumps that give something else, at the end of the log", () => {
    const text = vat(facts, `${read}\n# January follows.\n`);
    const { lines, left, after } = done(
      text,
      code,
      "Set head-1 to 22 mL/day and head-2 to 25 mL/day from now on",
    );
    expect(lines).toEqual(["  2026-12-01 08:00 set head-1 22 mL/day, head-2 25 mL/day"]);
    expect(after.endsWith("head-2 25 mL/day\n\n# January follows.\n")).toBe(true);
    expect(left).toEqual([]);
  });

  test("keep the line endings of the file", () => {
    const text = vat(facts, read).replaceAll("\n", "\r\n");
    const { after, left } = done(text, code, /^Set /);
    expect(after.endsWith("feeding\r\n  2026-12-01 08:00 set head-1 22 mL/day, head-2 25 mL/day\r\n")).toBe(
      true,
    );
    expect(after).not.toMatch(/[^\r]\n/);
    expect(left).toEqual([]);
  });

  test("leave out a pump that gives its rate already", () => {
    const text = vat(facts, `${read}  2026-12-01 07:10 set head-2 25 mL/day\n`);
    expect(done(text, code, /^Set /).lines).toEqual(["  2026-12-01 08:00 set head-1 22 mL/day"]);
  });

  test("go in order of time, before lines of later", () => {
    const text = vat(facts, `${read}  2026-12-02 07:00 read alkalinity 8 dKH\n`);
    const { after, left } = done(text, code, /^Set /);
    expect(after).toMatch(/08:00 set head-1 22 mL\/day, head-2 25 mL\/day\n {2}2026-12-02/);
    expect(left).toEqual([]);
  });

  test("replace what this very minute's line says", () => {
    const text = vat(facts, `${read}  2026-12-01 08:00 set head-1 2 mL/day, head-2 5 mL/day\n`);
    const { lines, left } = done(text, code, /^Set /);
    expect(lines).toEqual(["  2026-12-01 08:00 set head-1 22 mL/day, head-2 25 mL/day"]);
    expect(left).toEqual([]);
  });

  test("have the indent of the log, and stand in the file of its newest line", () => {
    const old = `use "old.marl"\nuse "new.marl"\n\n${vat(facts, "").replace("\nlog vat\n", "")}`;
    const text = `${old}// file: new.marl\nuse "farm.marl"\n\nlog vat\n    ${read.trim()}\n// file: old.marl\nuse "farm.marl"\n\nlog vat\n  2026-11-30 07:00 read alkalinity 8 dKH\n`;
    const { file, lines } = done(text, code, /^Set /);
    expect([file, lines]).toEqual([
      "new.marl",
      ["    2026-12-01 08:00 set head-1 22 mL/day, head-2 25 mL/day"],
    ]);
  });

  test("keep a line short: one a pump where it would be long", () => {
    const long = (text: string) => text.replaceAll("head-", "the-long-name-of-the-pump-head-");
    const { lines, left } = done(long(vat(facts, read)), code, /^Set /);
    expect(lines).toEqual([
      "  2026-12-01 08:00 set the-long-name-of-the-pump-head-1 22 mL/day",
      "  2026-12-01 08:00 set the-long-name-of-the-pump-head-2 25 mL/day",
    ]);
    expect(left).toEqual([]);
  });

  test("aren't offered for a pump that stands stopped", () => {
    const text = vat(facts, `${read}  2026-12-01 07:10 stopped head-1\n  2026-12-01 07:10 stopped head-2\n`);
    expect(titles(text, code)).toEqual([]);
  });

  test("mend a value outside its band where the plan doses for it, which stays told until it is read again", () => {
    const low = read.replace("8 dKH", "7.2 dKH");
    const text = vat(facts, `${low}  2026-12-01 07:10 set head-2 25 mL/day\n`);
    expect(titles(text, "water/outside-hold")).toEqual([
      expect.stringMatching(/^Set head-1 to \d+ mL\/day from now on$/),
      "Disregard this line: say why",
    ]);
    const { lines, left } = done(text, "water/outside-hold", /^Set head-1/);
    expect(lines).toHaveLength(1);
    expect(left).toContain("water/outside-hold");
    expect(left.filter((each) => each.startsWith("overdose/"))).toEqual([]);
  });

  test("are rounded down where a limit holds them", () => {
    // 0.5 dKH/day × 500 L × 0.35665 meq/L in 1 dKH is 89.16 meq/day, with 0.2 dKH/day of uptake 124.83: 78.02 mL of 1.6 meq/mL.
    const limited = `  limit alkalinity rise 0.5 dKH/day\n${facts}`;
    const low = read.replace("8 dKH", "6.9 dKH");
    const text = vat(limited, `${low}  2026-12-01 07:10 set head-2 25 mL/day\n`);
    expect(done(text, "water/outside-hold", /^Set /).lines).toEqual([
      "  2026-12-01 08:00 set head-1 78 mL/day",
    ]);
    // A litre less: 77.86 mL.
    const smaller = text.replace("500 L", "499 L");
    expect(done(smaller, "water/outside-hold", /^Set /).lines).toEqual([
      "  2026-12-01 08:00 set head-1 77 mL/day",
    ]);
  });

  test("go against rates that rise too fast, while they are in force", () => {
    const log = `${read}  2026-12-01 07:10 set head-1 400 mL/day, head-2 25 mL/day\n`;
    const { lines, left } = done(
      vat(facts, log),
      "overdose/alkalinity-rise",
      "Set head-1 to 20 mL/day from now on",
    );
    // A little was given too much already.
    expect(lines).toEqual(["  2026-12-01 08:00 set head-1 20 mL/day"]);
    // That it was set so stays told; where the water goes isn't any more.
    expect(left).toEqual(["overdose/alkalinity-rise"]);
    const since = `${log}  2026-12-01 07:20 set head-1 22 mL/day\n`;
    expect(titles(vat(facts, since), "overdose/alkalinity-rise")).toEqual([]);
  });
});

describe("a dose by hand", () => {
  const facts = "  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0.2 dKH/day\n  by-hand ash-part\n";
  const read = "  2026-12-01 07:00 read alkalinity 8 dKH\n";

  test("is written as given today, once", () => {
    const title = "Write gave ash-part 22 mL (today's dose by hand)";
    const { lines, left } = done(vat(facts, read), "water/leaves-hold-soon", title);
    expect(lines).toEqual(["  2026-12-01 08:00 gave ash-part 22 mL"]);
    expect(left).toEqual(["water/leaves-hold", "name/unused"]);
    expect(titles(vat(facts, `${read}${lines[0]}\n`), "water/leaves-hold")).toEqual([]);
  });
});

describe("a hand whose rate is set", () => {
  const facts =
    "  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0.2 dKH/day\n  by-hand ash-part\n  by-hand lime-part\n";
  const code = "water/leaves-hold";
  const log = (set: string) => `  2026-12-01 07:00 read alkalinity 8 dKH\n  2026-12-01 07:00 set ${set}\n`;

  test("is set anew: a dose of today would come on top", () => {
    const text = vat(facts, log("ash-part 5 mL/day"));
    expect(titles(text, code)).toEqual(["Set ash-part to 22 mL/day from now on"]);
    expect(problemIn(text, code).todo).toBe("Set ash-part to 22 mL/day.");
    const { lines, left } = done(text, code, /^Set /);
    expect(lines).toEqual(["  2026-12-01 08:00 set ash-part 22 mL/day"]);
    expect(left).toEqual([]);
  });

  test("and so is one that `always` gives something of", () => {
    const always = facts.replace("by-hand ash-part", "by-hand ash-part always 5 mL/day");
    const text = vat(always, "  2026-12-01 07:00 read alkalinity 8 dKH\n");
    expect(titles(text, code)).toEqual(["Set ash-part to 22 mL/day from now on"]);
  });

  test("also where the plan gives nothing of it", () => {
    const held = `${facts}  hold calcium 400 to 440 mg/L\n  uptake calcium 0 mg/L/day\n`;
    const text = vat(
      held,
      log("ash-part 22 mL/day, lime-part 100 mL/day").replace("8 dKH", "8 dKH, calcium 435 mg/L"),
    );
    expect(titles(text, "water/leaves-hold-soon")).toEqual(["Set lime-part to 0 mL/day from now on"]);
  });

  test("not where a pump gives the same: a line couldn't say which of them", () => {
    const both = `${facts}  pump head-1 gives ash-part at 40 mL/min from 2026-12-01 07:30\n`;
    const text = vat(both, log("ash-part 5 mL/day"));
    expect(titles(text, code).filter((title) => title.includes("ash-part"))).toEqual([]);
  });
});

describe("a dose in parts", () => {
  const facts =
    "  by-hand ash-part\n  by-hand lime-part\n  uptake alkalinity 0 dKH/day\n  uptake calcium 0 mg/L/day\n";
  // 1.6 meq/mL in 500 L: 100 mL raise alkalinity by 0.32 meq/L, 0.897 dKH.
  const gave = (line: string, more = "") =>
    vat(facts, `  2026-11-30 07:00 read alkalinity 8 dKH, calcium 420 mg/L\n  ${line}\n${more}`);

  test("on the same day where the limit on one dose alone is broken", () => {
    // 70 mL: 0.63 dKH, limits 0.5 dKH a dose and 0.7 dKH a day.
    const text = gave("2026-12-01 07:50 gave ash-part 70 mL by ro # all of it");
    const { after, left } = done(
      text,
      "overdose/alkalinity-dose",
      "Split into 2 doses over the day, 35 mL each (if it isn't given yet; the later lines wait for their time)",
    );
    expect(
      after.endsWith(
        "  2026-12-01 07:50 gave ash-part 35 mL by ro # all of it\n  2026-12-01 09:50 gave ash-part 35 mL by ro\n",
      ),
    ).toBe(true);
    expect(left).toEqual([]);
  });

  test("each of its lines at its place, and only the dose that is too large", () => {
    const text = gave(
      "2026-12-01 07:50 gave lime-part 40 mL, ash-part 70.5 mL",
      '  2026-12-01 09:00 note "by the door"\n  2026-12-02 06:00 read calcium 423 mg/L\n',
    );
    const { after, left } = done(text, "overdose/alkalinity-dose", /^Split into 2/);
    expect(
      after.endsWith(
        '  2026-12-01 07:50 gave lime-part 40 mL, ash-part 35.2 mL\n  2026-12-01 09:00 note "by the door"\n  2026-12-01 09:50 gave ash-part 35.3 mL\n  2026-12-02 06:00 read calcium 423 mg/L\n',
      ),
    ).toBe(true);
    expect(left).toEqual([]);
  });

  test("over the days where a day is too short: equal, none over the limit on a rise", () => {
    // 110 mL: 0.99 dKH in a day, the limit is 0.7 dKH: two days of 55 mL, 0.49 dKH each.
    const text = gave("2026-12-01 07:50 gave ash-part 0.11 L");
    for (const code of ["overdose/alkalinity-rise", "overdose/alkalinity-dose"]) {
      const { lines, left } = done(
        text,
        code,
        "Split over 2 days, 0.055 L each (if it isn't given yet; the later lines wait for their time)",
      );
      expect(lines).toEqual([
        "  2026-12-01 07:50 gave ash-part 0.055 L",
        "  2026-12-02 07:50 gave ash-part 0.055 L",
      ]);
      expect(left).toEqual([]);
    }
  });

  test("a bare date stays bare", () => {
    const text = gave("2026-12-01 gave ash-part 110 mL");
    // It counts as at noon, ten minutes ago.
    const at = "2026-12-01T12:10";
    const { lines, left } = done(text, "overdose/alkalinity-rise", /^Split over 2 days, 55 mL each/, at);
    expect(lines).toEqual(["  2026-12-01 gave ash-part 55 mL", "  2026-12-02 gave ash-part 55 mL"]);
    expect(left).toEqual([]);
    expect(titles(gave("2026-12-01 gave ash-part 70 mL"), "overdose/alkalinity-dose", at)).toEqual([]);
  });

  test("what other doses of the day leave room for comes first", () => {
    // 0.7 dKH a day are 78.0 mL; 50 mL were given: 28 mL are left today.
    const text = gave("2026-12-01 07:10 gave ash-part 50 mL", "  2026-12-01 07:50 gave ash-part 70 mL\n");
    const { lines, left } = done(text, "overdose/alkalinity-rise", /^Split over 2 days, 28 and 42 mL /);
    expect(lines).toEqual([
      "  2026-12-01 07:50 gave ash-part 28 mL",
      "  2026-12-02 07:50 gave ash-part 42 mL",
    ]);
    expect(left).toEqual([]);
  });

  test("under a greatest value as far as the corals make room", () => {
    // 3.2 of at most 3.25 meq/L, 0.1 meq/L taken a day: 50 mL of 1 meq/mL at once, then up to 100 mL a day.
    const text =
      "system vat\n  tank main 1000 L\n  uptake alkalinity 0.1 meq/L/day\n  limit alkalinity max 3.25 meq/L\n  limit alkalinity dose 0.5 meq/L\n  by-hand part\n\nsolution part\n  supplies alkalinity 1 meq/mL as bicarbonate\n\nlog vat\n  2026-12-01 08:00 read alkalinity 3.2 meq/L\n  2026-12-01 08:00 gave part 120 mL\n";
    const { lines, left } = done(
      text,
      "overdose/alkalinity-max",
      "Split over 2 days, 50 and 70 mL (if it isn't given yet; the later lines wait for their time)",
    );
    expect(lines).toEqual(["  2026-12-01 08:00 gave part 50 mL", "  2026-12-02 08:00 gave part 70 mL"]);
    expect(left).toEqual([]);
  });

  test("not once it has gone in: longer ago than writing it down takes", () => {
    const splits = (time: string) =>
      titles(gave(`2026-12-01 ${time} gave ash-part 70 mL`), "overdose/alkalinity-dose");
    expect(splits("07:44")).toEqual([]);
    expect(splits("07:45")).toHaveLength(1);
  });

  test("in parts that add up to what was written", () => {
    // At most 0.5 dKH, 55.7 mL, at once: three days, 53.37 mL each.
    const { lines } = done(
      gave("2026-12-01 07:50 gave ash-part 160.1 mL"),
      "overdose/alkalinity-rise",
      /^Split over 3 days, 53.3, 53.3 and 53.5 mL /,
    );
    const parts = lines.map((line) => Number(/([\d.]+) mL/.exec(line)?.[1]));
    expect(parts).toHaveLength(3);
    expect(parts.reduce((sum, part) => sum + part, 0)).toBeCloseTo(160.1, 9);
  });

  test("not where others follow, or seven days aren't enough", () => {
    const followed = gave("2026-12-01 07:50 gave ash-part 110 mL", "  2026-12-01 07:55 gave ash-part 1 mL\n");
    expect(titles(followed, "overdose/alkalinity-rise")).toEqual([]);
    expect(titles(gave("2026-12-01 07:50 gave ash-part 900 mL"), "overdose/alkalinity-rise")).toEqual([]);
  });

  test("no top-up with a solution, which is no line of doses", () => {
    const text = gave("2026-12-01 07:30 topped 0.07 L with ash-part");
    expect(titles(text, "overdose/alkalinity-dose")).toEqual([]);
  });
});

describe("exchanged water", () => {
  const mix = "saltwater mix\n  alkalinity 7 dKH\n  calcium 400 mg/L\n  salinity 30\n\n";
  const with_ = (facts: string, log: string, water = mix) => `${water}${vat(facts, log, " ")}`;

  test("brings what is beyond its limit to the aim, within the day's limit or told to be beyond it", () => {
    // (12.6 − 10) ÷ (12.6 − 7) of 500 L is 232.1 L; a fall of 1 dKH, the default, 89.3 L.
    const text = with_("  hold alkalinity 9 to 11 dKH\n", "  2026-12-01 07:00 read alkalinity 12.6 dKH\n");
    expect(titles(text, "water/beyond-limit")).toEqual([
      "Write renewed 89.2 L with mix (brings alkalinity to 11.6 dKH, as far as a day's limit on alkalinity allows)",
      "Write renewed 233 L with mix (brings alkalinity to 10.0 dKH, more at once than a day's limit on alkalinity allows)",
      "Disregard this line: say why",
    ]);
    const { lines, left } = done(text, "water/beyond-limit", /^Write renewed 233/);
    expect(lines).toEqual(["  2026-12-01 08:00 renewed 233 L with mix"]);
    expect(left).toEqual([]);
    expect(done(text, "water/beyond-limit", /^Write renewed 89/).left).toEqual(["water/outside-hold"]);
  });

  test("to the edge of the band where half of the water doesn't reach the aim", () => {
    // (495 − 440) ÷ (495 − 400) is 0.579, over a half; (495 − 450) ÷ 95 × 500 L is 236.8 L.
    const text = with_("  hold calcium 430 to 450 mg/L\n", "  2026-12-01 07:00 read calcium 495 mg/L\n");
    const { lines, left } = done(
      text,
      "water/outside-hold",
      "Write renewed 237 L with mix (brings calcium to 450 mg/L)",
    );
    expect(lines).toEqual(["  2026-12-01 08:00 renewed 237 L with mix"]);
    expect(left).toEqual([]);
  });

  test("for a salinity that is too low, a saltier water", () => {
    const brine = "saltwater brine\n  salinity 45\n\n";
    const text = with_(
      "  hold salinity 34 to 36\n  limit salinity rise 2\n",
      "  2026-12-01 07:00 read salinity 33.4\n",
      mix + brine,
    ).replace("rise 2\n", "rise 2 /day\n");
    // (35 − 33.4) ÷ (45 − 33.4) of 500 L is 68.97 L.
    const title = "Write renewed 69 L with brine (brings salinity to 35.0)";
    const { left } = done(text, "water/outside-hold", title);
    expect(left).toEqual(["name/unused"]);
  });

  test("no water that doesn't help, spoils something else, doesn't say, or isn't seen", () => {
    const log = "  2026-12-01 07:00 read alkalinity 12.6 dKH, calcium 430 mg/L\n";
    const only = ["Disregard this line: say why"];
    const facts = "  hold alkalinity 9 to 11 dKH\n";
    expect(titles(with_(facts, log, mix.replace("7 dKH", "13 dKH")), "water/beyond-limit")).toEqual(only);
    const narrow = `${facts}  hold calcium 425 to 435 mg/L\n`;
    expect(titles(with_(narrow, log), "water/beyond-limit")).toEqual(only);
    expect(titles(with_(facts, log, mix.replace("  alkalinity 7 dKH\n", "")), "water/beyond-limit")).toEqual(
      only,
    );
    const apart = `${with_(facts, log, "")}// file: mix.marl\n${mix}`;
    expect(titles(apart, "water/beyond-limit")).toEqual(only);
    expect(titles(`use "mix.marl"\n\n${apart}`, "water/beyond-limit")).toHaveLength(3);
  });

  test("keeps a day's limit on everything that it changes, and says what else it moves", () => {
    // Salinity falls by 7.2 in a whole exchange and by 1 a day at most: 0.1389 of 500 L are 69.4 L.
    const text = with_(
      "  hold alkalinity 9 to 11 dKH\n  limit alkalinity fall 5 dKH/day\n  hold salinity 30 to 38\n",
      "  2026-12-01 07:00 read alkalinity 12.6 dKH, salinity 37.2\n",
    );
    expect(titles(text, "water/beyond-limit").slice(0, 2)).toEqual([
      "Write renewed 69.4 L with mix (brings alkalinity to 11.8 dKH and salinity to 36.2, as far as a day's limit on salinity allows)",
      "Write renewed 233 L with mix (brings alkalinity to 10.0 dKH and salinity to 33.9, more at once than a day's limit on salinity allows)",
    ]);
  });

  test("isn't for what only salinity puts outside its band", () => {
    const text = with_(
      "  hold alkalinity 7.5 to 8.5 dKH\n  hold salinity 34 to 36\n",
      "  2026-12-01 07:00 read alkalinity 8.9 dKH, salinity 37.5\n",
    );
    const problems = walk(filesOf(text)).problems;
    expect(problems.map(({ code }) => code)).toContain("water/salinity-is-the-cause");
    const high = problems.find(({ message }) => message.startsWith("Alkalinity is 8.9"))!;
    expect(high.fixes.map(({ title }) => title)).toEqual(["Disregard this line: say why"]);
    const salinity = problems.find(({ message }) => message.startsWith("Salinity is 37.5"))!;
    expect(salinity.fixes[0]?.title).toContain("brings salinity to 36.5");
  });

  test("of many waters the first three", () => {
    const many = [1, 2, 3, 4].map((number) => mix.replace("mix", `mix-${number}`)).join("");
    const text = with_(
      "  hold alkalinity 9 to 11 dKH\n  limit alkalinity fall 5 dKH/day\n",
      "  2026-12-01 07:00 read alkalinity 12.6 dKH\n",
      many,
    );
    expect(titles(text, "water/beyond-limit").map((title) => /mix-\d/.exec(title)?.[0])).toEqual([
      ...["mix-1", "mix-2", "mix-3", undefined],
    ]);
  });
});

describe("a reading set aside", () => {
  test("has disregard where it belongs, and keeps its comment", () => {
    const text =
      "kit strips\n  salinity scatter 0.5\n\nsystem vat\n  tank main 500 L\n\nlog vat\n  2026-12-01 07:00 read  salinity 22 with strips by ro # old strips\n";
    const { lines, left } = done(text, "reading/unusual", "Disregard this line: say why");
    expect(lines).toEqual([
      '  2026-12-01 07:00 read salinity 22 with strips disregard "say why" by ro # old strips',
    ]);
    expect(left).toEqual(["reading/disregarded"]);
  });

  test("isn't offered where a dose since then brought the water beyond its limit", () => {
    const facts = "  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0 dKH/day\n";
    const log = "  2026-12-01 07:00 read alkalinity 8 dKH\n  2026-12-01 07:30 gave ash-part 600 mL\n";
    expect(titles(vat(facts, log), "water/beyond-limit")).toEqual([]);
    expect(titles(vat(facts, log.replace("8 dKH", "12.5 dKH")), "water/beyond-limit")).toEqual([
      "Disregard this line: say why",
    ]);
  });

  test("isn't offered where the band is left by reckoning", () => {
    const text = vat(
      "  hold alkalinity 7.5 to 8.5 dKH\n  uptake alkalinity 0.5 dKH/day\n",
      "  2026-11-29 07:00 read alkalinity 8 dKH\n",
    );
    expect(titles(text, "water/outside-hold")).toEqual([]);
  });
});

describe("what is missing", () => {
  test("a tank, as an example", () => {
    const text = "system vat # the new one\n  evaporates 4 L/day\n";
    const { after, left } = done(text, "system/no-volume", "Add tank main 500 L, an example to correct");
    expect(after).toBe("system vat # the new one\n  tank main 500 L\n  evaporates 4 L/day\n");
    expect(left).toEqual([]);
  });

  test("a source: each solution that the file sees and that holds it", () => {
    const facts = "  hold calcium 300 to 500 mg/L\n  uptake calcium 3 mg/L/day\n";
    const text = vat(facts, "  2026-12-01 07:00 read calcium 420 mg/L\n");
    expect(titles(text, "plan/no-source")).toEqual(["Add by-hand lime-part"]);
    const { after, left } = done(text, "plan/no-source", "Add by-hand lime-part");
    expect(after).toContain("  uptake calcium 3 mg/L/day\n  by-hand lime-part\n");
    expect(left).toEqual(["name/unused"]);
  });

  test("the one word that a line can go on with", () => {
    const text = "system vat\n  tank main 500 L\n  cohort plugs 40 pieces # more to come\n";
    const { lines } = done(text, "syntax/unfinished", "Add uptake");
    expect(lines).toEqual(["  cohort plugs 40 pieces uptake # more to come"]);
  });

  test("the volume of a recipe, as an example", () => {
    const text =
      "system vat\n  tank main 500 L\n  by-hand part\n\nsolution part\n  dissolve sodium-bicarbonate 80 g\n\n";
    const { after, left } = done(text, "syntax/unfinished", "Add make up to 1 L, an example to correct");
    expect(after).toContain("80 g\n  make up to 1 L\n");
    expect(left).toEqual([]);
  });

  test.each([
    ["  by-hand part", "solution part", "solution"],
    ["  flows-through 20 L/day with part", "saltwater part", "salt water"],
  ])("a declaration: %s", (line, header, kind) => {
    const text = `system vat\n  tank main 500 L\n${line}\n`;
    const title = `Declare ${kind} part, with example values to correct`;
    const { after, left } = done(text, "name/undeclared", title);
    expect(after).toContain(`${line}\n\n${header}\n  `);
    expect(left).toEqual([]);
  });

  test("a declaration of a kit, a reagent", () => {
    const kit = vat("", "  2026-12-01 07:00 read alkalinity 8 dKH with strips\n", " ");
    expect(done(kit, "name/undeclared", /^Declare kit strips/).left).toEqual([]);
    const reagent =
      "system vat\n  tank main 500 L\n  by-hand part\n\nsolution part\n  dissolve sack 80 g\n  make up to 1 L\n";
    expect(done(reagent, "name/undeclared", /^Declare reagent sack/).left).toEqual([]);
  });

  test("no declaration of a name that is something else, or that another file declares", () => {
    const other = "system vat\n  tank main 500 L\n  by-hand strips\n\nkit strips\n  salinity scatter 0.5\n";
    expect(titles(other, "name/undeclared")).toEqual([]);
    const elsewhere =
      "system vat\n  tank main 500 L\n  by-hand part\n// file: parts.marl\nsolution part\n  supplies calcium 9 mg/mL\n";
    expect(titles(elsewhere, "name/undeclared")).toEqual(['Add use "parts.marl"']);
  });
});

test("a unit is chosen among all that people mean", () => {
  const set = vat(pumps, "  2026-12-01 07:00 set head-1 22, head-2 30 mL/day\n");
  expect(titles(set, "unit/missing")).toEqual(["Add mL/min", "Add mL/day", "Add L/day"]);
  expect(done(set, "unit/missing", "Add mL/day").left).toEqual([]);
  const half = vat(pumps, "  2026-12-01 07:00 set head-1 22 mL\n");
  expect(titles(half, "unit/dimension")).toEqual(["Write mL/min", "Write mL/day"]);
  const read = vat(pumps, "  2026-12-01 07:00 read alkalinity 8\n");
  expect(titles(read, "unit/missing")).toEqual(["Add dKH", "Add mg/L as CaCO3", "Add meq/L"]);
});

test("of one problem no more fixes than somebody reads", () => {
  const mixes = [1, 2, 3, 4, 5].map((number) => `saltwater mix-${number}\n  alkalinity 7 dKH\n\n`).join("");
  const text = `${mixes}${vat("  hold alkalinity 9 to 11 dKH\n", "  2026-12-01 07:00 read alkalinity 12.6 dKH\n", " ")}`;
  const offered = titles(text, "water/beyond-limit");
  expect(offered.length).toBe(6);
  expect(offered.at(-1)).toBe("Disregard this line: say why");
});
