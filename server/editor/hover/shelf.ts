/** What stands on the shelf: salt waters, kits, the store; and the lines of a log's header and of `use`. */
import type { ParameterName } from "../../../grammar/parameters.ts";
import { changeFigure, figure, valueFigure } from "../../checks/figures.ts";
import { allOf } from "../../checks/words.ts";
import { alkalinity } from "../../culture/convert.ts";
import { dKH, plainUnit } from "../../culture/display.ts";
import { factAt } from "../../culture/history.ts";
import type { DisplayUnit, ReadEvent, ReadValue, SystemEvent } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { flowsSet } from "../../dosing/rates.ts";
import { toDouble } from "../../quantity/decimal.ts";
import { readPlain } from "../../quantity/plain.ts";
import { ago, dayAndMonth } from "../../report/latest.ts";
import { biasFound, biasOf, biasText } from "./bias.ts";
import { amount, lasting, percent, shortMoment, volumeFigure } from "./parts.ts";
import { massText } from "./reagent.ts";
import { recipeHere, solutionHover, strengthText } from "./solution.ts";
import type { Tells } from "./spot.ts";

/** A parameter as the trade writes it, where no system says how. */
const usualUnit = (name: ParameterName): DisplayUnit =>
  name === alkalinity.name ? { spelling: "dKH", perModelUnit: 1 / dKH } : plainUnit(name);

/** A salt water: its values now. */
export const saltWaterTold: Tells = ({ model, under, at }) => {
  const water = under.thing?.ref ? model.waters.get(under.thing.ref) : undefined;
  if (!water) return null;
  const values = [...water.values].flatMap(([name, history]) => {
    const entry = factAt(history, at);
    if (!entry) return [];
    const since = Number.isFinite(entry.from) ? ` (from ${dayAndMonth(entry.from)} on)` : "";
    return [`${name} ${valueFigure(name, entry.value, usualUnit(name))}${since}`];
  });
  return {
    answer: `${water.name}: ${values.length > 0 ? values.join(", ") : "nothing is stated of it"}.`,
    blocks: [["What isn't stated is taken as in sea water of its salinity."]],
  };
};

/** A kit: how far its tests scatter. */
export const kitTold: Tells = ({ farm, model, under, at }) => {
  const kit = under.thing?.ref ? model.kits.get(under.thing.ref) : undefined;
  if (!kit) return null;
  const scatters = [...kit.deviations].flatMap(([name, history]) => {
    const deviation = factAt(history, at)?.value;
    if (!deviation) return [];
    const size = deviation.relative
      ? percent(deviation.value)
      : changeFigure(name, deviation.value, usualUnit(name));
    return [`${name} ${size}`];
  });
  return {
    answer: `${kit.name}: ${scatters.length > 0 ? `tests scatter by ${scatters.join(", ")} (one standard deviation)` : "no scatter is stated"}.`,
    blocks: [biasOf(farm, kit, at).map((bias) => biasText(kit.name, bias, usualUnit(bias.parameter)))],
  };
};

/** `checked`: how far off a test of something known was. */
export const checkedTold: Tells = ({ statement }) => {
  const bias = statement.kind === "checked" ? biasFound(statement) : null;
  if (!bias) return null;
  const { parameter: name, off, known } = bias;
  if (off === 0) return { answer: `${name}: right on.`, blocks: [] };
  const share = known === 0 ? "" : ` (${percent(Math.abs(off / known))})`;
  return {
    answer: `${name}: ${changeFigure(name, Math.abs(off), usualUnit(name))}${share} ${off > 0 ? "too high" : "too low"}.`,
    blocks: [["That isn't taken off in any estimate yet."]],
  };
};

/** `received`, `counted`: what a mass of a reagent is worth. */
export const massTold: Tells = ({ farm, statement, place, at }) => {
  if (statement.kind !== "received" && statement.kind !== "counted") return null;
  const read = readPlain(statement.mass, "mass");
  const grams = read.ok ? toDouble(read.value.value) : null;
  if (grams === null) return null;
  const worth = massText(farm, place.file, statement.reagent, grams, at);
  return worth
    ? { answer: `${amount(grams / 1000, "kg")} of ${statement.reagent.text}: ${worth}.`, blocks: [] }
    : null;
};

