/** The solutions on the sheet: their strengths, and the caution that caustic ones need. */
import { rounded } from "../checks/figures.ts";
import { causticPrecautions, sheetComesFirst } from "../checks/hazard.ts";
import { allOf } from "../checks/words.ts";
import { factAt } from "../culture/history.ts";
import type { Solution, Strength } from "../culture/model.ts";
import { type Section, section } from "./sheet-model.ts";

const columns = [
  { title: "in 1 mL of", align: "left", whenNarrow: "cut" },
  { title: "alkalinity meq", align: "right" },
  { title: "calcium mg", align: "right" },
  { title: "magnesium mg", align: "right" },
  { title: "sodium mg", align: "right" },
  { title: "chloride mg", align: "right" },
  { title: "sulfate mg", align: "right" },
] as const;

export function solutionSection(solutions: readonly Solution[], at: number): Section {
  const rows = solutions.map((solution) => {
    const strength = factAt(solution.strengths, at)?.value;
    const cell = (value: number | null | undefined, decimals: number) =>
      value === null || value === undefined ? "unknown" : value === 0 ? "" : rounded(value, decimals);
    return [
      solution.name,
      cell(strength?.alkalinityMeq, 4),
      cell(strength?.calciumMg, 2),
      cell(strength?.magnesiumMg, 2),
      cell(strength?.sodiumMg, 2),
      cell(strength?.chlorideMg, 2),
      cell(strength?.sulfateMg, 2),
    ];
  });
  return section("Solutions", { table: { columns, rows } });
}

/** Bicarbonate brings a mole of carbon for each equivalent; clearly less than that is carbonate or hydroxide. */
export const isCausticByStrength = ({ alkalinityMeq, carbonMmol }: Strength): boolean =>
  alkalinityMeq !== null && alkalinityMeq > 0 && (carbonMmol ?? 0) < 0.9 * alkalinityMeq;

/** The usual precautions where something caustic is handled (common practice; the data sheet comes first). */
export function cautionLines(solutions: readonly Solution[], at: number): string[] {
  const caustic = solutions.flatMap(({ name, strengths }) => {
    const strength = factAt(strengths, at)?.value;
    return strength && isCausticByStrength(strength) ? [name] : [];
  });
  if (caustic.length === 0) return [];
  return [
    `Care: ${allOf(caustic)} can hurt eyes and skin. ${causticPrecautions} Keep it from the calcium and magnesium parts. ${sheetComesFirst}`,
  ];
}
