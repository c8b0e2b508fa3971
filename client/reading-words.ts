/** What is asked when a reading is recorded, and how. No VS Code in here. */
import type { ReadingAnswer, Refusal, UsualItem, UsualReadingAnswer } from "../server/protocol/requests.ts";

export interface Choice<T> {
  readonly label: string;
  readonly description?: string;
  readonly detail?: string;
  readonly value: T;
}

/** What was read: parameters together with the kit that they are usually tested with; null to pick them singly. */
export type What = UsualReadingAnswer["usual"][number] | null;

/** What is usually read, and a way to anything else. */
export function whatChoices({ usual, items }: UsualReadingAnswer): readonly Choice<What>[] {
  const lastOf = new Map(items.map(({ parameter, last }) => [parameter, last?.text ?? "never read"]));
  return [
    ...usual.map((value) => ({
      label: value.parameters.join(", "),
      ...(value.kit === null ? {} : { description: `with ${value.kit}` }),
      detail: `last: ${value.parameters.map((parameter) => lastOf.get(parameter)).join(", ")}`,
      value,
    })),
    { label: "Something else…", value: null },
  ];
}

/** Every parameter, to be picked singly. */
export const itemChoices = ({ items }: UsualReadingAnswer): readonly Choice<string>[] =>
  items.map(({ parameter, unit, last }) => ({
    label: parameter,
    description: last ? `last ${last.text}, ${last.moment}` : unit && `in ${unit}`,
    value: parameter,
  }));

/** `alkalinity in dKH. Last 7.8 dKH, 2026-12-01 07:30. Leave it empty to skip it.` */
export function promptFor({ parameter, unit, last }: UsualItem): string {
  const before = last ? ` Last ${last.text}, ${last.moment}.` : " Never read before.";
  return `${parameter}${unit ? ` in ${unit}` : ""}.${before} Leave it empty to skip it.`;
}

export interface Said {
  readonly message: string;
  readonly kind: "preview" | "note" | "refusal";
}

/** What is told under a value while it is typed: the line so far, with what is unusual about it. */
export function said(answer: ReadingAnswer | Refusal): Said {
  if ("refusal" in answer) return { message: answer.refusal, kind: "refusal" };
  const { line, notes } = answer;
  return notes.length > 0
    ? { message: [line, ...notes].join(" · "), kind: "note" }
    : { message: line, kind: "preview" };
}

export type Step = "write" | "kit" | "by" | "moment";

export interface Draft {
  readonly kit: string | null;
  readonly by: string | null;
  readonly moment: string;
}

/** What is asked last, with what is unusual about the line. */
export function lastQuestion(answer: ReadingAnswer | Refusal): string {
  const notes = "refusal" in answer ? [] : answer.notes;
  return ["Is this right?", ...notes].join(" ");
}

/** The line as it will be written, and what can still be changed about it. */
export function lastChoices(
  { kit, by, moment }: Draft,
  answer: ReadingAnswer | Refusal,
  hasKits: boolean,
): readonly Choice<Step>[] {
  const first: Choice<Step> =
    "refusal" in answer
      ? { label: "$(error) This can't be written", detail: answer.refusal, value: "moment" }
      : { label: "$(check) Write this line into the log", detail: answer.line, value: "write" };
  const tested: Choice<Step> = {
    label: "$(beaker) Tested with",
    description: kit ?? "no kit named",
    value: "kit",
  };
  return [
    first,
    ...(hasKits ? [tested] : []),
    { label: "$(person) Read by", description: by ?? "nobody named", value: "by" },
    { label: "$(clock) Read at", description: moment, value: "moment" },
  ];
}
