/** Whether names still mean what they meant after an edit: asked before it is offered, since reasons against it are many. */
import { type DocumentLine, type MarlDocument, readDocument } from "../../../grammar/document.ts";
import { isReagent } from "../../chemistry/reagents.ts";
import { bindNames, type Declaration } from "../../culture/names.ts";
import type { Farm } from "../../farm.ts";
import { type TextEdit, withEdits } from "../text-edits.ts";
import { wordsIn } from "../words.ts";
import { type FarmEdit, isTextEdit } from "./action.ts";

/** Tells of edits whether every name that a file speaks of still stands for the same thing, and nothing new is wrong with names. */
export function stillResolves(farm: Farm, moved: Declaration): (edit: FarmEdit) => boolean {
  const codesBefore = codesOf(bindNames(farm.documents, farm.links, isReagent).findings);
  return (edit) => {
    const documents = documentsAfter(farm, edit);
    const after = bindNames(documents, farm.links, isReagent);
    if (codesOf(after.findings) !== codesBefore) return false;
    return [...farm.bound.names.visible].every(([file, table]) => {
      const there = after.names.visible.get(file);
      return [...table].every(([name, declaration]) => {
        const now = there?.get(name);
        // A file that doesn't speak of it needn't see it.
        if (!now) return !documents.get(file)?.lines.some((line) => names(line, declaration));
        const isMoved = declaration === moved;
        return (
          now.kind === declaration.kind &&
          (isMoved
            ? now.sections.length === moved.sections.length
            : now.place.file === declaration.place.file)
        );
      });
    });
  };
}

/** True where one of a line's words stands for it: a text or a longer name that holds the same letters doesn't. */
const names = (line: DocumentLine, { name, kind }: Declaration): boolean =>
  line.text.includes(name) &&
  wordsIn(line).some((word) => word.text === name && word.name?.kinds.some((each) => each === kind));

const codesOf = (findings: ReturnType<typeof bindNames>["findings"]): string =>
  findings
    .map(({ code }) => code)
    .sort()
    .join(" ");

/** In order of their paths, as a farm binds them. */
function documentsAfter(farm: Farm, { edits, created }: FarmEdit): ReadonlyMap<string, MarlDocument> {
  const documents = new Map(farm.documents);
  for (const file of new Set(edits.map((edit) => edit.file))) {
    const own = edits.filter((edit): edit is TextEdit => edit.file === file && isTextEdit(edit));
    documents.set(file, readDocument(withEdits(farm.texts.get(file) ?? "", own), documents.get(file)));
  }
  for (const { file, text } of created) documents.set(file, readDocument(text));
  return new Map([...documents].sort(([left], [right]) => (left < right ? -1 : 1)));
}
