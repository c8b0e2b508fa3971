/** What an item means, at more length than its one line. */
import { formOf } from "../../../grammar/form.ts";
import { partOf } from "../../../grammar/parts.ts";
import { statementTable } from "../../../grammar/statements.ts";
import { factAt } from "../../culture/history.ts";
import type { Farm } from "../../farm.ts";
import { parameterTopic } from "../../report/explain/parameters.ts";
import { isCode, problemTopic } from "../../report/explain/problems.ts";
import { reagentTopic } from "../../report/explain/reagents.ts";
import { partTopic } from "../../report/explain/statements.ts";
import { unitTopic } from "../../report/explain/units.ts";
import { strengthText } from "../inlay-hints.ts";
import { escaped, marlBlock } from "../markdown.ts";
import type { About } from "./item.ts";

type Told<Kind extends About["kind"]> = Extract<About, { kind: Kind }>;
type Tellers = {
  readonly [Kind in About["kind"]]: (about: Told<Kind>, farm: Farm) => readonly string[] | null;
};

const tellers: Tellers = {
  statement: ({ rule }) => {
    const row = statementTable.find((each) => each.rule === rule);
    return row ? [marlBlock(formOf(row)), escaped(row.meaning), marlBlock(row.examples.join("\n"))] : null;
  },
  part: ({ word }) => {
    const topic = partTopic(word);
    const { meaning } = partOf(word) ?? {};
    if (!topic || meaning === undefined) return null;
    return [escaped(meaning), ...(topic.examples.length > 0 ? [marlBlock(topic.examples.join("\n"))] : [])];
  },
  parameter: ({ word }) => {
    const topic = parameterTopic(word);
    if (!topic) return null;
    const range = ([low, high]: readonly [number, number]) =>
      escaped(`${low} to ${high}${topic.unit && ` ${topic.unit}`}`);
    const units = topic.units.map(({ unit }) => unit).join(", ");
    return [
      ...(topic.usual ? [`Usual: ${range(topic.usual)}\\.`] : []),
      ...(topic.possible ? [`Possible: ${range(topic.possible)}\\.`] : []),
      escaped(`Written ${topic.bare ? "bare or " : ""}in ${units}.`),
    ];
  },
  unit: ({ word }) => {
    const topic = unitTopic(word);
    return topic && topic.is.length > 0 ? topic.is.map((text) => escaped(`${text}.`)) : null;
  },
  reagent: ({ word }) => {
    const topic = reagentTopic(word);
    if (!topic) return null;
    const brings = topic.gramBrings.map(({ what, amount }) => `${amount} of ${what}`).join(", ");
    return [
      escaped(`${topic.title}, ${topic.formula}, ${topic.molarMassGPerMol} g/mol.`),
      escaped(`1 g brings ${brings}.`),
    ];
  },
  problem: ({ word }) => {
    if (!isCode(word)) return null;
    const { says, why, todo } = problemTopic(word);
    return [`For example: ${escaped(says)}`, escaped(why), escaped(todo)];
  },
  solution: ({ ref }, farm) => {
    const strength = factAt(farm.bound.model.solutions.get(ref)?.strengths, farm.moment.at)?.value;
    const text = strength ? strengthText(strength) : null;
    return text ? [escaped(text)] : null;
  },
};

/** In Markdown; null where there is no more to tell. */
export function documentationOf(farm: Farm, about: About): string | null {
  const tell = tellers[about.kind] as (about: About, farm: Farm) => readonly string[] | null;
  return tell(about, farm)?.join("\n\n") ?? null;
}
