/** Advancing by edits ends where a fresh start on the same texts ends. */
import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { expect, test } from "vitest";
import { advance, advanceBySystem, type Farm, type FileChange } from "../server/farm.ts";
import { reportOn } from "../server/report/report.ts";
import { wholeFarm } from "../server/report/scope.ts";
import { moment } from "./report/walk.ts";

const examples = resolve(import.meta.dirname, "../examples");
const files = new Map(
  readdirSync(examples, { recursive: true, encoding: "utf8" })
    .filter((name) => name.endsWith(".marl"))
    .map((name) => [name.split("\\").join("/"), readFileSync(join(examples, name), "utf8")] as const),
);
const at = moment("2026-12-01T08:00");
const now = { at, clock: at };

const fresh = (texts: ReadonlyMap<string, string>): Farm =>
  advance(null, new Map([...texts].map(([file, text]) => [file, { text }])), now);

/** A small generator (xorshift32, Marsaglia 2003), so that the edits are the same every time. */
function* randoms(seed: number): Generator<number> {
  let state = seed;
  for (;;) {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    yield (state >>> 0) / 2 ** 32;
  }
}

function editedText(text: string, next: () => number): string {
  const lines = text.split("\n");
  const line = Math.floor(next() * lines.length);
  const kind = Math.floor(next() * 4);
  if (kind === 0) lines.splice(line, 1);
  else if (kind === 1) lines.splice(line, 0, lines[Math.floor(next() * lines.length)] ?? "");
  else if (kind === 2) lines[line] = (lines[line] ?? "").replace(/\d/, String(Math.floor(next() * 10)));
  else lines[line] = (lines[line] ?? "").slice(0, Math.floor(next() * 60));
  return lines.join("\n");
}

test("forty edits, a file gone and back, equal a fresh start each time", () => {
  const random = randoms(20_261_201);
  const next = () => random.next().value as number;
  const texts = new Map(files);
  const names = [...files.keys()];
  let farm = fresh(texts);
  for (let edit = 0; edit < 40; edit += 1) {
    const name = names[Math.floor(next() * names.length)]!;
    const change: FileChange =
      edit % 13 === 12 ? null : { text: editedText(texts.get(name) ?? files.get(name)!, next) };
    if (change === null) texts.delete(name);
    else if ("text" in change) texts.set(name, change.text);
    farm = advance(farm, new Map([[name, change]]), now);
    expect(reportOn(farm, wholeFarm)).toEqual(reportOn(fresh(texts), wholeFarm));
  }
});

test("nothing changed, nothing walked: the farm is the same value; a later moment is another", () => {
  const farm = fresh(files);
  expect(advance(farm, new Map(), now)).toBe(farm);
  const later = advance(farm, new Map(), { at: at + 60, clock: at + 60 });
  expect(later).not.toBe(farm);
  expect(later.bound).toBe(farm.bound);
});

test("the walk can be watched, system by system", () => {
  const seen: string[] = [];
  const steps = advanceBySystem(null, new Map([...files].map(([file, text]) => [file, { text }])), now);
  for (const { system, done, of } of { [Symbol.iterator]: () => steps })
    if (done > seen.length) seen.push(`${done}/${of} ${system}`);
  expect(seen).toEqual(["1/3 lagoon", "2/3 quarantine", "3/3 raceways"]);
});

test("logs split over files, copied, and lines in another order give the same report to the last bit", () => {
  const report = (texts: ReadonlyMap<string, string>) => {
    const { systems } = reportOn(fresh(texts), wholeFarm);
    // Places of readings may differ, figures may not.
    return systems.map(({ readings, ...rest }) => ({
      ...rest,
      readings: readings.map(({ file: _, line: __, ...reading }) => reading),
    }));
  };
  const log = files.get("raceways/log.marl")!;
  const lines = log.split("\n");
  const header = lines.findIndex((line) => line.startsWith("log "));
  const head = lines.slice(0, header + 1);
  const body = lines.slice(header + 1);
  const reversed = new Map(files).set("raceways/log.marl", [...head, ...[...body].reverse()].join("\n"));
  expect(report(reversed)).toEqual(report(files));
  const copied = new Map(files).set("raceways/log-copy.marl", log);
  expect(report(copied)).toEqual(report(files));
  const doubled = fresh(copied).problems.filter(({ code }) => code === "log/twice");
  expect(doubled.length).toBeGreaterThan(100);
  const half = Math.floor(body.length / 2);
  const split = new Map(files)
    .set("raceways/log.marl", [...head, ...body.slice(half)].join("\n"))
    .set("raceways/log-before.marl", [...head, ...body.slice(0, half)].join("\n"));
  expect(report(split)).toEqual(report(files));
});
