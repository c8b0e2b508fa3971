/** Systems that can't be as they are declared. */
import type { SystemFact } from "../../grammar/syntax.ts";
import type { Files } from "../culture/names.ts";
import type { Place } from "../culture/place.ts";
import { bandFigure, edgeFigure, figure } from "./figures.ts";
import { lineAt, swapping } from "./fixing.ts";
import type { LineFix } from "./problem.ts";
import type { Of, Rules } from "./rule.ts";
import { linesAfter } from "./sections.ts";
import { atStart } from "./words.ts";

/** Why there is no water to dose into. */
function noWater({ reason, volumeL }: Of<"system/no-volume">): string {
  if (reason === "no-tank") return "This system has neither a tank nor a measured volume.";
  if (reason === "measured-nothing") return "The measured volume of this system is 0.";
  if (reason === "empty-tanks") return "The tanks of this system hold nothing.";
  const over = volumeL < 0 ? `${figure(-volumeL, "L")} more than` : "all that";
  return `What is displaced takes up ${over} the tanks hold.`;
}

function holdAt(files: Files, place: Place): Extract<SystemFact, { kind: "hold" }> | null {
  const statement = lineAt(files, place)?.statement;
  return statement?.kind === "hold" ? statement : null;
}

/** The lower edge and the higher one in each other's place; a unit written once stays where it is. */
function edgesSwapped({ place, low, high }: Of<"system/empty-hold">, files: Files): readonly LineFix[] {
  const hold = holdAt(files, place);
  const text = lineAt(files, place)?.text;
  if (!hold || text === undefined || low <= high) return [];
  const shared = hold.low.borrowedUnit || hold.high.borrowedUnit;
  const [left, right] = shared ? [hold.low.number, hold.high.number] : [hold.low, hold.high];
  return swapping(place, text, "Swap the two values", left, right);
}

function aimLeftOut({ place }: Of<"system/aim-outside">, files: Files): readonly LineFix[] {
  const aim = holdAt(files, place)?.aim;
  const text = lineAt(files, place)?.text;
  if (!aim || text === undefined) return [];
  const [word] = /\s+aim\s+$/.exec(text.slice(0, aim.start)) ?? [];
  if (!word) return [];
  const { file, line } = place;
  const edits = [{ file, line, start: aim.start - word.length, end: aim.end, text: "" }];
  return [{ title: "Leave out the aim", safe: false, edits }];
}

function datesSwapped({ place }: Of<"system/until-before-from">, files: Files): readonly LineFix[] {
  const line = lineAt(files, place);
  const statement = line?.statement;
  if (!line || !statement || !("until" in statement)) return [];
  const { from, until } = statement;
  if (!from || !until || from.minute === until.minute) return [];
  return swapping(place, line.text, "Swap the two dates", from, until);
}

/** A size is needed that nobody but the farm knows: an example of one. */
const exampleTank = "tank main 500 L";

function tankAdded({ place, reason }: Of<"system/no-volume">, files: Files): readonly LineFix[] {
  const document = files.get(place.file);
  if (reason !== "no-tank" || !document?.lines[place.line]) return [];
  const edits = [linesAfter(document, place.file, place.line, true, [exampleTank])];
  return [{ title: `Add ${exampleTank}, an example to correct`, safe: false, edits }];
}

export const systemRules: Rules<
  | "system/no-volume"
  | "system/volume-differs"
  | "system/empty-hold"
  | "system/aim-outside"
  | "system/until-before-from"
> = {
  "system/no-volume": {
    severity: "error",
    title: "A system without water",
    says: noWater,
    why: "Without its volume no dose can be worked out.",
    todo: "Add a tank line or a measured volume, or check the sizes.",
    todoHere: ({ reason }) =>
      reason === "no-tank"
        ? "Add a tank line, or one with measured volume."
        : "Check the sizes of the tanks and of what is displaced.",
    fixes: tankAdded,
    example: {
      fires: "system vat\n  tank main 100 L\n  displace rock 120 L\n",
      silent: "system vat\n  tank main 100 L\n  displace rock 12 L\n",
    },
  },
  "system/volume-differs": {
    severity: "warning",
    title: "A measured volume far from the tanks' sizes",
    says: ({ measuredL, geometricL }) =>
      `${figure(measuredL, "L")} are measured, and the sizes of the tanks make ${figure(geometricL, "L")}.`,
    why: "The measured volume counts, and every dose is off by as much as it is.",
    todo: "Measure again, or check sizes, water depths and what is displaced.",
    background: "Asked where the two differ by more than 10 %: common practice, no source.",
    example: {
      fires: "system vat\n  tank main 500 L\n  measured volume 410 L\n",
      silent: "system vat\n  tank main 500 L\n  displace rock 70 L\n  measured volume 410 L\n",
    },
  },
  "system/empty-hold": {
    severity: "error",
    title: "A band with nothing in it",
    says: ({ parameter, low, high, unit }) =>
      `The band of ${parameter} is empty: ${bandFigure(parameter, low, high, unit)}.`,
    why: "This line is left out, so this parameter isn't held.",
    todo: "Write the lower value first, and a higher one after it.",
    fixes: edgesSwapped,
    example: {
      fires: "system vat\n  tank main 500 L\n  hold temperature 26.5 to 24.5 degC\n",
      silent: "system vat\n  tank main 500 L\n  hold temperature 24.5 to 26.5 degC\n",
    },
  },
  "system/aim-outside": {
    severity: "error",
    title: "An aim outside its band",
    says: ({ parameter, low, high, aim, unit }) =>
      `${atStart(parameter)} is to aim at ${edgeFigure(parameter, aim, unit)}, outside its band of ${bandFigure(parameter, low, high, unit)}.`,
    why: "The middle of the band is aimed at instead.",
    todo: "Move the aim into the band, or leave it out.",
    fixes: aimLeftOut,
    example: {
      fires: "system vat\n  tank main 500 L\n  hold temperature 24.5 to 26.5 degC aim 27\n",
      silent: "system vat\n  tank main 500 L\n  hold temperature 24.5 to 26.5 degC aim 25\n",
    },
  },
  "system/until-before-from": {
    severity: "error",
    title: "A fact that ends before it begins",
    says: () => "This ends before it begins, or at the same moment.",
    why: "It never holds, so this line is left out.",
    todo: "Check the two dates; on the day of until it holds no more.",
    fixes: datesSwapped,
    example: {
      fires: "system vat\n  tank main 500 L\n  evaporates 4 L/day from 2026-11-01 until 2026-10-01\n",
      silent: "system vat\n  tank main 500 L\n  evaporates 4 L/day from 2026-10-01 until 2026-11-01\n",
    },
  },
};
