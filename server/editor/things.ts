/** What a name on a line stands for, where that is declared, and every place that speaks of it. */
import { isReagent } from "../chemistry/reagents.ts";
import { inOneGo, linesAtOnce } from "../culture/keep.ts";
import type { System } from "../culture/model.ts";
import type { Declaration } from "../culture/names.ts";
import type { Farm } from "../farm.ts";
import { type LineInFarm, type LineSpan, lineIn } from "./cursor.ts";
import { type LineWord, namesIn, type OwnThing, type ThingKind } from "./words.ts";

export interface Thing {
  readonly kind: ThingKind;
  readonly name: string;
  /** The same for every mention of the same thing, and for no other. */
  readonly key: string;
  /** In the farm's model: of a shared thing its own reference, of a system's own the system's. Null where it has none. */
  readonly ref: string | null;
  /** True for the reagents that every farm has. */
  readonly builtIn: boolean;
}

const own: ReadonlySet<ThingKind> = new Set<OwnThing>(["tank", "displacement", "cohort", "pump"]);

/** True for names of one system. */
export const isOwn = (kind: ThingKind): kind is OwnThing => own.has(kind);

/** Answers what names stand for. Who asks about many lines of a farm makes one and keeps it meanwhile. */
export interface LookUp {
  /** What a word of a line stands for; null where it is no name or nobody knows it. */
  readonly thingOf: (line: LineInFarm, word: LineWord) => Thing | null;
  /** The system that a line belongs to: of its section, or of its log; null where there is none. */
  readonly systemOf: (line: LineInFarm) => System | null;
  /** All that is declared under a shared thing's name and is the same thing: recipes that files see as one. */
  readonly declarationsOf: (thing: Thing) => readonly Declaration[];
  /** The names of one kind that a system declares, whether or not the rest of their lines can be read. */
  readonly ownNames: (system: System, kind: OwnThing) => ReadonlySet<string>;
}

type Group = Declaration[];

export function lookUp(farm: Farm): LookUp {
  const { declarations, visible } = farm.bound.names;
  const { systems } = farm.bound.model;
  let grouped: ReturnType<typeof groupsOf> | null = null;
  // Lines of a log are asked about without them.
  const groups = () => {
    grouped ??= groupsOf(declarations);
    return grouped;
  };
  const ownOf = new Map<string, ReadonlyMap<OwnThing, ReadonlySet<string>>>();

  /** The declaration that a section is (part of); null where none counts. */
  const declaring = ({ file, line }: LineInFarm): Declaration | null => {
    const key = line.section === null ? null : sectionKey(file, line.section);
    return (key !== null && groups().bySection.get(key)?.[0]) || null;
  };
  const systemOf = (line: LineInFarm): System | null => {
    const { section, file } = line;
    if (section?.kind === "system") return systems.get(declaring(line)?.ref ?? "") ?? null;
    if (section?.kind !== "log" || !section.name) return null;
    const found = visible.get(file)?.get(section.name.text);
    return found?.kind === "system" ? (systems.get(found.ref) ?? null) : null;
  };
  const ownNames = (system: System, kind: OwnThing): ReadonlySet<string> => {
    const known = ownOf.get(system.ref) ?? ownNamesIn(farm, groups().byRef.get(system.ref) ?? []);
    ownOf.set(system.ref, known);
    return known.get(kind)!;
  };
  const ownThing = (line: LineInFarm, kind: OwnThing, { text, name }: LineWord): Thing | null => {
    const system = systemOf(line);
    if (!system || !(name?.declares || ownNames(system, kind).has(text))) return null;
    const key = `${kind} ${text} of ${system.ref}`;
    return { kind, name: text, key, ref: system.ref, builtIn: false };
  };
  const sharedThing = (line: LineInFarm, kind: ThingKind, { text, name }: LineWord): Thing | null => {
    // A header that says again what counts elsewhere speaks of that.
    const here = name?.declares ? declaring(line) : null;
    const found = here ?? visible.get(line.file)?.get(text) ?? null;
    if (found?.kind === kind) {
      const first = groups().byRef.get(found.ref)?.[0] ?? found;
      return { kind, name: found.name, key: `${kind} ${first.ref}`, ref: found.ref, builtIn: false };
    }
    if (kind !== "reagent" || !isReagent(text)) return null;
    return { kind, name: text, key: `reagent ${text}, built in`, ref: null, builtIn: true };
  };
  return {
    thingOf: (line, word) => {
      for (const kind of word.name?.kinds ?? []) {
        const thing = isOwn(kind) ? ownThing(line, kind, word) : sharedThing(line, kind, word);
        if (thing) return thing;
      }
      return null;
    },
    systemOf,
    declarationsOf: ({ ref }) => (ref === null ? [] : (groups().byRef.get(ref) ?? [])),
    ownNames,
  };
}

