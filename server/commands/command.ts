/** What a command is: words in, words out. The process, its streams and its status belong to the entrance. */
import { parseArgs } from "node:util";
import { readMoment } from "../../grammar/dates.ts";
import type { Moment } from "../farm.ts";

/** Where words go, and what is known of the place they go to. */
export interface Outlet {
  readonly out: (text: string) => void;
  readonly error: (text: string) => void;
  /** Shows how far a long piece of work is; does nothing where nobody watches. */
  readonly progress: (text: string | null) => void;
  /** What stands on standard input, whole. */
  readonly input: () => Promise<{ readonly text: string } | { readonly unreadable: string }>;
  readonly color: boolean;
  /** The wall clock, minutes since 1970-01-01. */
  readonly clock: number;
}

/** 0: gave what was asked. 1: an error in the farm. 2: the words of the command, or a path. */
export type Status = 0 | 1 | 2;

export interface Command {
  readonly name: string;
  readonly form: string;
  readonly about: string;
  readonly options: Readonly<Record<string, OptionRow>>;
  /** For a command that looks at texts only: the options that all others share mean nothing to it. */
  readonly looksAtNoFarm?: true;
  readonly run: (words: Words, outlet: Outlet) => Promise<Status>;
}

export interface OptionRow {
  readonly type: "string" | "boolean";
  /** What stands for its value in the help. */
  readonly value?: string;
  readonly about: string;
}

export interface Words {
  readonly paths: readonly string[];
  readonly text: (option: string) => string | null;
  readonly flag: (option: string) => boolean;
}

export const sharedOptions = {
  at: {
    type: "string",
    value: "WHEN",
    about: "see everything as at 2026-12-01T08:00 (a bare date: noon); default now",
  },
  format: { type: "string", value: "text|json", about: "how to print; default text" },
  color: { type: "boolean", about: "colour even where the output is no terminal; NO_COLOR switches it off" },
  help: { type: "boolean", about: "print this" },
} as const satisfies Record<string, OptionRow>;

/** All options of a command, its own first. */
export function optionsOf(command: Command): Readonly<Record<string, OptionRow>> {
  const { help } = sharedOptions;
  return { ...command.options, ...(command.looksAtNoFarm ? { help } : sharedOptions) };
}

/** Reads the words after a command's name. */
export function readWords(command: Command, words: readonly string[]): Words | { readonly reason: string } {
  const rows = Object.entries(optionsOf(command));
  try {
    const options = Object.fromEntries(rows.map(([name, { type }]) => [name, { type }]));
    const { values, positionals } = parseArgs({
      args: [...words],
      options,
      allowPositionals: true,
      strict: true,
    });
    const text = (option: string) => {
      const value = values[option];
      return typeof value === "string" ? value : null;
    };
    return { paths: positionals, text, flag: (option) => values[option] === true };
  } catch (error) {
    return { reason: (error as Error).message.split(". ")[0] ?? "the words can't be read" };
  }
}

/** The moment asked for; a reason where the words name none. */
export function momentOf(words: Words, clock: number): Moment | { readonly reason: string } {
  const asked = words.text("at");
  if (asked === null || asked === "now") return { at: clock, clock };
  const reading = readMoment(asked, "noon");
  if (reading.known) return { at: reading.moment.minute, clock };
  const [first = "2026-12-01 or 2026-12-01T08:00"] = reading.readings;
  return { reason: `--at ${asked} is no date; write for example ${first}` };
}

export function formatOf(words: Words): "text" | "json" | { readonly reason: string } {
  const asked = words.text("format") ?? "text";
  return asked === "text" || asked === "json" ? asked : { reason: `--format ${asked}: write text or json` };
}
