/** Everything that the server can do, one feature a file: the table of contents, and what the documentation lists. */

import { codeActionsFeature } from "./features/code-actions.ts";
import { codeLensFeature } from "./features/code-lens.ts";
import { completionFeature } from "./features/completion.ts";
import { definitionFeature } from "./features/definition.ts";
import { fileRenameFeature } from "./features/file-rename.ts";
import { foldingFeature } from "./features/folding.ts";
import { formattingFeature, rangeFormattingFeature, typingFormattingFeature } from "./features/formatting.ts";
import { highlightFeature } from "./features/highlight.ts";
import { hoverFeature } from "./features/hover.ts";
import { inlayHintsFeature } from "./features/inlay-hints.ts";
import { linksFeature } from "./features/links.ts";
import { recordReadingFeature } from "./features/record-reading.ts";
import { referencesFeature } from "./features/references.ts";
import { renameFeature } from "./features/rename.ts";
import { selectionFeature } from "./features/selection.ts";
import { sheetFeature } from "./features/sheet.ts";
import { signatureHelpFeature } from "./features/signature-help.ts";
import { symbolsFeature, workspaceSymbolsFeature } from "./features/symbols.ts";
import { systemsFeature } from "./features/systems.ts";
import { tidyFarmFeature } from "./features/tidy-farm.ts";
import { tokensFeature } from "./features/tokens.ts";
import { writePlanFeature } from "./features/write-plan.ts";
import { problemsFeature } from "./publish.ts";
import type { Feature } from "./session.ts";

export const features: readonly Feature[] = [
  problemsFeature,
  hoverFeature,
  completionFeature,
  signatureHelpFeature,
  definitionFeature,
  referencesFeature,
  highlightFeature,
  renameFeature,
  symbolsFeature,
  workspaceSymbolsFeature,
  tokensFeature,
  foldingFeature,
  selectionFeature,
  linksFeature,
  inlayHintsFeature,
  codeLensFeature,
  codeActionsFeature,
  formattingFeature,
  rangeFormattingFeature,
  typingFormattingFeature,
  fileRenameFeature,
  systemsFeature,
  sheetFeature,
  recordReadingFeature,
  writePlanFeature,
  tidyFarmFeature,
];
