/** The command line: the one place that knows the process, its streams and its status. */

import { nearestWords } from "../grammar/nearest.ts";
import manifest from "../package.json" with { type: "json" };
import { check } from "./commands/check.ts";
import { type Command, type Outlet, readWords, type Status } from "./commands/command.ts";
import { explain } from "./commands/explain.ts";
import { help, helpFor } from "./commands/help.ts";
import { refuse } from "./commands/refuse.ts";
import { sheet } from "./commands/sheet.ts";
import { tidy } from "./commands/tidy.ts";
import { clockNow, textOf } from "./environment.ts";

/** Loaded when asked for: no other command needs what it brings. */
const serve: Command = {
  name: "serve",
  form: "marl serve --stdio",
  about: "the language server, for an editor to talk to",
  options: {
    stdio: { type: "boolean", about: "over standard input and output" },
    ipc: { type: "boolean", about: "over the channel of a Node process that started it" },
  },
  run: async (words, outlet) => {
    const [only, ...others] = (["stdio", "ipc"] as const).filter((name) => words.flag(name));
    if (!only || others.length > 0 || words.paths.length > 0)
      return refuse(outlet, "serve needs --stdio (or --ipc), and no path");
    if (only === "ipc" && !process.send)
      return refuse(outlet, "no Node process started this one with a channel");
    const { serve: start } = await import("./language-server.ts");
    start(only);
    return 0;
  },
};

const commands: readonly Command[] = [check, sheet, tidy, explain, serve];

const { stdin, stdout, stderr, env } = process;

/** https://no-color.org: any value that isn't empty switches colour off. */
const noColor = env.NO_COLOR !== undefined && env.NO_COLOR !== "";

function outletFor(words: readonly string[]): Outlet {
  const watched = stderr.isTTY === true;
  return {
    out: (text) => void stdout.write(text),
    error: (text) => void stderr.write(text),
    progress: (text) => {
      if (watched) stderr.write(`\r\u001b[K${text ?? ""}`);
    },
    input: async () => {
      const pieces: Buffer[] = [];
      for await (const piece of stdin) pieces.push(piece as Buffer);
      return textOf(Buffer.concat(pieces));
    },
    color: !noColor && (stdout.isTTY === true || words.includes("--color")),
    clock: clockNow(),
  };
}

async function run(words: readonly string[]): Promise<Status> {
  const outlet = outletFor(words);
  const [first, ...rest] = words;
  if (first === undefined || first === "--help" || first === "-h" || first === "help") {
    const write = first === undefined ? outlet.error : outlet.out;
    write(help(commands));
    return first === undefined ? 2 : 0;
  }
  if (first === "--version") {
    outlet.out(`marl ${manifest.version}\n`);
    return 0;
  }
  const command = commands.find(({ name }) => name === first);
  if (!command) {
    const [near] = nearestWords(
      first,
      commands.map(({ name }) => name),
    );
    return refuse(outlet, `${first} is no command${near ? `; ${near}?` : ""} (marl --help lists them)`);
  }
  const read = readWords(command, rest);
  if ("reason" in read) return refuse(outlet, `${read.reason} (marl ${command.name} --help)`);
  if (read.flag("help")) {
    outlet.out(helpFor(command));
    return 0;
  }
  return command.run(read, outlet);
}

// A reader that went away (`marl sheet … | head`) is no failure.
stdout.on("error", (error: NodeJS.ErrnoException) => {
  if (error.code === "EPIPE") process.exit(0);
  stderr.write(`marl: what was to be printed can't be written (${error.code ?? "no reason given"})\n`);
  process.exit(2);
});

process.exitCode = await run(process.argv.slice(2));
