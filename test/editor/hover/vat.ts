/** A farm whose numbers can be worked out by hand, and hovers on its lines. */
import { expect } from "vitest";
import { hover } from "../../../server/editor/hover.ts";
import { cursorIn } from "../fixture.ts";

/**
 * 1000 L of water: 900 L and 200 L less 100 L. Corals take 2 meq × 100 + 2 × 100 mmol = 400 meq of alkalinity a
 * day, 0.4 meq/L or 1.12 dKH. A litre of soda holds 1000 meq, a litre of lime-water's partner 20 g of calcium.
 */
export const vat = `
use "shelf.marl"
system vat "Vat"
  tank main 100 cm x 100 cm x 45 cm times 2
  tank sump 200 L
  displace rock 100 L
  hold alkalinity 7 to 9 dKH aim 8
  hold calcium 400 to 440 mg/L
  hold salinity 34 to 36
  limit alkalinity rise 0.5 dKH/day
  limit alkalinity dose 0.2 dKH
  limit alkalinity max 11 dKH
  limit pH swing 0.4
  cohort plugs 100 pieces uptake 2 meq/day each
  cohort plates 1 m2 uptake 100 mmol/m2/day as CaCO3
  air CO2 500 ppm
  light between 08:00 and 18:00
  evaporates 10 L/day
  feeds 10 g/day protein 50 %
  top-off 150 L
  pump ash gives soda at 10 mL/min least 1 mL holding 4 L
  pump lime gives chloride at 10 mL/min least 1 mL between 20:00 and 08:00
  by-hand salts
log vat
  2026-11-30 08:00 read alkalinity 8 dKH, calcium 420 mg/L, pH 8.2, temperature 25 degC with bench
  2026-11-30 08:00 read salinity 38
  2026-11-30 08:00 set ash 400 mL/day, lime 200 mL/day
  2026-11-30 20:00 renewed 100 L with fresh
  2026-12-01 07:00 read alkalinity 7.5 dKH ± 0.1 with bench
  2026-12-01 07:10 gave soda 100 mL by ina
  2026-12-01 07:20 stocked plugs 50 pieces
  2026-12-01 07:25 filled ash to 2 L
  2026-12-01 07:30 calibrated ash 44 mL in 4 min
  2026-12-01 07:40 stopped lime
  2026-12-01 07:50 topped 10 L
  2026-12-02 08:00 gave soda 10 mL
`;

export const shelf = `
solution soda "Soda"
  supplies alkalinity 1 meq/mL as carbonate
solution chloride
  dissolve calcium-chloride-dihydrate 734 g
  make up to 10 L
  keep at 20 degC
solution salts
  dissolve sack 100 g
  make up to 1 L
solution lye
  saturated calcium-hydroxide
  keep at 25 degC
  acknowledge caustic "ina"
reagent sack "Epsom, 25 kg"
  is magnesium-sulfate-heptahydrate purity 98.5 %
reagent own
  formula SrCl2·6H2O
store
  2026-11-20 received sack 25 kg
  2026-11-21 09:00 mixed soda 4 L
saltwater fresh "New salt water"
  salinity 35
  alkalinity 9 dKH
  calcium 430 mg/L
kit bench
  alkalinity scatter 0.1 dKH
  calcium scatter 2 %
  2026-11-11 checked alkalinity 8.4 dKH against 8.0 dKH
`;

/** The farm with a cursor: the line given, `|` in it, stands instead of the same line without it. */
export function marked(line: string): string {
  const plain = line.replace("|", "");
  const whole = `${vat}// file: shelf.marl\n${shelf.trimStart()}`;
  const parts = whole.split(`\n${plain}\n`);
  if (parts.length !== 2) throw new Error(`${plain} is no line of the farm, or several`);
  return parts.join(`\n${line}\n`);
}

/** The Markdown of the hover at the cursor; `↵` stands for a break that Markdown keeps. Null where nothing is told. */
export function told(line: string, at?: string): string | null {
  return toldIn(marked(line), at);
}

/** Expects the text of a hover; the text's first line is empty, so that it stands at the margin. */
export function hovers(line: string, text: string): void {
  expect(told(line)).toBe(text.slice(1));
}

/** The same in any farm. */
export function toldIn(text: string, at?: string): string | null {
  const { farm, cursor } = cursorIn(text, at);
  return hover(farm, cursor)?.markdown.replace(/ {2}\n/g, " ↵\n") ?? null;
}
