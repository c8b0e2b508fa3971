/** Where a hover is asked for, with all that its texts look at. */
import type { Statement } from "../../../grammar/syntax.ts";
import type { FarmModel, ReadEvent, SystemEvent } from "../../culture/model.ts";
import type { Place } from "../../culture/place.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { type AtEvent, atEvent, type LogToLookInto } from "../../dosing/at-event.ts";
import { type ReadingAlone, readingAlone } from "../../dosing/reading-alone.ts";
import { type Farm, walkedLog } from "../../farm.ts";
import type { UnderCursor } from "../under-cursor.ts";
import type { Told } from "./parts.ts";

export interface Spot {
  readonly farm: Farm;
  readonly model: FarmModel;
  /** The moment that everything is seen as at. */
  readonly at: number;
  readonly under: UnderCursor;
  readonly statement: Statement;
  /** The line. */
  readonly place: Place;
  /** Of the line's system. */
  readonly assessment: Assessment | null;
}

/** The log of the line's system, as the walk folded it. */
export const logHere = (spot: Spot, assessment: Assessment): LogToLookInto => ({
  constants: assessment.constants,
  events: assessment.system.events,
  folded: walkedLog(spot.farm, assessment.system.ref)?.log ?? null,
});

/** The carbonate system of a reading, as the walk worked it out. */
export const carbonateHere = (spot: Spot, assessment: Assessment, event: ReadEvent): ReadingAlone =>
  readingAlone(
    assessment.system.events,
    event,
    walkedLog(spot.farm, assessment.system.ref)?.readings ?? { readings: assessment.readings, bases: [] },
  );

/** The water right before an event of the line's system and right after it. */
export function around(spot: Spot, event: SystemEvent): AtEvent | null {
  return spot.assessment && atEvent(logHere(spot, spot.assessment), event);
}

/** What is told of a spot; null where there is nothing to tell. */
export type Tells = (spot: Spot) => Told | null;

export type StatementOf<K extends Statement["kind"]> = Extract<Statement, { readonly kind: K }>;

/** The event that the line stands for; null where it doesn't count, or another line alike does. */
export function eventHere<K extends SystemEvent["kind"]>(
  { assessment, place }: Spot,
  ...kinds: readonly K[]
): Extract<SystemEvent, { readonly kind: K }> | null {
  const found = assessment?.system.events.find(
    ({ place: own, kind }) =>
      own.file === place.file && own.line === place.line && (kinds as readonly string[]).includes(kind),
  );
  return (found as Extract<SystemEvent, { readonly kind: K }> | undefined) ?? null;
}

/** Told of an event that lies ahead of the moment. */
export const aheadLines = (spot: Spot, minute: number): string[] =>
  minute > spot.at ? ["Lies ahead: it counts when its time has come."] : [];
