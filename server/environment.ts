/** Files and clock: the only door to the outside. Finds a farm, reads its files, writes where it is told to. */
import { randomBytes } from "node:crypto";
import {
  access,
  chmod,
  constants,
  lstat,
  readdir,
  readFile,
  realpath,
  rename,
  rm,
  stat,
  writeFile,
} from "node:fs/promises";
import { basename, dirname, isAbsolute, join, relative, resolve, sep } from "node:path";
import type { FileChange } from "./farm.ts";

/** A farm on disk: its folder, and for a path asked about, where that lies in it. */
export interface FarmOnDisk {
  readonly root: string;
  /** Relative to the root with `/`; empty for the whole farm. */
  readonly asked: string;
}

export type Found<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly reason: string };

/** The page that makes a folder a farm. */
export const farmPage = "farm.marl";
const isMarl = (name: string): boolean => name.endsWith(".marl");

/**
 * The farm that a path belongs to: the nearest folder upward with a `farm.marl`, else the nearest with `.git`,
 * else the innermost of these folders that holds it, else the path itself or its folder.
 */
export async function findFarm(path: string, folders: readonly string[] = []): Promise<Found<FarmOnDisk>> {
  let real: string;
  let isFolder: boolean;
  try {
    real = await realpath(resolve(path));
    isFolder = (await stat(real)).isDirectory();
  } catch {
    return { ok: false, reason: `${path} can't be read` };
  }
  if (!isFolder && !isMarl(real)) return { ok: false, reason: `${path} is no .marl file` };
  const folder = isFolder ? real : dirname(real);
  const marked = (await nearestHolding(folder, farmPage)) ?? (await nearestHolding(folder, ".git"));
  const root = marked ?? (await innermostOf(folders, folder)) ?? folder;
  return { ok: true, value: { root, asked: slashed(relative(root, real)) } };
}

/**
 * The farm of a file that may not be there yet, and where in it that is or would be; null where not even its folder
 * is there.
 */
export async function farmOfFile(path: string, folders: readonly string[]): Promise<FarmOnDisk | null> {
  const real = await realPlace(resolve(path));
  const found = await findFarm(dirname(real), folders);
  if (!found.ok) return null;
  const { root } = found.value;
  return { root, asked: slashed(relative(root, real)) };
}

/** The farms below a folder that have a page of their own, and the folder's own first. */
export async function farmsBelow(folder: string): Promise<readonly string[]> {
  const found = await findFarm(folder, [folder]);
  if (!found.ok) return [];
  const roots = new Set([found.value.root]);
  await addFarmsBelow(await realPlace(folder), roots);
  return [...roots];
}

/** Level by level, so that where there are too many folders the deepest are left out. */
async function addFarmsBelow(top: string, roots: Set<string>): Promise<void> {
  const waiting = [top];
  for (let seen = 0; seen < mostFolders && waiting.length > 0; seen += 1) {
    const folder = waiting.shift()!;
    const entries = await readdir(folder, { withFileTypes: true }).catch(() => []);
    if (entries.some(({ name }) => name === farmPage)) roots.add(folder);
    for (const entry of entries)
      if (entry.isDirectory() && isLookedInto(entry.name)) waiting.push(join(folder, entry.name));
  }
}

const isLookedInto = (folder: string): boolean => !folder.startsWith(".") && folder !== "node_modules";

/** A farm has not so many; someone who opens a whole disk doesn't want it read. */
const mostFolders = 2000;

/** What one file of a farm is now; null where it isn't there. */
export async function readFileOf(root: string, file: string): Promise<FileChange> {
  const path = join(root, file);
  const kind = await lstat(path).catch(() => null);
  if (kind?.isFile() && isMarl(file)) return readText(path);
  if (!kind?.isSymbolicLink()) return null;
  const target = await insideOf(root, path);
  return target === null ? null : { linkTo: target };
}

/** Where a file that isn't there yet would be: its folder's real place, with its name. */
export async function realPlace(path: string): Promise<string> {
  const real = await realpath(path).catch(() => null);
  if (real !== null || dirname(path) === path) return real ?? path;
  return join(await realPlace(dirname(path)), basename(path));
}

async function innermostOf(folders: readonly string[], folder: string): Promise<string | null> {
  const real = await Promise.all(folders.map(realPlace));
  const holding = real.filter((each) => isInside(each, folder));
  return holding.sort((left, right) => right.length - left.length)[0] ?? null;
}

/** True where a path is a folder or lies in it. */
export function isInside(folder: string, path: string): boolean {
  const way = relative(folder, path);
  return way === "" || !(way === ".." || way.startsWith(`..${sep}`) || isAbsolute(way));
}

const slashed = (path: string): string => path.split(sep).join("/");

/** Where a path lies in a folder, with `/`; null where it doesn't. */
export const pathIn = (folder: string, path: string): string | null =>
  isInside(folder, path) ? slashed(relative(folder, path)) : null;

async function nearestHolding(folder: string, name: string): Promise<string | null> {
  for (let here = folder; ; here = dirname(here)) {
    if (await exists(join(here, name))) return here;
    if (dirname(here) === here) return null;
  }
}

/** True where something is at a path. */
export const exists = (path: string): Promise<boolean> =>
  access(path).then(
    () => true,
    () => false,
  );

