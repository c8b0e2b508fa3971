/** What two clients declare: one that draws everything, one that says nothing. */

export const poor = {};

const upTo = (last: number): number[] => Array.from({ length: last }, (_, index) => index + 1);

/** Everything that a well-equipped editor declares; problems are pulled. */
export const rich = {
  general: { positionEncodings: ["utf-8", "utf-16", "utf-32"] },
  window: { workDoneProgress: true, showDocument: { support: true } },
  workspace: {
    workspaceFolders: true,
    configuration: true,
    applyEdit: true,
    didChangeWatchedFiles: { dynamicRegistration: true },
    didChangeConfiguration: { dynamicRegistration: true },
    workspaceEdit: { documentChanges: true, resourceOperations: ["create", "rename", "delete"] },
    diagnostics: { refreshSupport: true },
    semanticTokens: { refreshSupport: true },
    inlayHint: { refreshSupport: true },
    codeLens: { refreshSupport: true },
    fileOperations: { willRename: true, didRename: true },
  },
  textDocument: {
    diagnostic: { relatedInformation: true, codeDescriptionSupport: true, dataSupport: true },
    publishDiagnostics: { relatedInformation: true, versionSupport: true, codeDescriptionSupport: true },
    hover: { contentFormat: ["markdown", "plaintext"] },
    completion: {
      completionItemKind: { valueSet: upTo(25) },
      completionItem: {
        snippetSupport: true,
        insertReplaceSupport: true,
        documentationFormat: ["markdown", "plaintext"],
        resolveSupport: { properties: ["documentation", "detail"] },
      },
    },
    signatureHelp: {
      signatureInformation: {
        activeParameterSupport: true,
        noActiveParameterSupport: true,
        documentationFormat: ["markdown"],
        parameterInformation: { labelOffsetSupport: true },
      },
    },
    definition: { linkSupport: true },
    documentSymbol: { hierarchicalDocumentSymbolSupport: true, symbolKind: { valueSet: upTo(26) } },
    codeAction: {
      codeActionLiteralSupport: { codeActionKind: { valueSet: ["", "quickfix", "refactor", "source"] } },
      resolveSupport: { properties: ["edit"] },
      isPreferredSupport: true,
      dataSupport: true,
    },
    rename: { prepareSupport: true },
    foldingRange: { lineFoldingOnly: false },
    inlayHint: { resolveSupport: { properties: ["tooltip"] } },
    semanticTokens: {
      requests: { range: true, full: { delta: true } },
      tokenTypes: [],
      tokenModifiers: [],
      formats: ["relative"],
    },
  },
};
