/** What completion offers: plain items, each with its own edit over the whole word at the cursor. */
import type { LineEdit } from "../../checks/problem.ts";
import type { LineSpan } from "../cursor.ts";
import type { ThingKind } from "../thing-kinds.ts";

export type ItemKind =
  | "statement"
  | "part"
  | "parameter"
  | "unit"
  | "moment"
  | "line"
  | "person"
  | "path"
  | "formula"
  | "code"
  | ThingKind;

/** What the documentation of an item is about. */
export type About =
  | { readonly kind: "statement"; readonly rule: string }
  | { readonly kind: "part" | "parameter" | "unit" | "reagent" | "problem"; readonly word: string }
  | { readonly kind: "solution"; readonly ref: string };

/** An item before it is known which word it takes the place of. */
export interface Offer {
  readonly kind: ItemKind;
  readonly label: string;
  /** One line. */
  readonly detail: string;
  /** What is written; the label where it isn't told. */
  readonly text?: string;
  /** The same with places to fill in, for clients that can jump between them. */
  readonly snippet?: string;
  /** What the typed word is compared with; the label where it isn't told. */
  readonly filter?: string;
  /** What the line needs elsewhere. */
  readonly also?: readonly LineEdit[];
  readonly about?: About;
  /** True where the line can't be read yet with this alone: more has to follow. */
  readonly begins?: boolean;
}

export interface CompletionItem {
  readonly kind: ItemKind;
  readonly label: string;
  readonly detail: string;
  readonly text: string;
  readonly snippet: string | null;
  readonly filter: string;
  /** Up to the cursor, and to the end of the word. */
  readonly insert: LineSpan;
  readonly replace: LineSpan;
  readonly also: readonly LineEdit[];
  readonly about: About | null;
  readonly begins: boolean;
}

/** A text as it stands in a snippet. */
export const inSnippet = (text: string): string => text.replace(/[\\$}]/g, "\\$&");

/** A place to fill in; inside its braces a word, or several to choose from. */
export const tabStop = (number: number, words: readonly string[]): string => {
  if (words.length === 0) return `$${number}`;
  if (words.length === 1) return `\${${number}:${inSnippet(words[0]!)}}`;
  return `\${${number}|${words.map((word) => word.replace(/[\\$},|]/g, "\\$&")).join(",")}|}`;
};
