/** Completion: items with their own edits; what they mean is told when one is looked at, to clients that ask for it. */
import {
  type CompletionItem,
  CompletionItemKind,
  CompletionTriggerKind,
  InsertTextFormat,
  MarkupKind,
} from "vscode-languageserver/node";
import { documentationOf } from "../../editor/completion/documentation.ts";
import type { About, ItemKind, CompletionItem as Offered } from "../../editor/completion/item.ts";
import { completions, isAskedBy } from "../../editor/completion.ts";
import { plainText } from "../../editor/markdown.ts";
import type { Farm } from "../../farm.ts";
import type { Client } from "../client.ts";
import { about, type Feature, type Session } from "../session.ts";
import type { LookAt } from "../workspace.ts";

const kinds: Readonly<Record<ItemKind, CompletionItemKind>> = {
  statement: CompletionItemKind.Keyword,
  part: CompletionItemKind.Keyword,
  parameter: CompletionItemKind.Property,
  unit: CompletionItemKind.Unit,
  moment: CompletionItemKind.Value,
  line: CompletionItemKind.Event,
  person: CompletionItemKind.Text,
  path: CompletionItemKind.File,
  formula: CompletionItemKind.Value,
  code: CompletionItemKind.Constant,
  system: CompletionItemKind.Module,
  solution: CompletionItemKind.Struct,
  reagent: CompletionItemKind.Class,
  saltwater: CompletionItemKind.Struct,
  kit: CompletionItemKind.Reference,
  tank: CompletionItemKind.Field,
  displacement: CompletionItemKind.Field,
  cohort: CompletionItemKind.Field,
  pump: CompletionItemKind.Field,
};

/** What an older client is told instead of a kind that it doesn't know. */
const olderKinds: Readonly<Partial<Record<CompletionItemKind, CompletionItemKind>>> = {
  [CompletionItemKind.Constant]: CompletionItemKind.Value,
  [CompletionItemKind.Struct]: CompletionItemKind.Class,
  [CompletionItemKind.Event]: CompletionItemKind.Snippet,
};

function kindFor({ completionKinds }: Client, item: ItemKind): CompletionItemKind {
  const kind = kinds[item];
  return completionKinds.has(kind) ? kind : (olderKinds[kind] ?? CompletionItemKind.Text);
}

/** What an item carries until it is looked at. */
interface Carried {
  readonly uri: string;
  readonly about: About;
}

export const completionFeature: Feature = {
  title: "Completion",
  about: "what could stand at the cursor: statements, their parts, parameters, units, names, whole readings",
  offers: (client) => ({
    completionProvider: {
      triggerCharacters: [" ", '"'],
      resolveProvider: resolvesDocumentation(client),
    },
  }),
  listen: (session) => {
    const { connection, client, convert } = session;
    connection.onCompletion(({ textDocument, position, context }, token) =>
      about(session, textDocument.uri, token, (look) => {
        const cursor = convert.cursor(look, position);
        const typed =
          context?.triggerKind === CompletionTriggerKind.TriggerCharacter
            ? context.triggerCharacter
            : undefined;
        if (typed !== undefined && !isAskedBy(look.farm, cursor, typed)) return null;
        const found = completions(look.farm, cursor, session.now());
        if (typed !== undefined && found.length === 0) return null;
        return {
          isIncomplete: false,
          items: found.map((item, index) => itemFor(session, look, textDocument.uri, item, index)),
        };
      }),
    );
    if (!resolvesDocumentation(client)) return;
    connection.onCompletionResolve(async (item, token) => {
      const { uri, about: subject } = (item.data ?? {}) as Partial<Carried>;
      if (uri === undefined || subject === undefined) return item;
      const told = await about(session, uri, token, ({ farm }) => documented(client, farm, subject));
      return { ...item, ...told };
    });
  },
};

const resolvesDocumentation = (client: Client): boolean =>
  client.completionResolves.includes("documentation");

function documented(client: Client, farm: Farm, subject: About): Pick<CompletionItem, "documentation"> {
  const markdown = documentationOf(farm, subject);
  if (markdown === null) return {};
  return {
    documentation: client.markdownCompletion
      ? { kind: MarkupKind.Markdown, value: markdown }
      : plainText(markdown),
  };
}

function itemFor(
  { client, convert }: Session,
  { farm }: LookAt,
  uri: string,
  item: Offered,
  index: number,
): CompletionItem {
  const { snippet, about: subject, also } = item;
  const isSnippet = client.snippets && snippet !== null;
  const newText = isSnippet ? snippet : item.text;
  const replace = convert.range(farm, item.replace);
  return {
    label: item.label,
    kind: kindFor(client, item.kind),
    ...(item.detail === "" ? {} : { detail: item.detail }),
    sortText: String(index).padStart(4, "0"),
    filterText: item.filter,
    ...(isSnippet ? { insertTextFormat: InsertTextFormat.Snippet } : {}),
    textEdit: client.insertReplace
      ? { newText, insert: convert.range(farm, item.insert), replace }
      : { newText, range: replace },
    ...(also.length > 0 ? { additionalTextEdits: also.map((edit) => convert.textEdit(farm, edit)) } : {}),
    ...(subject === null
      ? {}
      : resolvesDocumentation(client)
        ? { data: { uri, about: subject } satisfies Carried }
        : documented(client, farm, subject)),
  };
}
