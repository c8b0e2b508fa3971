/** Names that are used and not declared, declared twice, or never used; and `use` lines. */
import { summaryOf } from "../../grammar/write.ts";
import type { NamedKind, OwnKind } from "../culture/finding.ts";
import type { Files } from "../culture/names.ts";
import { lineAt, removingDoubled, replacingWith } from "./fixing.ts";
import type { LineFix, Problem } from "./problem.ts";
import type { Of, Rules } from "./rule.ts";
import { sectionAtEnd } from "./sections.ts";
import { addingUseLines } from "./use-lines.ts";
import { allOf, inQuotes, nameOf, oneOf, sourceName } from "./words.ts";

const kindInWords: Readonly<Record<NamedKind | OwnKind, string>> = {
  system: "system",
  solution: "solution",
  reagent: "reagent",
  saltwater: "salt water",
  kit: "kit",
  pump: "pump",
  cohort: "cohort",
  source: "hand dose",
};
export const kindOf = (kind: string): string => kindInWords[kind as NamedKind] ?? kind;
const withArticle = (words: string): string => `a ${words}`;

type Undeclared = Of<"name/undeclared">;
const isOfSystem = (wanted: readonly string[]): boolean =>
  wanted.some((kind) => kind === "pump" || kind === "cohort" || kind === "source");

/** A hand dose is offered by the name of what it gives. */
const offered = (nearest: readonly string[]): string[] =>
  nearest.map((word) => word.replace(/^hand /, "")).map(nameOf);

function undeclared(finding: Undeclared): string {
  const { word } = finding;
  if ("severalSources" in finding)
    return `${inQuotes(word)} is given by more than one source: ${allOf(finding.severalSources)}.`;
  const wanted = oneOf(finding.wanted.map(kindOf));
  if (finding.standsFor)
    return `${inQuotes(word)} is ${withArticle(kindOf(finding.standsFor))}, and ${withArticle(wanted)} is wanted here.`;
  if (finding.elsewhere)
    return `${inQuotes(word)} is declared in ${finding.elsewhere}, which this file doesn't use.`;
  return isOfSystem(finding.wanted)
    ? `This system has no ${wanted} ${inQuotes(word)}.`
    : `No ${wanted} ${inQuotes(word)} is declared here.`;
}

function undeclaredTodo(finding: Undeclared): string {
  if ("severalSources" in finding) return "Write the name of the pump that is meant.";
  if (finding.elsewhere)
    return `Put use ${inQuotes(pathTo(finding.place.file, finding.elsewhere))} at the top.`;
  const nearest = offered(finding.nearest);
  if (nearest.length > 0) return `Is ${oneOf(nearest)} meant?`;
  return isOfSystem(finding.wanted)
    ? "Declare it in the system's section."
    : "Declare it in a section of its own, or use the file that declares it.";
}

/** What a new section says at least; what only the farm knows is an example, to be corrected. */
const exampleLines: Readonly<Record<NamedKind, readonly string[]>> = {
  system: ["tank main 500 L"],
  solution: ["dissolve sodium-bicarbonate 80 g", "make up to 1 L"],
  reagent: ["is sodium-bicarbonate"],
  saltwater: ["salinity 35"],
  kit: ["alkalinity scatter 0.15 dKH"],
};

/** A section of its own for the name, at the end of the file. */
function declaring({ place: { file }, word, ...finding }: Undeclared, files: Files): readonly LineFix[] {
  const document = files.get(file);
  if (!document || "severalSources" in finding || finding.standsFor) return [];
  // Water is renewed with a salt water or a system; the former is likelier to be still undeclared.
  const kind = finding.wanted.filter((each): each is NamedKind => each in exampleLines).at(-1);
  if (!kind || isOfSystem(finding.wanted)) return [];
  const wanted = finding.wanted.includes("saltwater") ? "saltwater" : kind;
  const edits = [sectionAtEnd(document, file, `${wanted} ${word}`, exampleLines[wanted])];
  const title = `Declare ${kindOf(wanted)} ${word}, with example values to correct`;
  return [{ title, safe: false, edits }];
}

const mostNames = 5;

function undeclaredFixes(finding: Undeclared, files: Files): readonly LineFix[] {
  if ("severalSources" in finding)
    return replacingWith(
      finding.place,
      finding.severalSources.filter((by) => by !== sourceName("hand")),
      false,
    );
  if (!finding.elsewhere)
    return [
      ...replacingWith(finding.place, offered(finding.nearest), false).slice(0, mostNames),
      ...declaring(finding, files),
    ];
  const { file } = finding.place;
  const document = files.get(file);
  const text = `use "${pathTo(file, finding.elsewhere)}"`;
  return document
    ? [{ title: `Add ${text}`, safe: false, edits: [addingUseLines(file, document, [text])] }]
    : [];
}

/** Where the name is declared in the file that isn't used. */
function undeclaredRelated(finding: Undeclared, files: Files): Problem["related"] {
  if ("severalSources" in finding || !finding.elsewhere) return [];
  const file = finding.elsewhere;
  const section = files.get(file)?.sections.find(({ name }) => name?.text === finding.word);
  if (!section?.name) return [];
  const { start, end } = section.name;
  const place = { file, line: section.headerLine, span: { start, end } };
  return [{ place, message: `Here ${inQuotes(finding.word)} is declared` }];
}

