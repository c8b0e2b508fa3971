/** Which documents the server is told of. No VS Code in here. */

/** Files, what isn't saved yet, and the open folders' own; not the old versions that a comparison shows. */
export const schemesOf = (folders: readonly string[]): readonly string[] => [
  ...new Set(["file", "untitled", ...folders]),
];
