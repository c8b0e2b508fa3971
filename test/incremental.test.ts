/** Whatever is edited, the farm that comes of editing is the farm that comes of reading everything anew, to the last bit. */
import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { isDeepStrictEqual } from "node:util";
import { expect, test } from "vitest";
import { advance, advanceBySystem, type Farm, type FileChange, type Moment } from "../server/farm.ts";
import { reportOn } from "../server/report/report.ts";
import { wholeFarm } from "../server/report/scope.ts";
import { moment } from "./report/walk.ts";
import { type Chance, chanceFrom } from "./simulator/random.ts";

type Texts = ReadonlyMap<string, string>;

const examples = resolve(import.meta.dirname, "../examples");
const exampleFarm: Texts = new Map(
  readdirSync(examples, { recursive: true, encoding: "utf8" })
    .filter((name) => name.endsWith(".marl"))
    .map((name) => [name.split("\\").join("/"), readFileSync(join(examples, name), "utf8")] as const),
);

/** The example farm with the last lines of its logs only. */
const shortFarm: Texts = new Map(
  [...exampleFarm].map(([file, text]) => {
    const lines = text.split("\n");
    const header = lines.findIndex((line) => line.startsWith("log "));
    return [file, header < 0 ? text : [...lines.slice(0, header + 1), ...lines.slice(-30)].join("\n")];
  }),
);

/** Days of a log from 2026-09-01 on: each with the lines that a function gives for it. */
function logOf(days: number, lines: (day: number) => readonly string[]): string {
  const of = (day: number) => {
    const date = new Date(Date.UTC(2026, 8, 1 + day)).toISOString().slice(0, 10);
    return lines(day).map((line) => `  ${date} ${line}\n`);
  };
  return Array.from({ length: days }, (_, day) => of(day).join("")).join("");
}

/** All that reaches from one line, file or system to another. */
const trickyFarm: Texts = new Map([
  [
    "shelf.marl",
    `reagent soda
  is sodium-carbonate purity 99 %
reagent old-soda
  is soda purity 90 % from 2026-10-01

solution ash
  dissolve soda 80 g
  make up to 1 L
solution ash from 2026-10-10
  dissolve old-soda 90 g
  make up to 1 L
solution chalk
  dissolve calcium-chloride-dihydrate 100 g
  make up to 1 L
solution spare
  supplies potassium 2 mg/mL

saltwater mix
  salinity 35
  alkalinity 2.5 meq/kg
  calcium 420 mg/kg
  2026-10-20 read alkalinity 2.6 meq/kg, salinity 34
kit bench
  alkalinity scatter 0.1 dKH
store
  2026-09-21 mixed ash 20 L
`,
  ],
  [
    "vat.marl",
    `use "shelf.marl" # quiet: use/cycle
system vat "Vat"
  tank main 500 L
  measured volume 410 L from 2026-10-01 # quiet: system/volume-differs
  hold alkalinity 2.6 to 3 meq/kg
  hold calcium 400 to 440 mg/L # narrow
  hold salinity 34 to 36
  hold pH 7.9 to 8.3
  limit alkalinity rise 0.5 dKH/day
  cohort plugs 40 pieces uptake 0.8 meq/day each grows 1 %/week from 2026-08-20
  cohort fans 2 m2 uptake 5 meq/m2/day
  pump head-1 ash 5 L/day
  by-hand chalk times 2
  evaporates 2 L/day
  top-off chalk 60 L
  air CO2 600 ppm

log vat
${logOf(46, (day) => [
  `07:30 read alkalinity ${(2.6 + (day % 5) / 20).toFixed(2)} meq/kg, pH ${(8 + (day % 3) / 20).toFixed(2)} with bench by ao`,
  ...(day % 4 === 0
    ? [
        `07:10 read salinity ${34 + (day % 3)}, temperature 25 degC`,
        `12:00 gave chalk ${40 + day} mL, ash ${30 + day} mL`,
      ]
    : []),
  ...(day % 7 === 3
    ? [`08:00 set head-1 ${100 + day} mL/day`, `13:00 renewed 40 L with ${day % 2 ? "mix" : "hall"}`]
    : []),
  ...(day % 9 === 5 ? [`09:00 moved plugs 2 pieces to hall`, `09:00 moved fans 0.1 m2 to hall`] : []),
  ...(day % 11 === 6 ? [`10:00 stopped head-1`, `16:00 started head-1`, `17:00 note "odd # smell"`] : []),
  ...(day % 13 === 2
    ? [`18:00 read calcium 300 mg/kg disregard "bubble"`, `18:00 topped 5 L with chalk`]
    : []),
])}`,
  ],
  [
    "hall.marl",
    `use "vat.marl"
# quiet file: log/out-of-order
solution spare
  supplies magnesium 3 mg/mL
system hall
  tank main box 100 cm x 60 cm x 40 cm
  displace rock 20 L
  cohort plugs 5 pieces uptake 0.7 meq/day each
  hold alkalinity 7.5 to 8.5 dKH
  hold magnesium 1250 to 1350 mg/L
  flows-through 20 L/day with vat from 2026-10-15
  by-hand spare
log hall
${logOf(40, (day) => [
  `20:00 read alkalinity ${(7.5 + (day % 6) / 10).toFixed(1)} dKH`,
  ...(day % 3 === 0 ? [`06:00 renewed 15 L with vat`, `06:00 gave spare 5 mL`] : []),
  ...(day % 5 === 0 ? [`05:00 read magnesium 1200 mg/kg`, `04:00 removed plugs 1 pieces`] : []),
  ...(day % 8 === 0 ? [`21:00 moved plugs 1 pieces to vat`] : []),
])}`,
  ],
  [
    "again.marl",
    `use "vat.marl"
log vat
  2026-09-05 12:00 gave chalk 44 mL, ash 34 mL
  2026-09-05 12:00 gave ash 34 mL
  2026-10-25 06:00 read salinity 40
  2026-12-20 06:00 read salinity 31, alkalinity 2.2 meq/kg # ahead
  2026-10-25 05:00 note "out of order"
`,
  ],
]);

