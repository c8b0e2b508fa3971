/** Numbers whose unit is missing, unknown, or measures something else. */
import type { Files } from "../culture/names.ts";
import type { Place } from "../culture/place.ts";
import { adding, lineAt, replacing, replacingWith } from "./fixing.ts";
import type { Rules } from "./rule.ts";
import { crossesApart, isCrossed } from "./syntax.ts";
import { inQuotes, isParameter, oneOf } from "./words.ts";

const leftOut = "This line is left out.";

/** `dKH or meq/L`; where a bare number will do, said so. */
function written(examples: readonly string[]): string {
  const units = [...new Set(examples)].filter((example) => example !== "no unit");
  const bare = units.length < new Set(examples).size;
  return `${bare ? "without a unit, or in " : "in "}${oneOf(units)}`;
}

const hasUnit = (example: string): boolean => example !== "no unit";

/** Beside the units that are given as examples, others that people mean as often. */
const meantToo: Readonly<Record<string, readonly string[]>> = {
  "mL/min": ["mL/day"],
  dKH: ["mg/L as CaCO3"],
};

/** All units that a fix may offer. */
const offered = (examples: readonly string[]): readonly string[] => [
  ...new Set(examples.filter(hasUnit).flatMap((unit) => [unit, ...(meantToo[unit] ?? [])])),
];

/** Of a unit like `mgg/L` only a part is misspelt: where that stands. */
function partOf(place: Place, word: string, files: Files): Place {
  const { span } = place;
  if (!span || span.end - span.start === word.length) return place;
  const text = lineAt(files, place)?.text.slice(span.start, span.end) ?? "";
  const parts = [...text.matchAll(/[^\s/]+/g)].filter(([part]) => part === word);
  const [only, ...others] = parts;
  if (!only || others.length > 0) return { ...place, span: null };
  const start = span.start + only.index;
  return { ...place, span: { start, end: start + word.length } };
}

export const unitRules: Rules<
  "unit/unknown" | "unit/dimension" | "unit/missing" | "unit/as-caco3" | "unit/ppm"
