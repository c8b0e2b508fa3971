/** Parameters: those that the system is read for or held in first, what the line has already last. */
import { type ParameterName, parameterTable } from "../../../grammar/parameters.ts";
import type { System } from "../../culture/model.ts";
import type { Offer } from "./item.ts";
import type { CompletionPlace } from "./place.ts";
import { beginsWithParameter } from "./statements.ts";

export function parameterOffers(place: CompletionPlace): Offer[] {
  const { expected, words, system, row } = place;
  if (!expected.includes("a parameter") || !(words.length > 0 || beginsWithParameter(place))) return [];
  const said = new Set<string>([
    ...words.map(({ image }) => image),
    ...(row?.rule === "hold" && system ? system.facts.holds.keys() : []),
    ...(words.length === 0 ? startsOfSection(place) : []),
  ]);
  const known = knownOf(system);
  const rank = (name: ParameterName): number => (said.has(name) ? 2 : known.has(name) ? 0 : 1);
  const rows = parameterTable.filter(({ measure }) => row?.rule !== "supplies" || dissolves.has(measure));
  return [...rows]
    .sort((left, right) => rank(left.name) - rank(right.name))
    .map(({ name, usual, unit }) => ({
      kind: "parameter",
      label: name,
      detail: usual ? `usual: ${usual[0]} to ${usual[1]}${unit && ` ${unit}`}` : "",
      about: { kind: "parameter", word: name },
      begins: true,
    }));
}

const dissolves: ReadonlySet<string> = new Set(["alkalinity", "dissolved"]);

/** What a system is held in or was ever read for. */
function knownOf(system: System | null): ReadonlySet<string> {
  const names = new Set<string>(system?.facts.holds.keys());
  for (const event of system?.events ?? [])
    if (event.kind === "read") for (const name of Object.keys(event.values)) names.add(name);
  return names;
}

/** The parameters that other lines of the section begin with. */
function startsOfSection({ line, cursor }: CompletionPlace): string[] {
  const { firstLine = 0, lastLine = -1 } = line.section ?? {};
  return line.document.lines.slice(firstLine, lastLine + 1).flatMap(({ statement }, index) => {
    const isOther = firstLine + index !== cursor.line;
    return isOther && statement && "parameter" in statement && !("at" in statement)
      ? [statement.parameter.text]
      : [];
  });
}
