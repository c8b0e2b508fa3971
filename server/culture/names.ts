/** Who sees which names: each file its own and, through `use`, those of the files it uses and that these use. */
import type { MarlDocument } from "../../grammar/document.ts";
import { nearestWords } from "../../grammar/nearest.ts";
import type { Word } from "../../grammar/syntax.ts";
import type { CultureFinding, NamedKind } from "./finding.ts";
import type { Place } from "./place.ts";

/** One thing with a name. A solution may have several sections: its recipes over time. */
export interface Declaration {
  readonly kind: NamedKind;
  readonly name: string;
  /** Unique in the farm: the name, with its file where two files that don't see each other share it. */
  readonly ref: string;
  readonly place: Place;
  readonly sections: { readonly file: string; readonly section: number; readonly from: number | null }[];
}

export interface Names {
  /** By file, the files that it uses. */
  readonly uses: ReadonlyMap<string, readonly string[]>;
  readonly declarations: readonly Declaration[];
  /** By file, what is visible there. */
  readonly visible: ReadonlyMap<string, ReadonlyMap<string, Declaration>>;
  /** By name, the files that declare it. */
  readonly declaring: ReadonlyMap<string, readonly string[]>;
}

const namedKinds: ReadonlySet<string> = new Set<NamedKind>([
  "system",
  "solution",
  "reagent",
  "saltwater",
  "kit",
]);

export type Files = ReadonlyMap<string, MarlDocument>;

/** Other names for files and folders of the farm: the path of a link → where it leads. */
export type Links = ReadonlyMap<string, string>;

/** All of a file that binding names looks at: headers with their names, and `use` lines. */
export function namesWrittenIn({ lines, sections, uses }: MarlDocument): unknown[] {
  const headers = sections.map(({ kind, name, from, headerLine }) =>
    name && namedKinds.has(kind) ? [kind, name, from?.minute, headerLine] : null,
  );
  return [headers, uses.map(({ line }) => [line, lines[line]?.statement])];
}

/** Binds `use` lines and headers of all files. */
export function bindNames(
  files: Files,
  links: Links,
  builtIn: (name: string) => boolean,
): { names: Names; findings: CultureFinding[] } {
  const findings: CultureFinding[] = [];
  const used = new Map(
    [...files].map(([file, document]) => [file, usedBy(file, document, files, links, findings)] as const),
  );
  reportCycles(used, findings);

  const declaring = new Map<string, string[]>();
  const own = new Map<string, Declaration[]>();
  for (const [file, document] of files) {
    const list: Declaration[] = [];
    for (const [index, section] of document.sections.entries()) {
      if (!section.name || !namedKinds.has(section.kind)) continue;
      const name = section.name.text;
      const place = { file, line: section.headerLine, span: section.name };
      const from = section.from?.minute ?? null;
      list.push({
        kind: section.kind as NamedKind,
        name,
        ref: `${name} ${file}`,
        place,
        sections: [{ file, section: index, from }],
      });
      declaring.set(name, [...(declaring.get(name) ?? []), file]);
    }
    own.set(file, list);
  }

  // Names that a file declares itself, recipes of one solution joined; then what it sees of others.
  const tables = new Map<string, Map<string, Declaration>>();
  for (const [file, list] of own) {
    const table = new Map<string, Declaration>();
    for (const declaration of list) {
      const first = table.get(declaration.name);
      if (!first) {
        table.set(declaration.name, declaration);
        if (declaration.kind === "reagent" && builtIn(declaration.name))
          findings.push(twice(declaration, null));
      } else if (!joinsRecipe(first, declaration)) findings.push(twice(declaration, first.place));
    }
    tables.set(file, table);
  }
  const visible = new Map<string, Map<string, Declaration>>();
  // Two that clash do so in every file that sees both; that is told once.
  const told = new Set<string>();
  for (const file of files.keys()) {
    const table = new Map(tables.get(file));
    for (const other of reachable(file, used)) {
      for (const theirs of tables.get(other)?.values() ?? []) {
        const mine = table.get(theirs.name);
        if (!mine) table.set(theirs.name, theirs);
        else if (mine !== theirs) {
          const pair = [mine.ref, theirs.ref].sort().join("\n");
          if (joinsRecipe(theirs, mine)) table.set(theirs.name, theirs);
          else if (!told.has(pair)) findings.push(twice(mine, theirs.place));
          told.add(pair);
        }
      }
    }
    visible.set(file, table);
  }
  const declarations = new Set([...visible.values()].flatMap((table) => [...table.values()]));
  const uses = new Map([...used].map(([file, list]) => [file, list.map((each) => each.file)]));
  const names = { uses, declarations: shortened([...declarations]), visible, declaring };
  return { names, findings };
}

