/** The sheet's face as Markdown, for a wiki or a print. What people wrote is escaped. */
import type { Section, Sheet, Table } from "./sheet-model.ts";

export function markdownSheet(sheet: Sheet): string {
  const blocks = [
    `# ${escaped(sheet.title)}`,
    ...sheet.cautions.map((caution) => `> ${escaped(caution)}`),
    ...sheet.systems.flatMap(({ heading, subtitle, sections }) => [
      `## ${escaped(heading)}`,
      escaped(subtitle),
      ...sections.flatMap((section) => sectionBlocks(section, "###")),
    ]),
    ...sheet.closing.flatMap((section) => sectionBlocks(section, "##")),
  ];
  return `${blocks.join("\n\n")}\n`;
}

function sectionBlocks({ title, table, lines, marl, problems }: Section, level: string): string[] {
  return [
    `${level} ${escaped(title)}`,
    ...(table ? [tableBlock(table)] : []),
    ...lines.map(escaped),
    ...(marl.length > 0
      ? [
          "To put it into the log, each line when its time has come:",
          `\`\`\`marl\n${marl.join("\n")}\n\`\`\``,
        ]
      : []),
    ...(problems.length > 0
      ? [
          problems
            .map(
              ({ severity, place, message, code }) =>
                `- **${severity}** ${escaped(place)}: ${escaped(message)} (${code})`,
            )
            .join("\n"),
        ]
      : []),
  ];
}

function tableBlock({ columns, rows }: Table): string {
  const row = (cells: readonly string[]) => `| ${cells.join(" | ")} |`;
  const head = row(columns.map(({ title }) => escaped(title)));
  const rule = row(columns.map(({ align }) => (align === "right" ? "--:" : ":--")));
  return [head, rule, ...rows.map((cells) => row(cells.map(escaped)))].join("\n");
}

/** Characters that Markdown or HTML would take for its own. */
const escaped = (text: string): string => text.replace(/[\\`*_{}[\]<>#|~]/g, "\\$&").replace(/&/g, "&amp;");
