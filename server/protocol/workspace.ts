/**
 * The farms of a client's folders and open documents. What is open wins over what is on disk; a document belongs to
 * the farm that its path says, one without a path is a farm of its own.
 */
import { basename, join } from "node:path";
import { farmOfFile, farmsBelow, isInside, pathIn, readFarm, readFileOf, realPlace } from "../environment.ts";
import type { Farm, FileChange, Moment, Progress } from "../farm.ts";
import { changed, type OpenText, type TextChange } from "./buffers.ts";
import { type FarmWalk, walkFarm } from "./farm-walk.ts";
import type { Encoding } from "./positions.ts";
import { pathOf, uriOf } from "./uris.ts";

/** A farm as it is looked at, with the names that the client has for its files. */
export interface Look {
  readonly farm: Farm;
  readonly key: string;
  readonly uriOf: (file: string) => string;
  /** The version of a file that is open; null of one that isn't. */
  readonly versionOf: (file: string) => number | null;
  readonly isOpen: (file: string) => boolean;
}

/** A document's place. */
export interface LookAt extends Look {
  readonly file: string;
}

interface HeldFarm {
  /** The real path of its folder, or the URI of a document without a path. */
  readonly key: string;
  /** As the client spells it, which may lead over links. */
  readonly spelling: string;
  readonly walk: FarmWalk;
  /** Open documents by file. */
  readonly open: Map<string, OpenText>;
}

export interface WorkspaceListener {
  readonly moment: () => Moment;
  readonly walked: (look: Look, before: Farm | null, changed: ReadonlySet<string>) => void;
  readonly progress: (key: string, progress: Progress | null) => void;
}

export type Workspace = ReturnType<typeof makeWorkspace>;

