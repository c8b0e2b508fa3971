/** The standing facts of a system: lines of its section, made into histories. */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { Fact, SystemFact } from "../../grammar/syntax.ts";
import { readCarbonDioxide } from "../quantity/carbon-dioxide.ts";
import { readUptake } from "../quantity/concentration.ts";
import { toDouble } from "../quantity/decimal.ts";
import { bindCohort } from "./bind-cohort.ts";
import { bindHold, bindLimit } from "./bind-hold.ts";
import { bindByHand, bindPump } from "./bind-source.ts";
import { bindDisplacement, bindTank } from "./bind-tank.ts";
import {
  amountOf,
  defaultWater,
  type Line,
  named,
  parameterNamed,
  positive,
  type ReferenceWater,
  refuseNumber,
  shareQuantity,
  take,
} from "./binder.ts";
import { enter, into } from "./enter.ts";
import { emptyFacts, type FactOf, type FactsDraft, hoursOf } from "./facts-draft.ts";
import type { StatedUptake, SystemFacts } from "./model.ts";

/** A line of the section with its fact. */
export interface FactLine {
  readonly line: Line;
  readonly fact: Fact;
}

/**
 * Binds the facts of a system. Salinity and temperature come first: they make the water in which everything
 * written for a kilogram is turned into a litre.
 */
export function bindSystemFacts(lines: readonly FactLine[]): { facts: SystemFacts; water: ReferenceWater } {
  const draft = emptyFacts();
  const sets = (parameter: string) => (entry: FactLine) =>
    entry.fact.kind === "hold" && entry.fact.parameter.text === parameter;
  const first = lines.filter((entry) => sets("salinity")(entry) || sets("temperature")(entry));
  for (const entry of first) bindFact(draft, entry, defaultWater);
  const aimOf = (parameter: ParameterName) => draft.holds.get(parameter)?.at(-1)?.value.aim;
  const water = {
    salinity: aimOf("salinity") ?? defaultWater.salinity,
    temperatureDegC: aimOf("temperature") ?? defaultWater.temperatureDegC,
  };
  for (const entry of lines) if (!first.includes(entry)) bindFact(draft, entry, water);
  return { facts: draft, water };
}

type BindFact = {
  readonly [K in SystemFact["kind"]]: (
    draft: FactsDraft,
    line: Line,
    fact: FactOf<K>,
    water: ReferenceWater,
  ) => void;
};

/** One entry a statement. */
const bind: BindFact = {
  tank: bindTank,
  displace: bindDisplacement,
  measured: (draft, line, fact) => {
    const litres = positive(line, fact.volume, "volume");
    if (litres !== null) enter(line, draft.measuredVolume, fact, litres, "measured volume");
  },
  hold: bindHold,
  limit: bindLimit,
  cohort: bindCohort,
  uptake: (draft, line, fact, water) => {
    const parameter = parameterNamed(
      line,
      fact.parameter,
      ({ measure }) => measure === "alkalinity" || measure === "dissolved",
    );
    if (!parameter) return;
    const read = amountOf(line, fact.value, parameter, readUptake(fact.value, parameter), water);
    if (read?.amount.sort !== "dissolved") return;
    if (read.value < 0) return void refuseNumber(line, fact.value.number);
    const per = read.amount.per === "whole" ? "whole" : "litre";
    const stated: StatedUptake = {
      parameter: parameter.name,
      per,
      value: read.value,
      deviation: read.deviation,
    };
    enter(line, into(draft.uptakes, parameter.name), fact, stated, `uptake ${parameter.name}`);
  },
  skeleton: (draft, line, fact) => {
    const share = shareQuantity(line, fact.magnesium);
    if (share !== null) enter(line, draft.skeletonMagnesium, fact, share, "skeleton magnesium");
  },
  air: (draft, line, fact) => {
    const read = take(line, readCarbonDioxide(fact.carbonDioxide));
    const value = read && toDouble(read.value);
    if (read && value !== null && value >= 0)
      enter(line, draft.air, fact, { value, unit: read.unit }, "air CO2");
  },
  light: (draft, line, fact) => enter(line, draft.light, fact, hoursOf(fact.hours), "light"),
  evaporates: (draft, line, fact) => {
    const litres = positive(line, fact.volume, "flow");
    if (litres !== null) enter(line, draft.evaporatesLPerDay, fact, litres, "evaporates");
  },
  feeds: (draft, line, fact) => {
    const food = positive(line, fact.food, "food");
    const protein = shareQuantity(line, fact.protein);
    if (food !== null && protein !== null) enter(line, draft.proteinGPerDay, fact, food * protein, "feeds");
  },
  "top-off": (draft, line, fact) => {
    const litres = positive(line, fact.volume, "volume");
    const solution = fact.solution && named(line, fact.solution, ["solution"]);
    if (litres === null || (fact.solution && !solution)) return;
    enter(line, draft.topOff, fact, { solution: solution?.ref ?? null, litres }, "top-off");
  },
  "flows-through": (draft, line, fact) => {
    const litresPerDay = positive(line, fact.volume, "flow");
    const water = named(line, fact.water, ["saltwater", "system"]);
    if (litresPerDay !== null && water)
      enter(line, draft.flowsThrough, fact, { litresPerDay, water: water.ref }, "flows-through");
  },
  pump: bindPump,
  "by-hand": bindByHand,
};

function bindFact(draft: FactsDraft, { line, fact }: FactLine, water: ReferenceWater): void {
  if (!(fact.kind in bind)) return;
  const binding = bind[fact.kind as SystemFact["kind"]] as (
    draft: FactsDraft,
    line: Line,
    fact: Fact,
    water: ReferenceWater,
  ) => void;
  binding(draft, line, fact, water);
}
