/** What a report covers: the whole farm, a path of it, one system. Narrows what is told, never what is read. */
import type { Problem } from "../checks/problem.ts";
import type { System } from "../culture/model.ts";
import type { Farm } from "../farm.ts";

export interface Scope {
  /** Paths from the farm's folder; an empty one is all of it. */
  readonly paths: readonly string[];
  /** A system's name; null for all. */
  readonly system: string | null;
}

export const wholeFarm: Scope = { paths: [""], system: null };

const isUnder = (file: string, path: string): boolean =>
  path === "" || file === path || file.startsWith(`${path}/`);

export const covers = ({ paths }: Scope, file: string): boolean => paths.some((path) => isUnder(file, path));

/** A system is told of where its section or its log stands under a path asked for. */
export const coversSystem = (scope: Scope, system: System): boolean =>
  (scope.system === null || scope.system === system.name) &&
  [system.place.file, ...system.logFiles].some((file) => covers(scope, file));

/** The solutions that the systems told of use, or that stand under a path asked for. */
export function solutionsIn(scope: Scope, farm: Farm): ReadonlySet<string> {
  const { systems, solutions } = farm.bound.model;
  const used = new Set<string>();
  for (const system of systems.values())
    if (coversSystem(scope, system)) for (const ref of usedBy(system)) used.add(ref);
  if (scope.system === null)
    for (const solution of solutions.values()) if (covers(scope, solution.place.file)) used.add(solution.ref);
  return used;
}

function usedBy(system: System): string[] {
  const sources = [...system.facts.sources.values()].flatMap((history) =>
    history.map(({ value }) => value.solution),
  );
  const topOffs = system.facts.topOff.flatMap(({ value }) => value.solution ?? []);
  const given = system.events.flatMap((event) => {
    if (event.kind === "gave") return event.doses.map(({ solution }) => solution);
    return event.kind === "topped" && event.solution ? [event.solution] : [];
  });
  return [...sources, ...topOffs, ...given];
}

/** The problems under the paths asked for; of one system those that name it or stand in what it uses. */
export function problemsIn(scope: Scope, farm: Farm): Problem[] {
  const inPaths = farm.problems.filter(({ place }) => covers(scope, place.file));
  if (scope.system === null) return inPaths;
  const files = new Set<string>();
  for (const system of farm.bound.model.systems.values()) {
    if (coversSystem(scope, system))
      for (const file of [system.place.file, ...system.logFiles]) addWithUsed(farm, file, files);
  }
  return inPaths.filter(
    ({ system, place }) => system === scope.system || (system === null && files.has(place.file)),
  );
}

/** A file and all that it uses: what is wrong there touches the systems that stand in it. */
function addWithUsed(farm: Farm, file: string, files: Set<string>): void {
  if (files.has(file)) return;
  files.add(file);
  for (const used of farm.bound.uses.get(file) ?? []) addWithUsed(farm, used, files);
}
