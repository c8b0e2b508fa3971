// Writes docs/problems/, one page a code, from the rules (npm run generate); a test checks that nothing differs.
import { mkdir, readdir, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { type Code, codes } from "../server/checks/rules.ts";
import { type ExampleFile, type ProblemTopic, problemTopic } from "../server/report/explain/problems.ts";

export const pageFolder = "docs/problems";

/** `overdose-ph.md`. */
export const pageName = (code: string): string => `${code.replace("/", "-")}.md`;

function farmText(files: readonly ExampleFile[]): string {
  return files
    .map(({ file, text }) => {
      const block = ["```marl", text.trimEnd(), "```"].join("\n");
      return files.length > 1 ? `\`${file}\`:\n\n${block}` : block;
    })
    .join("\n\n");
}

function exampleText({ fires, silent, also }: ProblemTopic): string[] {
  if (fires.length === 0) return [];
  const company = also ? ` (with it comes [${also}](${pageName(also)}))` : "";
  return ["## An example", `This is told of${company}:`, farmText(fires), "This isn't:", farmText(silent)];
}

export function page(code: Code): string {
  const topic = problemTopic(code);
  if (topic.says === "") throw new Error(`The example of ${code} doesn't bring it about`);
  return [
    `# ${code}`,
    `${topic.title}.`,
    `Severity: ${topic.severity}.`,
    "## What it says",
    `> ${topic.says}`,
    "## Why it matters",
    topic.why,
    "## What to do",
    topic.todo,
    ...(topic.background ? ["## Background", topic.background] : []),
    ...exampleText(topic),
    "",
  ]
    .join("\n\n")
    .replace(/\n+$/, "\n");
}

/** All pages by file name. */
export const pages = (): ReadonlyMap<string, string> =>
  new Map(codes.map((code) => [pageName(code), page(code)]));

export async function main(): Promise<void> {
  const written = pages();
  await mkdir(pageFolder, { recursive: true });
  for (const name of await readdir(pageFolder)) if (!written.has(name)) await rm(join(pageFolder, name));
  for (const [name, text] of written) await writeFile(join(pageFolder, name), text);
  console.log(`${written.size} pages in ${pageFolder}`);
}
