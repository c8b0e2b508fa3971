// Writes what package.json says to VS Code: commands, settings and the rest of it, from the tables that the code goes by.
import { readFile, writeFile } from "node:fs/promises";
import { category, commandTable } from "../client/command-table.ts";
import { sheetLanguage } from "../client/sheet-place.ts";
import { walkthrough } from "../client/walkthrough.ts";
import { type SettingRow, settingsTable } from "../server/protocol/settings.ts";

export const manifestFile = "package.json";

const setting = ([name, row]: [string, SettingRow<boolean | number>], order: number) => [
  `marl.${name}`,
  {
    order,
    type: typeof row.value === "boolean" ? "boolean" : "integer",
    default: row.value,
    ...(row.least === undefined ? {} : { minimum: row.least }),
    ...(row.most === undefined ? {} : { maximum: row.most }),
    description: row.description,
    scope: "window",
  },
];

const allowed = (signs: string): Readonly<Record<string, boolean>> =>
  Object.fromEntries([...signs].map((sign) => [sign, true]));

/** Files of the extension, beside package.json. */
const places = {
  configuration: "./grammar/language-configuration.json",
  grammar: "./grammar/marl.tmLanguage.json",
  icon: "./client/media/marl.svg",
} as const;

export const contributes = {
  languages: [
    {
      id: "marl",
      aliases: ["Marl"],
      extensions: [".marl"],
      configuration: places.configuration,
      icon: { light: places.icon, dark: places.icon },
    },
    // What a dose sheet is shown as; no file is written in it.
    { id: sheetLanguage, aliases: ["Marl dose sheet"] },
  ],
  grammars: [{ language: "marl", scopeName: "source.marl", path: places.grammar }],
  commands: commandTable.map(({ id: command, ...row }) => ({ command, category, ...row })),
  menus: {
    "editor/title": [
      { command: "marl.showDoseSheet", when: "editorLangId == marl", group: "navigation" },
      { command: "marl.recordReading", when: "editorLangId == marl", group: "navigation" },
    ],
  },
  configuration: {
    title: "Marl",
    properties: Object.fromEntries(Object.entries(settingsTable).map(setting)),
  },
  configurationDefaults: {
    "[marl]": {
      "editor.formatOnSave": true,
      "editor.wordBasedSuggestions": "off",
      "editor.semanticHighlighting.enabled": true,
      "editor.insertSpaces": true,
      "editor.tabSize": 2,
      // Signs that the language is written with are no letters in disguise.
      "editor.unicodeHighlight.allowedCharacters": allowed("±×°µ²³·−"),
    },
    [`[${sheetLanguage}]`]: {
      "editor.lineNumbers": "off",
      "editor.glyphMargin": false,
      "editor.folding": false,
      "editor.minimap.enabled": false,
      "editor.stickyScroll.enabled": false,
      "editor.guides.indentation": false,
      "editor.renderLineHighlight": "none",
      "editor.wordWrap": "off",
      "editor.unicodeHighlight.allowedCharacters": allowed("±×°µ²³·−─–…Ω"),
    },
    // The pages of problems are read, not edited: those of this extension and no others.
    "workbench.editorAssociations": { "**/marl.marl-*/docs/problems/*.md": "vscode.markdown.preview.editor" },
  },
  walkthroughs: [walkthrough],
};

export const capabilities = {
  untrustedWorkspaces: { supported: true },
  virtualWorkspaces: {
    supported: "limited",
    description:
      "Files that are open are read and checked. Others of the same farm aren't, since they are read from the disk.",
  },
};

export async function main(): Promise<void> {
  const {
    contributes: _was,
    capabilities: _were,
    ...manifest
  } = JSON.parse(await readFile(manifestFile, "utf8")) as Record<string, unknown>;
  const entries = Object.entries({ ...manifest, contributes, capabilities });
  // What is written here stands before the scripts, where the rest of what VS Code reads stands.
  const isOurs = ([name]: [string, unknown]) => name === "contributes" || name === "capabilities";
  const others = entries.filter((entry) => !isOurs(entry));
  const at = others.findIndex(([name]) => name === "scripts");
  const all = [...others.slice(0, at), ...entries.filter(isOurs), ...others.slice(at)];
  await writeFile(manifestFile, `${JSON.stringify(Object.fromEntries(all), null, 2)}\n`);
  console.log(manifestFile);
}
