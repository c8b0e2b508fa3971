/** All files of a farm → its model: the one place where sections are handed to those who bind them. */
import type { MarlDocument } from "../../grammar/document.ts";
import type {
  KitEvent,
  KitFact,
  LogEvent,
  ReagentFact,
  StoreEvent,
  WaterFact,
} from "../../grammar/syntax.ts";
import { isReagent } from "../chemistry/reagents.ts";
import { bindLogs, type Founded } from "./bind-logs.ts";
import { bindKit, bindStore, bindWater } from "./bind-shelf.ts";
import { bindSolution, type RecipeSection } from "./bind-solution.ts";
import { bindSystemFacts } from "./bind-system.ts";
import { lineOf } from "./binder.ts";
import type { CultureFinding, NamedKind } from "./finding.ts";
import {
  type BinderOf,
  bindPart,
  eventLines,
  factLines,
  type House,
  inputsOf,
  inputsOfAll,
  meaningsByFile,
  titleOf,
} from "./house.ts";
import { inOneGo, type Keeper, type Kept, keeper } from "./keep.ts";
import type { FarmModel, Kit, SaltWater, Solution, System, SystemFacts } from "./model.ts";
import { bindNames, type Declaration, type Files, type Links, type Names, namesWrittenIn } from "./names.ts";
import { comparePlaces, type Place } from "./place.ts";
import { checkReagent } from "./reagent.ts";

export interface BoundFarm {
  readonly model: FarmModel;
  /** What each file declares, and what it sees of others. */
  readonly names: Names;
  /** By file, the files that it uses. */
  readonly uses: ReadonlyMap<string, readonly string[]>;
  readonly findings: readonly CultureFinding[];
  /** For the next binding. */
  readonly kept: Kept;
}

/** Binds a farm. Files are taken in order of their paths, so that nothing depends on how they were found. */
export function bindFarm(files: Files, links: Links): BoundFarm {
  return inOneGo(bindFarmInSteps(files, links, null));
}

/** Binds a farm, pausing now and then; what was bound before and says the same is taken as it is. */
export function* bindFarmInSteps(
  unordered: Files,
  links: Links,
  before: BoundFarm | null,
): Generator<void, BoundFarm> {
  const files: Files = new Map([...unordered].sort(([left], [right]) => (left < right ? -1 : 1)));
  const keeping = keeper(before?.kept ?? null);
  const { names, nameFindings, seen } = namesOf(files, links, keeping);
  const findings = [...nameFindings];
  for (const [file, document] of files)
    findings.push(...keeping.keep(`lines ${file}`, [document], () => lineFindings(file, document)));
  const house: House = { files, names, seen, keeper: keeping, findings, used: new Set() };

  const of = (kind: NamedKind) =>
    names.declarations
      .filter((declaration) => declaration.kind === kind)
      .sort((left, right) => comparePlaces(left.place, right.place));
  // A recipe may name any reagent of the farm, and that another.
  const reagents = keeping.sameList(
    "reagents",
    of("reagent").flatMap((declaration) => inputsOfAll(house, declaration)),
  );
  for (const declaration of of("reagent")) {
    const { file, line } = declaration.place;
    bindPart(house, `reagent ${declaration.ref}`, [declaration.ref, reagents], (binder) =>
      checkReagent(declaration, lineOf(binder(file, null), line), reagentFacts(house, binder)),
    );
  }
  const bound = <T>(declaration: Declaration, work: (binder: BinderOf) => T): [string, T] => {
    const inputs = [reagents, ...inputsOfAll(house, declaration)];
    return [declaration.ref, bindPart(house, `${declaration.kind} ${declaration.ref}`, inputs, work)];
  };
  const solutions = new Map<string, Solution>();
  for (const declaration of of("solution")) {
    solutions.set(...bound(declaration, (binder) => solutionOf(house, binder, declaration)));
    yield;
  }
  const waters = new Map<string, SaltWater>(
    of("saltwater").map((each) => bound(each, (binder) => waterOf(house, binder, each))),
  );
  const kits = new Map<string, Kit>(
    of("kit").map((each) => bound(each, (binder) => kitOf(house, binder, each))),
  );
  yield;
  for (const [file, document] of files) {
    for (const [index, { kind }] of document.sections.entries()) {
      if (kind !== "store") continue;
      bindPart(house, `store ${index} ${file}`, inputsOf(house, file, index), (binder) =>
        bindStore(eventLines<StoreEvent>(house, binder(file, null), file, index)),
      );
    }
  }
  const systems = yield* bindSystems(house, of("system"));
  for (const { kind, name, ref, place } of names.declarations) {
    if (kind === "system" || house.used.has(ref)) continue;
    findings.push({ code: "name/unused", place, system: null, word: name, kind });
  }
  const model = { systems, solutions, waters, kits };
  return { model, names, uses: names.uses, findings, kept: keeping.kept };
}

