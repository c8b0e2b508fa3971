/** Moves a solution, reagent, salt water or kit to another file; `use` lines are mended, so that every name still resolves. */
import { type MarlDocument, readDocument } from "../../../grammar/document.ts";
import type { SectionKind } from "../../../grammar/syntax.ts";
import { isBlank } from "../../../grammar/tokens.ts";
import type { Declaration } from "../../culture/names.ts";
import type { Farm } from "../../farm.ts";
import { editsBetween, rawLines, withEdits } from "../text-edits.ts";
import type { Action, Asked, FarmEdit, FindInSteps } from "./action.ts";
import { lastOwnLine } from "./logs.ts";
import { isFree } from "./split-log.ts";
import { stillResolves } from "./still-resolves.ts";
import { addingUses, filesDeclaring, isNamedIn, namedIn, reachedFrom } from "./uses.ts";

/** What can be moved, and the name of a new file for it; where that is taken, the file gets its own name. */
const newFileFor: Readonly<Partial<Record<SectionKind, string>>> = {
  solution: "solutions.marl",
  reagent: "reagents.marl",
  saltwater: "salt-waters.marl",
  kit: "kits.marl",
};

/** More files than this are no list that one chooses from; those that hold the like come first. */
const mostFiles = 12;

interface Moving {
  readonly farm: Farm;
  readonly declaration: Declaration;
  readonly file: string;
  readonly document: MarlDocument;
  /** Its sections with the comments right above them, as lines from one number up to another (exclusive). */
  readonly blocks: readonly { readonly from: number; readonly to: number }[];
  /** The numbers of all these lines. */
  readonly lines: readonly number[];
  /** The files in which another line names it. */
  readonly users: readonly string[];
}

export const moving: FindInSteps = function* (asked) {
  const found = declarationAt(asked);
  if (!found) return [];
  const { farm, declaration, file } = found;
  const folder = file.slice(0, file.lastIndexOf("/") + 1);
  const names = [newFileFor[declaration.kind]!, `${declaration.name}.marl`];
  const fresh = names.map((name) => folder + name).find((path) => isFree(farm, path));
  const resolves = stillResolves(farm, declaration);
  const targets = [
    ...(asked.canCreate && fresh !== undefined ? [{ file: fresh, title: `a new file ${fresh}` }] : []),
    ...otherFiles(farm, file, declaration.kind).map((each) => ({ file: each, title: each })),
  ];
  const actions: Action[] = [];
  for (const { file: target, title } of targets) {
    yield;
    const edit = moved(found, target);
    yield;
    if (!resolves(edit)) continue;
    actions.push({
      ...{ title: `Move ${declaration.name} to ${title}`, kind: "refactor.move", problem: null },
      isPreferred: false,
      edit: () => edit,
    });
  }
  return actions;
};

function declarationAt({ farm, selection: { file, from } }: Asked): Moving | null {
  const document = farm.documents.get(file);
  const section = document?.sections.find(({ headerLine }) => headerLine === from.line);
  if (!document || !section?.name || !newFileFor[section.kind]) return null;
  const declaration = farm.bound.names.declarations.find(({ kind, name, sections }) => {
    const isHere = sections.some((each) => each.file === file && document.sections[each.section] === section);
    return isHere && kind === section.kind && name === section.name?.text;
  });
  if (!declaration) return null;
  const blocks = declaration.sections
    .filter((each) => each.file === file)
    .map((each) => document.sections[each.section]!)
    .sort((left, right) => left.headerLine - right.headerLine)
    .map(({ headerLine, lastLine }) => ({
      from: firstComment(document, headerLine),
      to: lastOwnLine(document, headerLine, lastLine) + 1,
    }));
  const lines = blocks.flatMap(({ from: first, to }) =>
    Array.from({ length: to - first }, (_, index) => first + index),
  );
  const nowhere = new Set<number>();
  const users = [...farm.documents.keys()].filter((each) =>
    isNamedIn(farm, each, declaration, each === file ? new Set(lines) : nowhere),
  );
  return { farm, declaration, file, document, blocks, lines, users };
}

/** The first of the comments right above a header; one that quietens something in the file stays with the file. */
function firstComment({ lines }: MarlDocument, header: number): number {
  let first = header;
  const isItsOwn = (text: string | undefined): boolean =>
    text?.startsWith("#") === true && !/\bquiet\s+file\s*:/.test(text);
  while (first > 0 && isItsOwn(lines[first - 1]?.text)) first -= 1;
  return first;
}