/** A fact that says again what the first one says may go. */
function twiceFixes({ place, what, first }: Of<"name/twice">, files: Files): readonly LineFix[] {
  const here = lineAt(files, place)?.statement;
  const there = first && lineAt(files, first)?.statement;
  if (what !== "fact" || !first || !here || !there || summaryOf(here) !== summaryOf(there)) return [];
  return removingDoubled(place, first, files);
}

/** The way from a file to another, both counted from the farm's folder. */
export function pathTo(from: string, to: string): string {
  const here = from.split("/").slice(0, -1);
  const there = to.split("/");
  let shared = 0;
  while (shared < here.length && shared < there.length - 1 && here[shared] === there[shared]) shared += 1;
  return [...here.slice(shared).map(() => ".."), ...there.slice(shared)].join("/");
}

function twice({ word, what, first }: Of<"name/twice">): string {
  if (what === "fact") return `${inQuotes(word)} is stated twice for the same time.`;
  if (what === "reading") return `${inQuotes(word)} is read twice on this line.`;
  return first
    ? `${inQuotes(word)} is declared twice, here as ${withArticle(kindOf(what))}.`
    : `${inQuotes(word)} is the name of a built-in reagent already.`;
}

export const nameRules: Rules<"name/undeclared" | "name/twice" | "name/ambiguous-reagent" | "name/unused"> = {
  "name/undeclared": {
    severity: "error",
    title: "A name that isn't declared",
    says: undeclared,
    why: "What names it is left out.",
    whyHere: (finding) =>
      "wanted" in finding && finding.wanted.includes("kit")
        ? "The readings count all the same."
        : "This line is left out.",
    todo: "Correct the name, declare it, or use the file that declares it.",
    todoHere: undeclaredTodo,
    related: undeclaredRelated,
    fixes: undeclaredFixes,
    background:
      "A file sees its own names and those of the files that it uses, and that these use. Pumps, hand doses and cohorts are names of one system.",
    example: {
      fires:
        "system vat\n  tank main 500 L\n  pump head-1 gives ash-prat at 40 mL/min\n  by-hand ash-part\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n",
      silent:
        "system vat\n  tank main 500 L\n  pump head-1 gives ash-part at 40 mL/min\n  by-hand ash-part\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n",
    },
  },
  "name/twice": {
    severity: "error",
    title: "A name, fact or value given twice",
    says: twice,
    why: "Two that differ can't both hold; the first one counts.",
    todo: "Keep one, give the other a name of its own, or write from which date the newer one holds.",
    todoHere: ({ what, first }) =>
      what === "fact"
        ? "Keep one, or write from which date the newer one holds: from 2026-12-01."
        : what === "reading"
          ? "Keep one, or write the second test on a line of its own."
          : first
            ? "Give one of them another name."
            : "Give it a name of your own.",
    related: ({ first, word }) => (first ? [{ place: first, message: `The first ${inQuotes(word)}` }] : []),
    fixes: twiceFixes,
    background:
      "A solution may be declared again with `from DATE` behind its name: that is its next recipe, and no mistake.",
    example: {
      fires: "system vat\n  tank main 500 L\n  tank main 520 L\n",
      silent: "system vat\n  tank main 500 L\n  tank main 520 L from 2026-11-01\n",
    },
  },
  "name/ambiguous-reagent": {
    severity: "error",
    title: "A reagent that is sold with different amounts of water",
    says: ({ word }) => `${inQuotes(word)} names several salts, which differ in their water.`,
    why: "Their strengths differ up to twofold, so the recipe's strength stays unknown.",
    todo: "Write the name with its water, as the label of the sack says: anhydrous, dihydrate, hexahydrate, heptahydrate.",
    todoHere: ({ offers }) => `Write ${oneOf(offers)}, as the label says.`,
    fixes: ({ place, offers }) => replacingWith(place, offers, false),
    example: {
      fires:
        "system vat\n  tank main 500 L\n  by-hand chloride-part\n\nsolution chloride-part\n  dissolve calcium-chloride 400 g\n  make up to 5 L\n",
      silent:
        "system vat\n  tank main 500 L\n  by-hand chloride-part\n\nsolution chloride-part\n  dissolve calcium-chloride-dihydrate 400 g\n  make up to 5 L\n",
    },
  },
  "name/unused": {
    severity: "hint",
    title: "Something declared that nothing uses",
    says: ({ word, kind }) => `Nothing uses the ${kindOf(kind)} ${inQuotes(word)}.`,
    why: "It may be left over, or misspelt where it should be used.",
    todo: "Remove it, or leave it if its use is still to come.",
    example: {
      fires: "system vat\n  tank main 500 L\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n",
      silent:
        "system vat\n  tank main 500 L\n  by-hand ash-part\n\nsolution ash-part\n  supplies alkalinity 1.6 meq/mL\n",
    },
  },
};
