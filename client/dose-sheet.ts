/** The dose sheet as a document beside the file: it can't be written in, and follows every edit. */
import {
  type Disposable,
  Disposable as Disposables,
  EventEmitter,
  languages,
  Uri,
  ViewColumn,
  window,
  workspace,
} from "vscode";
import { marlRequest, type SheetAnswer } from "../server/protocol/requests.ts";
import { type Named, systemHere } from "./here.ts";
import { once } from "./once.ts";
import type { Server } from "./server.ts";
import { addressOf, placeOf, sheetLanguage, sheetScheme } from "./sheet-place.ts";

export interface DoseSheets extends Disposable {
  readonly show: (named: Named) => Promise<void>;
}

export function showDoseSheets(server: Server): DoseSheets {
  const changed = new EventEmitter<Uri>();
  const follow = once(() => {
    for (const { uri } of workspace.textDocuments) if (uri.scheme === sheetScheme) changed.fire(uri);
  });
  const provider = workspace.registerTextDocumentContentProvider(sheetScheme, {
    onDidChange: changed.event,
    provideTextDocumentContent: async ({ query }) => {
      const place = placeOf(query);
      const answer = place && (await server.ask<SheetAnswer>(marlRequest.sheet, place));
      return answer?.text ?? `${place?.name ?? "This system"} isn't in the farm any more.\n`;
    },
  });
  const all = Disposables.from(provider, changed, follow, server.onChange(follow.soon));
  return {
    dispose: () => all.dispose(),
    show: async (named) => {
      const here = await systemHere(server, named);
      if (!here) return;
      const opened = await workspace.openTextDocument(Uri.from(addressOf(here)));
      const document = await languages.setTextDocumentLanguage(opened, sheetLanguage);
      await window.showTextDocument(document, { viewColumn: ViewColumn.Beside, preserveFocus: true });
    },
  };
}
