/** Nothing that a user can write throws, and no number of the answer is without a value. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { readDocument } from "../../grammar/document.ts";
import { bindFarm } from "../../server/culture/farm-model.ts";
import { type Assessment, assess } from "../../server/dosing/assess.ts";
import { balanceOf } from "../../server/dosing/balance.ts";
import { minute } from "../culture/fixture.ts";
import { eastHall, shelves } from "../grammar/a-farm.ts";

const westHall = `use "shelves.marl"
use "east.marl"

system west-hall
  tank vat 900 L
  hold alkalinity 7.5 to 8.5 dKH
  hold calcium 10 to 11 mmol/kg
  hold salinity 34 to 36
  cohort staghorn-tips 200 pieces uptake 1 meq/day each
  flows-through 20 L/day with east-hall
  by-hand soda

log west-hall
  2026-10-24 08:00 read alkalinity 7.2 dKH, calcium 400 mg/L, salinity 1.0262 SG
  2026-10-25 08:00 renewed 40 L with east-hall
  2026-10-30 08:00 gave soda 60 mL
  2026-10-30 20:00 read alkalinity 2800 umol/kg, pH 8.2
`;

const moreSolutions = `
solution chloride
  dissolve calcium-chloride-dihydrate 117.6 g
  make up to 1 L

solution epsom
  dissolve magnesium-sulfate-heptahydrate 200 g
  make up to 1 L
`;

const growOut = `reagent bag
  is tin
reagent tin
  formula CaCl2.2H2O purity 97 %

solution ash
  dissolve sodium-carbonate 84.79 g
  dissolve sodium-bicarbonate 10 g
  make up to 1 L
solution ash from 2026-11-20
  dissolve sodium-carbonate 60 g
  make up to 1 L
solution lime
  saturated calcium-hydroxide
  keep at 25 degC
solution chloride
  dissolve bag 117.6 g
  make up to 1 L
solution ready
  supplies magnesium 48 mg/mL
  supplies alkalinity 0.1 meq/mL as hydroxide

saltwater mix
  salinity 35
  alkalinity 8 dKH
  2026-11-10 read calcium 430 mg/L, salinity 34.6

kit one
  alkalinity scatter 0.1 dKH
  salinity tolerance 0.001 SG
  2026-11-02 checked alkalinity 8.2 dKH against 8.0 dKH

system grow-out
  tank main round 2 m x 70 cm times 2
  displace rock 80 kg at 2.6 kg/L
  measured volume 4100 L ± 2 % from 2026-11-05
  hold alkalinity 7.6 to 8.4 dKH aim 8.0
  hold calcium 410 to 440 mg/L
  hold magnesium 1280 to 1360 mg/L
  hold potassium 380 to 420 mg/L
  hold salinity 34 to 35.5
  hold temperature 76 to 80 degF
  hold pH 7.9 to 8.4
  limit alkalinity rise 0.6 dKH/day
  limit alkalinity dose 0.1 dKH
  limit pH max 8.5 total
  cohort tips 420 pieces uptake 0.9 meq/day each magnesium 2 % grows 1 %/week from 2026-10-01
  cohort crust 0.4 m2 uptake 240 mmol/m2/day as CaCO3
  cohort rest 5 pieces uptake 3 g/day as CaCO3
  uptake magnesium 0.5 mg/L/day ± 30 %
  skeleton magnesium 1 %
  air CO2 620 ppm
  evaporates 14 L/day
  top-off lime 200 L
  flows-through 15 L/day with mix from 2026-11-12
  feeds 20 g/day protein 45 %
  pump one gives ash at 48.5 mL/min least 0.5 mL between 20:00 and 08:00 always 20 mL/day holding 5 L
  pump two gives chloride at 30 mL/min
  by-hand ready times 2

log grow-out
  2026-11-14 08:10 read alkalinity 7.4 dKH, calcium 421 mg/L, magnesium 1140 mg/L with one by mk
  2026-11-14 08:40 read salinity 53 mS/cm, temperature 25.4 degC, pH 8.12
  2026-11-14 09:00 set one 310 mL/day, two 300 mL/day
  2026-11-15 09:30 gave ready 250 mL, ash 20 mL by ro
  2026-11-16 10:00 renewed 180 L with mix
  2026-11-17 08:05 read alkalinity 9.9 dKH with one disregard "reagent out of date"
  2026-11-18 stocked tips 60 pieces
  2026-11-18 22:00 stopped one
  2026-11-19 07:55 started one
  2026-11-20 moved tips 10 pieces to grow-out
  2026-11-20 12:00 topped 20 L with lime
  2026-11-21 08:00 read alkalinity 150 mg/L as CaCO3, strontium 8 ppm, nitrate below 2 mg/L
`;

interface Example {
  readonly files: Readonly<Record<string, string>>;
  readonly moments: readonly string[];
}

const halls: Example = {
  files: { "east.marl": eastHall, "west.marl": westHall, "shelves.marl": shelves + moreSolutions },
  moments: ["2026-10-31 12:00", "2026-10-26 11:00", "2026-12-24 08:00", "2026-09-01 08:00"],
};
const nursery: Example = {
  files: { "farm.marl": growOut },
  moments: ["2026-11-21 20:00", "2026-11-15 09:30", "2026-12-24 08:00", "2026-09-01 08:00"],
};

/** Paths of numbers that are none. A history may reach from always to for ever. */
function notNumbers(value: unknown, path: string, seen: Set<unknown>, bad: string[]): void {
  if (typeof value === "number") {
    const endless = /\.(from|until)$/.test(path) && !Number.isNaN(value);
    if (!Number.isFinite(value) && !endless) bad.push(`${path} ${value}`);
    return;
  }
  if (value === null || typeof value !== "object" || seen.has(value)) return;
  seen.add(value);
  const entries = value instanceof Map || value instanceof Set ? [...value.entries()] : Object.entries(value);
  for (const [key, inner] of entries) notNumbers(inner, `${path}.${String(key)}`, seen, bad);
}

