/** A cohort: what it takes, its share of the system's uptake, the skeleton that it lays down. */

import { changeFigure } from "../../checks/figures.ts";
import { calciumCarbonateGPerMeq } from "../../chemistry/calcification.ts";
import { factAt } from "../../culture/history.ts";
import type { Cohort, FarmModel } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { type Uptake, uptakeAt } from "../../dosing/uptake.ts";
import type { WaterState } from "../../dosing/water-state.ts";
import { amount, entryHere, notNow, papers, percent, type Told, unitIn } from "./parts.ts";
import { aheadLines, around, eventHere, type Tells } from "./spot.ts";

/** What one cohort takes at a state of the system, growth and stock counted; null where the volume isn't known. */
function takenBy({ constants, volume }: Assessment, state: WaterState, name: string): Uptake | null {
  const history = constants.facts.cohorts.get(name);
  if (!history || volume.litres === null) return null;
  const cohorts = new Map([[name, history]]);
  const facts = { ...constants.facts, cohorts, uptakes: new Map(), proteinGPerDay: [] };
  return uptakeAt(facts, state, state.minute, volume.litres, constants.firstEvent);
}

const declaredCount = ({ count }: Cohort): number =>
  count.by === "pieces" ? count.number : count.squareMetres;

function countNow({ constants }: Assessment, state: WaterState, name: string): number | null {
  const entry = factAt(constants.facts.cohorts.get(name), state.minute);
  if (!entry) return null;
  const stock = state.stock.get(name);
  const change = stock && stock.from === entry.from ? stock.change : 0;
  return Math.max(0, declaredCount(entry.value) + change);
}

const countText = (count: number, { count: { by } }: Cohort): string =>
  by === "pieces" ? `${count} ${count === 1 ? "piece" : "pieces"}` : amount(count, "m2");

export const cohortTold: Tells = ({ assessment, statement, under, place, at }) => {
  const name = statement.kind === "cohort" ? statement.name.text : under.thing?.name;
  if (!assessment || name === undefined) return null;
  const history = assessment.constants.facts.cohorts.get(name) ?? [];
  const entry = entryHere(history, place, at);
  if (!entry) return null;
  const late = notNow(entry, history, at);
  if (late.length > 0)
    return { answer: `${name}: ${countText(declaredCount(entry.value), entry.value)}.`, blocks: [late] };
  return cohortNow(assessment, name, entry.value);
};

function cohortNow(assessment: Assessment, name: string, cohort: Cohort): Told {
  const { state, constants, volume, uptake } = assessment;
  const meqPerDay = takenBy(assessment, state, name)?.perDay.alkalinity ?? null;
  const count = countNow(assessment, state, name) ?? 0;
  const declared = declaredCount(cohort);
  const stock =
    count === declared
      ? `${countText(count, cohort)}.`
      : `${countText(count, cohort)}: ${countText(declared, cohort)} as declared, ${countText(Math.abs(count - declared), cohort)} ${count > declared ? "came" : "went"} since.`;
  if (meqPerDay === null || volume.litres === null) {
    return {
      answer: `${name}: ${stock}`,
      blocks: [["The volume of the water isn't known, so its share can't be told."]],
    };
  }
  const all = [...constants.facts.cohorts.keys()].reduce(
    (sum, each) => sum + (takenBy(assessment, state, each)?.perDay.alkalinity ?? 0),
    0,
  );
  const share = all > 0 ? `${percent(meqPerDay / all)} of what the corals take: ` : "";
  const unit = unitIn(assessment, "alkalinity");
  const skeleton = (meq: number) => {
    const grams = meq * calciumCarbonateGPerMeq;
    return grams < 1 ? amount(1000 * grams, "mg") : amount(grams, "g");
  };
  const one = cohort.count.by === "pieces" ? "piece" : "m2";
  const each =
    count > 0
      ? [
          `Each ${one}: ${amount(meqPerDay / count, "meq")} of alkalinity and ${skeleton(meqPerDay / count)} of skeleton a day.`,
        ]
      : [];
  const asStated = cohort.uptakeOf === "all" ? cohort.uptakeMeqPerDay : count * cohort.uptakeMeqPerDay;
  const grown = cohort.uptakeOf !== "all" && asStated > 0 ? meqPerDay / asStated : 1;
  const growth =
    Math.abs(grown - 1) > 0.0005
      ? [
          `Grown since it was counted: takes ${percent(Math.abs(grown - 1))} ${grown > 1 ? "more" : "less"} than stated.`,
        ]
      : [];
  const stated =
    uptake?.basis === "stated" && uptake.perDay.alkalinity !== null
      ? ["The system's uptake is as its `uptake` line says, not as the cohorts do."]
      : [];
  return {
    answer: `${name}: ${share}${changeFigure("alkalinity", meqPerDay / volume.litres, unit)} (${amount(meqPerDay, "meq")}) of alkalinity and ${skeleton(meqPerDay)} of skeleton (as CaCO3) a day.`,
    blocks: [[stock, ...each], growth, stated],
    sources: [papers.calcification],
  };
}

/** `stocked`, `removed`, `moved`: how many are there then, and what that does to the uptake. */
export const stockTold: Tells = (spot) => {
  const { assessment, model } = spot;
  const event = eventHere(spot, "stocked", "removed", "moved");
  if (!assessment || !event) return null;
  const entry = factAt(assessment.constants.facts.cohorts.get(event.cohort), event.minute);
  const water = around(spot, event);
  if (!water) return null;
  if (!entry) {
    return {
      answer: `No change: ${event.cohort} is counted as of a later day, and that count has it in.`,
      blocks: [],
    };
  }
  const before = countNow(assessment, water.before, event.cohort) ?? 0;
  const after = countNow(assessment, water.after, event.cohort) ?? 0;
  const taken = (state: WaterState) => takenBy(assessment, state, event.cohort)?.perDay.alkalinity ?? null;
  const [was, is] = [taken(water.before), taken(water.after)];
  const { litres } = assessment.volume;
  const unit = unitIn(assessment, "alkalinity");
  const effect =
    was === null || is === null || litres === null
      ? []
      : [
          `Takes ${changeFigure("alkalinity", is / litres, unit)} of alkalinity a day then, ${changeFigure("alkalinity", Math.abs(is - was) / litres, unit)} ${is >= was ? "more" : "less"} than before.`,
        ];
  return {
    answer: `${event.cohort}: ${countText(after, entry.value)} after this, ${countText(before, entry.value)} before.`,
    blocks: [effect, targetLines(model, event.system, event.cohort), aheadLines(spot, event.minute)],
    sources: [],
  };
};

/** Corals that come in count only where the other system's log says so. */
function targetLines(model: FarmModel, target: string | null, cohort: string): string[] {
  const system = target === null ? null : model.systems.get(target);
  return system ? [`${system.name} counts them once its own log says: stocked ${cohort}.`] : [];
}
