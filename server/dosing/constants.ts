/** What a system's fold needs beside its events: one value, untouched by an edit of the log. */
import type { ParameterName } from "../../grammar/parameters.ts";
import { seaWaterComposition } from "../chemistry/sea-water.ts";
import { densityOf } from "../culture/binder.ts";
import { defaults } from "../culture/defaults.ts";
import { countUpTo } from "../culture/event-order.ts";
import { changesOf, factAt } from "../culture/history.ts";
import type { Assumption, FarmModel, Strength, System, SystemFacts } from "../culture/model.ts";
import { type ByTracked, byTracked, isTracked, type Tracked, tracked } from "./tracked.ts";

export interface SystemConstants {
  readonly facts: SystemFacts;
  /** Minutes at which a fact or a recipe changes, in order. */
  readonly changes: readonly number[];
  /** The strength of a solution, by reference; null where it isn't known. */
  readonly strengthAt: (solution: string, minute: number) => Strength | null;
  readonly waterAt: (water: string, minute: number) => ExchangeWater;
  readonly firstEvent: number | null;
  /** Whether any cohort is said to grow. */
  readonly grows: boolean;
}

/** A water to exchange with; what it doesn't state is sea water's at its salinity. */
export interface ExchangeWater {
  readonly values: ByTracked<number>;
  readonly assumptions: readonly (Assumption & { readonly parameter: Tracked })[];
}

export function constantsOf(model: FarmModel, system: System): SystemConstants {
  const { facts } = system;
  const solutions = new Set([
    ...[...facts.sources.values()].flatMap((history) => history.map(({ value }) => value.solution)),
    ...facts.topOff.flatMap(({ value }) => value.solution ?? []),
  ]);
  const waters = new Set(facts.flowsThrough.map(({ value }) => value.water));
  const histories = [
    ...facts.tanks.values(),
    ...facts.displacements.values(),
    facts.measuredVolume,
    ...facts.cohorts.values(),
    ...facts.uptakes.values(),
    facts.skeletonMagnesium,
    facts.evaporatesLPerDay,
    facts.proteinGPerDay,
    facts.topOff,
    facts.flowsThrough,
    ...facts.sources.values(),
    ...[...solutions].map((ref) => model.solutions.get(ref)?.strengths ?? []),
    ...[...waters].flatMap((ref) => [...(model.waters.get(ref)?.values.values() ?? [])]),
  ];
  return {
    facts,
    changes: changesOf(histories),
    strengthAt: (solution, minute) => factAt(model.solutions.get(solution)?.strengths, minute)?.value ?? null,
    waterAt: (water, minute) => exchangeWater(model, water, minute),
    grows: [...facts.cohorts.values()].some((history) =>
      history.some(({ value }) => value.growthPerDay !== 0),
    ),
    firstEvent: system.events[0]?.minute ?? null,
  };
}

/** What is in a salt water or another system at a minute. */
function exchangeWater(model: FarmModel, ref: string, minute: number): ExchangeWater {
  const saltWater = model.waters.get(ref);
  const other = model.systems.get(ref);
  const name = saltWater?.name ?? other?.name ?? ref;
  const stated = (parameter: ParameterName): number | null => {
    if (saltWater) return factAt(saltWater.values.get(parameter), minute)?.value ?? null;
    return other ? (lastReading(other, parameter, minute) ?? heldAim(other, parameter, minute)) : null;
  };
  const salinity = stated("salinity") ?? defaults.salinity.value;
  const temperatureDegC = stated("temperature") ?? defaults.temperature.value;
  const density = densityOf({ salinity, temperatureDegC });
  const sea = seaWaterComposition(salinity);
  const reference: ByTracked<number> = {
    alkalinity: (sea.alkalinityUmolPerKg / 1000) * density,
    calcium: sea.calciumMgPerKg * density,
    magnesium: sea.magnesiumMgPerKg * density,
    potassium: sea.potassiumMgPerKg * density,
    strontium: sea.strontiumMgPerKg * density,
    salinity,
  };
  const missing = tracked.filter((parameter) => stated(parameter) === null);
  const assumptions = missing.map((parameter) => ({
    parameter,
    what: `${parameter} of ${name}`,
    value: parameter === "salinity" ? defaults.salinity.text : `as in sea water of salinity ${salinity}`,
    basis: parameter === "salinity" ? defaults.salinity.basis : "Millero et al. 2008",
  }));
  const onlyHeld = tracked.filter(
    (parameter) => other && stated(parameter) !== null && lastReading(other, parameter, minute) === null,
  );
  for (const parameter of onlyHeld) {
    assumptions.push({
      parameter,
      what: `${parameter} of ${name}`,
      value: "as it is to be held",
      basis: "never read",
    });
  }
  return { values: byTracked((parameter) => stated(parameter) ?? reference[parameter]), assumptions };
}

const heldAim = (system: System, parameter: ParameterName, minute: number): number | null =>
  factAt(system.facts.holds.get(parameter), minute)?.value.aim ?? null;

/** The last reading of another system before a minute; null where there is none. */
function lastReading(system: System, parameter: ParameterName, minute: number): number | null {
  if (!isTracked(parameter) && parameter !== "temperature") return null;
  for (let index = countUpTo(system.events, minute) - 1; index >= 0; index--) {
    const event = system.events[index]!;
    if (event.kind !== "read" || event.disregarded) continue;
    const value = event.values[parameter];
    if (value && !value.impossible && !value.below) return value.value;
  }
  return null;
}
