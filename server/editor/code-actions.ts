/** Everything that can be done at a place, in the order in which it is offered. */
import type { Action, ActionKind, Asked, FindActions, FindInSteps } from "./code-actions/action.ts";

import { converting } from "./code-actions/convert-unit.ts";
import { fixAll, fixes } from "./code-actions/fixes.ts";
import { moving } from "./code-actions/move-section.ts";
import { quieting } from "./code-actions/quiet.ts";
import { recording } from "./code-actions/record-reading.ts";
import { sorting } from "./code-actions/sort-log.ts";
import { splitting } from "./code-actions/split-log.ts";
import { tidying } from "./code-actions/tidy.ts";
import { planning } from "./code-actions/write-plan.ts";

export { type Action, type Asked, actionKinds } from "./code-actions/action.ts";

interface Sort {
  readonly kinds: readonly ActionKind[];
  readonly find: FindActions | FindInSteps;
}

const sorts: readonly Sort[] = [
  { kinds: ["quickfix"], find: fixes },
  { kinds: ["quickfix"], find: quieting },
  { kinds: ["refactor.rewrite"], find: converting },
  { kinds: ["refactor.rewrite"], find: sorting },
  { kinds: ["refactor.move"], find: moving },
  { kinds: ["refactor.move"], find: splitting },
  { kinds: ["source.recordReading"], find: recording },
  { kinds: ["source.writePlan"], find: planning },
  { kinds: ["source.fixAll.marl"], find: fixAll },
  { kinds: ["source.tidy"], find: tidying },
];

/** True where a kind is one of those asked for, or a part of one; all are where none is named. */
const isAskedFor = (kind: ActionKind, only: readonly string[] | null): boolean =>
  only === null || only.some((asked) => asked === "" || kind === asked || kind.startsWith(`${asked}.`));

/** The actions at a selection, of the kinds asked for. Pauses now and then. */
export function* actionsAt(asked: Asked, only: readonly string[] | null): Generator<void, readonly Action[]> {
  const actions: Action[] = [];
  for (const { kinds, find } of sorts) {
    if (!kinds.some((kind) => isAskedFor(kind, only))) continue;
    const found = find(asked);
    actions.push(...("next" in found ? yield* found : found));
    yield;
  }
  return actions;
}
