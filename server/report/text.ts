/** The sheet's face for a terminal: at most 100 columns, what to do first. */
import { styleText } from "node:util";
import type { Section, Sheet, SheetProblem, Table } from "./sheet-model.ts";

export const textWidth = 100;

type Paint = (style: Parameters<typeof styleText>[0], text: string) => string;

export const paintIf =
  (color: boolean): Paint =>
  (style, text) =>
    color ? styleText(style, text, { validateStream: false }) : text;

export function textSheet(sheet: Sheet, color: boolean): string {
  const paint = paintIf(color);
  const lines = [paint("bold", sheet.title), ""];
  for (const caution of sheet.cautions)
    lines.push(...wrapped(caution, 0).map((line) => paint("yellow", line)), "");
  for (const { heading, subtitle, sections } of sheet.systems) {
    lines.push(
      paint("bold", cut(heading)),
      paint("dim", "─".repeat(Math.min(heading.length, textWidth))),
      subtitle,
      "",
    );
    for (const section of sections) lines.push(...sectionLines(section, paint), "");
  }
  for (const section of sheet.closing) lines.push(...sectionLines(section, paint), "");
  return `${lines.join("\n").trimEnd()}\n`;
}

const cut = (text: string): string => (text.length <= textWidth ? text : `${text.slice(0, textWidth - 1)}…`);

function sectionLines({ title, table, lines, marl, problems }: Section, paint: Paint): string[] {
  return [
    paint("bold", title),
    ...(table ? tableLines(table, paint) : []),
    ...lines.flatMap((line) => wrapped(line, 2)),
    ...(marl.length > 0 ? ["  To put it into the log:", ...marl.map((line) => `    ${line}`)] : []),
    ...problems.flatMap((problem) => problemText(problem, paint, 2)),
  ];
}

function tableLines({ columns, rows }: Table, paint: Paint): string[] {
  // A column without any content takes no room.
  const shown = columns
    .map((column, index) => ({ ...column, index }))
    .filter(({ index, title }) => title === "" || rows.some((row) => row[index]));
  const widths = fitting(
    shown.map(({ title, index, align }) => ({
      align,
      width: Math.max(title.length, ...rows.map((row) => (row[index] ?? "").length)),
    })),
  );
  const line = (cells: readonly string[]) =>
    `  ${cells
      .map((cell, place) => {
        const width = widths[place] ?? 0;
        const text = cell.length <= width ? cell : `${cell.slice(0, width - 1)}…`;
        return shown[place]?.align === "right" ? text.padStart(width) : text.padEnd(width);
      })
      .join("  ")}`.trimEnd();
  const head = paint("dim", cut(line(shown.map(({ title }) => title))));
  return [head, ...rows.map((row) => cut(line(shown.map(({ index }) => row[index] ?? ""))))];
}

/** Names give way so that figures keep their room: the widest words of the first columns are cut. */
function fitting(columns: readonly { readonly align: "left" | "right"; readonly width: number }[]): number[] {
  const widths = columns.map(({ width }) => width);
  const over = () => 2 + widths.reduce((sum, width) => sum + width + 2, -2) - textWidth;
  for (let excess = over(); excess > 0; excess = over()) {
    const names = widths.slice(0, 2);
    const widest = names.indexOf(Math.max(...names));
    if ((widths[widest] ?? 0) <= leastName) break;
    widths[widest] = Math.max(leastName, (widths[widest] ?? 0) - 1);
  }
  return widths;
}

/** A name cut shorter than this tells nothing. */
const leastName = 10;

const severityStyle = { error: "red", warning: "yellow", info: "cyan", hint: "dim" } as const;

/** `warning  north/log.marl:12:3  code`, and the message below it. */
export function problemText(
  { severity, place, message, code }: SheetProblem,
  paint: Paint,
  indent: number,
): string[] {
  const margin = " ".repeat(indent);
  return [
    `${margin}${paint(severityStyle[severity], severity)}  ${place}  ${paint("dim", code)}`,
    ...wrapped(message, indent + 4),
  ];
}

/** A paragraph in lines of at most 100 columns, all behind the same margin; a word too long stands alone. */
export function wrapped(text: string, indent: number): string[] {
  const margin = " ".repeat(indent);
  const lines: string[] = [];
  let line = "";
  for (const word of text.split(/\s+/)) {
    if (line !== "" && indent + line.length + 1 + word.length > textWidth) {
      lines.push(margin + line);
      line = word;
    } else line = line === "" ? word : `${line} ${word}`;
  }
  lines.push(margin + line);
  return lines;
}