const sectionKey = (file: string, section: number): string => `${section} ${file}`;

/** Two files may join a recipe to those of files that don't see each other: what shares a section is one thing. */
function groupsOf(declarations: readonly Declaration[]) {
  const bySection = new Map<string, Group>();
  const byRef = new Map<string, Group>();
  for (const declaration of declarations) {
    const keys = declaration.sections.map(({ file, section }) => sectionKey(file, section));
    const met = [...new Set(keys.flatMap((key) => bySection.get(key) ?? []))];
    const group = [...new Set([...met.flatMap(({ ref }) => byRef.get(ref) ?? []), declaration])];
    for (const { ref, sections } of group) {
      byRef.set(ref, group);
      for (const { file, section } of sections) bySection.set(sectionKey(file, section), group);
    }
  }
  return { bySection, byRef };
}

function ownNamesIn(
  farm: Farm,
  [declaration]: readonly Declaration[],
): ReadonlyMap<OwnThing, ReadonlySet<string>> {
  const names = new Map<OwnThing, Set<string>>([...own].map((kind) => [kind as OwnThing, new Set()]));
  const [first] = declaration?.sections ?? [];
  const document = first && farm.documents.get(first.file);
  const range = first && document?.sections[first.section];
  if (!document || !range) return names;
  for (const line of document.lines.slice(range.firstLine, range.lastLine + 1))
    for (const { text, name } of namesIn(line)) {
      const kind = name?.declares && name.kinds[0];
      if (kind && isOwn(kind)) names.get(kind)!.add(text);
    }
  return names;
}

/** The system that a line belongs to. */
export const systemOfLine = (farm: Farm, line: LineInFarm): System | null => lookUp(farm).systemOf(line);

/** What a word of a line stands for; null where it is no name or nobody knows it. */
export const thingOf = (farm: Farm, line: LineInFarm, word: LineWord): Thing | null =>
  word.name && lookUp(farm).thingOf(line, word);

export interface Mention extends LineSpan {
  /** True where the line declares it. */
  readonly declares: boolean;
}

/** Every place of a farm that speaks of a thing, by file and line. */
export const mentionsOf = (farm: Farm, thing: Thing): Mention[] => inOneGo(mentionSteps(farm, thing));

/** Those of one file. */
export const mentionsIn = (farm: Farm, thing: Thing, file: string): Mention[] =>
  inOneGo(mentionSteps(farm, thing, [file]));

/** The same, pausing now and then. */
export function* mentionSteps(
  farm: Farm,
  thing: Thing,
  files: Iterable<string> = farm.documents.keys(),
): Generator<void, Mention[]> {
  const mentions: Mention[] = [];
  const names = lookUp(farm);
  for (const file of [...files].sort()) {
    yield;
    if (!farm.texts.get(file)?.includes(thing.name)) continue;
    const document = farm.documents.get(file);
    // Within a section a word that may stand for the same kinds stands for the same.
    let section: number | null = null;
    const meant = new Map<readonly ThingKind[], boolean>();
    for (const [number, line] of document?.lines.entries() ?? []) {
      if (number % linesAtOnce === 0) yield;
      // Most lines don't hold the name at all.
      if (!line.text.includes(thing.name)) continue;
      if (line.section !== section) meant.clear();
      section = line.section;
      for (const word of namesIn(line)) {
        const { text, name, start, end } = word;
        if (text !== thing.name || !name) continue;
        const { kinds, declares } = name;
        let isMeant = declares ? undefined : meant.get(kinds);
        isMeant ??= names.thingOf(lineIn(farm, file, number)!, word)?.key === thing.key;
        if (!declares) meant.set(kinds, isMeant);
        if (isMeant) mentions.push({ file, line: number, start, end, declares });
      }
    }
  }
  return mentions;
}