/**
 * All files of a farm with their texts. Dot-folders and `node_modules` are left out, a folder below with a
 * `farm.marl` of its own is another farm. A link to a place inside the farm is another name for it, one that
 * leads out isn't followed. Of more than 2000 folders the deepest are left out.
 */
export async function readFarm(root: string): Promise<ReadonlyMap<string, FileChange>> {
  const files = new Map<string, FileChange>();
  const waiting = [""];
  for (let seen = 0; seen < mostFolders && waiting.length > 0; seen += 1)
    waiting.push(...(await readFolder(root, waiting.shift()!, files)));
  return files;
}

/** Adds the files of one folder; gives the folders in it that are to be looked into. */
async function readFolder(
  root: string,
  folder: string,
  files: Map<string, FileChange>,
): Promise<readonly string[]> {
  let names: string[];
  try {
    names = (await readdir(join(root, folder))).sort();
  } catch {
    files.set(folder, { unreadable: "this folder can't be opened" });
    return [];
  }
  if (folder !== "" && names.includes(farmPage)) return [];
  const folders: string[] = [];
  for (const name of names) {
    const path = folder === "" ? name : `${folder}/${name}`;
    const kind = await lstat(join(root, path)).catch(() => null);
    if (kind?.isDirectory()) {
      if (isLookedInto(name)) folders.push(path);
    } else if (kind?.isFile() && isMarl(name)) files.set(path, await readText(join(root, path)));
    else if (kind?.isSymbolicLink()) {
      const target = await insideOf(root, join(root, path));
      if (target !== null) files.set(path, { linkTo: target });
    }
  }
  return folders;
}

/** Where in the farm a link leads, with `/`; null where it leads out or nowhere. */
async function insideOf(root: string, link: string): Promise<string | null> {
  const target = await realpath(link).catch(() => null);
  if (target === null) return null;
  const path = pathIn(root, target);
  return path === "" ? null : path;
}

/**
 * What a path names, by the path that opens it: the file itself, or all files of a folder as if it were a farm of
 * its own, so that a farm inside it is left out unless it is named.
 */
export async function readPath(path: string): Promise<Found<ReadonlyMap<string, FileChange>>> {
  const kind = await stat(path).catch(() => null);
  if (!kind) return { ok: false, reason: `${path} can't be read` };
  if (kind.isDirectory()) {
    const files = [...(await readFarm(path))].map(([name, file]) => [join(path, name), file] as const);
    return files.length > 0
      ? { ok: true, value: new Map(files) }
      : { ok: false, reason: `${path} holds no .marl file` };
  }
  if (!isMarl(path)) return { ok: false, reason: `${path} is no .marl file` };
  return { ok: true, value: new Map([[path, await readText(path)]]) };
}

const utf8 = new TextDecoder("utf-8", { fatal: true, ignoreBOM: true });

async function readText(path: string): Promise<FileChange> {
  let bytes: Buffer;
  try {
    bytes = await readFile(path);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    return { unreadable: code === "EACCES" ? "no permission to read it" : "it can't be read" };
  }
  return textOf(bytes);
}

/** The text that bytes hold, with its byte order mark. */
export function textOf(bytes: Uint8Array): { readonly text: string } | { readonly unreadable: string } {
  try {
    const text = utf8.decode(bytes);
    return text.includes("\0") ? { unreadable: "it isn't text" } : { text };
  } catch {
    return { unreadable: "it isn't UTF-8 text" };
  }
}

/**
 * Writes a file whole or not at all, and never over another unless asked to. One written over keeps its mode; a
 * link stays one, and what it leads to is written.
 */
export async function writeWhole(path: string, text: string, replace: boolean): Promise<Found<null>> {
  const before = await stat(path).catch(() => null);
  if (before?.isDirectory()) return { ok: false, reason: `${path} is a folder` };
  if (!replace && (await exists(path)))
    return { ok: false, reason: `${path} exists; --replace writes over it` };
  const place = await realpath(path).catch(() => path);
  const beside = join(dirname(place), `.${basename(place)}.${randomBytes(6).toString("hex")}`);
  try {
    // Putting another in its place would go round a file's being for reading only.
    if (before) await access(place, constants.W_OK);
    await writeFile(beside, text, { flag: "wx" });
    if (before) await chmod(beside, before.mode & 0o7777);
    await rename(beside, place);
    return { ok: true, value: null };
  } catch (error) {
    await rm(beside, { force: true }).catch(() => undefined);
    return { ok: false, reason: `${path} can't be written: ${whyNot(error as NodeJS.ErrnoException)}` };
  }
}

const reasons: Readonly<Record<string, string>> = {
  ENOENT: "there is no such folder",
  ENOTDIR: "there is no such folder",
  EACCES: "no permission to write there",
  EPERM: "no permission to write there",
  EROFS: "nothing can be written there",
  ENOSPC: "no room is left",
};

const whyNot = ({ code }: NodeJS.ErrnoException): string =>
  reasons[code ?? ""] ?? `the system says ${code ?? "no"}`;

/** The wall clock now, in minutes since 1970-01-01 as written without a zone. */
export function clockNow(now = new Date()): number {
  return Math.floor(now.getTime() / 60_000) - now.getTimezoneOffset();
}
