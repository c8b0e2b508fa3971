/**
 * Code lenses. One that does something names a command of the client's own, and only where the client lists it; what
 * is left for others is the text, and completion writes the `read` line.
 */
import type { Command } from "vscode-languageserver/node";
import { codeLenses, dosesTitle, type LensKind, readingTitle } from "../../editor/code-lens.ts";
import type { Client } from "../client.ts";
import { about, type Feature, type Session } from "../session.ts";
import type { LookAt } from "../workspace.ts";

const commandOf: Readonly<Record<LensKind, string>> = {
  doses: "marl.showDoseSheet",
  reading: "marl.recordReading",
};

interface Carried {
  readonly uri: string;
  readonly kind: LensKind;
  readonly system: string;
  readonly name: string;
}

export const codeLensFeature: Feature = {
  title: "Code lenses",
  about: "today's doses above a system; a way to record a reading above a log",
  offers: () => ({ codeLensProvider: { resolveProvider: true } }),
  listen: (session) => {
    const { connection, convert } = session;
    connection.onCodeLens(({ textDocument: { uri } }, token) =>
      about(session, uri, token, (look) =>
        codeLenses(look.farm, look.file, chosen(session)).map(({ span, kind, system, name }) => ({
          range: convert.range(look.farm, span),
          data: { uri, kind, system, name } satisfies Carried,
        })),
      ),
    );
    connection.onCodeLensResolve(async (lens, token) => {
      const carried = (lens.data ?? {}) as Partial<Carried>;
      if (carried.uri === undefined || carried.kind === undefined) return lens;
      const command = await about(session, carried.uri, token, (look) =>
        commandFor(session.client, look, carried as Carried),
      );
      return command ? { ...lens, command } : lens;
    });
  },
};

/** By the settings; a lens that only does something isn't shown where it can't. */
function chosen({ settings, client }: Session): ReadonlySet<LensKind> {
  const { "lenses.doses": doses, "lenses.reading": reading } = settings();
  return new Set<LensKind>([
    ...(doses ? (["doses"] as const) : []),
    ...(reading && client.commands.has(commandOf.reading) ? (["reading"] as const) : []),
  ]);
}

function commandFor(client: Client, look: LookAt, { uri, kind, system, name }: Carried): Command {
  const title = kind === "reading" ? readingTitle : (dosesTitle(look.farm, system) ?? "");
  const command = commandOf[kind];
  return client.commands.has(command) ? { title, command, arguments: [uri, name] } : { title, command: "" };
}
