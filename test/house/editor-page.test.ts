/** docs/editor.md is what its script makes of the server's own features, and the pages that it names are there. */
import { existsSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { editorPage, editorText } from "../../scripts/editor-page.ts";
import { features } from "../../server/protocol/features.ts";

const text = readFileSync(editorPage, "utf8");

test("it is what its script makes", async () => {
  expect(text).toBe(await editorText());
});

test("it lists every feature", () => {
  for (const { title } of features) expect(text).toContain(`| ${title} |`);
});

test("the pages that it names are there", () => {
  const links = [...text.matchAll(/\]\(([^)#]+)\)/g)].map((match) => match[1] ?? "");
  expect(links.length).toBeGreaterThan(3);
  expect(links.filter((link) => !existsSync(join("docs", link)))).toEqual([]);
});
