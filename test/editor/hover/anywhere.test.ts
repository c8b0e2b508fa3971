/** Hovering anywhere, in good files and bad ones: never throws, never shows what no technician should see. */
import { readdirSync, readFileSync, statSync } from "node:fs";
import { join, relative, resolve } from "node:path";
import { expect, test } from "vitest";
import { hover } from "../../../server/editor/hover.ts";
import { plainText } from "../../../server/editor/markdown.ts";
import { walk } from "../../checks/walk.ts";

const root = resolve(import.meta.dirname, "../../..");

function filesUnder(folder: string): Map<string, string> {
  const files = new Map<string, string>();
  const look = (path: string): void => {
    for (const name of readdirSync(path)) {
      const inside = join(path, name);
      if (statSync(inside).isDirectory()) look(inside);
      else if (name.endsWith(".marl")) files.set(relative(folder, inside), readFileSync(inside, "utf8"));
    }
  };
  look(folder);
  return files;
}

const longest = 3000;
const mostDigits = 6;

/** Digits of a number that tell something: zeros at its start, and those of a whole number's end, don't. */
const tellingDigits = (number: string): number => {
  const plain = number.replace(".", "").replace(/^0+/, "");
  return (number.includes(".") ? plain : plain.replace(/0+$/, "")).length;
};

