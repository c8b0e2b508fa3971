/**
 * The farms of a client's folders and open documents. What is open wins over what is on disk; a document belongs to
 * the farm that its path says, one without a path is a farm of its own.
 */
import { basename, join } from "node:path";
import { farmOfFile, farmPage, farmsBelow, isInside, pathIn, readFarm, realPlace } from "../environment.ts";
import type { FileChange } from "../farm.ts";
import { changed, type TextChange } from "./buffers.ts";
import {
  filesOf,
  forget,
  type HeldFarm,
  holdFarm,
  type Look,
  lookOf,
  putOpen,
  rereadFile,
  rereadFolder,
  type WorkspaceListener,
} from "./held-farm.ts";
import type { Encoding } from "./positions.ts";
import { pathOf } from "./uris.ts";

export type { Look } from "./held-farm.ts";

/** A document's place. */
export interface LookAt extends Look {
  readonly file: string;
}

interface Placed {
  readonly held: HeldFarm;
  readonly file: string;
}

export type Workspace = ReturnType<typeof makeWorkspace>;

export function makeWorkspace(encoding: Encoding, listener: WorkspaceListener) {
  const farms = new Map<string, Promise<HeldFarm>>();
  /** Open documents, each with its farm. */
  const documents = new Map<string, Promise<Placed>>();
  /** Work on documents that isn't done yet. */
  const underWay = new Set<Promise<unknown>>();
  let folders: readonly string[] = [];
  let ready: Promise<void> = Promise.resolve();
  /** The farms of the client's folders. */
  let ofFolders = new Set<string>();

  function hold(
    key: string,
    spelling: string | null,
    read: () => Promise<ReadonlyMap<string, FileChange>>,
  ): Promise<HeldFarm> {
    const known = farms.get(key);
    if (known) return known;
    const held = (async () => {
      const made = holdFarm(key, spelling, listener);
      made.walk.change(await read());
      return made;
    })();
    farms.set(key, held);
    return held;
  }

  const holdFolder = (root: string, spelling: string) => hold(root, spelling, () => readFarm(root));

  /** The farm of a document, and its file there. */
  async function place(uri: string): Promise<Placed> {
    const path = pathOf(uri);
    const found = path?.endsWith(".marl") ? await farmOfFile(path, folders) : null;
    if (path === null || found === null) {
      const held = await hold(uri, null, async () => new Map());
      return { held, file: basename(path ?? uri) || "document.marl" };
    }
    const { root, asked } = found;
    const spelling = path.endsWith(`/${asked}`) ? path.slice(0, -asked.length - 1) : root;
    return { held: await holdFolder(root, spelling || "/"), file: asked };
  }

  /** Where a document is among the farms that are held: a question makes none. */
  async function find(uri: string): Promise<Placed | null> {
    const open = documents.get(uri);
    if (open) return open;
    const path = pathOf(uri);
    if (path === null) return null;
    const real = await realPlace(path);
    for (const held of await heldFarms()) {
      const file = held.spelling === null ? null : pathIn(held.key, real);
      if (file !== null && held.walk.last()?.documents.has(file)) return { held, file };
    }
    return null;
  }

  /**
   * Work on one document is done in the order in which it came; it may give the document another place. `isLast`:
   * nothing more of it has come yet.
   */
  function inTurn(
    uri: string,
    work: (placed: Placed, isLast: () => boolean) => undefined | Promise<Placed | undefined>,
  ): Promise<void> {
    const placed = documents.get(uri) ?? place(uri);
    const isLast = () => documents.get(uri) === after;
    const after = placed.then(async (found) => {
      return (await work(found, isLast)) ?? found;
    });
    documents.set(uri, after);
    return busy(after.then(() => undefined));
  }

  /** A document that isn't open is looked at as any other file. */
  async function closed(uri: string, { held, file }: Placed, isLast: () => boolean): Promise<undefined> {
    held.open.delete(file);
    await rereadFile(held, file);
    if (!isLast()) return undefined;
    documents.delete(uri);
    letGo(held);
    return undefined;
  }

  function busy(work: Promise<void>): Promise<void> {
    underWay.add(work);
    return work.catch(listener.failed).finally(() => underWay.delete(work));
  }

  /** A question about one document is answered after all that was said of others before it. */
  const arrived = () => Promise.allSettled(underWay);

  async function holdFolders(): Promise<void> {
    const roots = new Map<string, string>();
    for (const path of folders) {
      const real = await realPlace(path);
      for (const root of await farmsBelow(path)) {
        const inside = pathIn(real, root);
        roots.set(root, inside === null ? root : join(path, inside));
      }
    }
    ofFolders = new Set(roots.keys());
    for (const [root, spelling] of roots) await holdFolder(root, spelling);
    for (const held of await heldFarms()) letGo(held);
  }

  /** A farm of no folder is kept while one of its documents is open. */
  function letGo(held: HeldFarm): void {
    if (held.open.size > 0 || ofFolders.has(held.key)) return;
    farms.delete(held.key);
    forget(held);
  }

  /** Looks again which farms there are, what is in them, and to which each open document belongs. */
  async function rearrange(): Promise<void> {
    const moved = [...documents.keys()].map((uri) =>
      inTurn(uri, async (placed, isLast) => {
        const { held, file } = placed;
        const open = held.open.get(file);
        if (!open) return closed(uri, placed, isLast);
        if (held.spelling === null) return placed;
        const next = await place(uri);
        if (next.held === held) return placed;
        held.open.delete(file);
        putOpen(next.held, next.file, open);
        return next;
      }),
    );
    await Promise.all(moved);
    for (const held of await heldFarms()) await rereadFolder(held);
    await holdFolders();
  }

  const heldFarms = (): Promise<HeldFarm[]> => Promise.all(farms.values());

  return {
    /** The client's folders; their farms are read once `after` has come about. */
    setFolders: (paths: readonly string[], after: Promise<void>): Promise<void> => {
      folders = paths;
      ready = Promise.all([ready, after]).then(holdFolders).catch(listener.failed);
      return ready;
    },
    open: (uri: string, version: number, text: string) =>
      inTurn(uri, ({ held, file }) => {
        putOpen(held, file, { uri, version, text });
        return undefined;
      }),
    change: (uri: string, version: number, changes: readonly TextChange[]) =>
      inTurn(uri, (placed, isLast) => {
        const { held, file } = placed;
        const before = held.open.get(file);
        if (!before) return closed(uri, placed, isLast);
        putOpen(held, file, { uri, version, text: changed(before.text, changes, encoding) });
        return undefined;
      }),
    close: (uri: string) => inTurn(uri, (placed, isLast) => closed(uri, placed, isLast)),
    /** For a client that watches no files: whenever it opens or saves a document, everything is looked at. */
    refresh: () => busy(ready.then(rearrange)),
    /** Files and folders that changed on disk, by path. */
    touched: (paths: readonly string[]): Promise<void> =>
      busy(
        (async () => {
          await ready;
          const touched = await Promise.all(paths.map(realPlace));
          const held = await heldFarms();
          const known = held.flatMap(({ key, walk }) => filesOf(walk.last()).map((file) => join(key, file)));
          const isFolder = (path: string) =>
            !path.endsWith(".marl") && known.some((file) => isInside(path, file));
          if (touched.some((path) => basename(path) === farmPage || isFolder(path))) return rearrange();
          for (const path of touched.filter((each) => each.endsWith(".marl")))
            for (const each of held) {
              const file = each.spelling === null ? null : pathIn(each.key, path);
              if (file !== null) await rereadFile(each, file);
            }
        })(),
      ),
    lookAgain: async (): Promise<void> => {
      for (const held of await heldFarms()) held.walk.lookAgain();
    },
    /** The farm of a document with everything walked that has arrived; null of one that nobody knows. */
    look: async (uri: string): Promise<LookAt | null> => {
      await arrived();
      const found = (await find(uri)) ?? (await ready.then(() => find(uri)));
      if (!found) return null;
      const farm = await found.held.walk.settled();
      return { ...lookOf(found.held, farm), file: found.file };
    },
    looks: async (): Promise<Look[]> => {
      await Promise.all([ready, arrived()]);
      const held = await heldFarms();
      return Promise.all(held.map(async (each) => lookOf(each, await each.walk.settled())));
    },
  };
}
