/** Signature help. */
import { MarkupKind, type SignatureInformation } from "vscode-languageserver/node";
import { plainText } from "../../editor/markdown.ts";
import { type Signature, signatureHelp } from "../../editor/signature-help.ts";
import type { Client } from "../client.ts";
import { about, type Feature } from "../session.ts";

export const signatureHelpFeature: Feature = {
  title: "Signature help",
  about: "how the statement is written that is being typed, with the part that comes next",
  offers: () => ({ signatureHelpProvider: { triggerCharacters: [" ", ","] } }),
  listen: (session) => {
    const { connection, client, convert } = session;
    connection.onSignatureHelp(({ textDocument, position }, token) =>
      about(session, textDocument.uri, token, (look) => {
        const found = signatureHelp(look.farm, convert.cursor(look, position));
        if (!found) return null;
        const { active } = found.signatures[found.active]!;
        // A form that is full has no part to mark, and some clients then mark the first.
        if (active === null && !client.signatureNoActivePart) return null;
        const documentation = client.markdownSignature
          ? { kind: MarkupKind.Markdown, value: found.markdown }
          : plainText(found.markdown);
        return {
          signatures: found.signatures.map((signature) => information(client, signature, documentation)),
          activeSignature: found.active,
          activeParameter: active,
        };
      }),
    );
  },
};

function information(
  client: Client,
  signature: Signature,
  documentation: SignatureInformation["documentation"],
): SignatureInformation {
  const { label, parts, active } = signature;
  const marks = client.signatureActivePart && (active !== null || client.signatureNoActivePart);
  return {
    label,
    ...(documentation === undefined ? {} : { documentation }),
    parameters: parts.map(({ start, end }) => ({
      label: client.signatureOffsets ? [start, end] : told(label, start, end),
    })),
    ...(marks ? { activeParameter: active } : {}),
  };
}

/** A client that takes words only marks the first place where they stand: words before are taken in until that is it. */
function told(label: string, start: number, end: number): string {
  let from = start;
  while (from > 0 && label.indexOf(label.slice(from, end)) !== from)
    from = label.lastIndexOf(" ", from - 2) + 1;
  return label.slice(from, end);
}
