import { expect, test } from "vitest";
import { completions, isAskedBy } from "../../server/editor/completion.ts";
import { cursorIn } from "./fixture.ts";

const farm = `
system vat "Big vat"
  tank main 500 L
  hold alkalinity 7.5 to 8.5 dKH
  hold calcium 400 to 440 mg/L
  cohort plugs 30 pieces uptake 0.5 meq/day each
  pump head-1 gives ash-part at 40 mL/min
  pump head-2 gives chloride-part at 40 mL/min
  by-hand epsom

solution ash-part "Carbonate part"
  supplies alkalinity 1.6 meq/mL

solution chloride-part
  supplies calcium 60 g/L

solution epsom
  supplies magnesium 40 g/L

kit bench
  alkalinity scatter 0.1 dKH

saltwater mixing-vat "New salt water"
  salinity 35
`;

const log = `
log vat
  2026-11-28 08:00 read calcium 421 mg/L, alkalinity 2.9 meq/L with bench by mk
  2026-11-29 08:00 read salinity 34.8, temperature 25.4 degC
  2026-11-30 08:00 read alkalinity 2.8 meq/L, calcium 420 mg/L with bench by ro
  2026-11-30 09:00 gave epsom 20 mL by ro
`;

const items = (text: string) => {
  const { farm: walked, cursor } = cursorIn(farm + text);
  return completions(walked, cursor, walked.moment.at);
};
const labels = (text: string): string[] => items(text).map(({ label }) => label);
const named = (text: string, label: string) => {
  const found = items(text).find((item) => item.label === label);
  if (!found) throw new Error(`${label} isn't offered`);
  return found;
};

const headers = ["system", "solution", "reagent", "store", "saltwater", "kit", "log", "use"];
const now = ["2026-12-01 08:00", "2026-12-01"];
const parameters = [
  ...["alkalinity", "calcium", "magnesium", "potassium", "strontium"],
  ...["salinity", "temperature", "pH", "nitrate", "phosphate"],
];

test("header words stand at the margin, a section's own words below its header", () => {
  expect(labels("\nsystem two\n|")).toEqual(headers);
  expect(labels("\nsol|")).toEqual(headers);
  expect(labels("\nsolution two\n  |")).toEqual([
    ...["dissolve", "saturated", "make up to", "keep at", "supplies", "acknowledge caustic", "note"],
  ]);
  expect(labels("\nreagent sack\n  |")).toEqual(["is", "formula", "reorder-below", "lead", "note"]);
  expect(labels("\nsystem two\n  |")).toEqual([
    ...["tank", "tank NAME round q x q", "tank NAME cone q x q", "displace", "measured volume", "hold"],
    ...["limit", "cohort", "uptake", "skeleton magnesium", "air CO2", "light between", "evaporates"],
    ...["feeds", "top-off", "flows-through", "pump", "by-hand", "note"],
  ]);
});

test("events are offered behind their date", () => {
  const events = [
    ...["read", "set", "gave", "renewed", "topped", "stocked", "removed", "moved"],
    ...["filled", "level", "calibrated", "stopped", "started", "note"],
  ];
  const readings = [
    "read alkalinity … meq/L, calcium … mg/L with bench",
    "read salinity …, temperature … degC",
  ];
  expect(labels(`${log}  2026-12-01 08:00 |`)).toEqual([...readings, ...events]);
  expect(labels(`${log}  2026-12-01 08:00 re|`)).toEqual([...readings, ...events]);
  expect(labels(`${log}  2026-12-01 |`)).toEqual(["08:00", ...readings, ...events]);
  expect(labels("\nstore\n  2026-12-01 08:00 |")).toEqual([
    ...["received", "counted", "mixed", "discarded", "note"],
  ]);
  expect(labels("\nkit two\n  2026-12-01 08:00 |")).toEqual(["checked", "note"]);
  expect(labels("\nsolution two\n  2026-12-01 08:00 |")).toEqual(["note"]);
});

test("an empty line of events begins with the moment that it is", () => {
  const readings = [
    "2026-12-01 08:00 read alkalinity … meq/L, calcium … mg/L with bench",
    "2026-12-01 08:00 read salinity …, temperature … degC",
  ];
  expect(labels(`${log}  |`)).toEqual([...now, ...readings]);
  expect(labels(`${log}|`)).toEqual([...now, ...readings, ...headers]);
  expect(labels("\nstore\n  |")).toEqual([...now, "note"]);
  expect(labels("\nkit two\n  |")).toEqual([...now, ...parameters, "note"]);
  expect(named(`${log}  |`, "2026-12-01 08:00").text).toBe("2026-12-01 08:00 ");
  expect(named(`${log}|`, "2026-12-01 08:00").text).toBe("  2026-12-01 08:00 ");
  expect(labels("\nsystem two\n  evaporates 3 L/day from |")).toEqual(["2026-12-01"]);
});

