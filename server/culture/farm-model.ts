/** All files of a farm → its model: the one place where sections are handed to those who bind them. */
import type { MarlDocument } from "../../grammar/document.ts";
import type {
  Event,
  Fact,
  KitEvent,
  KitFact,
  LogEvent,
  ReagentFact,
  StoreEvent,
  WaterFact,
} from "../../grammar/syntax.ts";
import { isReagent } from "../chemistry/reagents.ts";
import { type BoundEvent, bindEvent } from "./bind-events.ts";
import { bindKit, bindStore, bindWater } from "./bind-shelf.ts";
import { bindSolution, type RecipeSection } from "./bind-solution.ts";
import { bindSystemFacts } from "./bind-system.ts";
import { type Binder, type Line, lineOf, named } from "./binder.ts";
import { compareEvents } from "./event-order.ts";
import type { CultureFinding, NamedKind } from "./finding.ts";
import type { FarmModel, Kit, SaltWater, Solution, System, SystemEvent } from "./model.ts";
import { bindNames, type Declaration, type Files, type Links, type Names } from "./names.ts";
import { comparePlaces, type Place } from "./place.ts";
import { convertReads, type PendingRead } from "./readings.ts";
import { checkReagent } from "./reagent.ts";

export interface BoundFarm {
  readonly model: FarmModel;
  /** By file, the files that it uses. */
  readonly uses: ReadonlyMap<string, readonly string[]>;
  readonly findings: readonly CultureFinding[];
}

/** Binds a farm. Files are taken in order of their paths, so that nothing depends on how they were found. */
export function bindFarm(unordered: Files, links: Links): BoundFarm {
  const files: Files = new Map([...unordered].sort(([left], [right]) => (left < right ? -1 : 1)));
  const findings: CultureFinding[] = [];
  const { names, findings: nameFindings } = bindNames(files, links, isReagent);
  findings.push(...nameFindings, ...lineFindings(files));
  const used = new Set<Declaration>();
  const binder = (file: string, system: string | null): Binder => ({
    file,
    system,
    names,
    used,
    report: (finding) => void findings.push(finding),
  });
  const house: House = { files, names, binder };

  const of = (kind: NamedKind) =>
    names.declarations
      .filter((declaration) => declaration.kind === kind)
      .sort((left, right) => comparePlaces(left.place, right.place));
  for (const reagent of of("reagent")) {
    const { file, line } = reagent.place;
    checkReagent(reagent, lineOf(binder(file, null), line), reagentFacts(house));
  }
  const solutions = new Map(
    of("solution").map((declaration) => [declaration.ref, solutionOf(house, declaration)]),
  );
  const waters = new Map<string, SaltWater>(
    of("saltwater").map((declaration) => [declaration.ref, waterOf(house, declaration)]),
  );
  const kits = new Map<string, Kit>(
    of("kit").map((declaration) => [declaration.ref, kitOf(house, declaration)]),
  );
  for (const [file, document] of files) {
    for (const [index, section] of document.sections.entries()) {
      if (section.kind === "store") bindStore(eventLines<StoreEvent>(house, file, index, null));
    }
  }
  const systems = bindSystems(house, of("system"), findings);
  for (const declaration of names.declarations) {
    if (declaration.kind === "system" || used.has(declaration)) continue;
    findings.push({
      code: "name/unused",
      place: declaration.place,
      system: null,
      word: declaration.name,
      kind: declaration.kind,
    });
  }
  return { model: { systems, solutions, waters, kits }, uses: names.uses, findings };
}

interface House {
  readonly files: Files;
  readonly names: Names;
  readonly binder: (file: string, system: string | null) => Binder;
}

/** What the reading of lines found, put into files. */
function lineFindings(files: Files): CultureFinding[] {
  return [...files].flatMap(([file, document]) =>
    document.lines.flatMap(({ findings, section }, line) =>
      findings.map(({ span, ...finding }) => {
        const place: Place = { file, line, span };
        return { ...finding, place, system: systemOf(document, section) } as CultureFinding;
      }),
    ),
  );
}

function systemOf(document: MarlDocument, section: number | null): string | null {
  const header = section === null ? null : document.sections[section];
  return header && (header.kind === "system" || header.kind === "log") ? (header.name?.text ?? null) : null;
}

interface Bindable<S> {
  readonly line: Line;
  readonly statement: S;
}

function statementLines(
  house: House,
  file: string,
  section: number,
  system: string | null,
): Bindable<Fact | Event>[] {
  const document = house.files.get(file);
  const range = document?.sections[section];
  if (!document || !range) return [];
  const binder = house.binder(file, system);
  const lines: Bindable<Fact | Event>[] = [];
  for (let line = range.firstLine; line <= range.lastLine; line++) {
    const statement = document.lines[line]?.statement;
    if (!statement || statement.kind === "header" || statement.kind === "use") continue;
    lines.push({ line: lineOf(binder, line), statement });
  }
  return lines;
}

function factLines<F extends Fact>(house: House, file: string, section: number, system: string | null) {
  return statementLines(house, file, section, system).flatMap(({ line, statement }) =>
    "at" in statement ? [] : [{ line, fact: statement as F }],
  );
}

function eventLines<E extends Event>(house: House, file: string, section: number, system: string | null) {
  return statementLines(house, file, section, system).flatMap(({ line, statement }) =>
    "at" in statement ? [{ line, event: statement as E }] : [],
  );
}

const reagentFacts = (house: House) => (declaration: Declaration) =>
  declaration.sections.flatMap(({ file, section }) => factLines<ReagentFact>(house, file, section, null));

