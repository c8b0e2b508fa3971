// Writes grammar/language-configuration.json: what an editor does by itself while one types.
import { writeFile } from "node:fs/promises";
import { sectionKinds } from "../grammar/syntax.ts";

export const configurationFile = "grammar/language-configuration.json";

const header = `^(${sectionKinds.join("|")})\\b.*$`;

export const languageConfiguration = {
  comments: { lineComment: "#" },
  brackets: [
    ["(", ")"],
    ["[", "]"],
  ],
  autoClosingPairs: [
    { open: '"', close: '"', notIn: ["string", "comment"] },
    { open: "(", close: ")", notIn: ["string", "comment"] },
    { open: "[", close: "]", notIn: ["string", "comment"] },
  ],
  surroundingPairs: [
    ['"', '"'],
    ["(", ")"],
  ],
  // Names hold `-`, units hold `/`: a double click takes the whole of either.
  wordPattern: '[^\\s"“”„,#()\\[\\]±×]+',
  indentationRules: {
    increaseIndentPattern: header,
    decreaseIndentPattern: `^\\s+(${sectionKinds.join("|")})\\s*$`,
  },
  onEnterRules: [
    { beforeText: header, action: { indent: "indent" } },
    { beforeText: "^\\s*#\\s+\\S.*$", afterText: "^\\s*\\S", action: { indent: "none", appendText: "# " } },
  ],
  folding: { offSide: true },
};

export const configurationText = (): string => `${JSON.stringify(languageConfiguration, null, 2)}\n`;

export async function main(): Promise<void> {
  await writeFile(configurationFile, configurationText());
  console.log(configurationFile);
}
