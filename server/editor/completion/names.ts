/** Names: those that the file sees, the lately used first; then those of files that it doesn't use yet; then what is built in. */

import { nameOf } from "../../checks/words.ts";
import { reagents } from "../../chemistry/reagents.ts";
import { countUpTo } from "../../culture/event-order.ts";
import type { System, SystemEvent } from "../../culture/model.ts";
import type { Declaration } from "../../culture/names.ts";
import type { Farm } from "../../farm.ts";
import type { ThingKind } from "../thing-kinds.ts";
import type { Offer } from "./item.ts";
import { type CompletionPlace, lastOf } from "./place.ts";
import { useEdit } from "./use-line.ts";

const waters: readonly ThingKind[] = ["saltwater", "system"];

/** By the word that comes before a name, what may be named. */
const namedAfter: Readonly<Record<string, readonly ThingKind[]>> = {
  log: ["system"],
  gives: ["solution"],
  "by-hand": ["solution"],
  "top-off": ["solution"],
  dissolve: ["reagent"],
  saturated: ["reagent"],
  is: ["reagent"],
  received: ["reagent"],
  counted: ["reagent"],
  mixed: ["solution"],
  discarded: ["solution"],
  gave: ["solution"],
  set: ["pump", "solution"],
  stocked: ["cohort"],
  removed: ["cohort"],
  moved: ["cohort"],
  to: ["system"],
  filled: ["pump"],
  level: ["pump"],
  calibrated: ["pump"],
  stopped: ["pump"],
  started: ["pump"],
  with: waters,
  // What follows is a person's.
  by: [],
};
const withIn: Readonly<Record<string, readonly ThingKind[]>> = { read: ["kit"], topped: ["solution"] };
const markers: ReadonlySet<string> = new Set(Object.keys(namedAfter));

export function nameOffers(place: CompletionPlace): Offer[] {
  const { expected, row } = place;
  if (!expected.includes("a name") || !row) return [];
  const marker = lastOf(place, markers);
  const kinds =
    marker === null ? [] : (((marker === "with" && withIn[row.rule]) || namedAfter[marker]) ?? []);
  const own = kinds.flatMap((kind) => ownOffers(place, kind));
  const shared = marker === "set" ? handSolutions(place) : sharedOffers(place, kinds);
  const used = lastNamed(place.system, place.now);
  const here = new Set(place.words.map(({ image }) => image));
  const rank = ({ label }: Offer): number => {
    // What a list has already is hardly meant again.
    if (here.has(label)) return used.length + 1;
    const at = used.indexOf(label);
    return at < 0 ? used.length : at;
  };
  const inOrder = [...own, ...shared].sort((left, right) => rank(left) - rank(right));
  return [...inOrder, ...elsewhere(place, marker === "set" ? [] : kinds), ...builtIn(kinds)];
}

/** Names of the system itself. */
function ownOffers({ system }: CompletionPlace, kind: ThingKind): Offer[] {
  if (!system) return [];
  if (kind === "cohort")
    return [...system.facts.cohorts.keys()].map((label) => ({ kind, label, detail: "cohort" }));
  if (kind !== "pump") return [];
  return [...system.facts.sources.values()].flatMap((history): Offer[] => {
    const source = history.at(-1)?.value;
    if (source?.device !== "pump") return [];
    return [{ kind, label: source.by, detail: `pump, gives ${nameOf(source.solution)}` }];
  });
}

/** Solutions that are given by hand: a `set` line names them themselves. */
function handSolutions({ system }: CompletionPlace): Offer[] {
  return [...(system?.facts.sources.values() ?? [])].flatMap((history): Offer[] => {
    const source = history.at(-1)?.value;
    if (source?.device !== "hand") return [];
    return [{ kind: "solution", label: nameOf(source.solution), detail: "by hand" }];
  });
}

function sharedOffers(place: CompletionPlace, kinds: readonly ThingKind[]): Offer[] {
  const { farm, cursor, system, row } = place;
  const seen = farm.bound.names.visible.get(cursor.file)?.values() ?? [];
  const isOther = (declaration: Declaration) =>
    row?.rule === "log" || (declaration.ref !== system?.ref && !isOwn(place, declaration));
  return inKinds([...seen].filter(isOther), kinds).map((declaration) =>
    offerOf(declaration, detailOf(farm, declaration, cursor.file)),
  );
}

/** True of what the cursor's own section declares: nothing is made of itself. */
const isOwn = ({ cursor, line }: CompletionPlace, { sections }: Declaration): boolean =>
  sections.some(({ file, section }) => file === cursor.file && section === line.line.section);

const inKinds = (declarations: readonly Declaration[], kinds: readonly ThingKind[]): Declaration[] =>
  kinds.flatMap((kind) => declarations.filter((declaration) => declaration.kind === kind));

const offerOf = ({ kind, name, ref }: Declaration, detail: string): Offer => ({
  kind,
  label: name,
  detail,
  ...(kind === "solution" ? { about: { kind, ref } } : {}),
});

const kindInWords: Readonly<Partial<Record<ThingKind, string>>> = { saltwater: "salt water" };

/** Its title, else what it is, and the file that declares it where that is another. */
function detailOf(farm: Farm, declaration: Declaration, from: string): string {
  const { kind, place, sections } = declaration;
  const first = sections[0];
  const title = first && farm.documents.get(first.file)?.sections[first.section]?.title?.text;
  const told = title ?? kindInWords[kind] ?? kind;
  return place.file === from ? told : `${told} (${place.file})`;
}

/** Names that another file declares, with the `use` line that makes them seen. */
function elsewhere({ farm, cursor, system }: CompletionPlace, kinds: readonly ThingKind[]): Offer[] {
  const seen = farm.bound.names.visible.get(cursor.file);
  const hidden = farm.bound.names.declarations.filter(
    ({ name, ref, place }) => !seen?.has(name) && ref !== system?.ref && place.file !== cursor.file,
  );
  return inKinds(hidden, kinds).map((declaration) => ({
    ...offerOf(declaration, detailOf(farm, declaration, cursor.file)),
    also: useEdit(farm, cursor.file, declaration.place.file),
  }));
}

function builtIn(kinds: readonly ThingKind[]): Offer[] {
  if (!kinds.includes("reagent")) return [];
  return Object.entries(reagents).map(([label, { title, formula }]) => ({
    kind: "reagent",
    label,
    detail: `${formula}, ${title}`,
    about: { kind: "reagent", word: label },
  }));
}

/** How many events tell what is named lately. */
const lastEvents = 200;

/** What the last events of a system named, newest first. */
export function lastNamed(system: System | null, now: number): readonly string[] {
  if (!system) return [];
  const end = countUpTo(system.events, now);
  const events = system.events.slice(Math.max(0, end - lastEvents), end).reverse();
  return [...new Set(events.flatMap(namesIn).map(nameOf))];
}

function namesIn(event: SystemEvent): readonly string[] {
  switch (event.kind) {
    case "read":
      return event.kit === null ? [] : [event.kit];
    case "gave":
      return event.doses.map(({ solution }) => solution);
    case "set":
      return event.rates.map(({ source }) => source.replace(/^hand /, ""));
    case "renewed":
      return [event.water];
    case "topped":
      return event.solution === null ? [] : [event.solution];
    case "stocked":
    case "removed":
    case "moved":
      return [event.cohort];
    case "note":
      return [];
    default:
      return [event.pump];
  }
}
