/** A document's URI ↔ its path. */
import { fileURLToPath, pathToFileURL } from "node:url";

/** The path of a `file:` URI; null for any other, and for one that is none. */
export function pathOf(uri: string): string | null {
  try {
    return uri.startsWith("file:") ? fileURLToPath(uri) : null;
  } catch {
    return null;
  }
}

export const uriOf = (path: string): string => pathToFileURL(path).href;
