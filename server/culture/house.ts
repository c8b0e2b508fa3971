/** What binding the parts of a farm shares: files, names, what is kept, and where findings go. */
import type { Event, Fact } from "../../grammar/syntax.ts";
import { type Binder, type Line, lineOf } from "./binder.ts";
import type { CultureFinding } from "./finding.ts";
import type { Keeper } from "./keep.ts";
import type { Declaration, Files, Names } from "./names.ts";

export interface House {
  readonly files: Files;
  readonly names: Names;
  /** By file, all that a name written in it can stand for, as one text. */
  readonly seen: ReadonlyMap<string, string>;
  readonly keeper: Keeper;
  readonly findings: CultureFinding[];
  /** References of what was named. */
  readonly used: Set<string>;
}

/** What the names in a file mean, as a text: where that is the same, so is what its lines are bound to. */
export function meaningsByFile({ visible, declaring }: Names): ReadonlyMap<string, string> {
  const everywhere = JSON.stringify([...declaring]);
  return new Map(
    [...visible].map(([file, table]) => {
      const here = [...table].map(([word, { kind, ref }]) => [word, kind, ref]);
      return [file, JSON.stringify([file, here]) + everywhere];
    }),
  );
}

/** Binds lines of a section to the house's names. */
export type BinderOf = (file: string, system: string | null) => Binder;

/**
 * Binds a part of the farm, or takes it as it was bound the last time where nothing that it is made from has changed;
 * either way what was found and named in it counts.
 */
export function bindPart<T>(
  { names, keeper, findings, used }: House,
  key: string,
  inputs: readonly unknown[],
  work: (binder: BinderOf) => T,
): T {
  const part = keeper.keep(key, inputs, () => {
    const own = { findings: [] as CultureFinding[], used: new Set<string>() };
    const report = (finding: CultureFinding) => void own.findings.push(finding);
    const value = work((file, system) => ({ file, system, names, used: own.used, report }));
    return { value, ...own };
  });
  for (const finding of part.findings) findings.push(finding);
  for (const ref of part.used) used.add(ref);
  return part.value;
}

/** All that binding a section can depend on: what names mean there, where it stands, and what its lines say. */
export function inputsOf({ files, seen }: House, file: string, section: number): unknown[] {
  const document = files.get(file);
  const range = document?.sections[section];
  if (!document || !range) return [file, section];
  const inputs: unknown[] = [seen.get(file), file, section, range.headerLine];
  inputs.push(range.kind, range.name?.text, range.name?.start, range.title?.text, range.from?.minute);
  for (let line = range.headerLine; line <= range.lastLine; line += 1) {
    const { statement, findings } = document.lines[line]!;
    inputs.push(statement ?? findings.length > 0);
  }
  return inputs;
}

export const inputsOfAll = (house: House, { name, ref, place, sections }: Declaration): unknown[] => [
  JSON.stringify([name, ref, place, sections]),
  ...sections.flatMap(({ file, section }) => inputsOf(house, file, section)),
];

interface Bindable<S> {
  readonly line: Line;
  readonly statement: S;
}

function statementLines(
  { files }: House,
  binder: Binder,
  file: string,
  section: number,
): Bindable<Fact | Event>[] {
  const document = files.get(file);
  const range = document?.sections[section];
  if (!document || !range) return [];
  const lines: Bindable<Fact | Event>[] = [];
  for (let line = range.firstLine; line <= range.lastLine; line += 1) {
    const statement = document.lines[line]?.statement;
    if (!statement || statement.kind === "header" || statement.kind === "use") continue;
    lines.push({ line: lineOf(binder, line), statement });
  }
  return lines;
}

export function factLines<F extends Fact>(house: House, binder: Binder, file: string, section: number) {
  return statementLines(house, binder, file, section).flatMap(({ line, statement }) =>
    "at" in statement ? [] : [{ line, fact: statement as F }],
  );
}

export function eventLines<E extends Event>(house: House, binder: Binder, file: string, section: number) {
  return statementLines(house, binder, file, section).flatMap(({ line, statement }) =>
    "at" in statement ? [{ line, event: statement as E }] : [],
  );
}

/** What stands behind the name in a declaration's first header. */
export function titleOf({ files }: House, { sections: [first] }: Declaration): string | null {
  return (first && files.get(first.file)?.sections[first.section]?.title?.text) ?? null;
}
