/** The line that makes the names of another file seen, at the place where it belongs. */
import { pathTo } from "../../checks/name.ts";
import type { LineEdit } from "../../checks/problem.ts";
import { addingUseLines } from "../../checks/use-lines.ts";
import type { Farm } from "../../farm.ts";

export function useEdit(farm: Farm, file: string, used: string): readonly LineEdit[] {
  const document = farm.documents.get(file);
  return document ? [addingUseLines(file, document, [`use "${pathTo(file, used)}"`])] : [];
}
