/**
 * What an extension may ask beyond the protocol: names and shapes only. Each has a twin that any editor can use, named
 * beside it.
 */
import type { WorkspaceEdit } from "vscode-languageserver";
import type { SystemState } from "../editor/system-state.ts";

/** Names of the requests, and of the one notification. */
export const marlRequest = {
  /** The systems that a place in a document speaks of. Twin: document symbols. */
  systems: "marl/systems",
  /** The dose sheet as text. Twin: the doses' lens and hover; `marl sheet`. */
  sheet: "marl/sheet",
  /** What a system is usually read for. Twin: completion of a whole `read` line. */
  usualReading: "marl/usualReading",
  /** A `read` line with its values, and the edit that writes it. Twin: the action that adds a `read` line dated now. */
  readingEdit: "marl/readingEdit",
  /** The edit that writes today's plan into the log. Twin: the action of the same name. */
  planEdit: "marl/planEdit",
  /** The edits that tidy every file of the farm. Twin: formatting, file by file; `marl tidy`. */
  tidyEdits: "marl/tidyEdits",
  /** How a system is, in short. Twin: its problems and the doses' lens. */
  state: "marl/state",
} as const;

/** Sent after each walk to a client that lists commands of its own: what it shows may be out of date. */
export const stateChanged = "marl/stateChanged";

export interface SystemsParams {
  readonly uri: string;
  /** The line that is looked at, from 0; null for the document as a whole. */
  readonly line: number | null;
  /** A system's name, where it is known already. */
  readonly name: string | null;
}

/** A system to choose among others. */
export interface SystemChoice {
  /** What the other requests name it by. */
  readonly ref: string;
  readonly name: string;
  readonly title: string | null;
}

export interface OfSystem {
  readonly uri: string;
  readonly system: string;
}

export interface SheetAnswer {
  readonly text: string;
}

export interface UsualItem {
  readonly parameter: string;
  /** Empty for a bare number. */
  readonly unit: string;
  /** The last value with its unit and when it was read; null where there is none. */
  readonly last: { readonly text: string; readonly moment: string } | null;
}

export interface UsualReadingAnswer {
  /** `2026-12-01 08:00`. */
  readonly now: string;
  /** What is read together, the most usual first. */
  readonly usual: readonly { readonly parameters: readonly string[]; readonly kit: string | null }[];
  /** Every parameter that can be read. */
  readonly items: readonly UsualItem[];
  readonly kits: readonly string[];
  /** Who read before, the last first. */
  readonly people: readonly string[];
}

export interface ReadingParams extends OfSystem {
  readonly values: readonly { readonly parameter: string; readonly text: string }[];
  readonly kit: string | null;
  readonly by: string | null;
  /** `2026-12-01 08:00` or a time of today; null for now. */
  readonly moment: string | null;
}

/** Why something can't be done, in words for a person. */
export interface Refusal {
  readonly refusal: string;
}

export interface ReadingAnswer {
  /** The tidy line. */
  readonly line: string;
  /** What is wrong or unusual about it. */
  readonly notes: readonly string[];
  readonly edit: WorkspaceEdit;
  readonly uri: string;
}

export interface PlanAnswer {
  /** `Set head-1 to 112 mL/day from now on`. */
  readonly title: string;
  readonly edit: WorkspaceEdit;
  readonly uri: string;
}

export interface TidyAnswer {
  readonly edit: WorkspaceEdit;
  /** How many files it changes. */
  readonly files: number;
}

/** Everything that the extension shows of it. */
export type StateAnswer = SystemState;
