/**
 * The whole walk from texts to answers: advance(previous, changes, at) → Farm, and what the next advance may
 * reuse. Knows no files, no clock, no protocol: texts and a moment come in, a value goes out.
 */
import { type MarlDocument, readDocumentInSteps } from "../grammar/document.ts";
import { quieten } from "./checks/quieten.ts";
import { type Problem, problemsOf } from "./checks/rules.ts";
import { type BoundFarm, bindFarmInSteps } from "./culture/farm-model.ts";
import { inOneGo, type Kept, keeper } from "./culture/keep.ts";
import { type Assessment, assessInSteps, type KeptAssessment } from "./dosing/assess.ts";
import { withRemedies } from "./dosing/remedies.ts";

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
  /** For the next walk. */
  readonly kept: Kept;
}

/** How far the walk is, for those who show it. While lines are still read and bound, `of` is 0. */
export interface Progress {
  /** The system that was done last, or is being worked on. */
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
  return inOneGo(advanceBySystem(previous, changes, moment));
}

/** The same walk, pausing every few milliseconds, so that a caller may show how far it is or stop. */
export function* advanceBySystem(
  previous: Farm | null,
  changes: ReadonlyMap<string, FileChange>,
  moment: Moment,
): Generator<Progress, Farm> {
  const files = yield* told(starting, changedFiles(previous, changes));
  const sameFiles = previous !== null && changes.size === 0;
  const sameMoment =
    previous !== null && previous.moment.at === moment.at && previous.moment.clock === moment.clock;
  if (sameFiles && sameMoment) return previous;

  const bound = sameFiles
    ? previous.bound
    : yield* told(starting, bindFarmInSteps(files.documents, files.links, previous?.bound ?? null));
  const keeping = keeper(previous?.kept ?? null);
  const { model } = bound;
  const assessments = new Map<string, Assessment>();
  const of = model.systems.size;
  for (const [ref, system] of model.systems) {
    const refs = [...system.refersTo];
    const parts = refs.flatMap((each) => [
      model.solutions.get(each),
      model.waters.get(each),
      model.systems.get(each),
    ]);
    const progress = { system: system.name, done: assessments.size, of };
    const { at, clock } = moment;
    const kept = yield* told(
      progress,
      keeping.keepSteps(
        assessmentKey(ref),
        [system, at, clock, ...refs, ...parts],
        (before: KeptAssessment | undefined) => assessInSteps(model, system, at, clock, before ?? null),
      ),
    );
    assessments.set(ref, kept.assessment);
    yield { ...progress, done: assessments.size };
  }
  const findings = [
    ...bound.findings,
    ...[...assessments.values()].flatMap((assessment) => withRemedies(model, assessment)),
  ];
  const unreadable = [...files.unreadable].map(([file, reason]) => ({
    code: "file/unreadable" as const,
    place: { file, line: 0, span: null },
    system: null,
    reason,
  }));
  const problems = quieten(problemsOf([...findings, ...unreadable], files.documents), files.documents);
  return { moment, ...files, bound, assessments, problems, kept: keeping.kept };
}

/** A system's log and readings as the walk went through them, to look into; null where it has no such system. */
export const walkedLog = (farm: Farm, ref: string): KeptAssessment | null =>
  (farm.kept.get(assessmentKey(ref))?.result as KeptAssessment | undefined) ?? null;

const assessmentKey = (ref: string): string => `assessment ${ref}`;

const starting: Progress = { system: "", done: 0, of: 0 };

/** Passes on the pauses of a part of the walk, saying how far that is. */
function* told<T>(progress: Progress, steps: Generator<void, T>): Generator<Progress, T> {
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    yield progress;
  }
}

function* changedFiles(previous: Farm | null, changes: ReadonlyMap<string, FileChange>) {
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
      documents.set(file, yield* readDocumentInSteps(change.text, previous?.documents.get(file)));
      yield;
    }
  }
  return { documents, texts, unreadable, links };
}
