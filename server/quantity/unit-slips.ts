/** Which units can be meant by a word that is none: only those that measure what stands there. */
import { nearestWords } from "../../grammar/nearest.ts";
import { readUnit, unitTable } from "../../grammar/units.ts";
import { bad, type QuantityFinding, type Reading } from "./finding.ts";

/** As people write units, in small letters; common practice, no source. An empty one: the number stands bare. */
const slips: Readonly<Record<string, string>> = {
  c: "degC",
  celsius: "degC",
  f: "degF",
  fahrenheit: "degF",
  kh: "dKH",
  dh: "dKH",
  mgl: "mg/L",
  "mgl-1": "mg/L",
  meql: "meq/L",
  mmoll: "mmol/L",
  mld: "mL/day",
  psu: "",
  lt: "L",
  ltr: "L",
  ltrs: "L",
  liter: "L",
  liters: "L",
  litre: "L",
  litres: "L",
  gram: "g",
  grams: "g",
  kilo: "kg",
  kilos: "kg",
  d: "day",
  hr: "h",
  hrs: "h",
  wk: "week",
  sec: "s",
};

const spellings = unitTable.map(({ spelling }) => spelling);

/** The finding of an unknown unit with what its word can mean at its place; any other finding stays. */
export function withUnitsMeant(
  finding: QuantityFinding,
  written: string,
  fits: (unit: string) => boolean,
): Reading<never> {
  if (finding.code !== "unit/unknown") return bad(finding);
  const { word } = finding;
  const meant = slips[word.toLowerCase()];
  const isMeant = (candidate: string): boolean => {
    const parts = written.split("/");
    const whole = parts.map((part) => (part === word ? candidate : part)).join("/");
    // Where another part is none either, nothing can be told.
    return (whole !== "" && !readUnit(whole).known) || fits(whole);
  };
  const alike = spellings.filter((each) => each.toLowerCase() === word.toLowerCase()).filter(isMeant);
  const certain = meant !== undefined && isMeant(meant) ? [meant] : alike;
  const nearest = certain.length > 0 ? certain : nearestWords(word, spellings).filter(isMeant);
  return bad({ ...finding, nearest });
}
