// Writes docs/problems/, one page a code, from the rules (npm run generate); a test checks that nothing differs.
import { mkdir, readdir, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";
import type { Rule } from "../server/checks/rule.ts";
import { type Code, codes, type Problem, problemsOf, rules } from "../server/checks/rules.ts";
import { filesOf, walk } from "../test/checks/walk.ts";

export const pageFolder = "docs/problems";

/** `overdose-ph.md`. */
export const pageName = (code: string): string => `${code.replace("/", "-")}.md`;

const ruleOf = (code: Code): Rule => rules[code] as unknown as Rule;

/** The first problem of this code that the rule's own example brings about. */
function problemOf(code: Code): Problem {
  const { example, sample } = ruleOf(code);
  const problems = example ? walk(filesOf(example.fires)).problems : sample ? problemsOf([sample]) : [];
  const problem = problems.find((other) => other.code === code);
  if (!problem) throw new Error(`The example of ${code} doesn't bring it about`);
  return problem;
}

function farmText(text: string): string {
  const files = [...filesOf(text)];
  return files
    .map(([file, lines]) => {
      const block = ["```marl", lines.trimEnd(), "```"].join("\n");
      return files.length > 1 ? `\`${file}\`:\n\n${block}` : block;
    })
    .join("\n\n");
}

function exampleText({ example }: Rule): string[] {
  if (!example) return [];
  const also = example.also ? ` (with it comes [${example.also}](${pageName(example.also)}))` : "";
  return [
    "## An example",
    `This is told of${also}:`,
    farmText(example.fires),
    "This isn't:",
    farmText(example.silent),
  ];
}

export function page(code: Code): string {
  const rule = ruleOf(code);
  const { message } = problemOf(code);
  const severity = rule.severityInWords ?? rule.severity;
  return [
    `# ${code}`,
    `${rule.title}.`,
    `Severity: ${severity}.`,
    "## What it says",
    `> ${message}`,
    "## Why it matters",
    rule.why,
    "## What to do",
    rule.todo,
    ...(rule.background ? ["## Background", rule.background] : []),
    ...exampleText(rule),
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
