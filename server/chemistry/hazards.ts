/**
 * What is known of the dangers of a reagent as it is sold: its GHS statements and signal word, whether it is
 * caustic, what its heat does when it dissolves. Data only; the sentences are made in `checks/`.
 */
import type { ReagentName } from "./reagents.ts";

/** The hazard statements that the reagents here carry, in the words of the GHS (from memory). */
export const hazardStatements = {
  H290: "may be corrosive to metals",
  H314: "causes severe skin burns and eye damage",
  H315: "causes skin irritation",
  H318: "causes serious eye damage",
  H319: "causes serious eye irritation",
  H335: "may cause respiratory irritation",
} as const;

export type HazardStatement = keyof typeof hazardStatements;

export interface Hazard {
  /** None for a substance that isn't classified. */
  readonly statements: readonly HazardStatement[];
  readonly signal: "Danger" | "Warning" | null;
  /** Its solution or dust attacks skin and eyes by its alkalinity, so the caution about caustics goes with it. */
  readonly caustic: boolean;
  /**
   * How it heats the water that it dissolves in: so that it boils and spurts, noticeably, or not enough to tell;
   * null where it isn't said here.
   */
  readonly heat: "strong" | "some" | "little" | null;
  readonly source: string;
}

/** Solid and strong solution. CLP Annex VI 011-002-00-6. */
const sodiumHydroxide: Hazard = {
  statements: ["H290", "H314"],
  signal: "Danger",
  caustic: true,
  // −1113 J/g (CRC Handbook, Parker 1965): 100 g in 900 g of water make 27 °C.
  heat: "strong",
  source: "safety data sheets of three suppliers; CLP Annex VI 011-002-00-6",
};

/** CLP Annex VI 011-005-00-2, from memory. */
const sodiumCarbonate: Omit<Hazard, "heat"> = {
  statements: ["H319"],
  signal: "Warning",
  caustic: true,
  source: "CLP Annex VI 011-005-00-2, from memory",
};

const lime: Omit<Hazard, "heat"> = {
  statements: ["H315", "H318", "H335"],
  signal: "Danger",
  caustic: true,
  source: "compiled safety data sheet",
};

const calciumChloride: Hazard = {
  statements: ["H319"],
  signal: "Warning",
  caustic: false,
  heat: null,
  source: "safety data sheet; CLP Annex VI 017-013-00-2",
};

const unclassified = (source: string): Hazard => ({
  statements: [],
  signal: null,
  caustic: false,
  heat: null,
  source,
});
const bicarbonate = unclassified("ECHA and OECD SIDS, from memory");
const magnesiumChloride = unclassified("REACH dossiers, from memory; an encyclopaedia gives H319 and H335");
const magnesiumSulfate = unclassified("REACH dossier of ECHA; two safety data sheets");

/** By reagent; one that is missing is one of which nothing is said here, not a harmless one. */
export const hazards: Readonly<Partial<Record<ReagentName, Hazard>>> = {
  "sodium-hydroxide": sodiumHydroxide,
  // Heats of solution from formation enthalpies (NBS tables): −252, −96 and +229 J/g; the decahydrate cools.
  "sodium-carbonate": { ...sodiumCarbonate, heat: "some" },
  "sodium-carbonate-monohydrate": { ...sodiumCarbonate, heat: "little" },
  "sodium-carbonate-decahydrate": { ...sodiumCarbonate, heat: "little" },
  // Little of it dissolves; the oxide turns into it first and gives off 1460 J/g.
  "calcium-hydroxide": { ...lime, heat: "little" },
  "calcium-oxide": { ...lime, heat: "strong" },
  "calcium-chloride-anhydrous": calciumChloride,
  "calcium-chloride-dihydrate": calciumChloride,
  "calcium-chloride-hexahydrate": calciumChloride,
  "sodium-bicarbonate": bicarbonate,
  "magnesium-chloride-anhydrous": magnesiumChloride,
  "magnesium-chloride-hexahydrate": magnesiumChloride,
  "magnesium-sulfate-anhydrous": magnesiumSulfate,
  "magnesium-sulfate-heptahydrate": magnesiumSulfate,
};

export const isCaustic = (name: ReagentName): boolean => hazards[name]?.caustic === true;
