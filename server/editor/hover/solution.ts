/** A solution: its strength, what goes with it, and what a millilitre does to a system's water. */

import { doseFigure, rounded } from "../../checks/figures.ts";
import { causticGear } from "../../checks/hazard.ts";
import { calcificationPerMeq } from "../../chemistry/calcification.ts";
import { defaults } from "../../culture/defaults.ts";
import { type Entry, factAt } from "../../culture/history.ts";
import type { Assumption, FarmModel, Solution, Strength, System } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { limitAt } from "../../dosing/limits.ts";
import { sourcesAt, topOffFlow } from "../../dosing/rates.ts";
import { broughtPerLitre, dosed } from "../../dosing/tracked.ts";
import type { Farm } from "../../farm.ts";
import { isCausticByStrength } from "../../report/sheet-solutions.ts";
import type { UnderCursor } from "../under-cursor.ts";
import { amount, digits, notNow, papers, solutionName, type Told, unitIn } from "./parts.ts";
import type { Tells } from "./spot.ts";

export const solutionTold: Tells = ({ farm, under, assessment, at }) => {
  const ref = under.thing?.kind === "solution" ? under.thing.ref : null;
  return ref === null ? null : solutionHover(farm, ref, assessment, at, recipeHere(under, ref, farm));
};

/** The header of a recipe, where the cursor stands in one of the solution. */
export function recipeHere({ cursor, line }: UnderCursor, ref: string, farm: Farm): Recipe | null {
  const { section } = line;
  if (section?.kind !== "solution" || !section.name) return null;
  const seen = farm.bound.names.visible.get(cursor.file)?.get(section.name.text);
  return seen?.ref === ref ? { file: cursor.file, line: section.headerLine } : null;
}

interface Recipe {
  readonly file: string;
  readonly line: number;
}

/** The strength that a recipe makes, else the one in force. */
function entryOf({ strengths }: Solution, recipe: Recipe | null, at: number): Entry<Strength> | null {
  if (!recipe) return factAt(strengths, at);
  const own = strengths.filter(({ place }) => place.file === recipe.file && place.line === recipe.line);
  return factAt(own, at) ?? own.at(-1) ?? null;
}

/** Told also of a line inside the solution's section: of a recipe that is changed later each section tells its own. */
export function solutionHover(
  farm: Farm,
  ref: string,
  here: Assessment | null,
  at: number,
  recipe: Recipe | null,
): Told | null {
  const { model } = farm.bound;
  const solution = model.solutions.get(ref);
  if (!solution) return null;
  const entry = entryOf(solution, recipe, at);
  if (!entry) return unknownStrength(solution, recipe ? Number.POSITIVE_INFINITY : at);
  const strength = entry.value;
  const using = here ? [here] : [...farm.assessments.values()].filter(({ system }) => uses(system, ref));
  const effects = using.slice(0, mostSystems).map((assessment) => effectLine(assessment, strength));
  const partners = using
    .slice(0, mostSystems)
    .flatMap((each) => partnerLine(model, each, ref, strength, using.length > 1) ?? []);
  const more = using.length > mostSystems ? [usedInMore(using.length - mostSystems)] : [];
  const mineral = using.flatMap(({ uptake }) => (uptake && partners.length > 0 ? [uptake] : []));
  const assumed: Assumption[] = mineral.some(({ magnesiumFractionStated }) => !magnesiumFractionStated)
    ? [
        {
          what: defaults.skeletonMagnesium.what,
          value: defaults.skeletonMagnesium.text,
          basis: defaults.skeletonMagnesium.basis,
        },
      ]
    : [];
  return {
    answer: `1 mL of ${solution.name} brings ${strengthText(strength)}.`,
    blocks: [
      notNow(entry, solution.strengths, at),
      [...effects, ...more, ...(using.length === 0 ? ["No system uses it."] : [])],
      [...new Set(partners)],
      isCausticByStrength(strength) ? [`Caustic. ${causticGear}.`] : [],
    ],
    assumptions: [...solution.assumptions, ...assumed],
    sources: [
      ...(isReckoned(strength) ? [papers.alkalinity] : []),
      ...(partners.length > 0 ? [papers.calcification] : []),
    ],
  };
}

const usedInMore = (count: number): string =>
  `It is used in ${count} more ${count === 1 ? "system" : "systems"}.`;

const mostSystems = 3;

/** Of a recipe all ions are known; a printed strength states alkalinity alone, and needs no paper. */
const isReckoned = ({ alkalinityMeq, sodiumMg, calciumMg }: Strength): boolean =>
  (alkalinityMeq ?? 0) > 0 && ((sodiumMg ?? 0) > 0 || (calciumMg ?? 0) > 0);

