/** What a command is about: a document, and a system that it speaks of. */
import { type TextDocument, window } from "vscode";
import { marlRequest, type OfSystem, type SystemChoice } from "../server/protocol/requests.ts";
import type { Server } from "./server.ts";

/** What a lens names: the document, and the system by its name. */
export type Named = readonly unknown[];

export interface Here extends OfSystem {
  readonly name: string;
}

const isMarl = (document: TextDocument | undefined): document is TextDocument =>
  document?.languageId === "marl";

/** The Marl document that is being looked at; says what to do where there is none. */
export function documentHere(server: Server): { readonly uri: string; readonly line: number } | undefined {
  const editor = window.activeTextEditor;
  if (editor && isMarl(editor.document))
    return { uri: server.uriOf(editor.document), line: editor.selection.active.line };
  void window.showInformationMessage("Open a Marl file first, so that it is known which farm is meant.");
  return undefined;
}

/** The system that is meant: the one named, that of the cursor, or one that is chosen. */
export async function systemHere(server: Server, [uri, name]: Named): Promise<Here | undefined> {
  const isNamed = typeof uri === "string";
  const at = isNamed ? { uri, line: null } : documentHere(server);
  if (!at) return undefined;
  const named = isNamed && typeof name === "string" ? name : null;
  const systems = await server.ask<readonly SystemChoice[]>(marlRequest.systems, { ...at, name: named });
  const [only, ...others] = systems ?? [];
  if (!only) {
    void window.showInformationMessage(
      "This farm has no system yet. Write one: a line that begins with system and its name.",
    );
    return undefined;
  }
  const choices = [only, ...others].map((system) => ({
    label: system.name,
    ...(system.title === null ? {} : { description: system.title }),
    system,
  }));
  const chosen =
    others.length === 0 ? choices[0] : await window.showQuickPick(choices, { title: "Which system?" });
  return chosen && { uri: at.uri, system: chosen.system.ref, name: chosen.system.name };
}