/** `mixed`, `discarded`: what a volume of a solution holds, and how long it lasts as set. */
export const batchTold: Tells = ({ farm, model, statement, place }) => {
  if (statement.kind !== "mixed" && statement.kind !== "discarded") return null;
  const read = readPlain(statement.volume, "volume");
  const litres = read.ok ? toDouble(read.value.value) : null;
  const seen = farm.bound.names.visible.get(place.file)?.get(statement.solution.text);
  const solution = seen?.kind === "solution" ? model.solutions.get(seen.ref) : undefined;
  if (litres === null || !solution) return null;
  const strength = factAt(solution.strengths, statement.at.minute)?.value;
  const perDay = [...farm.assessments.values()].reduce(
    (sum, each) => sum + givenPerDay(each, solution.ref),
    0,
  );
  const lasts = lasting(litres, perDay);
  return {
    answer: `${volumeFigure(litres)} of ${solution.name}: ${lasts ? `${lasts} at ${figure(perDay * 1000, "mL")} a day as set now` : "nothing is set to give it now"}.`,
    blocks: [strength ? [`1 mL brings ${strengthText(strength)}.`] : []],
  };
};

const givenPerDay = ({ constants, state, at }: Assessment, ref: string): number =>
  flowsSet(constants, state, at).reduce(
    (sum, { solution, litresPerDay }) => sum + (solution === ref ? litresPerDay : 0),
    0,
  );

/** A log's header: how much is in it, and what came last. */
export const logTold: Tells = ({ farm, under, at, assessment }) => {
  if (!assessment) return null;
  const { name, events, logFiles } = assessment.system;
  const past = events.filter(({ minute }) => minute <= at);
  const isRead = (event: SystemEvent): event is ReadEvent => event.kind === "read" && !event.disregarded;
  const last = past.findLast(isRead);
  const together = past.filter((event) => isRead(event) && event.minute === last?.minute);
  const count = (of: string, many: number) => `${many} ${of}${many === 1 ? "" : "s"}`;
  const reads = past.filter(({ kind }) => kind === "read").length;
  const first = past[0];
  const ahead = events.length - past.length;
  const files = logFiles.filter((file) => file !== under.cursor.file && farm.documents.has(file));
  return {
    answer: last
      ? `Last read ${shortMoment(last.minute)}, ${ago(last.minute, at)}: ${together.map(readText).join("; ")}`
      : `${name} was never read.`,
    blocks: [
      [
        `${count("line", past.length)}, ${count("reading", reads)} of them${first ? `, since ${shortMoment(first.minute)}` : ""}${ahead > 0 ? `; ${ahead} ahead` : ""}.`,
        ...(files.length > 0 ? [`More of this log: ${allOf(files)}.`] : []),
      ],
    ],
  };
};

/** The values of a line as written, with what sea water can't have marked. */
function readText(event: SystemEvent): string {
  const text = event.text.replace(/^\S+( \d\d:\d\d)? read /, "");
  const out =
    event.kind === "read"
      ? Object.entries(event.values as Record<string, ReadValue>).flatMap(([name, { impossible }]) =>
          impossible ? [name] : [],
        )
      : [];
  return out.length > 0 ? `${text} (impossible in sea water, left out: ${allOf(out)})` : text;
}

/** A `use` line: what the other file declares. */
export const useTold: Tells = ({ farm, under, place }) => {
  const { document } = under.line;
  const used = farm.bound.uses.get(place.file) ?? [];
  const index = document.uses.filter(({ line }) => line <= place.line).length - 1;
  // Of two that lead to the same file either says it; a path that leads nowhere isn't among those used.
  const target = used.length === document.uses.length ? used[index] : undefined;
  if (target === undefined) return null;
  const declared = farm.bound.names.declarations.filter((each) => each.place.file === target);
  const names = declared.map(({ kind, name }) => `${kind} ${name}`);
  const shown = names.slice(0, mostNames);
  return {
    answer: `${target} declares ${shown.length > 0 ? allOf(shown) : "nothing"}${names.length > mostNames ? ` and ${names.length - mostNames} more` : ""}.`,
    blocks: [],
  };
};

const mostNames = 12;

/** Lines of a solution's section that make its strength together. */
export const ofSolution: Tells = ({ farm, under, at }) => {
  const header = under.line.section?.name;
  const seen = header && farm.bound.names.visible.get(under.cursor.file)?.get(header.text);
  return seen?.kind === "solution"
    ? solutionHover(farm, seen.ref, null, at, recipeHere(under, seen.ref, farm))
    : null;
};