function unknownStrength({ name, assumptions, strengths }: Solution, at: number): Told {
  const later = strengths.find(({ from }) => from > at);
  const why = later
    ? "No recipe of it counts yet at this moment."
    : "A line of its recipe is missing or can't be read: a reagent and its mass, or the volume that it is made up to.";
  return { answer: `The strength of ${name} isn't known.`, blocks: [[why]], assumptions };
}

/** `1.57 meq of alkalinity, 36.1 mg of sodium`. */
export function strengthText(strength: Strength): string {
  const parts = [
    ["meq of alkalinity", strength.alkalinityMeq],
    ["mg of calcium", strength.calciumMg],
    ["mg of magnesium", strength.magnesiumMg],
    ["mg of potassium", strength.potassiumMg],
    ["mg of strontium", strength.strontiumMg],
    ["mg of sodium", strength.sodiumMg],
    ["mg of chloride", strength.chlorideMg],
    ["mg of sulfate", strength.sulfateMg],
  ] as const;
  const known = parts.flatMap(([unit, value]) => (value ? [amount(value, unit)] : []));
  return known.length > 0 ? known.join(", ") : "nothing that is known";
}

const uses = ({ facts, events }: System, ref: string): boolean =>
  [...facts.sources.values()].some((history) => history.some(({ value }) => value.solution === ref)) ||
  facts.topOff.some(({ value }) => value.solution === ref) ||
  events.some(
    (event) =>
      (event.kind === "gave" && event.doses.some(({ solution }) => solution === ref)) ||
      (event.kind === "topped" && event.solution === ref),
  );

/** `In north-house 1 mL raises alkalinity by 0.0025 dKH; 71 mL are the most at once by a pump.` */
function effectLine(assessment: Assessment, strength: Strength): string {
  const { system, volume, constants, at } = assessment;
  const { litres } = volume;
  if (litres === null)
    return `In ${system.name}: its volume isn't known, so neither is what a millilitre does.`;
  const rises = dosed.flatMap((name) => {
    const brought = broughtPerLitre(strength, name) ?? 0;
    if (!(brought > 0)) return [];
    const unit = unitIn(assessment, name);
    return [
      {
        name,
        brought,
        text: `${name} by ${digits(((brought * unit.perModelUnit) / litres) * 0.001, 2)} ${unit.spelling}`,
      },
    ];
  });
  if (rises.length === 0) return `In ${system.name} a millilitre raises nothing that is dosed for.`;
  const stated = rises.flatMap(({ name, brought }) => {
    const limit = limitAt(constants.facts, name, "dose", "hand", at, null);
    return limit?.place
      ? [`; by its dose limit ${doseFigure((limit.value * litres) / brought)} at once`]
      : [];
  });
  return `In ${system.name} 1 mL raises ${rises.map(({ text }) => text).join(" and ")}${stated[0] ?? ""}.`;
}

/** How much of the other part goes with it, by what the skeleton takes: 0.5 mmol of calcium a meq, less its magnesium. */
function partnerLine(
  model: FarmModel,
  assessment: Assessment,
  ref: string,
  strength: Strength,
  isOneOfMany: boolean,
): string | null {
  const { constants, state, at, uptake } = assessment;
  const topOff = topOffFlow(constants, at);
  const others = [...sourcesAt(constants, at).map(({ source }) => source.solution), topOff?.solution ?? ""];
  const { calciumMg } = calcificationPerMeq(uptake?.magnesiumFraction ?? defaults.skeletonMagnesium.value);
  const alkaline = alkalineOnly(strength);
  if (!(calciumMg > 0) || (!alkaline && !calcicOnly(strength))) return null;
  const pairs = [...new Set(others)].flatMap((other) => {
    const theirs = other !== ref ? constants.strengthAt(other, state.minute) : null;
    if (!theirs || !(alkaline ? calcicOnly(theirs) : alkalineOnly(theirs))) return [];
    const millilitres = alkaline
      ? ((strength.alkalinityMeq ?? 0) * calciumMg) / (theirs.calciumMg ?? 0)
      : (strength.calciumMg ?? 0) / ((theirs.alkalinityMeq ?? 0) * calciumMg);
    return [`${rounded(millilitres, 2)} mL of ${solutionName(model, other)}`];
  });
  const where = isOneOfMany ? ` in ${assessment.system.name}` : "";
  if (pairs.length > 0) return `In balance${where}: 1 mL of it goes with ${pairs.join(" or ")}.`;
  return alkaline
    ? `No source of ${assessment.system.name} brings calcium alone, so nothing balances it.`
    : `No source of ${assessment.system.name} brings alkalinity alone, so nothing balances it.`;
}

const alkalineOnly = ({ alkalinityMeq, calciumMg }: Strength): boolean =>
  (alkalinityMeq ?? 0) > 0 && calciumMg === 0;
const calcicOnly = ({ alkalinityMeq, calciumMg }: Strength): boolean =>
  (calciumMg ?? 0) > 0 && alkalinityMeq === 0;
