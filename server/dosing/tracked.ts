/** What is carried forward from reading to reading, and how strong a solution is in it. */
import type { ParameterName } from "../../grammar/parameters.ts";
import { atomicWeight } from "../chemistry/elements.ts";
import { gramsPerKgPerSalinity } from "../chemistry/sea-water.ts";
import type { Strength } from "../culture/model.ts";

export const tracked = ["alkalinity", "calcium", "magnesium", "potassium", "strontium", "salinity"] as const;
export type Tracked = (typeof tracked)[number];
export type ByTracked<T> = Readonly<Record<Tracked, T>>;

export const isTracked = (name: ParameterName): name is Tracked =>
  (tracked as readonly string[]).includes(name);

export const byTracked = <T>(value: (name: Tracked) => T): ByTracked<T> =>
  Object.fromEntries(tracked.map((name) => [name, value(name)])) as Record<Tracked, T>;

/** What can be dosed for, in order of priority. */
export const dosed = ["alkalinity", "calcium", "magnesium", "potassium", "strontium"] as const;
export type Dosed = (typeof dosed)[number];

export const unitOf = (name: ParameterName): string =>
  name === "alkalinity" ? "meq/L" : name === "salinity" ? "" : "mg/L";

const strengthField = {
  alkalinity: "alkalinityMeq",
  calcium: "calciumMg",
  magnesium: "magnesiumMg",
  potassium: "potassiumMg",
  strontium: "strontiumMg",
} as const satisfies Record<Dosed, keyof Strength>;

const carbonateGPerMol = atomicWeight.C + 3 * atomicWeight.O;

/**
 * Salt that a millilitre of solution leaves in the water, g: its ions, and for its alkalinity as much carbonate as
 * the skeleton takes with it; hydroxide takes that up from the air, bicarbonate gives the rest off to it. What isn't
 * known counts as none.
 */
export function saltGPerMl(strength: Strength): number {
  const ions = [
    strength.sodiumMg,
    strength.chlorideMg,
    strength.sulfateMg,
    strength.potassiumMg,
    strength.strontiumMg,
    strength.calciumMg,
    strength.magnesiumMg,
  ];
  const milligrams = ions.reduce<number>((sum, ion) => sum + (ion ?? 0), 0);
  return (milligrams + ((strength.alkalinityMeq ?? 0) / 2) * carbonateGPerMol) / 1000;
}

/** Salinity that a gram of salt brings to a litre of sea water, near enough at one density for all of it. */
export const salinityPerGramInLitre = 1 / (gramsPerKgPerSalinity * 1.0233);

/** What a litre of solution brings, in meq, mg, or salinity × litres; null where it isn't known. */
export function broughtPerLitre(strength: Strength, name: Tracked): number | null {
  if (name === "salinity") return 1000 * saltGPerMl(strength) * salinityPerGramInLitre;
  const perMl = strength[strengthField[name]];
  return perMl === null ? null : 1000 * perMl;
}
