/** What can be done at a place: a title, a kind, and the edits, worked out only when they are wanted. Shapes only. */
import type { LineEdit, Problem } from "../../checks/problem.ts";
import type { Farm } from "../../farm.ts";
import type { TextEdit, TextPoint } from "../text-edits.ts";

/** From general to particular, as editors name them. */
export const actionKinds = [
  "quickfix",
  "refactor.move",
  "refactor.rewrite",
  "source.fixAll",
  "source.fixAll.marl",
  "source.recordReading",
  "source.tidy",
  "source.writePlan",
] as const;
export type ActionKind = (typeof actionKinds)[number];

/** Edits in files of the farm, and files that are new in it. */
export interface FarmEdit {
  readonly edits: readonly (LineEdit | TextEdit)[];
  readonly created: readonly { readonly file: string; readonly text: string }[];
}

export interface Action {
  readonly title: string;
  readonly kind: ActionKind;
  /** The problem that it mends. */
  readonly problem: Problem | null;
  /** The one that may be done unasked. */
  readonly isPreferred: boolean;
  readonly edit: () => FarmEdit;
}

/** A selection in a file, or a cursor where both ends are the same. */
export interface Selection {
  readonly file: string;
  readonly from: TextPoint;
  readonly to: TextPoint;
}

/** What is looked at to find actions. */
export interface Asked {
  readonly farm: Farm;
  readonly selection: Selection;
  /** The wall clock's minute. */
  readonly now: number;
  /** True where a new file can be made. */
  readonly canCreate: boolean;
}

/** Finds the actions of one sort at a place. */
export type FindActions = (asked: Asked) => readonly Action[];

/** The same, with pauses, where it may take long. */
export type FindInSteps = (asked: Asked) => Generator<void, readonly Action[]>;

export const inLines = (edits: readonly (LineEdit | TextEdit)[]): FarmEdit => ({ edits, created: [] });

export const isTextEdit = (edit: LineEdit | TextEdit): edit is TextEdit => "from" in edit;

/** The numbers of the lines that a selection touches. */
export const touchedLines = ({ from, to }: Selection): readonly [first: number, last: number] => [
  from.line,
  // A selection that ends where a line begins has nothing of it.
  to.column === 0 && to.line > from.line ? to.line - 1 : to.line,
];