function otherFiles({ documents }: Farm, own: string, kind: SectionKind): string[] {
  const others = [...documents.keys()].filter((file) => file !== own).sort();
  const holdsLike = (file: string): boolean =>
    documents.get(file)?.sections.some((section) => section.kind === kind) ?? false;
  return [...others.filter(holdsLike), ...others.filter((file) => !holdsLike(file))].slice(0, mostFiles);
}

function moved(found: Moving, target: string): FarmEdit {
  const { farm, file, document, blocks } = found;
  const uses = usesAfter(found, target);
  const written = blocks.flatMap(({ from, to }, index) => [
    ...(index > 0 ? [""] : []),
    ...document.lines
      .slice(from, to)
      .filter(({ statement }) => statement?.kind !== "use")
      .map(({ text }) => text),
  ]);
  const texts = new Map<string, string>([[file, withoutBlocks(found)]]);
  const there = farm.texts.get(target);
  if (there !== undefined) texts.set(target, withBlocks(there, farm.documents.get(target)!, written));
  for (const [user, targets] of uses) {
    const before = texts.get(user) ?? farm.texts.get(user);
    if (before !== undefined) texts.set(user, withUses(user, before, targets, farm.documents.get(user)));
  }
  const edits = [...texts].flatMap(([each, after]) => editsBetween(each, farm.texts.get(each)!, after));
  if (there !== undefined) return { edits, created: [] };
  const text = written.map((line) => line + document.lineEnding).join("");
  const mark = document.hasByteOrderMark ? "\ufeff" : "";
  return { edits, created: [{ file: target, text: mark + withUses(target, text, uses.get(target) ?? []) }] };
}

/** By file, the files that it has to use from now on. */
function usesAfter(found: Moving, target: string): ReadonlyMap<string, readonly string[]> {
  const { farm, declaration, file, users, lines: inBlocks } = found;
  const { names } = farm.bound;
  const uses = new Map([...names.uses].map(([each, list]) => [each, [...list]]));
  const added = new Map<string, string[]>();
  const use = (user: string, other: string): void => {
    added.set(user, [...(added.get(user) ?? []), other]);
    uses.set(user, [...(uses.get(user) ?? []), other]);
  };
  for (const needed of filesDeclaring(namedIn(farm, file, inBlocks)))
    if (!reachedFrom(uses, target).has(needed)) use(target, needed);
  for (const user of users) {
    if (user === target || reachedFrom(uses, user).has(target)) continue;
    const sharesTheWay = reachedFrom(uses, user).has(file) && !reachedFrom(uses, target).has(file);
    use(sharesTheWay ? file : user, target);
  }
  // A solution whose recipes stand in several files stays one thing only where they see each other.
  for (const other of filesDeclaring([declaration]))
    if (other !== file && other !== target && !reachedFrom(uses, other).has(target)) {
      if (!reachedFrom(uses, target).has(other)) use(target, other);
    }
  return added;
}

/** The text without the sections, and without the blank lines that set them off. */
function withoutBlocks({ farm, file, document, blocks }: Moving): string {
  const text = farm.texts.get(file)!;
  const lines = [...rawLines(text)];
  const isEmpty = (line: number): boolean => isBlank(lines[line] ?? "x");
  for (const { from, to } of [...blocks].reverse()) {
    // A `use` line may stand anywhere, and is the file's.
    const kept = document.uses
      .filter(({ line }) => from <= line && line < to)
      .map(({ line }) => lines[line]!);
    lines.splice(from, to - from, ...kept);
    const below = from + kept.length;
    while (below < lines.length - 1 && isEmpty(below) && (below === 0 || isEmpty(below - 1)))
      lines.splice(below, 1);
    if (below < lines.length - 1) continue;
    for (let last = below - 1; last > 0 && isEmpty(last); last -= 1) lines.splice(last, 1);
  }
  return (document.hasByteOrderMark ? "\ufeff" : "") + lines.join("\n");
}

/** A text with the sections at its end. */
function withBlocks(text: string, { lines, lineEnding }: MarlDocument, written: readonly string[]): string {
  const isEmpty = lines.every((line) => isBlank(line.text));
  const mark = text.startsWith("\ufeff") ? "\ufeff" : "";
  const before = isEmpty ? mark : text.trimEnd() + lineEnding + lineEnding;
  return before + written.map((line) => line + lineEnding).join("");
}

const withUses = (file: string, text: string, targets: readonly string[], previous?: MarlDocument): string =>
  withEdits(text, addingUses(file, readDocument(text, previous), targets));