function walk(files: Readonly<Record<string, string>>, moments: readonly string[]) {
  const documents = new Map(Object.entries(files).map(([file, text]) => [file, readDocument(text)]));
  const bound = bindFarm(documents, new Map());
  const assessments: Assessment[] = [];
  for (const moment of moments) {
    for (const one of bound.model.systems.values())
      assessments.push(assess(bound.model, one, minute(moment), minute("2026-12-01")));
  }
  const balances = assessments.map(
    ({ plan, uptake, constants, state }) => plan && uptake && balanceOf(plan, { constants, state, uptake }),
  );
  return { bound, assessments, balances };
}

function check(example: Example): void {
  const first = walk(example.files, example.moments);
  const bad: string[] = [];
  notNumbers(first, "", new Set(), bad);
  expect(bad.slice(0, 5)).toEqual([]);
  const plain = (value: unknown) =>
    JSON.stringify(value, (_, inner) => (inner instanceof Map || inner instanceof Set ? [...inner] : inner));
  expect(plain(walk(example.files, example.moments))).toBe(plain(first));
}

/** A whole farm around a few strange lines: facts of its system, lines of its log, sections. */
const around = (facts: string, log = "", sections = ""): Example => ({
  files: {
    "farm.marl": `solution ash
  supplies alkalinity 1 meq/mL as hydroxide
  supplies calcium 40 mg/mL

system vat
  tank main 1000 L
  hold alkalinity 7 to 9 dKH
  hold calcium 400 to 440 mg/L
  pump one gives ash at 40 mL/min
${facts}

log vat
  2026-11-01 08:00 read alkalinity 8 dKH, calcium 420 mg/L, salinity 35, pH 8.1
${log}
  2026-11-02 08:00 gave ash 10 mL

${sections}
`,
  },
  moments: ["2026-11-02 08:00", "2026-11-12", "1900-01-01", "9998-12-31"],
});

