/** What `marl check --fix` does: the safe fixes of a farm's problems, in its files, until none is left. */
import { join } from "node:path";
import { applySafeFixes, type FixNote } from "../checks/apply-fixes.ts";
import { writeWhole } from "../environment.ts";
import { advance, type Farm } from "../farm.ts";
import { problemsIn, type Scope } from "../report/scope.ts";
import type { OpenFarm } from "./open-farm.ts";

/** A fix may bring another problem to light. More rounds than this no line has needed. */
const mostRounds = 10;

export interface FixedFarm {
  readonly farm: Farm;
  readonly done: readonly FixNote[];
  readonly skipped: readonly FixNote[];
  /** Why a file couldn't be written; then the files before it were, and those after it weren't. */
  readonly failed: string | null;
}

/** Mends what can be mended of the problems in scope, and writes each file that changed, whole or not at all. */
export async function fixFarm({ farm: before, root, scope }: OpenFarm): Promise<FixedFarm> {
  const { farm, done, skipped } = mended(before, scope);
  const changed = [...farm.texts].filter(([file, text]) => before.texts.get(file) !== text);
  for (const [index, [file, text]] of changed.entries()) {
    const written = await writeWhole(join(root, file), text, true);
    if (!written.ok) {
      const names = new Set(changed.slice(0, index).map(([name]) => name));
      return { farm, done: done.filter((note) => names.has(note.file)), skipped: [], failed: written.reason };
    }
  }
  return { farm, done, skipped, failed: null };
}

function mended(before: Farm, scope: Scope): Omit<FixedFarm, "failed"> {
  const done: FixNote[] = [];
  let farm = before;
  for (let round = 0; ; round += 1) {
    const fixed = applySafeFixes(farm.texts, problemsIn(scope, farm));
    if (fixed.texts.size === 0 || round === mostRounds) return { farm, done, skipped: fixed.skipped };
    done.push(...fixed.done);
    farm = advance(farm, new Map([...fixed.texts].map(([file, text]) => [file, { text }])), farm.moment);
  }
}

export const fixText = ({ file, line, title }: FixNote): string => `${file}:${line + 1} ${title}\n`;
