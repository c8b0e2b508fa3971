/** Units that fit what is being written, the one that the system uses first. */
import { type Parameter, parameterOf } from "../../../grammar/parameters.ts";
import { asCaCO3, cross, numberWord, plusMinus } from "../../../grammar/tokens.ts";
import { unitTable } from "../../../grammar/units.ts";
import { factAt } from "../../culture/history.ts";
import { asRate, readConcentration, readStrength } from "../../quantity/concentration.ts";
import { parameterTopic } from "../../report/explain/parameters.ts";
import { inOwnUnit, oneOf } from "../../report/explain/units.ts";
import { unitsLastRead } from "../usual-reading.ts";
import type { Offer } from "./item.ts";
import { partOffer } from "./parts.ts";
import { type CompletionPlace, lastOf } from "./place.ts";

const volumes = ["L", "mL", "m3", "gal", "impgal", "floz"];
const doses = ["mL", "L", "floz"];
const lengths = ["cm", "m", "mm", "inch", "ft"];
const areas = ["m2", "cm2"];
const masses = ["g", "kg", "mg", "lb", "oz"];
const sacks = ["kg", "g", "lb", "oz"];
const dailyDoses = ["mL/day", "L/day"];
const temperatures = ["degC", "degF"];
const share = ["%"];
const uptakes = ["meq/day", "mmol/day as CaCO3", "g/day as CaCO3"];
const areaUptakes = ["mmol/m2/day as CaCO3", "meq/m2/day", "g/m2/day as CaCO3"];

type Units = (place: CompletionPlace) => readonly string[];

/** By the statement's rule and, where it has several quantities, the last word before the number that tells them apart. */
const unitsByRule: Readonly<Record<string, Units | Readonly<Record<string, readonly string[] | Units>>>> = {
  tank: {
    "": ({ words }) =>
      words.some(({ tokenType }) => tokenType === cross) ? lengths : [...volumes, ...lengths],
    round: lengths,
    cone: lengths,
  },
  displace: { "": [...volumes, ...sacks], at: ["kg/L", "g/mL"] },
  measured: () => volumes,
  hold: valuesOf,
  waterValue: valuesOf,
  checked: valuesOf,
  read: valuesOf,
  limit: {
    "": [],
    ...{ max: valuesOf, min: valuesOf, swing: differencesOf, dose: differencesOf },
    ...{ rise: ratesOf, fall: ratesOf },
  },
  kitAccuracy: (place) => [...differencesOf(place), "%"],
  uptake: (place) => [...ratesOf(place), ...amountsADay(place)],
  cohort: {
    uptake: ({ words }) => (words.some(({ image }) => /^pieces?$/.test(image)) ? uptakes : areaUptakes),
    magnesium: share,
    grows: ["%/week", "%/day"],
  },
  skeleton: () => share,
  air: () => ["ppm", "uatm"],
  evaporates: () => ["L/day", "mL/day"],
  feeds: { "": ["g/day", "g/week"], protein: share },
  topOff: () => volumes,
  flowsThrough: () => ["L/day", "L/h", "mL/min"],
  pump: {
    "": [],
    ...{ at: ["mL/min", "L/h", "L/day"], least: doses, always: dailyDoses, holding: volumes },
  },
  byHand: () => dailyDoses,
  dissolve: () => masses,
  makeUp: () => volumes,
  keep: () => temperatures,
  supplies: strengthsOf,
  is: () => share,
  formula: () => share,
  reorderBelow: () => sacks,
  lead: () => ["day", "week"],
  received: () => sacks,
  counted: () => sacks,
  mixed: () => volumes,
  discarded: () => volumes,
  set: () => dailyDoses,
  gave: () => doses,
  renewed: () => volumes,
  topped: () => volumes,
  filled: () => volumes,
  level: () => volumes,
  calibrated: { "": doses, in: ["min", "s", "h"] },
};

