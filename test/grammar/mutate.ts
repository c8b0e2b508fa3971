/** Small Marl files out of real ones, and the slips of hand, editor and disk that turn them into others. */
import { readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { statementTable } from "../../grammar/statements.ts";
import { keywords } from "../../grammar/tokens.ts";
import { unitTable } from "../../grammar/units.ts";
import { eastHall, shelves } from "./a-farm.ts";

/** The next number from 0 up to 1. */
export type Random = () => number;

const root = resolve(import.meta.dirname, "../..");
const readmeBlocks = [
  ...readFileSync(join(root, "README.md"), "utf8").matchAll(/```marl\n([\s\S]*?)```/g),
].map((match) => match[1] ?? "");
const examples = readdirSync(join(root, "examples"), { recursive: true, encoding: "utf8" })
  .filter((name) => name.endsWith(".marl"))
  .sort()
  .map((name) => readFileSync(join(root, "examples", name), "utf8"));
const everyStatement = statementTable
  .flatMap(({ form, sections, examples: lines }) =>
    form === "header"
      ? lines
      : sections.flatMap((section) => [
          section === "store" ? section : `${section} some-name`,
          ...lines.map((line) => `  ${line}`),
        ]),
  )
  .join("\n");

/** The texts that files are cut from. */
export const wholeTexts: readonly string[] = [
  ...examples,
  ...readmeBlocks,
  eastHall,
  shelves,
  `${everyStatement}\n`,
];

export const pick = <T>(random: Random, from: readonly T[]): T => from[below(random, from.length)]!;
/** A whole number from 0 to less than `count`; 0 where that is none. */
export const below = (random: Random, count: number): number => Math.floor(random() * count);

const isHeader = (line: string): boolean => /^[a-z]/.test(line);

/** A few lines in a row of one of the texts, most often below the header that they stood under. */
export function smallFile(random: Random): string {
  const lines = pick(random, wholeTexts).split("\n");
  const first = below(random, lines.length);
  const cut = lines.slice(first, first + 2 + below(random, 12));
  const header = lines.slice(0, first).findLast(isHeader);
  const text = [...(header !== undefined && random() < 0.8 ? [header] : []), ...cut].join("\n");
  return random() < 0.15 ? `${text}\n${smallFile(random)}` : text;
}

const strange = [
  ...["é", "µ", "µmol", "²", "−", "±", "+-", "+/-", "×", "°", "½", "海水", "ア", "🐠", "\u{20bb7}"],
  ...["\ud83d", "\udc20", "\0", "\u0007", "\t", "\t\t", "\u00a0", "\u202f", "\u200b", "\u2060", "\ufeff"],
  ...["\u2028", "\u0085", "\v", "\f", "\r", "\r\r", "\r\n", "\n", "\n\n", "\n\n\n", "  \n", "\n ", " "],
  ...['"', '""', "“", "”", "„", "'", "’", "#", " # ", "# quiet: a/b", "\n# remark\n", "\n  # remark\n"],
  ...["<<<<<<< ours\n", "\n=======\n", "\n>>>>>>> theirs\n", "\n||||||| base\n", ",", "/", "-", ".", ":"],
  ...["7,9", "1,250", "1 250", ".9", "1e3", "24.11.2026", "2026-02-30", "9999-12-31 24:00", "8:05", "T08:05"],
  ...["as CaCO3", "as  caco3", "from 2026-01-01", "until 2026-12-31 24:00", "by mk", "total", "times 2"],
];
const units = unitTable.flatMap(({ spelling, also }) => [spelling, ...also]);

const insertion = (random: Random): string => {
  const choice = random();
  if (choice < 0.6) return pick(random, strange);
  if (choice < 0.8) return ` ${pick(random, keywords)} `;
  if (choice < 0.9) return ` ${pick(random, units)}`;
  return pick(random, pick(random, wholeTexts).split(/[ \n]/));
};

type Mutation = (text: string, random: Random) => string;

/** Text cut at a separator, changed as a list, put together again. */
const inPieces =
  (cut: RegExp, change: (pieces: string[], at: number, random: Random) => void): Mutation =>
  (text, random) => {
    // What stands between the pieces is kept, so a piece is every second one.
    const parts = text.split(cut);
    change(parts, 2 * below(random, (parts.length + 1) / 2), random);
    return parts.join("");
  };
const words = /([ \t]+|\n)/;
const lines = /(\n)/;

const remove = (pieces: string[], at: number): void => void pieces.splice(at, 2);
const double = (pieces: string[], at: number): void =>
  void pieces.splice(at, 0, pieces[at] ?? "", pieces[at + 1] ?? "\n");
const swap = (pieces: string[], at: number, random: Random): void => {
  const other = 2 * below(random, (pieces.length + 1) / 2);
  [pieces[at], pieces[other]] = [pieces[other] ?? "", pieces[at] ?? ""];
};
const insert = (pieces: string[], at: number, random: Random): void => {
  pieces[at] = insertion(random) + (pieces[at] ?? "");
};

/** Bytes of the text changed and read again as UTF-8, as a careless program would. */
const flipBytes: Mutation = (text, random) => {
  const bytes = Buffer.from(text, "utf8");
  for (let flips = 1 + below(random, 4); flips > 0 && bytes.length > 0; flips -= 1) {
    const at = below(random, bytes.length);
    bytes[at] = bytes[at]! ^ (1 << below(random, 8));
  }
  return bytes.toString("utf8");
};

export const mutations: Readonly<Record<string, Mutation>> = {
  "word left out": inPieces(words, remove),
  "word doubled": inPieces(words, double),
  "words swapped": inPieces(words, swap),
  "something put before a word": inPieces(words, insert),
  "line left out": inPieces(lines, remove),
  "line doubled": inPieces(lines, double),
  "lines swapped": inPieces(lines, swap),
  "something put before a line": inPieces(lines, insert),
  "something put anywhere": (text, random) => {
    const at = below(random, text.length + 1);
    return text.slice(0, at) + insertion(random) + text.slice(at);
  },
  "characters left out": (text, random) => {
    const at = below(random, text.length);
    return text.slice(0, at) + text.slice(at + 1 + below(random, 3));
  },
  "bits flipped": flipBytes,
  "cut off": (text, random) => text.slice(0, below(random, text.length + 1)),
  "indent changed": (text, random) =>
    inPieces(lines, (pieces, at) => {
      pieces[at] = pick(random, ["", " ", "  ", "\t", "\u00a0 ", "      "]) + pieces[at]!.trimStart();
    })(text, random),
  "space changed": (text, random) =>
    text.replaceAll(" ", () => (random() < 0.2 ? pick(random, ["  ", "\t", "\u00a0", "", "   "]) : " ")),
  "line endings changed": (text) => text.replace(/\r?\n/g, "\r\n"),
  "line endings mixed": (text, random) => text.replace(/\n/g, () => (random() < 0.5 ? "\r\n" : "\n")),
  "byte order mark": (text) => `\ufeff${text}`,
};

/** A small file with one to five slips in it. */
export function mutatedFile(random: Random): string {
  const kinds = Object.values(mutations);
  let text = smallFile(random);
  for (let slips = 1 + below(random, 5); slips > 0; slips -= 1) text = pick(random, kinds)(text, random);
  return text;
}