export function makeWorkspace(encoding: Encoding, listener: WorkspaceListener) {
  const farms = new Map<string, Promise<HeldFarm>>();
  const documents = new Map<string, Promise<{ readonly held: HeldFarm; readonly file: string } | null>>();
  /** Work on documents that isn't done yet. */
  const underWay = new Set<Promise<unknown>>();
  let folders: readonly string[] = [];
  let ready: Promise<void> = Promise.resolve();
  /** The farms of the client's folders. */
  let ofFolders = new Set<string>();

  const lookOf = (held: HeldFarm, farm: Farm): Look => ({
    farm,
    key: held.key,
    uriOf: (file) => held.open.get(file)?.uri ?? uriOf(join(held.spelling, file)),
    versionOf: (file) => held.open.get(file)?.version ?? null,
    isOpen: (file) => held.open.has(file),
  });

  function hold(key: string, spelling: string, read: () => Promise<ReadonlyMap<string, FileChange>>) {
    const known = farms.get(key);
    if (known) return known;
    const held = (async (): Promise<HeldFarm> => {
      const made: HeldFarm = {
        key,
        spelling,
        open: new Map(),
        walk: walkFarm({
          moment: listener.moment,
          walked: (farm, before, files) => listener.walked(lookOf(made, farm), before, files),
          progress: (progress) => listener.progress(key, progress),
        }),
      };
      made.walk.change(await read());
      return made;
    })();
    farms.set(key, held);
    return held;
  }

  const holdFolder = (root: string, spelling: string) => hold(root, spelling, () => readFarm(root));

  /** The farm of a document, and its file there. */
  async function place(uri: string) {
    const path = pathOf(uri);
    const found = path?.endsWith(".marl") ? await farmOfFile(path, folders) : null;
    if (path === null || found === null) {
      const held = await hold(uri, uri, async () => new Map());
      return { held, file: basename(path ?? uri) || "document.marl" };
    }
    const { root, asked } = found;
    const spelling = path.endsWith(`/${asked}`) ? path.slice(0, -asked.length - 1) : root;
    return { held: await holdFolder(root, spelling || "/"), file: asked };
  }

  const placed = (uri: string) => documents.get(uri) ?? place(uri);

  function put(held: HeldFarm, file: string, open: OpenText): void {
    held.open.set(file, open);
    held.walk.change([[file, textChange(open.text)]]);
  }

  /** Work on one document is done in the order in which it came. */
  const inTurn = (uri: string, work: (held: HeldFarm, file: string) => void | Promise<void>) => {
    const before = placed(uri);
    const after = before.then(async (found) => {
      if (found) await work(found.held, found.file);
      return found;
    });
    documents.set(uri, after);
    underWay.add(after);
    void after.finally(() => underWay.delete(after));
    return after;
  };

  /** A question about one document is answered after all that was said of others before it. */
  const arrived = () => Promise.all(underWay);

  /** What is open isn't read from disk. */
  async function reread(held: HeldFarm, file: string): Promise<void> {
    if (held.open.has(file)) return;
    const change = await readFileOf(held.key, file);
    if (held.open.has(file) || isSame(held.walk.last(), file, change)) return;
    held.walk.change([[file, change]]);
  }

  async function refreshFarm(held: HeldFarm): Promise<void> {
    if (pathOf(held.key) === null && !held.key.startsWith("/") && !/^[A-Za-z]:/.test(held.key)) return;
    const found = await readFarm(held.key);
    const farm = held.walk.last();
    const known = farm ? [...farm.texts.keys(), ...farm.unreadable.keys(), ...farm.links.keys()] : [];
    const gone = known.filter((file) => !found.has(file)).map((file): [string, FileChange] => [file, null]);
    const changes = [...found, ...gone].filter(
      ([file, change]) => !held.open.has(file) && !isSame(farm, file, change),
    );
    if (changes.length > 0) held.walk.change(changes);
  }

  async function holdFolders(paths: readonly string[]): Promise<void> {
    ofFolders = new Set();
    for (const path of paths) {
      const real = await realPlace(path);
      for (const root of await farmsBelow(path)) {
        const inside = pathIn(real, root);
        ofFolders.add(root);
        await holdFolder(root, inside === null ? root : join(path, inside));
      }
    }
  }

  /** A farm of no folder is kept while one of its documents is open. */
  function letGo(held: HeldFarm): void {
    if (held.open.size > 0 || ofFolders.has(held.key)) return;
    farms.delete(held.key);
    const farm = held.walk.last();
    held.walk.change([...(farm?.texts.keys() ?? [])].map((file) => [file, null]));
  }

  const heldFarms = (): Promise<HeldFarm[]> => Promise.all(farms.values());

  return {
    /** The client's folders; their farms are read once `after` has come about. */
    setFolders: (paths: readonly string[], after: Promise<void>): Promise<void> => {
      folders = paths;
      ready = Promise.all([ready, after]).then(async () => {
        await holdFolders(paths);
        for (const held of await heldFarms()) letGo(held);
      });
      return ready;
    },
    open: (uri: string, version: number, text: string) =>
      inTurn(uri, (held, file) => put(held, file, { uri, version, text })),
    change: (uri: string, version: number, changes: readonly TextChange[]) =>
      inTurn(uri, (held, file) => {
        const before = held.open.get(file);
        if (before) put(held, file, { uri, version, text: changed(before.text, changes, encoding) });
      }),
    close: (uri: string) =>
      inTurn(uri, async (held, file) => {
        held.open.delete(file);
        documents.delete(uri);
        if (held.key !== uri) await reread(held, file);
        letGo(held);
      }),
    /** A client that watches no files has the farm looked at whenever it opens or saves one of its documents. */
    refresh: (uri: string) => inTurn(uri, (held) => refreshFarm(held)),
    /** Files that changed on disk, by path. */
    touched: async (paths: readonly string[]): Promise<void> => {
      for (const path of paths) {
        const real = await realPlace(path);
        for (const held of await heldFarms()) {
          const file = isInside(held.key, real) ? pathIn(held.key, real) : null;
          if (file === null) continue;
          if (real.endsWith(".marl")) await reread(held, file);
          else await refreshFarm(held);
        }
      }
    },
    lookAgain: async (): Promise<void> => {
      for (const held of await heldFarms()) held.walk.lookAgain();
    },
    /** The farm of a document with everything walked that has arrived; null of one that nobody knows. */
    look: async (uri: string): Promise<LookAt | null> => {
      await arrived();
      const found = await placed(uri);
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

const textChange = (text: string): FileChange =>
  text.includes("\0") ? { unreadable: "it isn't text" } : { text };

function isSame(farm: Farm | null, file: string, change: FileChange): boolean {
  if (!farm) return false;
  if (change === null) return !farm.texts.has(file) && !farm.unreadable.has(file) && !farm.links.has(file);
  if ("text" in change) return farm.texts.get(file) === change.text;
  return "unreadable" in change
    ? farm.unreadable.get(file) === change.unreadable
    : farm.links.get(file) === change.linkTo;
}
