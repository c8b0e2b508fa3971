/** Files and folders that get another path: `use` lines are mended before, farms looked at again afterwards. */
import {
  FileOperationPatternKind,
  type FileOperationRegistrationOptions,
  type WorkspaceEdit,
} from "vscode-languageserver/node";
import type { LineEdit } from "../../checks/problem.ts";
import { mendedUses, movesOf } from "../../editor/file-rename.ts";
import { pathIn } from "../../environment.ts";
import type { Convert } from "../convert.ts";
import { turn } from "../farm-walk.ts";
import { type Feature, unlessCancelled } from "../session.ts";
import { pathOf } from "../uris.ts";
import type { Look } from "../workspace.ts";

const which: FileOperationRegistrationOptions = {
  filters: [
    { scheme: "file", pattern: { glob: "**/*.marl", matches: FileOperationPatternKind.file } },
    { scheme: "file", pattern: { glob: "**/*", matches: FileOperationPatternKind.folder } },
  ],
};

interface Renaming {
  readonly oldUri: string;
  readonly newUri: string;
}

const isMarl = (path: string): boolean => path.endsWith(".marl");

/** The edits of one farm. */
function editsFor(look: Look, renames: readonly Renaming[]): readonly LineEdit[] {
  const root = pathOf(look.uriOf(""));
  if (root === null) return [];
  const inside = renames.flatMap(({ oldUri, newUri }): [string, string | null][] => {
    const [from, to] = [oldUri, newUri].map((uri) => {
      const path = pathOf(uri);
      return path === null ? null : (pathIn(root, path) ?? pathIn(look.key, path));
    });
    if (!from) return [];
    // Under a name that isn't Marl's a file leaves the farm.
    const leaves = !to || (isMarl(from) && !isMarl(to));
    return [[from, leaves ? null : to]];
  });
  return inside.length === 0 ? [] : mendedUses(look.farm, movesOf(look.farm, inside));
}

function joined(
  convert: Convert,
  looks: readonly Look[],
  renames: readonly Renaming[],
): WorkspaceEdit | null {
  const edits = looks.flatMap((look) => {
    const ofFarm = editsFor(look, renames);
    return ofFarm.length > 0 ? [convert.workspaceEdit(look, ofFarm)] : [];
  });
  if (edits.length === 0) return null;
  const [first] = edits;
  return first!.documentChanges
    ? { documentChanges: edits.flatMap(({ documentChanges }) => documentChanges ?? []) }
    : { changes: Object.assign({}, ...edits.map(({ changes }) => changes)) };
}

export const fileRenameFeature: Feature = {
  title: "File and folder rename",
  about: "`use` lines follow a file or folder that gets another path",
  offers: ({ fileRenames: { will, did } }) =>
    will || did
      ? {
          workspace: {
            fileOperations: { ...(will ? { willRename: which } : {}), ...(did ? { didRename: which } : {}) },
          },
        }
      : {},
  listen: ({ connection, client, convert, workspace }) => {
    if (client.fileRenames.will)
      connection.workspace.onWillRenameFiles(async ({ files }, token) => {
        await turn();
        const looks = await unlessCancelled(token, workspace.looks());
        return joined(convert, looks, files);
      });
    if (client.fileRenames.did)
      connection.workspace.onDidRenameFiles(({ files }) => {
        const paths = files.flatMap(({ oldUri, newUri }) => [pathOf(oldUri), pathOf(newUri)]);
        void workspace.touched(paths.flatMap((path) => path ?? []));
      });
  },
};
