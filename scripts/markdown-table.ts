// Tables for generated pages.
export const code = (text: string): string => `\`${text}\``;
const cell = (text: string): string => text.replaceAll("|", "\\|");
export const table = (heads: readonly string[], rows: readonly (readonly string[])[]): string =>
  [heads, heads.map(() => "---"), ...rows.map((row) => row.map(cell))]
    .map((cells) => `| ${cells.join(" | ")} |`)
    .join("\n");
