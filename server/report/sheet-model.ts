/** The shapes of a dose sheet: what its parts give and its faces draw. */
import type { Severity } from "../checks/problem.ts";

export interface Column {
  readonly title: string;
  readonly align: "left" | "right";
  /** Where room is short: a name may be cut, a column that others make up for left out. Figures and units never. */
  readonly whenNarrow?: "cut" | "leave out";
}

export interface Table {
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly string[])[];
}

export interface Section {
  readonly title: string;
  readonly table: Table | null;
  readonly lines: readonly string[];
  /** Lines to be copied as they are. */
  readonly marl: readonly string[];
  readonly problems: readonly SheetProblem[];
}

export interface SheetProblem {
  readonly severity: Severity;
  readonly place: string;
  readonly message: string;
  readonly code: string;
}

export interface SystemSheet {
  readonly heading: string;
  readonly subtitle: string;
  readonly sections: readonly Section[];
}

export interface Sheet {
  readonly title: string;
  readonly cautions: readonly string[];
  readonly systems: readonly SystemSheet[];
  readonly closing: readonly Section[];
}

export const section = (title: string, parts: Partial<Omit<Section, "title">>): Section => ({
  title,
  table: null,
  lines: [],
  marl: [],
  problems: [],
  ...parts,
});