/** The same without functions, which are no answers. */
function answers({ assessments, problems, bound }: Farm, report: unknown) {
  const plain = [...assessments.values()].map(
    ({ constants: { strengthAt: _, waterAt: __, ...constants }, ...rest }) => ({ ...rest, constants }),
  );
  return { plain, problems, model: bound.model, names: bound.names, report };
}

const answersOf = (farm: Farm) => answers(farm, JSON.parse(JSON.stringify(reportOn(farm, wholeFarm))));

const words = [
  " # why",
  "  ",
  " # quiet: reading/unusual",
  ", salinity 36",
  " with bench",
  " by ao",
  "é",
  '"',
  "note",
  "0",
  "1",
  ".",
  " dKH",
];
const newLines = [
  "",
  '  2026-11-01 08:00 note "new"',
  "  2026-10-02 08:00 read alkalinity 8 dKH, pH 8.1, salinity 35",
  "  2026-10-03 09:00 read alkalinity 2.7 meq/kg",
  "  2026-11-05 gave ash 50 mL",
  "  2026-09-12 renewed 20 L with hall",
  "  2026-10-12 moved plugs 3 pieces to hall",
  "  2026-11-30 11:00 read temperature 24 degC, calcium 3000 mg/L",
  'use "shelf.marl"',
  'use "link/shelf.marl"',
  "log vat",
  "log hall",
  "system hall",
  "solution ash from 2026-11-01",
  "  pump head-2 ash 2 L/day",
  "  hold potassium 380 to 420 mg/L",
  "<<<<<<< ours",
];

const pick = <T>(chance: Chance, list: readonly T[]): T => list[Math.floor(chance.uniform() * list.length)]!;

/** A text after one edit, of characters or of lines. */
function edited(text: string, chance: Chance): string {
  const lines = text.split("\n");
  const line = Math.floor(chance.uniform() * lines.length);
  const old = lines[line]!;
  const at = Math.floor(chance.uniform() * (old.length + 1));
  const edits: readonly (() => void)[] = [
    () => lines.splice(line, 1),
    () => lines.splice(line, 0, pick(chance, lines)),
    () => lines.splice(line, 0, pick(chance, newLines)),
    () => lines.splice(line, 0, old),
    () => lines.splice(Math.floor(chance.uniform() * lines.length), 0, ...lines.splice(line, 2)),
    () => lines.splice(line, 1, old.slice(0, at) + old.slice(at + 1)),
    () => lines.splice(line, 1, old.slice(0, at) + pick(chance, words) + old.slice(at)),
    () => lines.splice(line, 1, old + pick(chance, words)),
    () => lines.splice(line, 1, old.replace(/\d(?=\D*$)/, String(Math.floor(chance.uniform() * 10)))),
    () => lines.splice(line, 1, old.replace(/\d(?= )/, String(Math.floor(chance.uniform() * 10)))),
    () => lines.splice(line, 1, old.slice(0, at)),
    () => lines.push(pick(chance, newLines)),
  ];
  pick(chance, edits)();
  return lines.join("\n");
}

const changeOf = (text: string | undefined, chance: Chance): FileChange => {
  const kind = chance.uniform();
  if (kind < 0.02) return null;
  if (kind < 0.03) return { unreadable: "it isn't UTF-8 text" };
  return text === undefined ? null : { text: edited(text, chance) };
};

