/** What a file needs to see of others, and the `use` lines for it. */
import type { MarlDocument } from "../../../grammar/document.ts";
import { isBlank } from "../../../grammar/tokens.ts";
import { pathTo } from "../../checks/name.ts";
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

/** Puts `use` lines below those that a file has, else below the comment that it begins with. */
export function addingUses(file: string, document: MarlDocument, targets: readonly string[]): TextEdit[] {
  if (targets.length === 0) return [];
  const { lines, lineEnding, sections, uses } = document;
  const firstHeader = sections[0]?.headerLine ?? lines.length;
  const last = uses.filter(({ line }) => line < firstHeader).at(-1)?.line;
  const text = targets.map((target) => `${useLine(file, target)}${lineEnding}`).join("");
  const put = (line: number, text: string): TextEdit[] => [
    { file, from: { line, column: 0 }, to: { line, column: 0 }, text },
  ];
  if (last !== undefined && last + 1 < lines.length) return put(last + 1, text);
  if (last !== undefined) {
    const end = { line: last, column: lines[last]!.text.length };
    return [{ file, from: end, to: end, text: lineEnding + text.slice(0, -lineEnding.length) }];
  }
  // A comment with a blank line below it is the file's own; one right above a header is the header's.
  let below = 0;
  while (lines[below]?.text.startsWith("#")) below += 1;
  const isFilesOwn = below > 0 && below + 1 < lines.length && isBlank(lines[below]!.text);
  return isFilesOwn ? put(below + 1, text + lineEnding) : put(0, text + lineEnding);
}
