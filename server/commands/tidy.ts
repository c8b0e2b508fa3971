/** `marl tidy`: files rewritten in their tidy form, or told that they aren't in it. */
import { resolve } from "node:path";
import { tidyText } from "../../grammar/tidy.ts";
import { readPath, writeWhole } from "../environment.ts";
import type { FileChange } from "../farm.ts";
import type { Command, Outlet, Status } from "./command.ts";
import { refuse } from "./refuse.ts";

export const tidy: Command = {
  name: "tidy",
  form: "marl tidy PATH… [--check]",
  about: "rewrite files in their tidy form; - tidies standard input to standard output",
  looksAtNoFarm: true,
  options: { check: { type: "boolean", about: "write nothing; list what isn't tidy and end with 1" } },
  run: async (words, outlet) => {
    const { paths } = words;
    const check = words.flag("check");
    if (paths.length === 0)
      return refuse(outlet, "tidy takes files or folders, for example: marl tidy examples");
    if (paths.includes("-"))
      return paths.length === 1
        ? tidyInput(check, outlet)
        : refuse(outlet, "- stands for standard input, and can't stand beside other paths");
    // Nothing is written before all paths are known to be there.
    const files = new Map<string, readonly [path: string, FileChange]>();
    for (const path of paths) {
      const found = await readPath(path);
      if (!found.ok) return refuse(outlet, found.reason);
      for (const [name, file] of found.value) files.set(resolve(name), [name, file]);
    }
    let status: Status = 0;
    for (const [path, file] of files.values()) {
      const ended = await tidyFile(path, file, check, outlet);
      if (ended > status) status = ended;
    }
    return status;
  },
};

async function tidyInput(check: boolean, outlet: Outlet): Promise<Status> {
  const given = await outlet.input();
  if ("unreadable" in given) return refuse(outlet, `standard input: ${given.unreadable}`);
  const text = tidyText(given.text);
  if (!check) outlet.out(text);
  else if (text !== given.text) {
    outlet.out("standard input isn't tidy\n");
    return 1;
  }
  return 0;
}

async function tidyFile(path: string, file: FileChange, check: boolean, outlet: Outlet): Promise<Status> {
  if (file !== null && "unreadable" in file)
    return refuse(outlet, `${path} is left alone: ${file.unreadable}`);
  // Where a link leads is among the files by its own name.
  if (file === null || !("text" in file)) return 0;
  const text = tidyText(file.text);
  if (text === file.text) return 0;
  if (check) {
    outlet.out(`${path} isn't tidy\n`);
    return 1;
  }
  const written = await writeWhole(path, text, true);
  if (!written.ok) return refuse(outlet, written.reason);
  outlet.out(`tidied ${path}\n`);
  return 0;
}