export function unitOffers(place: CompletionPlace): Offer[] {
  const { expected, row, words } = place;
  if (!expected.includes("a unit") || !row) return [];
  if (expected.includes("pieces")) {
    const counted = countedBy(place);
    return [
      ...(counted === "area" ? [] : [partOffer("pieces")]),
      ...(counted === "pieces" ? [] : areas.map((unit) => offerOf(unit, null))),
    ];
  }
  const units = unitsByRule[row.rule];
  // A unit follows its number; after a stroke only its rest is missing, and the whole word is typed anew.
  if (!units || words.at(-1)?.tokenType !== numberWord) return [];
  const found = typeof units === "function" ? units(place) : byMarker(place, units);
  const isDeviation = words.at(-2)?.tokenType === plusMinus;
  const all = isDeviation ? ["%", ...deviationsOf(place, found).filter((unit) => unit !== "%")] : found;
  return [...new Set(all)].filter((unit) => unit !== "").map((unit) => offerOf(unit, rowOf(place)));
}

/** How the corals that an event names are counted; null of those that nothing is known of. */
function countedBy({ row, words, system, now }: CompletionPlace): "pieces" | "area" | null {
  const name = row?.rule === "cohort" ? undefined : words[1]?.image;
  const history = name === undefined ? undefined : system?.facts.cohorts.get(name);
  return (factAt(history, now) ?? history?.[0])?.value.count.by ?? null;
}

const calcite = " as CaCO3";

/** What stands behind `±` counts what the number before it counts, and doesn't say so again. */
function deviationsOf({ words }: CompletionPlace, units: readonly string[]): readonly string[] {
  const isCalcite = words.some(({ tokenType }) => tokenType === asCaCO3);
  return units.flatMap((unit) => {
    if (unit.endsWith(calcite) !== isCalcite) return [];
    return isCalcite ? [unit.slice(0, -calcite.length)] : [unit];
  });
}

function byMarker(
  place: CompletionPlace,
  units: Readonly<Record<string, readonly string[] | Units>>,
): readonly string[] {
  const found = units[lastOf(place, new Set(Object.keys(units))) ?? ""] ?? [];
  return typeof found === "function" ? found(place) : found;
}

/** Told in the unit of the parameter's ranges, else by what it measures. */
function offerOf(unit: string, row: Parameter | null): Offer {
  const detail = (row && inOwnUnit(row.name, unit)) ?? (unit.includes("/") ? "" : kindOf(unit));
  return { kind: "unit", label: unit, detail, about: { kind: "unit", word: unit } };
}

const kindOf = (unit: string): string => unitTable.find(({ spelling }) => spelling === unit)?.kind ?? "";

const rowOf = ({ parameter }: CompletionPlace): Parameter | null =>
  parameter === null ? null : (parameterOf(parameter) ?? null);

/** Units of a parameter's values; first those that the system's last readings and its hold are written in. */
function valuesOf(place: CompletionPlace): readonly string[] {
  const row = rowOf(place);
  const units = row ? (parameterTopic(row.name)?.units.map(({ unit }) => unit) ?? []) : [];
  const used = inUse(place).filter((unit) => units.includes(unit));
  return [...used, ...units];
}

/** A difference of a pH has no scale. */
function differencesOf(place: CompletionPlace): readonly string[] {
  return valuesOf(place).filter((unit) => unit !== "total");
}

function ratesOf(place: CompletionPlace): readonly string[] {
  const row = rowOf(place);
  if (!row) return [];
  const rates = ["", ...valuesOf(place)].map((unit) =>
    unit.endsWith(calcite) ? `${unit.slice(0, -calcite.length)}/day${calcite}` : `${unit}/day`,
  );
  return rates.filter((unit) => readConcentration(oneOf(unit), row, asRate).ok);
}

function amountsADay(place: CompletionPlace): readonly string[] {
  const measure = rowOf(place)?.measure;
  if (measure === "alkalinity") return uptakes;
  return measure === "dissolved" ? ["g/day", "mg/day", "mmol/day"] : [];
}

function strengthsOf(place: CompletionPlace): readonly string[] {
  const row = rowOf(place);
  const units = ["meq/mL", "g/L", "mg/mL", "mmol/mL", "mol/L", "g/L as CaCO3"];
  return row ? units.filter((unit) => readStrength(oneOf(unit), row).ok) : [];
}

function inUse({ farm, system, parameter, now }: CompletionPlace): string[] {
  const row = parameter === null ? null : parameterOf(parameter);
  if (!system || !row) return [];
  const read = unitsLastRead(farm, system, now).get(row.name);
  const hold = factAt(system.facts.holds.get(row.name), now)?.value.unit.spelling;
  return [read, hold].filter((unit): unit is string => unit !== undefined && unit !== "");
}