test("a whole read line has the usual parameters, units, kit and people, and no value", () => {
  const line = named(`${log}  re|`, "2026-12-01 08:00 read alkalinity … meq/L, calcium … mg/L with bench");
  expect(line.text).toBe("2026-12-01 08:00 read alkalinity ");
  expect(line.snippet).toBe(
    `2026-12-01 08:00 read alkalinity $1 meq/L, calcium $2 mg/L with bench by \${3|ro,mk|}$0`,
  );
  expect(line.detail).toBe("last: 2.8 meq/L, 420 mg/L");
  expect(line.filter).toBe("read alkalinity … meq/L, calcium … mg/L with bench");
  // A disregarded line isn't usual, and what lies ahead isn't known.
  const others = `
log vat
  2026-11-28 08:00 read nitrate 2 mg/L disregard "old"
  2026-12-03 08:00 read phosphate 0.1 mg/L
  2026-12-01 |`;
  expect(labels(others).slice(0, 3)).toEqual(["08:00", "read", "set"]);
});

test("parameters: what the system is held in first, what the line has already last", () => {
  expect(labels(`${log}  2026-12-01 08:00 read |`)).toEqual([
    ...["alkalinity", "calcium", "salinity", "temperature"],
    ...["magnesium", "potassium", "strontium", "pH", "nitrate", "phosphate"],
  ]);
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 8 dKH, c|`)).toEqual([
    ...["calcium", "salinity", "temperature"],
    ...["magnesium", "potassium", "strontium", "pH", "nitrate", "phosphate", "alkalinity"],
  ]);
  expect(labels("\nsystem two\n  hold calcium 400 to 440 mg/L\n  hold |").at(-1)).toBe("calcium");
  expect(labels("\nsolution two\n  supplies |")).toEqual([
    ...["alkalinity", "calcium", "magnesium", "potassium", "strontium", "nitrate", "phosphate"],
  ]);
  expect(labels("\nsaltwater two\n  salinity 35\n  |").slice(2)).toEqual([
    ...parameters.filter((name) => name !== "salinity"),
    ...["salinity", "note"],
  ]);
});

test("units that fit, the one in use first", () => {
  const units = (text: string) => items(text).flatMap(({ kind, label }) => (kind === "unit" ? [label] : []));
  expect(units(`${log}  2026-12-01 08:00 read alkalinity 8 |`).slice(0, 3)).toEqual([
    ...["meq/L", "dKH", "mmol/L"],
  ]);
  expect(units(`${log}  2026-12-01 08:00 read alkalinity 8 mg/L as |`)).toEqual([]);
  expect(units(`${log}  2026-12-01 08:00 read pH 8 |`)).toEqual(["total"]);
  expect(units(`${log}  2026-12-01 08:00 read temperature 25 |`)).toEqual(["degC", "degF"]);
  expect(units(`${log}  2026-12-01 08:00 read salinity 35 |`)).toEqual([
    "ppt",
    "SG",
    "SG20",
    "SG60F",
    "mS/cm",
  ]);
  expect(units(`${log}  2026-12-01 08:00 read alkalinity 8 dKH ± 0.1 |`).slice(0, 3)).toEqual([
    ...["%", "dKH", "meq/L"],
  ]);
  expect(units(`${log}  2026-12-01 08:00 set head-1 20 |`)).toEqual(["mL/day", "L/day"]);
  expect(units(`${log}  2026-12-01 08:00 calibrated head-1 20 |`)).toEqual(["mL", "L", "floz"]);
  expect(units(`${log}  2026-12-01 08:00 calibrated head-1 20 mL in 2 |`)).toEqual(["min", "s", "h"]);
  expect(units("\nsystem two\n  limit alkalinity rise 0.5 |").slice(0, 2)).toEqual(["dKH/day", "meq/L/day"]);
  expect(units("\nsystem two\n  limit pH swing 0.5 |")).toEqual([]);
  expect(units("\nsystem two\n  tank a 3 |").slice(0, 2)).toEqual(["L", "mL"]);
  expect(units("\nsystem two\n  tank a 3 cm x 4 |")).toEqual(["cm", "m", "mm", "inch", "ft"]);
  expect(units("\nsystem two\n  tank a cone 3 |")).toEqual(["cm", "m", "mm", "inch", "ft"]);
  expect(units("\nsystem two\n  displace a 3 kg at 2 |")).toEqual(["kg/L", "g/mL"]);
  expect(units("\nsystem two\n  cohort a 3 pieces uptake 4 |")).toEqual([
    ...["meq/day", "mmol/day as CaCO3", "g/day as CaCO3"],
  ]);
  expect(units("\nsystem two\n  cohort a 3 m2 uptake 4 |")).toEqual([
    ...["mmol/m2/day as CaCO3", "meq/m2/day", "g/m2/day as CaCO3"],
  ]);
  expect(units("\nsystem two\n  cohort a 3 pieces uptake 4 meq/day grows 1 |")).toEqual(["%/week", "%/day"]);
  expect(units("\nsolution two\n  supplies calcium 4 |").slice(0, 2)).toEqual(["g/L", "mg/mL"]);
  expect(units("\nsolution two\n  make up to 4 |").slice(0, 2)).toEqual(["L", "mL"]);
  expect(units("\nkit two\n  calcium scatter 2 |").at(-1)).toBe("%");
  expect(labels(`${log}  2026-12-01 08:00 stocked plugs 20 |`)).toEqual(["pieces"]);
  const mat =
    "\nsystem two\n  cohort mat 2 m2 uptake 4 meq/m2/day\n\nlog two\n  2026-12-01 08:00 removed mat 1 |";
  expect(labels(mat)).toEqual(["m2", "cm2"]);
  expect(labels("\nsystem two\n  cohort mat 2 |")).toEqual(["pieces", "m2", "cm2"]);
});

test("a number that needs its unit is followed by nothing else", () => {
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 7.9 d|`)).not.toContain("disregard");
  expect(labels("\nsystem two\n  cohort y 0.5 m2 uptake 200 |")).toEqual([
    ...["mmol/m2/day as CaCO3", "meq/m2/day", "g/m2/day as CaCO3"],
  ]);
  expect(labels(`${log}  2026-12-01 08:00 read pH 7.9 |`)).toContain("with");
  expect(labels("\nsystem two\n  hold alkalinity 7 |").at(-1)).toBe("to");
});

