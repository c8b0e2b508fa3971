/** Two thousand random edits, sent without waiting: in the end the problems are those of a fresh start. */
import { readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { expect, test } from "vitest";
import { changed } from "../../server/protocol/buffers.ts";
import { characterOf, type Encoding } from "../../server/protocol/positions.ts";
import { folder } from "../commands/marl.ts";
import { chanceFrom } from "../simulator/random.ts";
import { startClient } from "./client.ts";

const examples = resolve(import.meta.dirname, "../../examples");
const files = [
  ...["farm.marl", "solutions.marl", "raceways/system.marl", "raceways/log.marl"],
  ...["lagoon/system.marl", "lagoon/log.marl", "quarantine/system.marl", "quarantine/log.marl"],
];
const texts = Object.fromEntries(files.map((file) => [file, readFileSync(join(examples, file), "utf8")]));

/** What people type, paste and slip in. */
const pieces = [
  ...[
    "a",
    " ",
    "  ",
    "\n",
    "\n  ",
    "#",
    '"',
    ",",
    ".",
    "7",
    "0",
    "-",
    "é",
    "水",
    "🪸",
    "±",
    "\r\n",
    "\ufeff",
  ],
  ...["read alkalinity 8 dKH", "  2026-11-30 08:00 gave carbonate-part 90 mL\n", "system", "log raceways\n"],
  ...[
    'use "../farm.marl"\n',
    "solution carbonate-part\n",
    "# quiet: name/unused",
    "<<<<<<< ours\n",
    "dKH",
    " mg/L",
  ],
];

interface Edit {
  readonly file: string;
  readonly changes: readonly { readonly range?: object; readonly text: string }[];
}

/** Random edits of lines and characters, told as the encoding counts; the texts that they lead to. */
function* edits(count: number, seed: number, encoding: Encoding): Generator<Edit, Map<string, string>> {
  const { uniform } = chanceFrom(seed);
  const below = (most: number) => Math.floor(uniform() * most);
  const now = new Map(Object.entries(texts));
  for (let number = 0; number < count; number += 1) {
    const file = files[below(files.length)]!;
    const text = now.get(file)!;
    const lines = text.split("\n");
    const place = () => {
      const line = below(lines.length);
      const whole = [...lines[line]!.replace(/\r$/, "")];
      const before = whole.slice(0, below(whole.length + 1)).join("");
      return { line, before, character: characterOf(before, before.length, encoding) };
    };
    const start = place();
    const kind = below(10);
    const position = { line: start.line, character: start.character };
    const lineStart = { line: start.line, character: 0 };
    const nextLine = { line: start.line + 1, character: 0 };
    const change =
      kind < 5
        ? { range: { start: position, end: position }, text: pieces[below(pieces.length)]! }
        : kind < 7
          ? { range: { start: lineStart, end: nextLine }, text: "" }
          : kind < 8
            ? { range: { start: lineStart, end: lineStart }, text: `${lines[below(lines.length)]}\n` }
            : kind < 9
              ? { range: { start: lineStart, end: position }, text: "" }
              : { range: { start: position, end: { line: start.line, character: 1_000_000 } }, text: "" };
    // Now and then everything is put back, so that the farm doesn't fall to pieces.
    const changes = below(60) === 0 ? [{ text: texts[file]! }] : [change];
    now.set(file, changed(text, changes, encoding));
    yield { file, changes };
  }
  return now;
}

async function problemsAfter(
  encoding: Encoding,
  opened: ReadonlyMap<string, string>,
  steps: Generator<Edit, Map<string, string>>,
) {
  const client = await startClient({
    capabilities: { general: { positionEncodings: [encoding] } },
    folder: folder(texts),
  });
  expect(client.capabilities.positionEncoding).toBe(encoding);
  const versions = new Map<string, number>();
  for (const [file, text] of opened) await client.open(file, text);
  let step = steps.next();
  for (let sent = 1; !step.done; sent += 1, step = steps.next()) {
    const { file, changes } = step.value;
    const version = (versions.get(file) ?? 1) + 1;
    versions.set(file, version);
    await client.change(file, version, changes);
    // A hover now and then, as people have it while they type.
    if (sent % 50 === 0) await client.request("textDocument/hover", at(client.uriOf(file)));
  }
  const told = new Map<string, unknown>();
  for (const file of files) {
    const version = versions.get(file) ?? 1;
    await client.problemsOf(file, version);
  }
  // What is published last for a file is what stands, also where another file's edit changed it.
  await client.request("textDocument/hover", at(client.uriOf("farm.marl")));
  for (const file of files) {
    const last = client.published.findLast(({ uri }) => uri === client.uriOf(file))!;
    expect(last.version, file).toBe(versions.get(file) ?? 1);
    told.set(file, last.diagnostics);
  }
  const newest = new Map<string, number>();
  for (const { uri, version = 0 } of client.published) {
    expect(version).toBeGreaterThanOrEqual(newest.get(uri) ?? 0);
    newest.set(uri, version);
  }
  return { told, texts: step.value };
}

const at = (uri: string) => ({ textDocument: { uri }, position: { line: 3, character: 4 } });

function* none(): Generator<Edit, Map<string, string>> {
  yield* [];
  return new Map();
}

test.each([
  ["utf-8", 1],
  ["utf-16", 2],
  ["utf-32", 3],
] as const)("in %s", async (encoding, seed) => {
  const after = await problemsAfter(encoding, new Map(Object.entries(texts)), edits(667, seed, encoding));
  const fresh = await problemsAfter(encoding, after.texts, none());
  for (const file of files) {
    const strip = (found: Map<string, unknown>) =>
      JSON.stringify(found.get(file)).replaceAll(/file:\/\/[^"]*\/marl-test-[^/]*/g, "");
    expect(strip(after.told), file).toBe(strip(fresh.told));
  }
});
