/**
 * The table of statements: where each belongs, the word that starts it, what it means, and lines that say it. The
 * reader goes by it, and documentation, completion and tests are made from it. The form of a statement isn't
 * written here: it is the parser's own grammar.
 */
import { type SectionKind, sectionKinds } from "./syntax.ts";
import type { Keyword } from "./tokens.ts";

/** The word that starts lines which begin with a parameter's name. */
export const aParameter = "a parameter";

export interface StatementRow {
  /** A header opens a section, a fact stands, an event is dated. */
  readonly form: "header" | "fact" | "event";
  readonly sections: readonly SectionKind[];
  readonly word: Keyword | typeof aParameter;
  /** The parser's rule. */
  readonly rule: string;
  readonly meaning: string;
  /** Lines without their indent. */
  readonly examples: readonly string[];
}

const row =
  (form: StatementRow["form"]) =>
  (
    sections: readonly SectionKind[],
    word: StatementRow["word"],
    rule: string,
    meaning: string,
    ...examples: readonly string[]
  ): StatementRow => ({ form, sections, word, rule, meaning, examples });

const header = row("header");
const fact = row("fact");
const event = row("event");

export const statementTable: readonly StatementRow[] = [
  header(
    [],
    "system",
    "system",
    "One body of water that shares one chemistry.",
    'system east-hall "East hall raceways"',
  ),
  fact(
    ["system"],
    "tank",
    "tank",
    "Something that holds the system's water: length x width x water depth, round, a cone, or a volume.",
    "tank trough 310 cm x 80 cm x 28 cm times 3",
    "tank trough 310 x 80 x 28 cm",
    "tank vat round 1.2 m x 60 cm",
    "tank settler cone 70 cm x 90 cm",
    "tank sump 280 L from 2026-03-01",
  ),
  fact(
    ["system"],
    "displace",
    "displace",
    "Volume that something in the tanks takes up: a volume, or a mass at a density.",
    "displace racks 38 L",
    "displace rubble 60 kg at 2.4 kg/L",
  ),
  fact(
    ["system"],
    "measured",
    "measured",
    "Net water volume found by dilution; it wins over the tanks' sizes and is compared with them.",
    "measured volume 1910 L ± 35 L from 2026-09-14",
  ),
  fact(
    ["system"],
    "hold",
    "hold",
    "The band to keep a parameter in, and where in it to aim.",
    "hold alkalinity 7.8 to 8.6 dKH aim 8.2",
    "hold pH 7.9 to 8.3 total",
    "hold salinity 34 to 36",
  ),
  fact(
    ["system"],
    "limit",
    "limit",
    "What a parameter may do: change of the daily mean (rise, fall), swing within a day, rise at one dose, max, min.",
    "limit alkalinity rise 0.5 dKH/day",
    "limit calcium fall 15 mg/L/day",
    "limit pH swing 0.4",
    "limit alkalinity dose 0.3 dKH",
    "limit alkalinity max 10.5 dKH",
    "limit calcium min 380 mg/L",
  ),
  fact(
    ["system"],
    "cohort",
    "cohort",
    "Corals kept as one: how many or how much area, and what they take up.",
    "cohort staghorn-tips 360 pieces uptake 0.8 meq/day each grows 1.5 %/week from 2026-09-20",
    "cohort plating 0.6 m2 uptake 210 mmol/m2/day as CaCO3 magnesium 4 %",
  ),
  fact(
    ["system"],
    "uptake",
    "uptake",
    "The whole system's consumption of a parameter, as found.",
    "uptake alkalinity 0.7 dKH/day ± 0.1",
  ),
  fact(
    ["system"],
    "skeleton",
    "skeleton",
    "Mole fraction of magnesium in the mineral laid down, where no cohort says.",
    "skeleton magnesium 3.5 %",
  ),
  fact(["system"], "air", "air", "Carbon dioxide of the room's air.", "air CO2 560 ppm"),
  fact(["system"], "light", "light", "Hours of light.", "light between 08:30 and 18:30"),
  fact(
    ["system"],
    "evaporates",
    "evaporates",
    "Fresh water lost a day.",
    "evaporates 11 L/day",
    "evaporates 14 L/day from 2026-06-01 until 2026-09-01",
  ),
  fact(["system"], "feeds", "feeds", "Food given a day, and its protein.", "feeds 16 g/day protein 48 %"),
  fact(
    ["system"],
    "top-off",
    "topOff",
    "The container that makes up what evaporates, with fresh water or with a solution.",
    "top-off 150 L",
    "top-off lime 150 L",
  ),
  fact(
    ["system"],
    "flows-through",
    "flowsThrough",
    "Automatic, steady exchange of water.",
    "flows-through 90 L/day with vat-water",
  ),
  fact(
    ["system"],
    "pump",
    "pump",
    "A dosing head: its solution, flow, smallest dose that repeats well, hours allowed, fixed rate, own container.",
    "pump line-1 gives soda at 31.5 mL/min least 0.8 mL between 20:00 and 08:00 holding 10 L",
    "pump line-2 gives soda at 12 mL/min always 40 mL/day",
  ),
  fact(
    ["system"],
    "by-hand",
    "byHand",
    "A solution given by hand, so many times a day, or at a fixed amount.",
    "by-hand epsom times 2 always 30 mL/day",
  ),
  header(
    [],
    "solution",
    "solution",
    "A stock solution.",
    'solution soda "Soda stock"',
    "solution soda from 2026-10-05",
  ),
  fact(["solution"], "dissolve", "dissolve", "A reagent in the recipe.", "dissolve sodium-carbonate 385 g"),
  fact(
    ["solution"],
    "saturated",
    "saturated",
    "Kept with excess solid; the clear part is dosed.",
    "saturated calcium-hydroxide",
  ),
  fact(["solution"], "make", "makeUp", "The volume that the recipe is made up to.", "make up to 4 L"),
  fact(["solution"], "keep", "keep", "The coldest temperature it is stored at.", "keep at 16 degC"),
  fact(
    ["solution"],
    "supplies",
    "supplies",
    "Strength of a bought solution, instead of a recipe.",
    "supplies alkalinity 1.6 meq/mL as bicarbonate",
    "supplies alkalinity 80 g/L as CaCO3 as carbonate",
    "supplies alkalinity 0.9 meq/mL as hydroxide",
    "supplies calcium 72 g/L",
  ),
  fact(
    ["solution"],
    "acknowledge",
    "acknowledge",
    "Says who may handle a caustic solution, which shortens its standing caution.",
    'acknowledge caustic "two trained staff, goggles and gloves"',
  ),
  header(
    [],
    "reagent",
    "reagent",
    "A reagent of the farm's own.",
    'reagent soda-drum "Soda ash, 20 kg drum"',
  ),
  fact(
    ["reagent"],
    "is",
    "is",
    "Which known reagent it is, and how pure.",
    "is sodium-carbonate purity 99.5 %",
  ),
  fact(
    ["reagent"],
    "formula",
    "formula",
    "Its chemical formula, where no known reagent fits, and how pure it is.",
    "formula SrCl2·6H2O purity 98 %",
    "formula Ca(OH)2",
  ),
  fact(
    ["reagent"],
    "reorder-below",
    "reorderBelow",
    "Stock under which more is to be ordered.",
    "reorder-below 4 kg",
  ),
  fact(["reagent"], "lead", "lead", "Time from order to delivery.", "lead 9 day"),
  header([], "store", "store", "What is on the shelves.", "store"),
  event(
    ["store"],
    "received",
    "received",
    "A delivery of a reagent.",
    '2026-10-02 received soda-drum 20 kg lot "K-31" by ina',
  ),
  event(
    ["store"],
    "counted",
    "counted",
    "A reagent weighed or counted.",
    "2026-10-20 16:00 counted soda-drum 13.5 kg",
  ),
  event(
    ["store"],
    "mixed",
    "mixed",
    "A fresh batch of a solution; what is left of the old one is gone.",
    "2026-10-21 09:15 mixed soda 4 L by ina",
  ),
  event(
    ["store"],
    "discarded",
    "discarded",
    "Some of a solution thrown away.",
    "2026-10-23 discarded soda 0.5 L",
  ),
  header(
    [],
    "saltwater",
    "saltwater",
    "A salt water that is made up for renewals.",
    'saltwater vat-water "Vat"',
  ),
  fact(
    ["saltwater"],
    aParameter,
    "waterValue",
    "The value of a parameter in this water.",
    "salinity 35",
    "alkalinity 8.4 dKH",
    "calcium 1060 mg/L as CaCO3",
    "pH 8.0 total",
  ),
  header([], "kit", "kit", "A test kit or a meter.", 'kit titrator "Bench titrator"'),
  fact(
    ["kit"],
    aParameter,
    "kitAccuracy",
    "How far tests of a parameter scatter (one standard deviation), or the tolerance printed on the kit.",
    "alkalinity scatter 0.12 dKH",
    "calcium scatter 2 %",
    "pH tolerance 0.05",
  ),
  event(
    ["kit"],
    "checked",
    "checked",
    "A test of something known, which shows the kit's bias.",
    '2026-10-11 checked alkalinity 8.3 dKH against 8.0 dKH lot "C7" by ina',
  ),
  header([], "log", "log", "What was measured in a system and done to it.", "log east-hall"),
  event(
    ["log", "saltwater"],
    "read",
    "read",
    "Tests of one sample.",
    "2026-10-24 07:50 read alkalinity 8.1 dKH, calcium 418 mg/L ± 6 mg/L with titrator by ina",
    '2026-10-24 08:00 read nitrate below 2 mg/L, temperature 25.2 degC disregard "wrong vial"',
  ),
  event(
    ["log"],
    "set",
    "set",
    "From now on this much a day, spread over the pump's hours.",
    "2026-10-24 08:30 set line-1 280 mL/day, epsom 40 mL/day by ina",
  ),
  event(
    ["log"],
    "gave",
    "gave",
    "One dose, at once.",
    "2026-10-25 10:00 gave epsom 120 mL, soda 30 mL by ina",
  ),
  event(
    ["log"],
    "renewed",
    "renewed",
    "Water drained, then filled up with a salt water or another system's water.",
    "2026-10-26 11:00 renewed 150 L with vat-water",
  ),
  event(
    ["log"],
    "topped",
    "topped",
    "Fresh water, or a solution, added by hand.",
    "2026-10-26 topped 12 L with lime",
  ),
  event(["log"], "stocked", "stocked", "Corals came in.", "2026-10-27 stocked staghorn-tips 40 pieces"),
  event(["log"], "removed", "removed", "Corals went out.", "2026-10-27 removed plating 0.1 m2 by ina"),
  event(
    ["log"],
    "moved",
    "moved",
    "Corals went to another system.",
    "2026-10-28 moved staghorn-tips 25 pieces to west-hall",
  ),
  event(
    ["log"],
    "filled",
    "filled",
    "A pump's container refilled.",
    "2026-10-28 09:00 filled line-1 to 10 L",
  ),
  event(["log"], "level", "level", "A pump's container read.", "2026-10-29 09:00 level line-1 7.4 L"),
  event(
    ["log"],
    "calibrated",
    "calibrated",
    "What a pump gave in a measured time.",
    "2026-10-29 09:20 calibrated line-1 62.5 mL in 2 min",
  ),
  event(["log"], "stopped", "stopped", "A pump stopped.", "2026-10-30 21:00 stopped line-1"),
  event(["log"], "started", "started", "A pump started again.", "2026-10-31 06:45 started line-1 by ina"),
  fact(
    sectionKinds.filter((kind) => kind !== "log"),
    "note",
    "standingNote",
    "Words to keep.",
    'note "Lid cracked; # 3 is on order." from 2026-10-01',
  ),
  event(
    sectionKinds,
    "note",
    "datedNote",
    "Words to keep, of that day.",
    '2026-10-31 note "Heater replaced." by ina',
  ),
  header([], "use", "use", "Names of another file are seen in this one.", 'use "shared/solutions.marl"'),
];

const byWord = new Map<string, StatementRow[]>();
for (const entry of statementTable) byWord.set(entry.word, [...(byWord.get(entry.word) ?? []), entry]);

/** The rows of a word, in the table's order; none where no statement starts with it. */
export const rowsOf = (word: string): readonly StatementRow[] => byWord.get(word) ?? [];

/** The words that may start a line of this form here. */
export const wordsOf = (section: SectionKind, form: StatementRow["form"]): readonly string[] =>
  statementTable
    .filter((entry) => entry.form === form && entry.sections.includes(section))
    .map((entry) => entry.word);

export const headerWords: readonly string[] = statementTable
  .filter((entry) => entry.form === "header")
  .map((entry) => entry.word);
