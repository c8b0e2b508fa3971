/** One farm that is held in memory: its walk, its open documents, and what is taken in again from disk. */
import { join } from "node:path";
import { exists, readFarm, readFileOf } from "../environment.ts";
import type { Farm, FileChange, Moment, Progress } from "../farm.ts";
import type { OpenText } from "./buffers.ts";
import { type FarmWalk, walkFarm } from "./farm-walk.ts";
import { uriOf } from "./uris.ts";

/** A farm as it is looked at, with the names that the client has for its files. */
export interface Look {
  readonly farm: Farm;
  readonly key: string;
  readonly uriOf: (file: string) => string;
  /** The version of a file that is open; null of one that isn't. */
  readonly versionOf: (file: string) => number | null;
  readonly isOpen: (file: string) => boolean;
}

export interface HeldFarm {
  /** The real path of its folder, or the URI of a document without one. */
  readonly key: string;
  /** The folder as the client spells it, which may lead over links; null of a document without one. */
  readonly spelling: string | null;
  readonly walk: FarmWalk;
  /** Open documents by file. */
  readonly open: Map<string, OpenText>;
  /** True once it was let go: what was still being read of it counts no more. */
  isForgotten: boolean;
}

export interface WorkspaceListener {
  readonly moment: () => Moment;
  readonly walked: (look: Look, changed: ReadonlySet<string>) => void;
  readonly progress: (key: string, progress: Progress | null) => void;
  /** Work that went wrong, which must not take the rest with it. */
  readonly failed: (error: unknown) => void;
}

export function holdFarm(key: string, spelling: string | null, listener: WorkspaceListener): HeldFarm {
  const held: HeldFarm = {
    key,
    spelling,
    open: new Map(),
    isForgotten: false,
    walk: walkFarm({
      moment: listener.moment,
      walked: (farm, changed) => listener.walked(lookOf(held, farm), changed),
      failed: listener.failed,
      progress: (progress) => listener.progress(key, progress),
    }),
  };
  return held;
}

export const lookOf = ({ key, spelling, open }: HeldFarm, farm: Farm): Look => ({
  farm,
  key,
  uriOf: (file) => open.get(file)?.uri ?? (spelling === null ? key : uriOf(join(spelling, file))),
  versionOf: (file) => open.get(file)?.version ?? null,
  isOpen: (file) => open.has(file),
});

/** The text of an open document is what its file holds now. */
export function putOpen({ open, walk }: HeldFarm, file: string, document: OpenText): void {
  open.set(file, document);
  walk.change([[file, textChange(document.text)]]);
}

/** Takes in one file again, unless it is open. */
export async function rereadFile(held: HeldFarm, file: string): Promise<void> {
  if (held.open.has(file) || held.spelling === null) return;
  const change = await readFileOf(held.key, file);
  if (held.isForgotten || held.open.has(file) || isSame(held.walk.last(), file, change)) return;
  held.walk.change([[file, change]]);
}

/** Takes in the whole folder again, but for what is open. A folder that is gone holds nothing. */
export async function rereadFolder(held: HeldFarm): Promise<void> {
  if (held.spelling === null) return;
  const found = (await exists(held.key)) ? await readFarm(held.key) : new Map<string, FileChange>();
  const farm = held.walk.last();
  const gone = filesOf(farm)
    .filter((file) => !found.has(file))
    .map((file): [string, FileChange] => [file, null]);
  const changes = [...found, ...gone].filter(
    ([file, change]) => !held.open.has(file) && !isSame(farm, file, change),
  );
  if (changes.length > 0 && !held.isForgotten) held.walk.change(changes);
}

/** Forgets all that a farm holds, so that nothing is told of it any more. */
export function forget(held: HeldFarm): void {
  held.isForgotten = true;
  held.walk.change(filesOf(held.walk.last()).map((file) => [file, null]));
}

/** Every name that a farm has something under. */
export const filesOf = (farm: Farm | null): readonly string[] =>
  farm ? [...farm.texts.keys(), ...farm.unreadable.keys(), ...farm.links.keys()] : [];

const textChange = (text: string): FileChange =>
  text.includes("\0") ? { unreadable: "it isn't text" } : { text };

function isSame(farm: Farm | null, file: string, change: FileChange): boolean {
  if (!farm) return false;
  if (change === null) return !filesOf(farm).includes(file);
  if ("text" in change) return farm.texts.get(file) === change.text;
  return "unreadable" in change
    ? farm.unreadable.get(file) === change.unreadable
    : farm.links.get(file) === change.linkTo;
}
