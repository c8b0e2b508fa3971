/** Opens the farm that some paths belong to, and takes the walk, showing how far it is. */
import { resolve } from "node:path";
import { findFarm, readFarm } from "../environment.ts";
import { advanceBySystem, type Farm, type Moment } from "../farm.ts";
import { covers, type Scope } from "../report/scope.ts";
import type { Outlet } from "./command.ts";

export interface OpenFarm {
  readonly farm: Farm;
  readonly root: string;
  readonly scope: Scope;
}

/** Fewer systems than this are done before anyone reads how far it is. */
const manySystems = 5;

/** The farm of the paths (the folder one stands in, where none is named), or why there is none. */
export async function openFarm(
  paths: readonly string[],
  moment: Moment,
  outlet: Outlet,
): Promise<{ readonly open: OpenFarm } | { readonly reason: string }> {
  const asked: string[] = [];
  let root: string | null = null;
  for (const path of paths.length > 0 ? paths : ["."]) {
    const found = await findFarm(resolve(path));
    if (!found.ok) return { reason: found.reason.replace(resolve(path), path) };
    if (root !== null && root !== found.value.root)
      return { reason: `${path} belongs to another farm; name the paths of one farm at a time` };
    root = found.value.root;
    asked.push(found.value.asked);
  }
  if (root === null) return { reason: "no path was named" };
  const files = await readFarm(root);
  const scope: Scope = { paths: asked, system: null };
  for (const [index, path] of asked.entries()) {
    const single: Scope = { paths: [path], system: null };
    if (![...files.keys()].some((file) => covers(single, file)))
      return { reason: `${paths[index] ?? "."} holds no .marl file` };
  }
  return { open: { farm: walk(files, moment, outlet), root, scope } };
}

function walk(files: Parameters<typeof advanceBySystem>[1], moment: Moment, outlet: Outlet): Farm {
  const steps = advanceBySystem(null, files, moment);
  for (;;) {
    const step = steps.next();
    if (step.done) {
      outlet.progress(null);
      return step.value;
    }
    const { done, of, system } = step.value;
    if (of >= manySystems) outlet.progress(`${done} of ${of} systems: ${system}`);
  }
}
