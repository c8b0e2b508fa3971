/** `marl sheet`: the water now, where it goes, and today's doses. */
import { extname, resolve } from "node:path";
import { writeWhole } from "../environment.ts";
import type { Farm } from "../farm.ts";
import { markdownSheet } from "../report/markdown.ts";
import { reportOn } from "../report/report.ts";
import { coversSystem, type Scope } from "../report/scope.ts";
import { sheetOf } from "../report/sheet.ts";
import { textSheet } from "../report/text.ts";
import { type Command, formatOf, momentOf } from "./command.ts";
import { openFarm } from "./open-farm.ts";
import { refuse } from "./refuse.ts";

type Face = "txt" | "md" | "json";

export const sheet: Command = {
  name: "sheet",
  form: "marl sheet PATH [--system NAME] [--to FILE.txt|.md|.json] [--replace]",
  about: "the dose sheet: the water now, where it is going, what to dose today",
  options: {
    system: { type: "string", value: "NAME", about: "of one system only" },
    to: { type: "string", value: "FILE", about: "write to a .txt, .md or .json file instead of the screen" },
    replace: { type: "boolean", about: "write over FILE where it exists" },
  },
  run: async (words, outlet) => {
    if (words.paths.length !== 1)
      return refuse(outlet, "sheet takes one PATH, for example: marl sheet examples");
    const moment = momentOf(words, outlet.clock);
    if ("reason" in moment) return refuse(outlet, moment.reason);
    const format = formatOf(words);
    if (typeof format !== "string") return refuse(outlet, format.reason);
    const to = words.text("to");
    const face = to === null ? (format === "json" ? "json" : "txt") : faceOf(to);
    if (!face) return refuse(outlet, `--to ${to}: end the name with .txt, .md or .json`);
    if (words.text("format") === "json" && face !== "json")
      return refuse(outlet, `--format json writes JSON: end ${to} with .json`);
    const opened = await openFarm(words.paths, moment, outlet);
    if ("reason" in opened) return refuse(outlet, opened.reason);
    const { farm } = opened.open;
    const scope: Scope = { ...opened.open.scope, system: words.text("system") };
    const refusal = unknownSystem(farm, scope);
    if (refusal) return refuse(outlet, refusal);
    const text = drawn(farm, scope, face, to === null && outlet.color);
    if (to === null) {
      outlet.out(text);
      return 0;
    }
    const written = await writeWhole(resolve(to), text, words.flag("replace"));
    if (!written.ok) return refuse(outlet, written.reason.replace(resolve(to), to));
    outlet.error(`wrote ${to}\n`);
    return 0;
  },
};

const faceOf = (file: string): Face | null =>
  (({ ".txt": "txt", ".md": "md", ".json": "json" }) as const)[extname(file)] ?? null;

function drawn(farm: Farm, scope: Scope, face: Face, color: boolean): string {
  if (face === "json") return `${JSON.stringify(reportOn(farm, scope), null, 2)}\n`;
  const sheetModel = sheetOf(farm, scope);
  return face === "md" ? markdownSheet(sheetModel) : textSheet(sheetModel, color);
}

function unknownSystem(farm: Farm, scope: Scope): string | null {
  if (scope.system === null) return null;
  const all = [...farm.bound.model.systems.values()];
  if (all.some((system) => coversSystem(scope, system))) return null;
  const names = all.map(({ name }) => name).join(", ");
  return `no system is called ${scope.system}${names ? `; there are ${names}` : ""}`;
}
