/** What every feature of the server is given: the client's word, the farms, the settings, and how to convert. */
import {
  type CancellationToken,
  type Connection,
  LSPErrorCodes,
  ResponseError,
  type ServerCapabilities,
} from "vscode-languageserver/node";
import type { Client } from "./client.ts";
import type { Convert } from "./convert.ts";
import { turn } from "./farm-walk.ts";
import type { Settings } from "./settings.ts";
import type { LookAt, Workspace } from "./workspace.ts";

export interface Session {
  readonly connection: Connection;
  readonly client: Client;
  readonly convert: Convert;
  readonly workspace: Workspace;
  readonly settings: () => Settings;
  /** The wall clock's minute, or the moment that the client fixed. */
  readonly now: () => number;
  /** Sends something whose answer nobody waits for: what goes wrong with it is told to the client's log. */
  readonly send: (sending: Promise<unknown>) => void;
  /** The address of a problem's page as it is shipped; null where it isn't there. */
  readonly pageOf: (code: string) => string | null;
}

/** One thing that the server can do. */
export interface Feature {
  /** For the documentation. */
  readonly title: string;
  readonly about: string;
  /** What is announced to a client. */
  readonly offers: (client: Client) => ServerCapabilities;
  readonly listen: (session: Session) => void;
}

/** Ends a request that its client has taken back. */
export function stopIfCancelled(token: CancellationToken): void {
  if (token.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, "Cancelled.");
}

/** Waits for something, but no longer than the client does. */
export async function unlessCancelled<T>(token: CancellationToken, work: Promise<T>): Promise<T> {
  stopIfCancelled(token);
  let listening: { readonly dispose: () => void } | null = null;
  const cancelled = new Promise<"cancelled">((resolve) => {
    listening = token.onCancellationRequested(() => resolve("cancelled"));
  });
  try {
    const first = await Promise.race([work.then((value) => ({ value })), cancelled]);
    if (first !== "cancelled") return first.value;
  } finally {
    (listening as { readonly dispose: () => void } | null)?.dispose();
  }
  stopIfCancelled(token);
  return work;
}

/** Asks about one document: waits for its farm, and stops where the client has lost interest. */
export async function about<T>(
  { workspace }: Session,
  uri: string,
  token: CancellationToken,
  answer: (look: LookAt) => T | Promise<T>,
): Promise<T | null> {
  // A cancel that came right behind its request is read first.
  await turn();
  const look = await unlessCancelled(token, workspace.look(uri));
  return look?.farm.documents.has(look.file) ? answer(look) : null;
}
