/** Everything in a farm that has a name. Tanks, what they hold, pumps and cohorts are names of one system. */
export const thingKinds = [
  ...["system", "solution", "reagent", "saltwater", "kit"],
  ...["tank", "displacement", "cohort", "pump"],
] as readonly ThingKind[];
export type ThingKind = "system" | "solution" | "reagent" | "saltwater" | "kit" | OwnThing;
export type OwnThing = "tank" | "displacement" | "cohort" | "pump";
