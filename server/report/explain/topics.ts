/** What can be explained: a problem's code, or a word of the language, by all that it means. */
import { nearestWords } from "../../../grammar/nearest.ts";
import { parameterTable } from "../../../grammar/parameters.ts";
import { partTable } from "../../../grammar/parts.ts";
import { aParameter, statementTable } from "../../../grammar/statements.ts";
import { unitTable } from "../../../grammar/units.ts";
import { codes } from "../../checks/rules.ts";
import { ambiguousReagents, reagents } from "../../chemistry/reagents.ts";
import { type ParameterTopic, parameterTopic } from "./parameters.ts";
import { isCode, type ProblemTopic, problemTopic } from "./problems.ts";
import { type ReagentTopic, reagentTopic } from "./reagents.ts";
import {
  type PartTopic,
  parameterStatements,
  partTopic,
  type StatementTopic,
  statementTopics,
} from "./statements.ts";
import { type UnitTopic, unitTopic } from "./units.ts";

export type Topic = ProblemTopic | StatementTopic | PartTopic | ParameterTopic | UnitTopic | ReagentTopic;

/** All that a word or a code means; nothing where it is unknown. */
export function topicsOf(word: string): Topic[] {
  if (isCode(word)) return [problemTopic(word)];
  const parameter = parameterTopic(word);
  const topics: (Topic | null)[] = [
    ...statementTopics(word),
    parameter,
    ...(parameter ? parameterStatements(parameter.parameter) : []),
    partTopic(word),
    unitTopic(word),
    reagentTopic(word),
  ];
  return topics.filter((topic) => topic !== null);
}

/** Everything that has a topic, in the tables' order. */
export const knownWords = (): readonly string[] => [
  ...new Set([
    ...statementTable.map((row) => row.word).filter((word) => word !== aParameter),
    ...parameterTable.map((row) => row.name),
    ...partTable.map((row) => row.word),
    ...unitTable.flatMap((row) => [row.spelling, ...row.also]),
    ...Object.keys(reagents),
    ...codes,
  ]),
];

/** What was meant by a word that nothing is known of, likeliest first. */
export function nearTopics(word: string): readonly string[] {
  const open = ambiguousReagents.get(word);
  if (open) return open;
  // A code without its family, or a family without its code.
  const halves = codes.filter((code) => code.split("/").includes(word));
  return halves.length > 0 ? halves : nearestWords(word, knownWords());
}
