/** The form of a statement, printed from the parser's own grammar: `pump NAME gives SOLUTION at q [least q] …`. */
import {
  Alternation,
  type IProduction,
  NonTerminal,
  Option,
  Repetition,
  RepetitionMandatoryWithSeparator,
  Terminal,
  tokenLabel,
} from "chevrotain";
import { parser } from "./line.ts";
import type { StatementRow } from "./statements.ts";

/** What stands for a phrase, where the grammar gives it no name of its own at that place. */
const phrases: Readonly<Record<string, string>> = {
  name: "NAME",
  parameter: "PARAMETER",
  quantity: "q",
  number: "N",
  text: '"text"',
  title: '["title"]',
  moment: "DATE [TIME]",
  clock: "TIME",
  unit: "unit",
  afterUnit: "",
};
const terminals: Readonly<Record<string, string>> = {
  "a formula": "FORMULA",
  "a date": "DATE",
  "a time": "TIME",
};

const partsOf = (part: IProduction): IProduction[] =>
  (part as IProduction & { definition: IProduction[] }).definition;

function print(parts: readonly IProduction[]): string {
  const words = parts.map((part) => {
    const word = printed(part);
    return isChoice(part) && parts.length > 1 ? `(${word})` : word;
  });
  return words.filter(Boolean).join(" ");
}

const isChoice = (part: IProduction): boolean =>
  part instanceof Alternation ||
  (part instanceof NonTerminal &&
    part.referencedRule.definition.length === 1 &&
    isChoice(part.referencedRule.definition[0]!));

function printed(part: IProduction): string {
  if (part instanceof Terminal) {
    const label = tokenLabel(part.terminalType);
    return terminals[label] ?? label;
  }
  if (part instanceof NonTerminal)
    return part.label ?? phrases[part.nonTerminalName] ?? print(partsOf(part.referencedRule));
  if (part instanceof Alternation)
    return partsOf(part)
      .map((choice) => print(partsOf(choice)))
      .join(" | ");
  if (part instanceof Option) return `[${print(partsOf(part))}]`;
  if (part instanceof RepetitionMandatoryWithSeparator) return `${print(partsOf(part))}, …`;
  if (part instanceof Repetition) return optional(partsOf(part));
  return print(partsOf(part));
}

/** Parts that may stand in any order, each once: `[a] [b]`. */
function optional(parts: readonly IProduction[]): string {
  const first = parts[0];
  if (first instanceof Alternation)
    return partsOf(first)
      .map((choice) => optional(partsOf(choice)))
      .join(" ");
  if (first instanceof NonTerminal)
    return phrases[first.nonTerminalName] ?? optional(partsOf(first.referencedRule));
  return `[${print(parts)}]`;
}

/** How a statement is written, as documentation shows it. */
export function formOf(row: StatementRow): string {
  const rule = parser().getGAstProductions()[row.rule];
  const form = rule ? print(rule.definition) : "";
  return row.form === "event" ? `DATE [TIME] ${form}` : form;
}