/** What is wrong with a hover's text. */
function faultsOf(markdown: string, files: ReadonlyMap<string, string>): string[] {
  const faults: string[] = [];
  const plain = plainText(markdown);
  for (const word of ["NaN", "Infinity", "undefined", "null", "[object"])
    if (plain.includes(word)) faults.push(`shows ${word}`);
  // Lines of Marl and forms stand in code, where nothing is markup.
  const open = markdown.replace(/^```marl\n[\s\S]*?\n```$/gm, "").replace(/`[^`\n]*`/g, "");
  const raw = open.replace(/\\[!-/:-@[-`{-~]/g, "");
  if (/[<>[\]_|~$`]/.test(raw)) faults.push("holds raw markup");
  if (/&(?!(?:amp|lt|gt);)/.test(raw)) faults.push("holds a raw ampersand");
  if (/\*/.test(raw.replace(/^\*\*[^*\n]+\*\*/gm, ""))) faults.push("holds a raw star");
  if (/:\/\//.test(raw)) faults.push("holds a bare link");
  if (markdown.length > longest) faults.push(`is ${markdown.length} long`);
  const texts = [...files.values()].join("\n");
  for (const [number] of open.matchAll(/\d+(?:\.\d+)?/g))
    if (tellingDigits(number) > mostDigits && !texts.includes(number)) faults.push(`shows ${number}`);
  return faults;
}

/** Hovers at every column of every line, and tells what is wrong and how much was answered. */
function everywhere(files: ReadonlyMap<string, string>, at: string) {
  const farm = walk(files, at);
  const faults: string[] = [];
  const answers = new Set<string>();
  let asked = 0;
  for (const [file, { lines }] of farm.documents) {
    for (const [line, { text }] of lines.entries()) {
      let last = "";
      for (let column = 0; column <= text.length; column += 1) {
        const found = hover(farm, { file, line, column });
        asked += 1;
        if (!found) continue;
        const { span, markdown } = found;
        if (!(span.start <= column && column <= span.end && span.end <= text.length))
          faults.push(`${file}:${line + 1}:${column + 1} has a wrong span`);
        if (markdown === last) continue;
        last = markdown;
        answers.add(markdown);
        for (const fault of faultsOf(markdown, files))
          faults.push(`${file}:${line + 1}:${column + 1} ${fault}: ${markdown}`);
      }
    }
  }
  return { faults: faults.slice(0, 5), answers, asked };
}

test("the whole example farm", () => {
  const files = filesUnder(join(root, "examples"));
  // The logs are long and alike: their last lines and every fortieth of the others stand for them.
  const farm = new Map(
    [...files].map(([file, text]) => {
      const lines = text.split("\n");
      const kept = lines.filter(
        (_, index) => lines.length < 60 || index > lines.length - 16 || index % 40 === 0,
      );
      return [file, kept.join("\n")];
    }),
  );
  const { faults, answers, asked } = everywhere(farm, "2026-12-01T08:00");
  expect(faults).toEqual([]);
  expect(asked).toBeGreaterThan(9_000);
  expect(answers.size).toBeGreaterThan(300);
});

test("the farm of North House, before its log, in it and long after", () => {
  const files = filesUnder(join(import.meta.dirname, "../fixtures/north-house"));
  for (const at of ["2026-09-01T00:00", "2026-11-27T08:05", "2031-01-01T12:00"]) {
    const { faults, answers } = everywhere(files, at);
    expect(faults).toEqual([]);
    expect(answers.size).toBeGreaterThan(100);
  }
});

const messy = `
use "elsewhere.marl"
use "other.marl"
system vat "<script>alert(1)</script> [x](http://evil.example) \`code\` | *b* _i_ ~~s~~ &amp; www.evil.example a@b.example"
  tank empty 0 L
  tank huge 999999999999999 m3
  displace __rock__ 3 L
  tank 1. 3 L
  measured volume 0.000000001 mL ± 900 %
  hold alkalinity 0 to 0 dKH
  hold calcium 440 to 410 mg/L aim 1e3
  hold pH 8 to 9 total
  hold salinity 1.020 to 1.030 SG
  hold temperature -40 to 400 degF
  hold strontium 0 to 0.000001 mmol/kg
  limit alkalinity rise 0 dKH/day
  limit pH max 14 total
  limit pH swing 0
  limit temperature swing 3 degF
  limit salinity rise 0.001 SG
  limit calcium dose 999999999999 mg/L
  cohort none 0 pieces uptake 0 meq/day
  cohort many 900000000000000 pieces uptake 900000000000000 mol/day as CaCO3 each grows 90 %/week
  uptake potassium 3 g/day ± 300 %
  uptake magnesium 3 mg/L/day
  skeleton magnesium 100 %
  air CO2 0 ppm
  air CO2 99999999999 uatm from 2027-01-01
  light between 24:00 and 00:00
  evaporates 99999999 L/day
  feeds 0 g/day protein 0 %
  top-off lye 0 L
  flows-through 0 L/day with vat
  pump p_1 gives lye at 0.0000001 mL/week least 900 L between 01:00 and 01:00 always 3 L/day holding 0 L
  pump p_2 gives nothing-known at 3 mL/min
  by-hand lye times 99999
  by-hand odd
log vat
  2026-11-30 09:00 read alkalinity 0 meq/L, calcium 0 mg/L, salinity 0, temperature 0 degC, pH 4 total
  2026-11-30 10:00 read alkalinity below 20 meq/L, magnesium 12 %
  2026-11-30 10:30 read alkalinity 99999 dKH, pH 99
  2026-11-30 11:00 read nitrate below 2 mg/L with kit_x disregard "]( http://x.example <b> \`\`\`"
  2026-11-30 11:00 set p_1 999999999999 L/day, odd 1 mL/day
  2026-11-30 11:01 gave lye 99999999 L, odd 0 mL, nothing-known 1 L
  2026-11-30 11:02 renewed 1000000 m3 with vat
  2026-11-30 11:03 topped 3 L with lye
  2026-11-30 11:04 removed many 900000000000000 pieces
  2026-11-30 11:04 moved none 1 pieces to vat
  2026-11-30 11:05 filled p_1 to 3 L
  2026-11-30 11:05 level p_1 0 L
  2026-11-30 11:06 calibrated p_1 0 mL in 9999999 week
  2026-11-30 11:07 stopped p_1
  2030-11-30 11:07 gave lye 3 mL
  2030-11-30 11:08 read alkalinity 8 dKH, pH 8
  2026-13-45 gave lye 3 mL
  gave lye 3 mL
  2026-11-30 note "# <i>x</i> # quiet: water/stale"
solution lye "**lye** <b>"
  dissolve sodium-hydroxide 0 g
  dissolve calcium-chloride 3 g
  make up to 0 L
  keep at -300 degC
solution odd
  supplies alkalinity 999999999 meq/mL as bicarbonate
  supplies calcium 0 mg/mL
solution nothing-known
  dissolve own-thing 3 kg
  make up to 0.0001 mL
solution too-strong
  dissolve NaCl 99999999999 kg
  saturated sodium-chloride
  make up to 1 mL
reagent own-thing "a|b"
  formula (NH4)2SO4[x] purity 0 %
reagent loop
  is loop purity 300 %
reagent real
  formula Fe2(SO4)3·9H2O purity 0.0001 %
store
  2026-11-30 received real 0 g lot "<lot>"
  2026-11-30 mixed lye 0 L
  2026-11-30 discarded odd 9999999 m3
saltwater thin
  salinity 0
  pH 14 total
  calcium 0.0000001 umol/kg
kit kit_x "__kit__"
  alkalinity scatter 0 dKH
  calcium scatter 900 %
  pH tolerance 0
  temperature scatter 3 degF
  2026-11-30 checked alkalinity 3 dKH against 0 dKH
<<<<<<< ours
!!! 💥 é 漢 [a](b) <x>
# quiet file: water/stale, hazard/caustic  & <b>
`;

test("a file in which everything is wrong, with words that are markup", () => {
  const files = new Map([
    ["farm.marl", messy],
    ["other.marl", 'solution other_part "[t](u)"\n  supplies alkalinity 1 meq/mL\n'],
  ]);
  const { faults, answers } = everywhere(files, "2026-12-01T08:00");
  expect(faults).toEqual([]);
  expect(answers.size).toBeGreaterThan(100);
  // The title of the system is on no hover; a name that is markup comes out as it was written.
  const shown = [...answers].map(plainText).join("\n");
  expect(shown).toContain("p_1:");
  expect(shown).toContain("kit_x:");
});