> = {
  "unit/unknown": {
    severity: "error",
    title: "A unit that isn't known",
    says: ({ word }) =>
      isCrossed(word) ? `In ${inQuotes(word)} the x stands without spaces.` : `${inQuotes(word)} is no unit.`,
    why: leftOut,
    todo: "Write the unit as the language spells it.",
    todoHere: ({ word, nearest }) =>
      isCrossed(word)
        ? "Put a space on either side of it, as in 40 cm x 30 cm."
        : nearest.includes("")
          ? "Write the number without a unit."
          : nearest.length > 0
            ? `Is ${oneOf(nearest)} meant?`
            : "Write a unit such as mL, mg/L, meq/L or dKH.",
    fixes: ({ place, word, nearest }, files) =>
      isCrossed(word)
        ? crossesApart(place, files)
        : replacingWith(partOf(place, word, files), nearest, false),
    example: {
      fires: "system vat\n  tank main 500 L\n  evaporates 4 L/dya\n",
      silent: "system vat\n  tank main 500 L\n  evaporates 4 L/day\n",
    },
  },
  "unit/dimension": {
    severity: "error",
    title: "A unit that measures something else",
    says: ({ unit, expected }) =>
      `${unit === "" ? "A number without a unit" : unit} doesn't measure ${expected}.`,
    why: leftOut,
    todo: "Write the number in one of the units that the message gives as examples.",
    todoHere: ({ examples }) => `Write it ${written(examples)}.`,
    fixes: ({ place, unit, expected, examples }) =>
      // A time that was forgotten, or a parameter's unit that was mixed up; any other would need another number.
      replacingWith(
        place,
        offered(examples).filter(
          (example) => example.startsWith(`${unit}/`) || (unit !== "" && isParameter(expected)),
        ),
        false,
      ),
    background:
      "Every number is checked against what it stands for, so that a volume can't pass for a flow, or a mass for a volume.",
    example: {
      fires: "system vat\n  tank main 500 L\n  evaporates 4 L\n",
      silent: "system vat\n  tank main 500 L\n  evaporates 4 L/day\n",
    },
  },
  "unit/missing": {
    severity: "error",
    title: "A number without its unit",
    says: ({ number, expected }) => `${number} stands without a unit, where ${expected} is wanted.`,
    why: `Only salinity, pH and counts stand bare: 8 dKH and 8 meq/L are far apart. ${leftOut}`,
    todo: "Write the unit behind the number.",
    todoHere: ({ number, examples }) =>
      `Write ${oneOf(examples.filter(hasUnit).map((unit) => `${number} ${unit}`))}.`,
    fixes: ({ place, examples }) => offered(examples).flatMap((unit) => adding(place, ` ${unit}`, false)),
    example: {
      fires: "system vat\n  tank main 500\n  tank sump 100 L\n",
      silent: "system vat\n  tank main 500 L\n  tank sump 100 L\n",
    },
  },
  "unit/as-caco3": {
    severity: "error",
    title: "As CaCO3, missing or out of place",
    says: ({ unit, written: isWritten }) =>
      isWritten
        ? `As CaCO3 can't follow ${unit} here.`
        : `Alkalinity in ${unit} says nothing without what it is counted as.`,
    why: `50 mg/L as CaCO3 are 1 meq/L; as another substance they are something else. ${leftOut}`,
    whyHere: ({ written: isWritten }) =>
      isWritten
        ? `Only alkalinity, and calcium and magnesium in mg/L, are told so. ${leftOut}`
        : `So many mg or mmol are more or less alkalinity, depending on the substance that they count. ${leftOut}`,
    todo: "Write as CaCO3 where the kit counts so, or use meq or dKH; remove it where it is out of place.",
    todoHere: ({ unit, written: isWritten }) =>
      isWritten
        ? "Remove it, and give the value of the element itself."
        : `Write ${unit} as CaCO3, or use meq or dKH.`,
    fixes: ({ place, written: isWritten }) =>
      isWritten ? replacing(place, "", false) : adding(place, " as CaCO3", false),
    background:
      "One mole of CaCO3 carries two equivalents, 100.09 g to 2 eq (IUPAC abridged atomic weights). Corals' uptake in mmol or g needs it as well: a mole of CaCO3 takes two of alkalinity.",
    example: {
      fires:
        "saltwater vat-mix\n  alkalinity 140 mg/L\n\nsystem vat\n  tank main 500 L\n  flows-through 20 L/day with vat-mix\n",
      silent:
        "saltwater vat-mix\n  alkalinity 140 mg/L as CaCO3\n\nsystem vat\n  tank main 500 L\n  flows-through 20 L/day with vat-mix\n",
    },
  },
  "unit/ppm": {
    severity: "info",
    title: "ppm, which kits use for two things",
    says: ({ number }) => `${number} ppm is read as ${number} mg/L.`,
    why: "Some kits mean mg/kg by it, which is about 2 % more in sea water.",
    todo: "Write mg/L or mg/kg, whichever the kit means.",
    fixes: ({ place }) => {
      const { span } = place;
      if (!span) return [];
      // Over a time the unit goes on behind it.
      const ppm = { ...place, span: { start: span.start, end: span.start + "ppm".length } };
      return replacingWith(ppm, ["mg/L", "mg/kg"], false);
    },
    background: "A litre of sea water weighs about 1.023 kg at salinity 35 and 25 °C (EOS-80, UNESCO 1983).",
    example: {
      fires:
        "saltwater vat-mix\n  calcium 425 ppm\n\nsystem vat\n  tank main 500 L\n  flows-through 20 L/day with vat-mix\n",
      silent:
        "saltwater vat-mix\n  calcium 425 mg/L\n\nsystem vat\n  tank main 500 L\n  flows-through 20 L/day with vat-mix\n",
    },
  },
};