test("behind ± what the number before it counts", () => {
  const deviations = (value: string) => labels(`${log}  2026-12-01 08:00 read alkalinity ${value} |`);
  expect(deviations("8 dKH ± 0.1").slice(0, 3)).toEqual(["%", "dKH", "meq/L"]);
  expect(deviations("8 dKH ± 0.1").filter((label) => label.includes("CaCO3"))).toEqual([]);
  expect(deviations("140 mg/L as CaCO3 ± 2")).toEqual([
    ...["%", "mg/L", "mg/kg", "ppm", "with", "disregard", "by"],
  ]);
});

test("CaCO3 behind as, where it makes sense", () => {
  expect(labels("\nsystem two\n  cohort y 0.5 m2 uptake 20 mmol/m2/day as |")).toEqual(["CaCO3"]);
  expect(labels("\nsystem two\n  cohort y 0.5 m2 uptake 20 meq/m2/day as |")).toEqual([]);
});

test("a reagent isn't made of itself", () => {
  const found = labels("\nreagent zreag\n  is |");
  expect(found).toContain("sodium-carbonate");
  expect(found).not.toContain("zreag");
});

test("parts of a statement, those that aren't said yet", () => {
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 8 dKH |`)).toEqual([
    "with",
    "disregard",
    "by",
    "±",
  ]);
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 8 dKH with bench |`)).toEqual(["disregard", "by"]);
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 140 mg/L |`)).toEqual([
    ...["with", "disregard", "by", "as CaCO3", "±"],
  ]);
  expect(labels("\nsystem two\n  hold alkalinity 7 to 8 dKH |")).toEqual(["aim", "from", "until", "±"]);
  expect(labels("\nsystem two\n  limit alkalinity |")).toEqual([
    "rise",
    "fall",
    "swing",
    "dose",
    "max",
    "min",
  ]);
  expect(labels("\nsystem two\n  pump a gives ash-part at 40 mL/min ho|")).toEqual([
    ...["least", "between", "always", "holding", "from", "until", "±"],
  ]);
  expect(labels("\nsystem two\n  cohort a 3 m2 uptake 4 mmol/m2/day |")).toEqual([
    ...["magnesium", "grows", "from", "until", "as CaCO3", "±"],
  ]);
  expect(labels("\nsystem two\n  cohort a 3 pieces uptake 4 meq/day |")[0]).toBe("each");
  expect(labels("\nkit two\n  alkalinity |")).toEqual(["scatter", "tolerance"]);
});

test("names by what is wanted, the lately used first", () => {
  expect(labels("\nlog |")).toEqual(["vat"]);
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 8 dKH with |`)).toEqual(["bench"]);
  expect(labels(`${log}  2026-12-01 08:00 read alkalinity 8 dKH by |`)).toEqual(["ro", "mk"]);
  expect(labels(`${log}  2026-12-01 08:00 set |`)).toEqual(["epsom", "head-1", "head-2"]);
  expect(labels(`${log}  2026-12-01 08:00 set head-1 20 mL/day, |`)).toEqual(["epsom", "head-2", "head-1"]);
  expect(labels(`${log}  2026-12-01 08:00 gave |`)).toEqual(["epsom", "ash-part", "chloride-part"]);
  expect(labels(`${log}  2026-12-01 08:00 renewed 20 L with |`)).toEqual(["mixing-vat"]);
  expect(labels(`${log}  2026-12-01 08:00 topped 20 L with |`)).toEqual([
    "epsom",
    "ash-part",
    "chloride-part",
  ]);
  expect(labels(`${log}  2026-12-01 08:00 filled |`)).toEqual(["head-1", "head-2"]);
  expect(labels(`${log}  2026-12-01 08:00 removed |`)).toEqual(["plugs"]);
  expect(labels(`\nsystem two\n  tank a 3 L\n${log}  2026-12-01 08:00 moved plugs 3 pieces to |`)).toEqual([
    "two",
  ]);
  expect(labels("\nsystem two\n  pump a gives |")).toEqual(["ash-part", "chloride-part", "epsom"]);
  expect(labels("\nstore\n  2026-12-01 mixed |")).toEqual(["ash-part", "chloride-part", "epsom"]);
  const reagents = items("\nreagent sack\n  is CaO\n\nsolution two\n  dissolve |");
  expect(reagents.slice(0, 2).map(({ label, detail }) => [label, detail])).toEqual([
    ["sack", "reagent"],
    ["sodium-carbonate", "Na2CO3, Sodium carbonate, anhydrous (soda ash)"],
  ]);
  expect(labels("\nreagent sack\n  formula |").slice(0, 2)).toEqual(["Na2CO3", "Na2CO3·H2O"]);
  // A name that is given here can't be one that is there.
  expect(labels("\nsystem two\n  pump |")).toEqual([]);
});