const strangeFarms: Readonly<Record<string, Example>> = {
  "fresh water held": around(
    "  hold salinity 0 to 1\n  hold temperature -2 to 0 degC",
    "  2026-11-01 09:00 read salinity 0, temperature 0 degC",
  ),
  "negative salinity held": around("  hold salinity -5 to -1"),
  "a thimble and an ocean": {
    ...around(""),
    files: {
      "a.marl": around("  measured volume 0.000001 mL").files["farm.marl"]!,
      "b.marl": around("  measured volume 999999999999999 m3\n  uptake alkalinity 1 meq/day").files[
        "farm.marl"
      ]!,
    },
  },
  "uptake of an ocean": around(
    "  uptake alkalinity 999999999999999 dKH/s\n  uptake calcium 999999999999999 kg/s",
  ),
  "uptake below nothing": around(
    "  uptake alkalinity -5 dKH/day\n  cohort plugs 5 pieces uptake -9 meq/day each",
  ),
  "growth and decay without end": around(
    "  cohort plugs 999999999999999 pieces uptake 999999999999999 mol/s as CaCO3 each grows 99 %/week from 1900-01-01\n  cohort tips 5 pieces uptake 9 meq/day each grows -99 %/week from 1900-01-01",
  ),
  "growth past any": around("  cohort tips 5 pieces uptake 9 meq/day each grows -300 %/week from 1900-01-01"),
  "a system that exchanges with itself": around(
    "  flows-through 10 L/day with vat",
    "  2026-11-02 07:00 renewed 10 L with vat",
  ),
  "systems that exchange with each other": around(
    "  flows-through 10 L/day with other",
    "  2026-11-02 07:00 renewed 10 L with other",
    "system other\n  tank main 10 L\n  flows-through 999999999999999 L/s with vat\n\nlog other\n  2026-11-01 read alkalinity 5 meq/L\n  2026-11-02 renewed 5 L with vat",
  ),
  "corals that move to where they are": around(
    "  cohort plugs 5 pieces uptake 9 meq/day each",
    "  2026-11-02 07:00 moved plugs 5 pieces to vat\n  2026-11-02 07:00 moved plugs 999999999999999 pieces to vat",
  ),
  "a solution of itself": around(
    "  by-hand self",
    "  2026-11-02 07:00 gave self 5 L",
    "solution self\n  dissolve self 5 g\n  make up to 1 L\nreagent ring\n  is ring\nsolution two\n  saturated ring",
  ),
  "salt without water": around(
    "  by-hand brine",
    "  2026-11-02 07:00 gave brine 999999999999999 m3",
    "solution brine\n  dissolve sodium-carbonate 999999999999999 kg\n  make up to 0.000000000000001 mL",
  ),
  "limits of nothing": around(
    "  limit alkalinity dose 0 dKH\n  limit alkalinity rise 0 dKH/day\n  limit alkalinity max 0 dKH\n  limit pH dose 0\n  limit pH max 4",
    "  2026-11-01 09:00 set one 5 L/day",
  ),
  "limits without end": around(
    "  limit alkalinity dose 999999999999999 dKH\n  limit alkalinity rise 999999999999999 dKH/day\n  limit pH max 11\n  limit pH dose 9",
    "  2026-11-01 09:00 set one 999999999999999 m3/s",
  ),
  "a pump of nothing": around(
    "  pump two gives ash at 0 mL/min least 999999999999999 L between 08:00 and 08:00 always 999999999999999 L/s",
  ),
  "a limit below nothing": around(
    "  limit alkalinity dose -5 dKH\n  limit alkalinity rise -5 dKH/day\n  limit calcium fall -1 mg/L/day",
  ),
  "air of nothing, air of CO2": around(
    "  air CO2 0 ppm\n  air CO2 999999999999999 uatm from 2026-11-05\n  hold pH 8.2 to 8.4",
  ),
  "light and hours over midnight": around(
    "  light between 23:00 and 01:00\n  pump two gives ash at 5 mL/min between 24:00 and 00:00",
  ),
  "empty sections": around(
    "",
    "",
    "system\n\nlog\n\nlog vat\n\nsolution\n\nsolution empty\n\nreagent empty-too\n\nstore\n\nkit\n\nsaltwater\n\nsaltwater dry\n\nsystem nothing\n\nsystem",
  ),
};

