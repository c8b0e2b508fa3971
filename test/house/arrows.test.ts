/** The rooms' imports point down only; what the product ships imports no test and no tool. */
import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { expect, test } from "vitest";

const root = resolve(import.meta.dirname, "../..");

/** From the lowest room up; two on one row don't know each other. */
const storeys: readonly (readonly string[])[] = [
  ["grammar"],
  ["server/quantity"],
  ["server/chemistry"],
  ["server/culture"],
  ["server/dosing"],
  ["server/checks"],
  ["server/farm.ts"],
  ["server/report"],
  ["server/editor", "server/environment.ts"],
  ["server/commands", "server/protocol"],
  ["server/language-server.ts"],
  // The command line, the extension, and the server as the extension starts it: entrances, none of which another knows.
  ["server/cli.ts", "server/ipc.ts", "client"],
];

const heightOf = (file: string): number =>
  storeys.findIndex((rooms) => rooms.some((room) => file === room || file.startsWith(`${room}/`)));

const roomOf = (file: string): string =>
  storeys.flat().find((room) => file === room || file.startsWith(`${room}/`)) ?? file;

function sources(folder: string): string[] {
  return readdirSync(join(root, folder), { recursive: true, encoding: "utf8" })
    .filter((name) => name.endsWith(".ts"))
    .map((name) => join(folder, name));
}

const imported =
  /(?:^|\n)\s*(?:import|export)\b[^;]*?from\s+"([^"]+)"|\bimport\(\s*"([^"]+)"\s*\)|(?:^|\n)import\s+"([^"]+)"/g;

interface Arrow {
  readonly from: string;
  readonly to: string;
}

function arrowsOf(file: string, text: string): Arrow[] {
  return [...text.matchAll(imported)].flatMap((match) => {
    const target = match[1] ?? match[2] ?? match[3] ?? "";
    return target.startsWith(".")
      ? [{ from: file, to: relative(root, resolve(root, dirname(file), target)) }]
      : [];
  });
}

const isUpward = ({ from, to }: Arrow): boolean => {
  if (to === "package.json") return !["server/cli.ts", "server/language-server.ts"].includes(roomOf(from));
  if (heightOf(to) < 0) return true;
  return heightOf(to) > heightOf(from) || (heightOf(to) === heightOf(from) && roomOf(to) !== roomOf(from));
};

const files = [...sources("grammar"), ...sources("server"), ...sources("client")];

test("every source file stands in a room", () => {
  expect(files.length).toBeGreaterThan(50);
  expect(files.filter((file) => heightOf(file) < 0)).toEqual([]);
});

test("imports point down only", () => {
  const arrows = files.flatMap((file) => arrowsOf(file, readFileSync(join(root, file), "utf8")));
  expect(arrows.length).toBeGreaterThan(100);
  expect(arrows.filter(isUpward)).toEqual([]);
});

test("the extension knows of the server only what the two say to each other", () => {
  const arrows = sources("client").flatMap((file) => arrowsOf(file, readFileSync(join(root, file), "utf8")));
  const into = new Set(arrows.map(({ to }) => to).filter((to) => !to.startsWith("client/")));
  expect([...into]).toEqual(["server/protocol/requests.ts"]);
});

/** Those of the extension that can be tried without VS Code. */
const plain = sources("client").filter((file) =>
  readFileSync(join(root, file), "utf8").includes("No VS Code in here."),
);

test("what says that no VS Code is in it has none", () => {
  expect(plain.length).toBeGreaterThan(5);
  const knowing = plain.filter((file) =>
    arrowsOf(file, readFileSync(join(root, file), "utf8"))
      .map(({ to }) => to)
      .some((to) => to.startsWith("client/") && !plain.includes(to)),
  );
  expect(knowing).toEqual([]);
  for (const file of plain) expect(readFileSync(join(root, file), "utf8")).not.toContain('from "vscode');
});

test("an import that points up is seen", () => {
  const text =
    'import type { Farm } from "../farm.ts";\nimport {\n  problem,\n} from "../checks/problem.ts";\nexport { x } from "./y.ts";';
  expect(arrowsOf("server/dosing/x.ts", text).filter(isUpward)).toEqual([
    { from: "server/dosing/x.ts", to: "server/farm.ts" },
    { from: "server/dosing/x.ts", to: "server/checks/problem.ts" },
  ]);
});

/** Only the doors to the outside may touch it. */
const outside = new Set([
  "server/environment.ts",
  "server/cli.ts",
  "server/language-server.ts",
  "client/server.ts",
]);

test("the core knows no files, process or clock", () => {
  const touching = files.filter((file) => {
    if (outside.has(file)) return false;
    const text = readFileSync(join(root, file), "utf8");
    return /from "node:(fs|child_process|os|net|http)|\bprocess\.|\bDate\.now\(|new Date\(\)/.test(text);
  });
  expect(touching).toEqual([]);
});