test("a name of a file that isn't used comes with its use line, in the right place", () => {
  const shelf = '// file: shelf/waters.marl\nsaltwater light-mix "Light"\n  salinity 33\n';
  const offer = (text: string) => {
    const { farm: walked, cursor, files } = cursorInFiles(`${text}\n${shelf}`);
    const found = completions(walked, cursor, walked.moment.at);
    expect(found.map(({ label }) => label)).toEqual(["light-mix"]);
    const [item] = found;
    expect(item!.detail).toBe("Light (shelf/waters.marl)");
    return withEdits(files.get("farm.marl")!, item!.also);
  };
  const system = "system vat\n  tank main 500 L\n  flows-through 9 L/day with |";
  const plain = system.replace("|", "");
  expect(offer(system)).toBe(`use "shelf/waters.marl"\n\n${plain}\n`);
  expect(offer(`# Our vat.\n\n${system}`)).toBe(`# Our vat.\n\nuse "shelf/waters.marl"\n\n${plain}\n`);
  expect(offer(`# Our vat.\n${system}`)).toBe(`use "shelf/waters.marl"\n\n# Our vat.\n${plain}\n`);
  expect(offer(`use "other.marl"\n\n${system}`)).toBe(
    `use "other.marl"\nuse "shelf/waters.marl"\n\n${plain}\n`,
  );
});

test("paths of the farm's files behind use, in quotes", () => {
  const others = "\n// file: shelf/salts.marl\nreagent sack\n\n// file: shelf/waters.marl\nsaltwater mix\n";
  const paths = (text: string) => {
    const { farm: walked, cursor } = cursorIn(text + others);
    return completions(walked, cursor, 0).map(({ text: put, detail, replace: { start, end } }) => [
      ...[put, detail, start, end],
    ]);
  };
  expect(paths("use |")).toEqual([
    ['"shelf/salts.marl"', "sack", 4, 4],
    ['"shelf/waters.marl"', "mix", 4, 4],
  ]);
  expect(paths('use "|')).toEqual([
    ['"shelf/salts.marl"', "sack", 4, 5],
    ['"shelf/waters.marl"', "mix", 4, 5],
  ]);
  expect(paths('use "shelf/salts.marl"\nuse "sh|x"')).toEqual([['"shelf/waters.marl"', "mix", 4, 9]]);
  expect(paths('use "shelf/salts.marl"|')).toEqual([]);
  expect(paths('// file: shelf/more.marl\nuse "|').map(([put]) => put)).toEqual([
    '"salts.marl"',
    '"waters.marl"',
  ]);
});

