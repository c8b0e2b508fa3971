/** Who signs: names and initials seen before, the newest first; those of the same file before others. */
import type { MarlDocument } from "../../../grammar/document.ts";
import type { Offer } from "./item.ts";
import { type CompletionPlace, lastOf } from "./place.ts";

const markers: ReadonlySet<string> = new Set(["by", "read", "set", "gave", "with", "to"]);
/** Lines of the other files that are looked through. */
const mostLines = 5000;

export function personOffers(place: CompletionPlace): Offer[] {
  if (!place.expected.includes("a name") || lastOf(place, markers) !== "by") return [];
  const { farm, cursor } = place;
  const own = farm.documents.get(cursor.file);
  const others = [...farm.documents].flatMap(([file, document]) => (file === cursor.file ? [] : [document]));
  // What is being typed isn't seen before.
  const people = new Set(own ? signedIn(own, own.lines.length, cursor.line) : []);
  let left = mostLines;
  for (const document of others) {
    for (const name of signedIn(document, left)) people.add(name);
    left -= Math.min(left, document.lines.length);
  }
  return [...people].map((label) => ({ kind: "person", label, detail: "signed before" }));
}

function signedIn({ lines }: MarlDocument, most: number, except = -1): string[] {
  const people = new Set<string>();
  for (let at = lines.length - 1; at >= Math.max(0, lines.length - most); at -= 1) {
    const { statement } = lines[at]!;
    if (at !== except && statement && "by" in statement && statement.by) people.add(statement.by.text);
  }
  return [...people];
}
