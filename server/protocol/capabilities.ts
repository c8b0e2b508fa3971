/** What is announced to a client: how texts are kept in step, and each feature's own. */
import { type ServerCapabilities, TextDocumentSyncKind } from "vscode-languageserver/node";
import type { Client } from "./client.ts";
import { features } from "./features.ts";

export function capabilitiesFor(client: Client): ServerCapabilities {
  const offered: ServerCapabilities = {
    positionEncoding: client.encoding,
    textDocumentSync: {
      openClose: true,
      change: TextDocumentSyncKind.Incremental,
      save: { includeText: false },
    },
    workspace: { workspaceFolders: { supported: true, changeNotifications: true } },
  };
  return features.reduce((all, { offers }) => merged(all, offers(client)), offered);
}

function merged(all: ServerCapabilities, more: ServerCapabilities): ServerCapabilities {
  return { ...all, ...more, workspace: { ...all.workspace, ...more.workspace } };
}