/** The solutions, salt waters and other systems that a system's facts name. */
function refsIn({ sources, topOff, flowsThrough }: SystemFacts): readonly string[] {
  return [
    ...[...sources.values()].flatMap((history) => history.map(({ value }) => value.solution)),
    ...topOff.flatMap(({ value }) => value.solution ?? []),
    ...flowsThrough.map(({ value }) => value.water),
  ];
}

/** Names change only where a header with a name, a `use` or a link does. */
function namesOf(files: Files, links: Links, { keep }: Keeper) {
  const written = [...files].map(([file, document]) =>
    keep(`names in ${file}`, [document], () => JSON.stringify([file, namesWrittenIn(document)])),
  );
  return keep("names", [JSON.stringify([...links]), ...written], () => {
    const { names, findings } = bindNames(files, links, isReagent);
    return { names, nameFindings: findings, seen: meaningsByFile(names) };
  });
}

/** What the reading of lines found, put into files. */
function lineFindings(file: string, document: MarlDocument): CultureFinding[] {
  const placed: CultureFinding[] = [];
  for (let line = 0; line < document.lines.length; line += 1) {
    const { findings, section } = document.lines[line]!;
    for (const { span, ...finding } of findings) {
      const place: Place = { file, line, span };
      placed.push({ ...finding, place, system: systemOf(document, section) } as CultureFinding);
    }
  }
  return placed;
}

function systemOf(document: MarlDocument, section: number | null): string | null {
  const header = section === null ? null : document.sections[section];
  return header && (header.kind === "system" || header.kind === "log") ? (header.name?.text ?? null) : null;
}

const reagentFacts = (house: House, binder: BinderOf) => (declaration: Declaration) =>
  declaration.sections.flatMap(({ file, section }) =>
    factLines<ReagentFact>(house, binder(file, null), file, section),
  );

function solutionOf(house: House, binder: BinderOf, declaration: Declaration): Solution {
  const sections = declaration.sections.map(({ file, section, from }): RecipeSection => {
    const document = house.files.get(file);
    const { headerLine = 0, lastLine = -1 } = document?.sections[section] ?? {};
    const lines = document?.lines.slice(headerLine, lastLine + 1) ?? [];
    return {
      hasUnreadLine: lines.some(({ statement, findings }) => !statement && findings.length > 0),
      header: lineOf(binder(file, null), headerLine),
      from,
      lines: factLines(house, binder(file, null), file, section),
    };
  });
  return bindSolution(declaration, titleOf(house, declaration), sections, reagentFacts(house, binder));
}

function waterOf(house: House, binder: BinderOf, declaration: Declaration): SaltWater {
  const [first] = declaration.sections;
  const facts = first ? factLines<WaterFact>(house, binder(first.file, null), first.file, first.section) : [];
  const events = first
    ? eventLines<LogEvent>(house, binder(first.file, null), first.file, first.section)
    : [];
  return bindWater(declaration, titleOf(house, declaration), facts, events);
}

function kitOf(house: House, binder: BinderOf, declaration: Declaration): Kit {
  const [first] = declaration.sections;
  const facts = first ? factLines<KitFact>(house, binder(first.file, null), first.file, first.section) : [];
  const events = first
    ? eventLines<KitEvent>(house, binder(first.file, null), first.file, first.section)
    : [];
  return bindKit(declaration, facts, events);
}

/** Facts of all systems first, then every log, since corals move between systems. */
function* bindSystems(
  house: House,
  declarations: readonly Declaration[],
): Generator<void, Map<string, System>> {
  const founded = new Map<string, Founded>();
  for (const declaration of declarations) {
    const { ref, name } = declaration;
    const [first] = declaration.sections;
    const facts = bindPart(house, `facts ${ref}`, inputsOfAll(house, declaration), (binder) => {
      const own = first ? binder(first.file, name) : null;
      return bindSystemFacts(first && own ? factLines(house, own, first.file, first.section) : []).facts;
    });
    founded.set(ref, { declaration, facts });
    yield;
  }
  const logged = yield* bindLogs(house, founded);
  const systems = new Map<string, System>();
  for (const [ref, { declaration, facts }] of founded) {
    const { name, place } = declaration;
    const { events, logFiles, ...log } = logged.get(ref)!;
    const title = titleOf(house, declaration);
    const inputs = [facts, events, logFiles, JSON.stringify([name, title, place])];
    const system = house.keeper.keep(`system ${ref}`, inputs, (): System => {
      const refersTo = new Set([...refsIn(facts), ...log.refersTo]);
      return { ref, name, title, place, facts, events, logFiles, refersTo };
    });
    systems.set(ref, system);
  }
  return systems;
}
