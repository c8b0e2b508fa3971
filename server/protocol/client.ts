/** What a client says that it can do. Nothing is sent that it didn't declare. */
import type { CompletionItemKind, InitializeParams, SymbolKind } from "vscode-languageserver/node";
import { type Encoding, encodings } from "./positions.ts";

export interface Client {
  readonly encoding: Encoding;
  /** Problems are asked for by the client, not sent by the server. */
  readonly pullsProblems: boolean;
  readonly relatedPlaces: boolean;
  readonly codeDescriptions: boolean;
  readonly problemTags: boolean;
  readonly problemData: boolean;
  readonly markdownHover: boolean;
  readonly markdownCompletion: boolean;
  readonly snippets: boolean;
  readonly completionResolves: readonly string[];
  readonly insertReplace: boolean;
  /** Kinds of items that it can draw; of symbols likewise. */
  readonly completionKinds: ReadonlySet<CompletionItemKind>;
  readonly symbolKinds: ReadonlySet<SymbolKind>;
  readonly signatureActivePart: boolean;
  /** A signature may have no part marked. */
  readonly signatureNoActivePart: boolean;
  /** Parts of a signature may be told by their places in it. */
  readonly signatureOffsets: boolean;
  readonly markdownSignature: boolean;
  readonly symbolTree: boolean;
  readonly linkTargets: boolean;
  readonly actionLiterals: boolean;
  readonly actionResolves: readonly string[];
  readonly preferredActions: boolean;
  /** It does edits that the server asks for. */
  readonly appliesEdits: boolean;
  readonly versionedEdits: boolean;
  readonly fileCreation: boolean;
  readonly annotatedEdits: boolean;
  readonly preparesRename: boolean;
  readonly watchesFiles: boolean;
  readonly configuration: boolean;
  readonly configurationRegistration: boolean;
  readonly folders: boolean;
  readonly progress: boolean;
  readonly refreshes: {
    readonly problems: boolean;
    readonly tokens: boolean;
    readonly hints: boolean;
    readonly lenses: boolean;
  };
  readonly foldsWholeLines: boolean;
  /** The most folds that it takes of a file; null where it takes any number. */
  readonly mostFolds: number | null;
  /** Whether it asks before files get another path, and tells afterwards. */
  readonly fileRenames: { readonly will: boolean; readonly did: boolean };
  readonly hintResolves: boolean;
  readonly showsDocuments: boolean;
  /** Commands that the client itself has, so that a lens or an action may name them. */
  readonly commands: ReadonlySet<string>;
}

/** Those that the protocol began with, of items and of symbols: a client that names none knows no others. */
const firstKinds = Array.from({ length: 18 }, (_, index) => (index + 1) as CompletionItemKind & SymbolKind);

/** Reads what a client declared; whatever it leaves out it can't do. */
export function clientOf({ capabilities, initializationOptions }: InitializeParams): Client {
  const { textDocument: text, workspace, window, general } = capabilities ?? {};
  const offered: readonly string[] = general?.positionEncodings ?? [];
  const listed = (initializationOptions as { commands?: unknown } | null | undefined)?.commands;
  const commands = Array.isArray(listed) ? listed.filter((name) => typeof name === "string") : [];
  // The first that it names is the one that it likes best.
  const isMarkdown = (formats: readonly string[] | undefined) => formats?.[0] === "markdown";
  return {
    encoding: encodings.find((encoding) => offered.includes(encoding)) ?? "utf-16",
    pullsProblems: text?.diagnostic !== undefined,
    relatedPlaces:
      (text?.diagnostic?.relatedInformation ?? text?.publishDiagnostics?.relatedInformation) === true,
    codeDescriptions:
      (text?.diagnostic?.codeDescriptionSupport ?? text?.publishDiagnostics?.codeDescriptionSupport) === true,
    problemTags: (text?.diagnostic?.tagSupport ?? text?.publishDiagnostics?.tagSupport) !== undefined,
    problemData: (text?.diagnostic?.dataSupport ?? text?.publishDiagnostics?.dataSupport) === true,
    markdownHover: isMarkdown(text?.hover?.contentFormat),
    markdownCompletion: isMarkdown(text?.completion?.completionItem?.documentationFormat),
    snippets: text?.completion?.completionItem?.snippetSupport === true,
    completionResolves: text?.completion?.completionItem?.resolveSupport?.properties ?? [],
    insertReplace: text?.completion?.completionItem?.insertReplaceSupport === true,
    completionKinds: new Set(text?.completion?.completionItemKind?.valueSet ?? firstKinds),
    symbolKinds: new Set(
      text?.documentSymbol?.symbolKind?.valueSet ?? workspace?.symbol?.symbolKind?.valueSet ?? firstKinds,
    ),
    signatureActivePart: text?.signatureHelp?.signatureInformation?.activeParameterSupport === true,
    signatureNoActivePart: text?.signatureHelp?.signatureInformation?.noActiveParameterSupport === true,
    signatureOffsets:
      text?.signatureHelp?.signatureInformation?.parameterInformation?.labelOffsetSupport === true,
    markdownSignature: isMarkdown(text?.signatureHelp?.signatureInformation?.documentationFormat),
    symbolTree: text?.documentSymbol?.hierarchicalDocumentSymbolSupport === true,
    linkTargets: text?.definition?.linkSupport === true,
    actionLiterals: text?.codeAction?.codeActionLiteralSupport !== undefined,
    actionResolves: text?.codeAction?.resolveSupport?.properties ?? [],
    preferredActions: text?.codeAction?.isPreferredSupport === true,
    appliesEdits: workspace?.applyEdit === true,
    versionedEdits: workspace?.workspaceEdit?.documentChanges === true,
    fileCreation: workspace?.workspaceEdit?.resourceOperations?.includes("create") === true,
    annotatedEdits: workspace?.workspaceEdit?.changeAnnotationSupport !== undefined,
    preparesRename: text?.rename?.prepareSupport === true,
    watchesFiles: workspace?.didChangeWatchedFiles?.dynamicRegistration === true,
    configuration: workspace?.configuration === true,
    configurationRegistration: workspace?.didChangeConfiguration?.dynamicRegistration === true,
    folders: workspace?.workspaceFolders === true,
    progress: window?.workDoneProgress === true,
    refreshes: {
      problems: workspace?.diagnostics?.refreshSupport === true,
      tokens: workspace?.semanticTokens?.refreshSupport === true,
      hints: workspace?.inlayHint?.refreshSupport === true,
      lenses: workspace?.codeLens?.refreshSupport === true,
    },
    foldsWholeLines: text?.foldingRange?.lineFoldingOnly === true,
    mostFolds: text?.foldingRange?.rangeLimit ?? null,
    fileRenames: {
      will: workspace?.fileOperations?.willRename === true,
      did: workspace?.fileOperations?.didRename === true,
    },
    hintResolves: text?.inlayHint?.resolveSupport?.properties.includes("tooltip") === true,
    showsDocuments: window?.showDocument?.support === true,
    commands: new Set(commands),
  };
}