test("in comments only the codes of problems, and those only behind quiet", () => {
  expect(labels(`${log}  2026-12-01 08:00 read # al|`)).toEqual([]);
  expect(labels(`${log}  2026-12-01 08:00 note "al|"`)).toEqual([]);
  expect(labels(`${log}  2026-12-01 08:00 note "al|`)).toEqual([]);
  const ppm = `${log}  2026-11-30 10:00 read calcium 415 ppm # quiet:`;
  expect(labels(`${ppm} |`)[0]).toBe("unit/ppm");
  expect(labels(`${ppm} unit/ppm, |`)).not.toContain("unit/ppm");
  expect(labels(`${ppm} |`)).not.toContain("unit/missing");
  expect(labels("\n# quiet file: na|").slice(0, 2)).toEqual(["name/unused", "unit/ppm"]);
  const { insert, replace } = named(`${ppm} un|it`, "unit/ppm");
  expect([insert.end - insert.start, replace.end - replace.start]).toEqual([2, 4]);
});

test("the edit takes in the whole word, with its - and /", () => {
  const spans = (text: string, label: string) => {
    const { insert, replace } = named(text, label);
    return [insert.start, insert.end, replace.start, replace.end];
  };
  expect(spans("\nsystem two\n  pump a gives ash-p|art at 3 mL/min", "ash-part")).toEqual([15, 20, 15, 23]);
  expect(spans(`${log}  2026-12-01 08:00 read calcium 8 mm|ol/L with bench`, "mg/L")).toEqual([
    34, 36, 34, 40,
  ]);
  expect(spans(`${log}  2026-12-01 08:00 read calcium 8mg|/L`, "mg/L")).toEqual([33, 35, 33, 37]);
  expect(spans(`${log}  2026-12-01 08:00 re|`, "read")).toEqual([19, 21, 19, 21]);
});

test("what goes on behind the cursor is kept: only its word is offered", () => {
  const { text, snippet } = named(`${log}  2026-12-01 08:00 re| alkalinity 8 dKH`, "read");
  expect([text, snippet]).toEqual(["read", null]);
  expect(labels(`${log}  2026-12-01 08:00 re| alkalinity 8 dKH`)[0]).toBe("read");
});

test("a space asks only behind words that take a name, a parameter or a unit", () => {
  const asks = (text: string, character = " ") => {
    const { farm: walked, cursor } = cursorIn(farm + text);
    return isAskedBy(walked, cursor, character);
  };
  expect(asks("\nsystem two\n  hold |")).toBe(true);
  expect(asks("\nsystem two\n  hold alkalinity 7 |")).toBe(true);
  expect(asks(`${log}  2026-12-01 08:00 read alkalinity 8 dKH with |`)).toBe(true);
  expect(asks(`${log}  2026-12-01 08:00 read alkalinity 8 dKH |`)).toBe(false);
  // Behind a number that needs none, a unit isn't pressed upon anybody.
  expect(asks(`${log}  2026-12-01 08:00 read pH 8.1 |`)).toBe(false);
  expect(asks(`${log}  2026-12-01 08:00 read temperature 25 |`)).toBe(true);
  expect(asks(`${log}  |`)).toBe(false);
  expect(asks(`${log}  2026-12-01 08:00 |`)).toBe(false);
  expect(asks(`${log}  2026-12-01 08:00 note "with |`)).toBe(false);
  expect(asks(`${log}  # with |`)).toBe(false);
  expect(asks("\nuse |")).toBe(true);
  expect(asks('\nuse "|', '"')).toBe(true);
  expect(asks('\nsystem two\n  note "|', '"')).toBe(false);
});

function cursorInFiles(text: string) {
  const { farm: walked, cursor } = cursorIn(text);
  return { farm: walked, cursor, files: walked.texts };
}

function withEdits(
  text: string,
  edits: readonly { line: number; start: number; end: number; text: string | null }[],
): string {
  const lines = text.split("\n");
  for (const { line, start, end, text: put } of edits)
    lines[line] = lines[line]!.slice(0, start) + (put ?? "") + lines[line]!.slice(end);
  return lines.join("\n");
}
