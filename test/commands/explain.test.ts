import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { codes, rules } from "../../server/checks/rules.ts";
import { molarMass, parseFormula } from "../../server/chemistry/formula.ts";
import { problemTopic } from "../../server/report/explain/problems.ts";
import { topicText } from "../../server/report/explain/text.ts";
import { knownWords, topicsOf } from "../../server/report/explain/topics.ts";
import { folder, marl } from "./marl.ts";

/** What `marl explain` prints, in a folder that holds nothing. */
const explained = (...words: string[]): string => {
  const { status, out, error } = marl(folder({}), ["explain", ...words]);
  expect({ status, error }).toEqual({ status: 0, error: "" });
  return out;
};
const unwrapped = (text: string): string => text.replace(/\s+/g, " ").trim();
const facts = (word: string) => JSON.parse(explained(word, "--format", "json")).topics;

describe("a code", () => {
  test("prints its page", () => {
    const out = explained("water/stale");
    const paragraphs = readFileSync("docs/problems/water-stale.md", "utf8")
      .replace(/```marl\n|```/g, "")
      .split("\n\n")
      .map((paragraph) => unwrapped(paragraph.replace(/^(#+|>) /, "")))
      .filter((paragraph) => paragraph !== "" && paragraph !== "An example");
    expect(paragraphs.length).toBeGreaterThan(10);
    for (const paragraph of paragraphs) expect(unwrapped(out)).toContain(paragraph);
    expect(out).toContain("  What to do\n    Test what the message names.");
  });

  test.each(codes)("%s has a message, and its example as lines to copy", (code) => {
    const topic = problemTopic(code);
    expect(topic.says).not.toBe("");
    const out = topicText([topic], false);
    for (const { text } of [...topic.fires, ...topic.silent])
      for (const line of text.split("\n")) expect(out).toContain(line.trim());
    if (rules[code].example === null) expect(out).not.toContain("This is told of");
  });
});

describe("a word", () => {
  test("of a statement: form, meaning, section, examples", () => {
    expect(explained("hold")).toBe(`hold  a standing line of a system section
  hold PARAMETER q to q [aim q] [from DATE [TIME]] [until DATE [TIME]]
  The band to keep a parameter in, and where in it to aim.
  For example:
    hold alkalinity 7.8 to 8.6 dKH aim 8.2
    hold pH 7.9 to 8.3 total
    hold salinity 34 to 36
`);
    expect(explained("make", "up", "to")).toContain("make up to volume");
    expect(explained("read")).toContain("an event of log and saltwater sections");
  });

  test("of a section: what its lines begin with", () => {
    expect(explained("store")).toContain("Its lines begin with: received, counted, mixed, discarded, note.");
  });

  test("that is several things: all of them", () => {
    expect(facts("note").map(({ form }: { form: string }) => form)).toEqual(["fact", "event"]);
    const kinds = (word: string) => facts(word).map(({ kind }: { kind: string }) => kind);
    expect(kinds("magnesium")).toEqual(["parameter", "statement", "statement", "part"]);
    expect(kinds("min")).toEqual(["part", "unit"]);
    expect(kinds("uptake")).toEqual(["statement", "part"]);
  });

  test("of a parameter: ranges, units, default limits", () => {
    const out = explained("alkalinity");
    for (const part of [
      "Usual: 1.4 to 5.4 meq/L",
      "Possible: 0 to 20 meq/L",
      "1 dKH = 0.35665 meq/L",
      "rise 0.7 dKH/day (common practice)",
      "alkalinity (scatter | tolerance) q",
    ])
      expect(out).toContain(part);
    expect(explained("salinity")).toContain("Where nothing says it, salinity is taken as 35");
    expect(facts("nitrate")[0]).toMatchObject({ possible: null, limits: [], otherwise: null });
  });
});

describe("a unit", () => {
  test.each([
    // 20 / M(CaO), M(CaO) = 40.078 + 15.999 (IUPAC abridged weights).
    ["dKH", "1 dKH = 0.35665 meq/L"],
    // Exact by definition (international yard and pound, 1959).
    ["gal", "1 gal = 3.785411784 L"],
    ["lb", "1 lb = 453.59237 g"],
    ["week", "1 week = 10080 min"],
    ["mL/min", "1 mL/min = 1.44 L/day"],
    ["mmol/L", "calcium: 1 mmol/L = 40.078 mg/L"],
    // 2 eq in a mole of 100.086 g.
    ["mg/L as CaCO3", "alkalinity: 1 mg/L as CaCO3 = 0.019983 meq/L"],
    // 1.023343 kg/L: UNESCO 1983, Technical Papers in Marine Science 44, at 35 and 25 °C.
    ["umol/kg", "alkalinity: 1 umol/kg = 0.0010233 meq/L, at salinity 35 and 25 °C"],
    ["µmol/kg", "umol/kg  a unit"],
    ["degF", "32 degF is 0 degC and 212 degF is 100 degC"],
    ["SG", "1.0264 SG is a salinity of 35"],
    ["total", "Measures pH."],
    ["g", "Measures a mass."],
    ["meq", "Counts an amount"],
    ["ppm", "read as mg/L"],
  ])("%s: %s", (unit, part) => {
    expect(explained(unit)).toContain(part);
  });

  test("that can't be one is none", () => {
    for (const word of ["mg/", "/", "dKH/dKH/dKH", "dKH as CaCO3", "mg/L/lot", " as CaCO3", "m".repeat(5000)])
      expect(topicsOf(word)).toEqual([]);
  });
});

describe("a reagent", () => {
  test("has its formula, molar mass, and what a gram brings", () => {
    expect(explained("sodium-carbonate")).toBe(`sodium-carbonate  a built-in reagent
  Sodium carbonate, anhydrous (soda ash), Na2CO3, 105.988 g/mol.
  1 g brings 18.87 meq of alkalinity, 433.8 mg of sodium and 9.435 mmol of inorganic carbon.
`);
  });

  test("whose ions are all told weighs what its formula does", () => {
    const [topic] = facts("calcium-chloride-dihydrate");
    const water = parseFormula("H2O");
    const dry = topic.gramBrings.reduce(
      (sum: number, { amount }: { amount: string }) => sum + Number.parseFloat(amount) / 1000,
      0,
    );
    const crystal = water.ok ? (2 * molarMass(water.elements)) / topic.molarMassGPerMol : Number.NaN;
    expect(dry + crystal).toBeCloseTo(1, 3);
  });
});

describe("what is unknown", () => {
  test.each([
    ["alkalinty", "alkalinity?"],
    ["water/stael", "water/stale?"],
    ["stale", "water/stale?"],
    ["overdose", "for example overdose/"],
    ["dkh", "dKH?"],
    ["calcium-chloride", "calcium-chloride-dihydrate"],
    ["zzzzzz", "nothing is known of zzzzzz\n"],
    ["constructor", "nothing is known of constructor"],
    ["", "explain takes a code or a word"],
  ])("%s: status 2 and nothing on standard output", (word, part) => {
    const ended = marl(folder({}), ["explain", word]);
    expect(ended).toMatchObject({ status: 2, out: "" });
    expect(ended.error).toContain(part);
  });

  test("no word, a strange format, an option of other commands", () => {
    for (const words of [[], ["hold", "--format", "yaml"], ["hold", "--at", "2026-12-01"]])
      expect(marl(folder({}), ["explain", ...words])).toMatchObject({ status: 2, out: "" });
  });
});

test("every known word has a topic, and its text keeps within 100 columns but for lines of Marl", () => {
  expect(knownWords().length).toBeGreaterThan(200);
  for (const word of knownWords()) {
    const topics = topicsOf(word);
    expect(topics.length, word).toBeGreaterThan(0);
    const marlLines = new Set(
      topics
        .flatMap((topic) => {
          if (topic.kind === "problem")
            return [...topic.fires, ...topic.silent].flatMap(({ text }) => text.split("\n"));
          return topic.kind === "statement" || topic.kind === "part" ? topic.examples : [];
        })
        .map((line) => line.trim()),
    );
    for (const line of topicText(topics, false).split("\n"))
      if (!marlLines.has(line.trim())) expect(line.length, line).toBeLessThanOrEqual(100);
  }
});

test("JSON is one object with the same facts", () => {
  const { word, topics } = JSON.parse(explained("water/stale", "--format", "json"));
  expect(word).toBe("water/stale");
  expect(topics).toEqual(JSON.parse(JSON.stringify(topicsOf("water/stale"))));
});