/** A name alone is enough of a reference where the whole farm has it once. */
function shortened(declarations: Declaration[]): Declaration[] {
  const count = new Map<string, number>();
  for (const { name } of declarations) count.set(name, (count.get(name) ?? 0) + 1);
  for (const declaration of declarations) {
    if (count.get(declaration.name) === 1) (declaration as { ref: string }).ref = declaration.name;
  }
  return declarations;
}

/** A solution declared again with another `from` is its next recipe. */
function joinsRecipe(first: Declaration, next: Declaration): boolean {
  if (first.kind !== "solution" || next.kind !== "solution") return false;
  const known = new Set(first.sections.map(({ from }) => from));
  if (next.sections.some(({ from }) => known.has(from))) {
    return next.sections.every((section) =>
      first.sections.some(({ file, section: index }) => file === section.file && index === section.section),
    );
  }
  first.sections.push(...next.sections);
  return true;
}

const twice = (declaration: Declaration, first: Place | null): CultureFinding => ({
  code: "name/twice",
  place: declaration.place,
  system: declaration.kind === "system" ? declaration.name : null,
  word: declaration.name,
  what: declaration.kind,
  first,
});

interface UsedFile {
  readonly file: string;
  readonly place: Place;
  readonly path: string;
}

function usedBy(
  file: string,
  document: MarlDocument,
  files: Files,
  links: Links,
  findings: CultureFinding[],
): UsedFile[] {
  const used: UsedFile[] = [];
  for (const { line } of document.uses) {
    const statement = document.lines[line]?.statement;
    if (statement?.kind !== "use") continue;
    const path = statement.path.text;
    const place = { file, line, span: statement.path };
    const target = fileMeant(file, path, links);
    if (target === null) findings.push({ code: "use/outside", place, system: null, path });
    else if (!files.has(target)) findings.push({ code: "use/missing-file", place, system: null, path });
    else used.push({ file: target, place, path });
  }
  return used;
}

/** The file that a path written in a file means, links followed, whether or not it is there; null outside the farm. */
export function fileMeant(file: string, path: string, links: Links): string | null {
  const written = resolvePath(file, path);
  return written === null ? null : throughLinks(written, links);
}

/** A link may lead to another one; more than so many lead in a circle. */
const longestWay = 8;

/** Where a path leads when links on its way are followed: the longest that begins it, again and again. */
function throughLinks(path: string, links: Links): string {
  let here = path;
  for (let way = 0; way < longestWay && links.size > 0; way += 1) {
    const link = [...links.keys()]
      .filter((name) => here === name || here.startsWith(`${name}/`))
      .reduce<string | null>(
        (longest, name) => (longest === null || name.length > longest.length ? name : longest),
        null,
      );
    if (link === null) return here;
    here = `${links.get(link)}${here.slice(link.length)}`;
  }
  return here;
}

/** A path as written in a file, from the farm's folder; null where it leaves it. */
function resolvePath(file: string, path: string): string | null {
  if (/^([/\\]|[A-Za-z]:)/.test(path)) return null;
  const steps = file.split("/").slice(0, -1);
  for (const step of path.split(/[/\\]/)) {
    if (step === "" || step === ".") continue;
    if (step !== "..") steps.push(step);
    else if (steps.pop() === undefined) return null;
  }
  return steps.join("/");
}

function reachable(file: string, used: ReadonlyMap<string, readonly UsedFile[]>): Set<string> {
  const seen = new Set<string>();
  const waiting = [file];
  for (let next = waiting.shift(); next !== undefined; next = waiting.shift()) {
    for (const { file: target } of used.get(next) ?? []) {
      if (seen.has(target)) continue;
      seen.add(target);
      waiting.push(target);
    }
  }
  seen.delete(file);
  return seen;
}

function reportCycles(used: ReadonlyMap<string, readonly UsedFile[]>, findings: CultureFinding[]): void {
  for (const [file, list] of used) {
    for (const { file: target, place, path } of list) {
      if (target === file || reachable(target, used).has(file))
        findings.push({ code: "use/cycle", place, system: null, path });
    }
  }
}

/** The declaration that a word means in a file, or why there is none. */
export function resolve(
  names: Names,
  file: string,
  line: number,
  word: Word,
  wanted: readonly NamedKind[],
  system: string | null,
): { found: Declaration } | { finding: CultureFinding } {
  const table = names.visible.get(file);
  const found = table?.get(word.text);
  if (found && wanted.includes(found.kind)) return { found };
  const candidates = [...(table?.values() ?? [])]
    .filter(({ kind }) => wanted.includes(kind))
    .map(({ name }) => name);
  const elsewhere = found ? null : (names.declaring.get(word.text)?.find((other) => other !== file) ?? null);
  return {
    finding: {
      code: "name/undeclared",
      place: { file, line, span: word },
      system,
      word: word.text,
      wanted,
      nearest: nearestWords(word.text, candidates),
      elsewhere,
      standsFor: found?.kind ?? null,
    },
  };
}
