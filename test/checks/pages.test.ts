import { readdirSync, readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { pageFolder, pages } from "../../scripts/problem-pages.ts";

const expected = pages();

test("there is a page for every code, and no other", () => {
  expect(readdirSync(pageFolder).sort()).toEqual([...expected.keys()].sort());
});

test.each([...expected])("%s is as the rules give it", (name, text) => {
  expect(readFileSync(`${pageFolder}/${name}`, "utf8")).toBe(text);
});
