/** A whole farm through a real server: what it tells of the water, of caustics, and of a dose too large as it is typed. */
import { readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { expect, test } from "vitest";
import { folder } from "../commands/marl.ts";
import { rich, startClient } from "./client.ts";

const fixture = resolve(import.meta.dirname, "../editor/fixtures/north-house");
const texts = Object.fromEntries(
  ["north-house.marl", "solutions.marl"].map((name) => [name, readFileSync(join(fixture, name), "utf8")]),
);

test("drift and doses in the hover, cautions, and an overdose while it is typed", async () => {
  const pushes = { ...rich, textDocument: { ...rich.textDocument, diagnostic: undefined } };
  const client = await startClient({ capabilities: pushes, folder: folder(texts) });
  const text = texts["north-house.marl"]!;
  await client.open("north-house.marl", text);
  await client.open("solutions.marl", texts["solutions.marl"]!);
  const uri = client.uriOf("north-house.marl");
  const hover = await client.request<{ readonly contents: { readonly value: string } }>(
    "textDocument/hover",
    {
      textDocument: { uri },
      position: { line: 2, character: 10 },
    },
  );
  const { value } = hover.contents;
  const [, ash, chloride] = /ash\\?-part (\d+) mL\/day.*chloride\\?-part (\d+) mL\/day/.exec(value) ?? [];
  // Two parts of about the same strength, in balance: 2 meq of alkalinity to 1 mmol of calcium.
  expect(Number(ash)).toBeGreaterThan(0);
  expect(Number(chloride) / Number(ash)).toBeGreaterThan(0.5);
  expect(Number(chloride) / Number(ash)).toBeLessThan(1.5);
  expect(value).toMatch(/as set falls [\d.]+ dKH a day/);
  expect(value).toMatch(/as planned rises [\d.]+ dKH a day/);
  const caustic = (await client.problemsOf("solutions.marl", 1)).diagnostics.filter(
    ({ code }) => code === "hazard/caustic",
  );
  expect(caustic.map(({ range, severity }) => [range.start.line, severity])).toEqual([
    [6, 2],
    [20, 2],
  ]);

  const line = text.trimEnd().split("\n").length - 1;
  const end = { line, character: text.trimEnd().split("\n")[line]!.length };
  let version = 1;
  for (const letter of "\n  2026-12-01 07:50 gave ash-part 900 mL") {
    version += 1;
    await client.change("north-house.marl", version, [{ range: { start: end, end }, text: letter }]);
    if (letter === "\n") {
      end.line += 1;
      end.character = 0;
    } else end.character += 1;
  }
  const { diagnostics } = await client.problemsOf("north-house.marl", version);
  const overdose = diagnostics.filter(({ code }) => code.startsWith("overdose/"));
  // 900 mL of 1.57 meq/mL in 1740 L: 0.813 meq/L, 2.28 dKH at once.
  expect(overdose.map(({ code, range }) => [code, range.start.line])).toEqual([
    ["overdose/alkalinity-dose", line + 1],
    ["overdose/alkalinity-rise", line + 1],
    ["overdose/ph", line + 1],
  ]);
  expect(overdose[0]!.message).toContain("by 2.28 dKH");
});
