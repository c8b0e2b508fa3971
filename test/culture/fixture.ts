/** A farm as text: files parted by `--- NAME`, and under a line what binding it found. */
import { expect } from "vitest";
import { readMoment } from "../../grammar/dates.ts";
import { type MarlDocument, readDocument } from "../../grammar/document.ts";
import { type BoundFarm, bindFarm } from "../../server/culture/farm-model.ts";
import type { CultureFinding } from "../../server/culture/finding.ts";
import { factAt, type History } from "../../server/culture/history.ts";
import type { Solution, Strength, System } from "../../server/culture/model.ts";
import { comparePlaces } from "../../server/culture/place.ts";

/** Texts by file; what stands before the first `--- NAME` is `farm.marl`. */
export function filesOf(text: string): Map<string, string> {
  const files = new Map<string, string>();
  const [first = "", ...others] = text.replace(/^\n/, "").split(/^--- /m);
  if (first.trim()) files.set("farm.marl", first);
  for (const other of others) {
    const end = other.indexOf("\n");
    files.set(other.slice(0, end).trim(), other.slice(end + 1));
  }
  return files;
}

export const documentsOf = (text: string): Map<string, MarlDocument> =>
  new Map([...filesOf(text)].map(([file, own]) => [file, readDocument(own)]));

/** The minute of `2026-12-01 08:00`; a bare date is its midnight. */
export function minute(text: string): number {
  const read = readMoment(text, "midnight");
  if (!read.known) throw new Error(`${text} is no moment`);
  return read.moment.minute;
}

/** A finding in one line: its code and what it is about. */
function inWords(finding: CultureFinding): string {
  const about = Object.entries(finding).flatMap(([key, value]) => {
    if (
      [
        "code",
        "place",
        "system",
        "unit",
        "range",
        "expected",
        "examples",
        "first",
        "written",
        "writtenUnit",
      ].includes(key)
    )
      return [];
    if (value === null || value === "") return [];
    if (Array.isArray(value)) return value.length === 0 ? [] : `${key} ${value.slice(0, 4).join(" ")}`;
    return `${key} ${typeof value === "number" ? Number(value.toPrecision(5)) : value}`;
  });
  return [finding.code, ...about].join(", ");
}

const isUnder = (line: string): boolean => /^\s*\^+ /.test(line);

/** The text with each finding drawn under its line; one of a whole line is drawn under its words. */
function drawn(files: ReadonlyMap<string, string>, findings: readonly CultureFinding[]): Map<string, string> {
  const draw = ([file, text]: [string, string]): [string, string] => {
    const lines = text.split("\n").flatMap((line, number) => {
      const here = findings
        .filter(({ place }) => place.file === file && place.line === number)
        .sort((left, right) => comparePlaces(left.place, right.place))
        .map((finding) => {
          const span = finding.place.span ?? { start: line.search(/\S/), end: line.trimEnd().length };
          return `${" ".repeat(span.start)}${"^".repeat(Math.max(1, span.end - span.start))} ${inWords(finding)}`;
        });
      return [line, ...here];
    });
    return [file, lines.join("\n")];
  };
  return new Map([...files].map(draw));
}

/** Binds a farm. A finding that isn't drawn fails the test, and so does a drawn one that isn't there; unused names and cautions aside. */
export function farm(text: string): BoundFarm {
  const wished = filesOf(text);
  const files = new Map(
    [...wished].map(([file, own]) => [
      file,
      own
        .split("\n")
        .filter((line) => !isUnder(line))
        .join("\n"),
    ]),
  );
  const bound = bindFarm(new Map([...files].map(([file, own]) => [file, readDocument(own)])), new Map());
  const told = bound.findings.filter(({ code }) => code !== "name/unused" && code !== "hazard/caustic");
  expect(Object.fromEntries(drawn(files, told))).toEqual(Object.fromEntries(wished));
  return bound;
}

/** The one system of a farm, or the one named. */
export function systemIn({ model }: BoundFarm, name?: string): System {
  const found = [...model.systems.values()].find((system) => name === undefined || system.name === name);
  expect(found, `system ${name}`).toBeDefined();
  return found as System;
}

export function solutionIn({ model }: BoundFarm, name: string): Solution {
  const found = [...model.solutions.values()].find((solution) => solution.name === name);
  expect(found, `solution ${name}`).toBeDefined();
  return found as Solution;
}

/** What holds at a moment. */
export const at = <T>(history: History<T> | undefined, moment: string): T | undefined =>
  factAt(history, minute(moment))?.value;

/** A solution's strength in a millilitre of it, at a moment. */
export function strength(bound: BoundFarm, name: string, moment = "2026-12-01"): Strength {
  const found = at(solutionIn(bound, name).strengths, moment);
  expect(found, `strength of ${name}`).toBeDefined();
  return found as Strength;
}
