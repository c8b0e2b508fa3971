/** What is offered at the mark of a text (two marks: what stands between them), and the texts after one of it. */

import { inOneGo } from "../../server/culture/keep.ts";
import { type Action, isTextEdit } from "../../server/editor/code-actions/action.ts";
import { actionsAt } from "../../server/editor/code-actions.ts";
import { advance, type Farm } from "../../server/farm.ts";
import { applied, overLines } from "./apply.ts";
import { marked } from "./fixture.ts";

export interface Offered {
  readonly farm: Farm;
  readonly actions: readonly Action[];
}

export function offered(text: string, only: readonly string[] | null = null, canCreate = true): Offered {
  const { farm, cursors } = marked(text);
  const [from, to = from] = cursors;
  if (!from || !to) throw new Error("| marks the cursor");
  const selection = { file: from.file, from, to };
  return { farm, actions: inOneGo(actionsAt({ farm, selection, canCreate, now: farm.moment.at }, only)) };
}

export const titlesAt = (text: string, only: readonly string[] | null = null, canCreate = true): string[] =>
  offered(text, only, canCreate).actions.map(({ title }) => title);

/** All texts of a farm after an action. */
export function textsAfter(farm: Farm, action: Action): Map<string, string> {
  const { edits, created } = action.edit();
  const texts = new Map(farm.texts);
  for (const file of new Set(edits.map((edit) => edit.file))) {
    const text = farm.texts.get(file);
    if (text === undefined) throw new Error(`${file} is no file of the farm`);
    const own = edits.filter((edit) => edit.file === file);
    texts.set(
      file,
      applied(
        text,
        own.map((edit) => (isTextEdit(edit) ? edit : overLines(text, edit))),
      ),
    );
  }
  for (const { file, text } of created) {
    if (texts.has(file)) throw new Error(`${file} is there already`);
    texts.set(file, text);
  }
  return texts;
}

/** The farm after the action with this title, written as the given one was: one file plainly, several with their names. */
export function textAfter(text: string, title: string, canCreate = true): string {
  const { farm, actions } = offered(text, null, canCreate);
  const found = actions.find((action) => action.title === title);
  if (!found) throw new Error(`no ${title} among\n${actions.map((each) => each.title).join("\n")}`);
  const texts = textsAfter(farm, found);
  if (texts.size === 1) return [...texts.values()][0]!;
  return [...texts].map(([file, changed]) => `// file: ${file}\n${changed}`).join("");
}

/** The farm after an action; only what changed is walked again. */
export function walkedAfter(farm: Farm, action: Action): Farm {
  const changed = [...textsAfter(farm, action)].filter(([file, text]) => farm.texts.get(file) !== text);
  return advance(farm, new Map(changed.map(([file, text]) => [file, { text }])), farm.moment);
}