const titleOf = (house: House, declaration: Declaration): string | null => {
  const [first] = declaration.sections;
  return (first && house.files.get(first.file)?.sections[first.section]?.title?.text) ?? null;
};

function solutionOf(house: House, declaration: Declaration): Solution {
  const sections = declaration.sections.map(({ file, section, from }): RecipeSection => {
    const document = house.files.get(file);
    const { headerLine = 0, lastLine = -1 } = document?.sections[section] ?? {};
    const lines = document?.lines.slice(headerLine, lastLine + 1) ?? [];
    return {
      hasUnreadLine: lines.some(({ statement, findings }) => !statement && findings.length > 0),
      header: lineOf(house.binder(file, null), headerLine),
      from,
      lines: factLines(house, file, section, null),
    };
  });
  return bindSolution(declaration, titleOf(house, declaration), sections, reagentFacts(house));
}

function waterOf(house: House, declaration: Declaration): SaltWater {
  const [first] = declaration.sections;
  const facts = first ? factLines<WaterFact>(house, first.file, first.section, null) : [];
  const events = first ? eventLines<LogEvent>(house, first.file, first.section, null) : [];
  return bindWater(declaration, titleOf(house, declaration), facts, events);
}

function kitOf(house: House, declaration: Declaration): Kit {
  const [first] = declaration.sections;
  const facts = first ? factLines<KitFact>(house, first.file, first.section, null) : [];
  const events = first ? eventLines<KitEvent>(house, first.file, first.section, null) : [];
  return bindKit(declaration, facts, events);
}

/** Facts of all systems first, then every log, since corals move between systems. */
function bindSystems(
  house: House,
  declarations: readonly Declaration[],
  findings: CultureFinding[],
): Map<string, System> {
  const drafts = new Map(
    declarations.map((declaration) => {
      const [first] = declaration.sections;
      const lines = first ? factLines(house, first.file, first.section, declaration.name) : [];
      return [
        declaration.ref,
        {
          declaration,
          facts: bindSystemFacts(lines).facts,
          events: [] as BoundEvent[],
          logFiles: new Set<string>(),
        },
      ];
    }),
  );
  for (const [file, document] of house.files) {
    for (const [index, section] of document.sections.entries()) {
      if (section.kind !== "log" || !section.name) continue;
      const header = lineOf(house.binder(file, section.name.text), section.headerLine);
      const system = named(header, section.name, ["system"]);
      const draft = system && drafts.get(system.ref);
      if (!draft) continue;
      draft.logFiles.add(file);
      let before = Number.NEGATIVE_INFINITY;
      for (const { line, event } of eventLines(house, file, index, section.name.text)) {
        if (event.at.minute < before) {
          findings.push({
            code: "log/out-of-order",
            place: { file, line: line.line, span: event.at },
            system: line.system,
          });
        }
        before = event.at.minute;
        const bound = bindEvent(line, event, { facts: draft.facts });
        if (bound) draft.events.push(bound);
      }
    }
  }
  for (const { declaration, events } of drafts.values()) dropDoubled(events, declaration.name, findings);
  arrive(drafts, findings);
  return new Map(
    [...drafts].map(([ref, { declaration, facts, events, logFiles }]) => {
      const { name, place } = declaration;
      const title = titleOf(house, declaration);
      return [ref, { ref, name, title, place, facts, events: converted(events), logFiles: [...logFiles] }];
    }),
  );
}

/** Two lines alike in system, minute and tidy text are one event: a merge may have doubled them. */
function dropDoubled(events: BoundEvent[], system: string, findings: CultureFinding[]): void {
  events.sort(
    (left, right) =>
      compareEvents(left as SystemEvent, right as SystemEvent) || comparePlaces(left.place, right.place),
  );
  let kept = 0;
  for (const event of events) {
    const before = events[kept - 1];
    if (before && before.minute === event.minute && before.text === event.text) {
      findings.push({ code: "log/twice", place: event.place, system, first: before.place });
      continue;
    }
    events[kept++] = event;
  }
  events.length = kept;
}

type Drafts = ReadonlyMap<
  string,
  { readonly declaration: Declaration; readonly facts: System["facts"]; readonly events: BoundEvent[] }
>;

/** Corals moved to a system arrive in its cohort of the same name. */
function arrive(drafts: Drafts, findings: CultureFinding[]): void {
  const arrivals: { readonly into: BoundEvent[]; readonly event: BoundEvent }[] = [];
  for (const { declaration, facts, events } of drafts.values()) {
    for (const event of events) {
      if (event.kind !== "moved" || !event.system) continue;
      const target = drafts.get(event.system);
      if (!target) continue;
      const here = facts.cohorts.get(event.cohort)?.[0]?.value.count.by;
      const there = target.facts.cohorts.get(event.cohort)?.[0]?.value.count.by;
      if (there !== undefined && there === here)
        arrivals.push({ into: target.events, event: { ...event, kind: "stocked" } });
      else {
        const why =
          there === undefined
            ? `${target.declaration.name} has no cohort ${event.cohort}, so what they take there isn't counted`
            : `${target.declaration.name} counts ${event.cohort} in ${there === "pieces" ? "pieces" : "an area"}, so what they take there isn't counted`;
        findings.push({ code: "log/no-effect", place: event.place, system: declaration.name, why });
      }
    }
  }
  for (const { into, event } of arrivals) into.push(event);
}

/** Readings in the model's units, all events in canonical order. */
function converted(events: readonly BoundEvent[]): SystemEvent[] {
  const isRead = (event: BoundEvent): event is PendingRead => event.kind === "read";
  const others = events.filter((event): event is Exclude<BoundEvent, PendingRead> => !isRead(event));
  return [...convertReads(events.filter(isRead)), ...others].sort(compareEvents);
}
