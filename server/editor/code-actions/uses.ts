/** What a file needs to see of others, and the `use` lines for it. */
import type { MarlDocument } from "../../../grammar/document.ts";
import { pathTo } from "../../checks/name.ts";
import { addingUseLines } from "../../checks/use-lines.ts";
import type { Declaration } from "../../culture/names.ts";
import type { Farm } from "../../farm.ts";
import type { TextEdit } from "../text-edits.ts";
import { wordsIn } from "../words.ts";

/** What a line of a file names: everything that is seen there and that one of its words can stand for. */
function namedOn(farm: Farm, file: string, number: number): readonly Declaration[] {
  const line = farm.documents.get(file)?.lines[number];
  const visible = farm.bound.names.visible.get(file);
  if (!line?.statement) return [];
  return wordsIn(line).flatMap(({ name, text }) => {
    const declaration = name && !name.declares ? visible?.get(text) : undefined;
    return declaration && name?.kinds.some((kind) => kind === declaration.kind) ? [declaration] : [];
  });
}

/** What these lines name. */
export const namedIn = (farm: Farm, file: string, lines: readonly number[]): ReadonlySet<Declaration> =>
  new Set(lines.flatMap((line) => namedOn(farm, file, line)));

/** True where a line of the file, these left out, names it. */
export function isNamedIn(
  farm: Farm,
  file: string,
  declaration: Declaration,
  leftOut: ReadonlySet<number>,
): boolean {
  if (!farm.texts.get(file)?.includes(declaration.name)) return false;
  const lines = farm.documents.get(file)?.lines ?? [];
  return lines.some(
    ({ text }, number) =>
      text.includes(declaration.name) &&
      !leftOut.has(number) &&
      namedOn(farm, file, number).includes(declaration),
  );
}

/** A file and all that it sees of others, through others too. */
export function reachedFrom(uses: ReadonlyMap<string, readonly string[]>, file: string): ReadonlySet<string> {
  const reached = new Set([file]);
  for (const each of reached) for (const other of uses.get(each) ?? []) reached.add(other);
  return reached;
}

/** The files that declare these. */
export const filesDeclaring = (declarations: Iterable<Declaration>): ReadonlySet<string> =>
  new Set([...declarations].flatMap(({ sections }) => sections.map(({ file }) => file)));

/** A `use` line of one file for another. */
export const useLine = (from: string, to: string): string => `use "${pathTo(from, to)}"`;

/** Puts `use` lines where they belong. */
export function addingUses(file: string, document: MarlDocument, targets: readonly string[]): TextEdit[] {
  if (targets.length === 0) return [];
  const written = targets.map((target) => useLine(file, target));
  const { line, start, text } = addingUseLines(file, document, written);
  const at = { line, column: start };
  return [{ file, from: at, to: at, text: (text ?? "").replaceAll("\n", document.lineEnding) }];
}
