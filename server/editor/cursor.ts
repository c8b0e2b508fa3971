/** Where an editor points: plain places in lines. Columns are UTF-16 units of the line's own text, from 0. */
import type { DocumentLine, MarlDocument, Section } from "../../grammar/document.ts";
import type { Farm } from "../farm.ts";

export interface Cursor {
  readonly file: string;
  readonly line: number;
  readonly column: number;
}

/** A part of one line; nothing in Marl is longer. End exclusive. */
export interface LineSpan {
  readonly file: string;
  readonly line: number;
  readonly start: number;
  readonly end: number;
}

/** From a place in one line to a place in the same or a later one. */
export interface LinesSpan {
  readonly file: string;
  readonly first: number;
  readonly start: number;
  readonly last: number;
  readonly end: number;
}

/** A line with what surrounds it. */
export interface LineInFarm {
  readonly file: string;
  readonly number: number;
  readonly line: DocumentLine;
  readonly document: MarlDocument;
  readonly section: Section | null;
}

/** The line of a file, or null where there is none. */
export function lineIn(farm: Farm, file: string, number: number): LineInFarm | null {
  const document = farm.documents.get(file);
  const line = document?.lines[number];
  if (!document || !line) return null;
  const section = line.section === null ? null : (document.sections[line.section] ?? null);
  return { file, number, line, document, section };
}

/** All lines of a file, in order. */
export function linesOf(farm: Farm, file: string): LineInFarm[] {
  const document = farm.documents.get(file);
  return (document?.lines ?? []).map((line, number) => {
    const section = line.section === null ? null : (document!.sections[line.section] ?? null);
    return { file, number, line, document: document!, section };
  });
}

/** True where a cursor stands in a span or touches its end. */
export const touches = (column: number, span: { readonly start: number; readonly end: number }): boolean =>
  span.start <= column && column <= span.end;
