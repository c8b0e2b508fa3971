/** The sheet's face for a terminal: at most 100 columns, what to do first. */
import { styleText } from "node:util";
import type { Column, Section, Sheet, SheetProblem, Table } from "./sheet-model.ts";

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
    ...(marl.length > 0
      ? [
          marl.length > 1
            ? "  To put it into the log, each line when its time has come:"
            : "  To put it into the log:",
          ...marl.map((line) => `    ${line}`),
        ]
      : []),
    ...problems.flatMap((problem) => problemText(problem, paint, 2)),
  ];
}

interface Fitted extends Column {
  readonly index: number;
  readonly width: number;
}

function tableLines({ columns, rows }: Table, paint: Paint): string[] {
  const shown = fitted(
    columns.flatMap((column, index): Fitted[] => {
      const width = Math.max(column.title.length, ...rows.map((row) => (row[index] ?? "").length));
      // A column without any content takes no room.
      const isEmpty = column.title !== "" && !rows.some((row) => row[index]);
      return isEmpty ? [] : [{ ...column, index, width }];
    }),
  );
  const line = (cellOf: (column: Fitted) => string) =>
    `  ${shown
      .map((column) => {
        const cell = cellOf(column);
        const text = cell.length <= column.width ? cell : `${cell.slice(0, column.width - 1)}…`;
        return column.align === "right" ? text.padStart(column.width) : text.padEnd(column.width);
      })
      .join("  ")}`.trimEnd();
  return [
    paint(
      "dim",
      line(({ title }) => title),
    ),
    ...rows.map((row) => line(({ index }) => row[index] ?? "")),
  ];
}

/** By how many columns of text a table is too wide. */
const excess = (columns: readonly Fitted[]): number =>
  columns.reduce((sum, { width }) => sum + width + 2, 0) - textWidth;

/** The table made to fit: names cut first, the widest before the others, then whole columns left out, the last first. */
function fitted(columns: readonly Fitted[]): readonly Fitted[] {
  let kept = columns;
  while (excess(kept) > 0) {
    const names = kept.filter(({ whenNarrow, width }) => whenNarrow === "cut" && width > leastName);
    const widest = names.reduce<Fitted | null>(
      (most, next) => (most === null || next.width > most.width ? next : most),
      null,
    );
    const spare = kept.findLast(({ whenNarrow }) => whenNarrow === "leave out");
    if (widest)
      kept = kept.map((column) => (column === widest ? { ...column, width: column.width - 1 } : column));
    else if (spare) kept = kept.filter((column) => column !== spare);
    else break;
  }
  return kept;
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
