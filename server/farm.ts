/**
 * The whole walk from texts to answers: advance(previous, changes, at) → Farm, and what the next advance may
 * reuse. Knows no files, no clock, no protocol: texts and a moment come in, a value goes out.
 */
import { type MarlDocument, readDocument } from "../grammar/document.ts";
import { quieten } from "./checks/quieten.ts";
import { type Problem, problemsOf } from "./checks/rules.ts";
import { type BoundFarm, bindFarm } from "./culture/farm-model.ts";
import { type Assessment, assess } from "./dosing/assess.ts";

/** The moment that everything is seen as at, and the real clock; minutes since 1970-01-01 of the wall clock. */
export interface Moment {
  readonly at: number;
  readonly clock: number;
}

/**
 * What became of a file since the last time: its text, that it can't be read, that it is another name for a
 * file or folder of the farm, or null where it is gone.
 */
export type FileChange =
  | { readonly text: string }
  | { readonly unreadable: string }
  | { readonly linkTo: string }
  | null;

export interface Farm {
  readonly moment: Moment;
  /** By path from the farm's folder, with `/`. */
  readonly documents: ReadonlyMap<string, MarlDocument>;
  readonly texts: ReadonlyMap<string, string>;
  readonly unreadable: ReadonlyMap<string, string>;
  /** By the path of a link, the path that it leads to. */
  readonly links: ReadonlyMap<string, string>;
  readonly bound: BoundFarm;
  /** By the system's reference, in order of declaration. */
  readonly assessments: ReadonlyMap<string, Assessment>;
  readonly problems: readonly Problem[];
}

/** How far the walk is, for those who show it. */
export interface Progress {
  readonly system: string;
  readonly done: number;
  readonly of: number;
}

/** Takes the whole walk. */
export function advance(
  previous: Farm | null,
  changes: ReadonlyMap<string, FileChange>,
  moment: Moment,
): Farm {
  const steps = advanceBySystem(previous, changes, moment);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

/** The same walk, pausing after each system, so that a caller may show how far it is or stop. */
export function* advanceBySystem(
  previous: Farm | null,
  changes: ReadonlyMap<string, FileChange>,
  moment: Moment,
): Generator<Progress, Farm> {
  const files = changedFiles(previous, changes);
  const sameFiles = previous !== null && changes.size === 0;
  const bound = sameFiles ? previous.bound : bindFarm(files.documents, files.links);
  const sameMoment =
    previous !== null && previous.moment.at === moment.at && previous.moment.clock === moment.clock;
  if (sameFiles && sameMoment) return previous;

  const assessments = new Map<string, Assessment>();
  const { systems } = bound.model;
  for (const [ref, system] of systems) {
    assessments.set(ref, assess(bound.model, system, moment.at, moment.clock));
    yield { system: system.name, done: assessments.size, of: systems.size };
  }
  const findings = [
    ...bound.findings,
    ...[...assessments.values()].flatMap((assessment) => assessment.findings),
  ];
  const unreadable = [...files.unreadable].map(([file, reason]) => ({
    code: "file/unreadable" as const,
    place: { file, line: 0, span: null },
    system: null,
    reason,
  }));
  const problems = problemsOf([...findings, ...unreadable], files.documents);
  return { moment, ...files, bound, assessments, problems: quieten(problems, files.documents) };
}

function changedFiles(previous: Farm | null, changes: ReadonlyMap<string, FileChange>) {
  const documents = new Map(previous?.documents);
  const texts = new Map(previous?.texts);
  const unreadable = new Map(previous?.unreadable);
  const links = new Map(previous?.links);
  for (const [file, change] of changes) {
    documents.delete(file);
    texts.delete(file);
    unreadable.delete(file);
    links.delete(file);
    if (change === null) continue;
    if ("unreadable" in change) unreadable.set(file, change.unreadable);
    else if ("linkTo" in change) links.set(file, change.linkTo);
    else {
      texts.set(file, change.text);
      documents.set(file, readDocument(change.text, previous?.documents.get(file)));
    }
  }
  return { documents, texts, unreadable, links };
}