/** Edits a farm again and again, each time beside a fresh start. */
function walk(start: Texts, edits: number, seed: number): void {
  const chance = chanceFrom(seed);
  const at = moment("2026-12-01T08:00");
  let now: Moment = { at, clock: at };
  const all = new Map<string, FileChange>([...start].map(([file, text]) => [file, { text }]));
  let farm = advance(null, all, now);
  for (let edit = 0; edit < edits; edit += 1) {
    const changes = new Map<string, FileChange>();
    const files = [...all.keys()];
    const kind = chance.uniform();
    if (kind < 0.05) now = { at: now.at + Math.floor(chance.uniform() * 3000 - 1500), clock: at };
    else if (kind < 0.07)
      changes.set("link", all.has("link") ? null : { linkTo: kind < 0.06 ? "." : "nowhere" });
    else if (kind < 0.1) {
      // Back to where it was: undone, put back, checked out.
      const file = pick(chance, [...start.keys()]);
      changes.set(file, { text: start.get(file)! });
    } else if (files.length === 0) {
      for (const [file, text] of start) changes.set(file, { text });
    } else {
      for (let count = kind < 0.2 ? 2 : 1; count > 0; count -= 1) {
        const file = pick(chance, files);
        const old = all.get(file);
        changes.set(file, changeOf(old && "text" in old ? old.text : start.get(file), chance));
      }
    }
    for (const [file, change] of changes) {
      if (change === null) all.delete(file);
      else all.set(file, change);
    }
    farm = advance(farm, changes, now);
    const fresh = answersOf(advance(null, all, now));
    const incremental = answersOf(farm);
    if (isDeepStrictEqual(incremental, fresh)) continue;
    expect(incremental, `seed ${seed}, edit ${edit}: ${JSON.stringify([...changes])}`).toEqual(fresh);
    throw new Error(`seed ${seed}, edit ${edit} differs in what toEqual can't tell apart`);
  }
}

test.each([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12])(
  "a farm where everything hangs together, edited by chance: %i",
  (seed) => {
    walk(trickyFarm, 100, seed);
  },
);

test.each([21, 22, 23, 24, 25, 26, 27, 28])(
  "the example farm with short logs, edited by chance: %i",
  (seed) => {
    walk(shortFarm, 90, seed);
  },
);

test("the example farm as it is, edited by chance", () => {
  walk(exampleFarm, 80, 31);
});

test("a walk that was left half way changes nothing for the next", () => {
  const at = moment("2026-12-01T08:00");
  const now = { at, clock: at };
  const all = new Map([...trickyFarm].map(([file, text]) => [file, { text }]));
  const before = advance(null, all, now);
  const text = trickyFarm.get("vat.marl")!.replaceAll("2.65 meq", "2.95 meq").replace("tank", "\n\n  tank");
  const changes = new Map([["vat.marl", { text }]]);
  const fresh = answersOf(advance(null, new Map([...all, ...changes]), now));
  for (let pauses = 1; pauses < 40; pauses += 3) {
    const left = advanceBySystem(before, new Map([["vat.marl", { text: text.replace("500", "600") }]]), now);
    for (let pause = 0; pause < pauses; pause += 1) left.next();
    expect(isDeepStrictEqual(answersOf(advance(before, changes, now)), fresh)).toBe(true);
  }
});

test("what was given within the day reaches over a reading that makes the water the same, wherever it stands", () => {
  const at = moment("2026-12-01T08:00");
  const now = { at, clock: at };
  const farmWith = (place: number, dose: number) => {
    const events = Array.from({ length: 90 }, (_, number) => {
      const when = new Date((at - 60 * (100 - number)) * 60_000).toISOString().replace("T", " ").slice(0, 16);
      if (number === place) return `  ${when} gave part ${dose} mL\n`;
      if (number === place + 2) return `  ${when} gave part 100 mL\n`;
      return `  ${when} read alkalinity 8 dKH\n`;
    });
    const text = `system vat\n  tank main 1000 L\n  uptake alkalinity 0 dKH/day\n  limit alkalinity rise 0.5 dKH/day\n  limit alkalinity dose 3 dKH\n  by-hand part\n\nsolution part\n  supplies alkalinity 1 meq/mL as bicarbonate\n\nlog vat\n${events.join("")}`;
    return new Map([["farm.marl", { text }]]);
  };
  for (let place = 0; place < 80; place += 1) {
    const farm = advance(advance(null, farmWith(place, 10), now), farmWith(place, 90), now);
    const fresh = advance(null, farmWith(place, 90), now);
    expect(farm.problems, `at ${place}`).toEqual(fresh.problems);
    expect(fresh.problems.some(({ code }) => code === "overdose/alkalinity-rise")).toBe(true);
  }
});
