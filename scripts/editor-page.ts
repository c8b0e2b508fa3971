// Writes docs/editor.md: the prose of scripts/editor.md, with the server's own features and settings in their places.
import { readFile, writeFile } from "node:fs/promises";
import type { ClientCapabilities } from "vscode-languageserver/node";
import { type Client, clientOf } from "../server/protocol/client.ts";
import { features } from "../server/protocol/features.ts";
import type { Feature } from "../server/protocol/session.ts";
import { settingsTable } from "../server/protocol/settings.ts";
import { poor, rich } from "../test/protocol/capabilities.ts";
import { code, table } from "./markdown-table.ts";

export const editorPage = "docs/editor.md";
const template = "scripts/editor.md";

const clientWith = (capabilities: ClientCapabilities): Client =>
  clientOf({ processId: null, rootUri: null, capabilities });

const announced = (feature: Feature, client: Client): string => {
  const { workspace, ...offers } = feature.offers(client);
  const names = [
    ...Object.entries(offers).flatMap(([name, value]) => (value === undefined ? [] : [name])),
    ...Object.entries(workspace ?? {}).flatMap(([name, value]) =>
      value === undefined ? [] : [`workspace.${name}`],
    ),
  ];
  return names.map(code).join(", ");
};

/** What is the same for both is said once. */
function featureTable(): string {
  const [most, least] = [clientWith(rich as ClientCapabilities), clientWith(poor)];
  const rows = features.map((feature) => {
    const [toRich, toPoor] = [announced(feature, most), announced(feature, least)];
    const same = toRich === toPoor ? "the same" : toPoor || "nothing";
    return [feature.title, feature.about, toRich || "nothing", same];
  });
  return table(
    ["", "what it gives", "announced to an editor that declares all", "to one that declares nothing"],
    rows,
  );
}

function settingTable(): string {
  const rows = Object.entries(settingsTable).map(([name, { value, description }]) => [
    code(`marl.${name}`),
    code(String(value)),
    description,
  ]);
  return table(["setting", "default", ""], rows);
}

/** The page, made of prose and tables. */
export async function editorText(): Promise<string> {
  const prose = await readFile(template, "utf8");
  return prose.replace("<!-- features -->", featureTable()).replace("<!-- settings -->", settingTable());
}

export async function main(): Promise<void> {
  await writeFile(editorPage, await editorText());
  console.log(editorPage);
}