const absurd = [
  "0",
  "-1",
  "-5.5",
  "1",
  "999999999999999",
  "0.000000000000001",
  "100000",
  "1e9",
  "7,9",
  "60",
  "12",
];
const words = [
  "dKH",
  "mg/L",
  "%",
  "%/week",
  "L",
  "mL/min",
  "meq/day",
  "as",
  "CaCO3",
  "from",
  "until",
  "2026-11-01",
];
const strange = [
  "system",
  "log",
  "x",
  "to",
  "±",
  "total",
  "SG",
  "degF",
  "each",
  '"',
  "#",
  "below",
  "pieces",
  "mL/L",
];

type Edit =
  | { readonly kind: "number" | "token"; readonly line: number; readonly word: number; readonly by: string }
  | {
      readonly kind: "drop line" | "double line" | "swap lines" | "drop word" | "double word" | "swap words";
      readonly line: number;
      readonly word: number;
      readonly by?: undefined;
    };

const place = { line: fc.nat(), word: fc.nat() };
const edit: fc.Arbitrary<Edit> = fc.oneof(
  {
    weight: 5,
    arbitrary: fc.record({ kind: fc.constant("number" as const), ...place, by: fc.constantFrom(...absurd) }),
  },
  {
    weight: 2,
    arbitrary: fc.record({
      kind: fc.constant("token" as const),
      ...place,
      by: fc.constantFrom(...absurd, ...words, ...strange),
    }),
  },
  {
    weight: 3,
    arbitrary: fc.record({
      kind: fc.constantFrom(
        "drop line" as const,
        "double line" as const,
        "swap lines" as const,
        "drop word" as const,
        "double word" as const,
        "swap words" as const,
      ),
      ...place,
    }),
  },
);

function edited(text: string, change: Edit): string {
  const lines = text.split("\n");
  const index = change.line % lines.length;
  const line = lines[index]!;
  const parts = line.split(/( +)/);
  const isNumber = (part: string) => /^-?\d+(\.\d+)?,?$/.test(part);
  const places = parts.flatMap((part, at) =>
    part.trim() && (change.kind !== "number" || isNumber(part)) ? [at] : [],
  );
  const at = places[change.word % Math.max(1, places.length)];
  const other = places[(change.word + 1) % Math.max(1, places.length)];
  switch (change.kind) {
    case "drop line":
      lines.splice(index, 1);
      break;
    case "double line":
      lines.splice(index, 0, line);
      break;
    case "swap lines": {
      const next = (index + 1 + (change.word % 7)) % lines.length;
      [lines[index], lines[next]] = [lines[next]!, line];
      break;
    }
    default: {
      if (at === undefined || other === undefined) break;
      if (change.kind === "drop word") parts.splice(at, 1);
      else if (change.kind === "double word") parts.splice(at, 0, parts[at]!, " ");
      else if (change.kind === "swap words") [parts[at], parts[other]] = [parts[other]!, parts[at]!];
      else parts[at] = (change.by ?? "") + (parts[at]!.endsWith(",") ? "," : "");
      lines[index] = parts.join("");
    }
  }
  return lines.join("\n");
}

const spoil = (example: Example, changes: readonly (readonly [number, Edit])[]): Example => {
  const files = { ...example.files };
  const names = Object.keys(files);
  for (const [which, change] of changes) {
    const name = names[which % names.length]!;
    files[name] = edited(files[name]!, change);
  }
  return { ...example, files };
};

describe("the whole walk", () => {
  it("has nothing wrong with the examples as they stand", () => {
    for (const { files, moments } of [halls, nursery]) {
      const { bound, assessments } = walk(files, moments);
      expect(
        bound.findings.filter(({ code }) => code.startsWith("syntax/") || code === "name/undeclared"),
      ).toEqual([]);
      expect(assessments.length).toBeGreaterThan(0);
      expect(assessments.some(({ plan }) => plan !== null)).toBe(true);
    }
  });

  it.each(Object.entries(strangeFarms))("gives an answer to %s", (_, example) => check(example));

  const runs = Number(process.env.RUNS ?? 60);
  it.each([
    ["halls", halls],
    ["nursery", nursery],
  ] as const)("never throws and never loses a number: %s", (_, example) => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.nat(), edit), { minLength: 1, maxLength: 8 }), (changes) =>
        check(spoil(example, changes)),
      ),
      { numRuns: runs, seed: process.env.SEED ? Number(process.env.SEED) : 20_261_201 },
    );
  });
});
