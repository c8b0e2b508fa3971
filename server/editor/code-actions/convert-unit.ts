/** Writes a quantity, or all of the same unit that are selected, in another unit of its kind. */
import type { QuantityText } from "../../../grammar/syntax.ts";
import type { LineEdit } from "../../checks/problem.ts";
import type { Farm } from "../../farm.ts";
import { type LineInFarm, lineIn } from "../cursor.ts";
import { type Measured, type MeasuredQuantity, quantitiesOf } from "../quantities.ts";
import {
  type Action,
  type Asked,
  type FindActions,
  inLines,
  type Selection,
  touchedLines,
} from "./action.ts";
import { type InOtherUnit, inOtherUnits, inUnit, textOf, unitOf } from "./other-units.ts";
import { densityAt } from "./water-at.ts";

/** A quantity where it stands. */
interface Placed extends MeasuredQuantity {
  readonly line: LineInFarm;
}

export const converting: FindActions = (asked) => {
  const all = selected(asked);
  const here =
    all.find(({ line, quantity }) => touchesQuantity(asked.selection, line.number, quantity)) ?? null;
  return [
    ...(here ? oneByOne(asked.farm, here, all) : []),
    ...allSelected(asked, here ?? all[0] ?? null, all),
  ];
};

/** In a longer selection there is too much to work out for an answer at once. */
const mostLines = 500;

function selected({ farm, selection }: Asked): readonly Placed[] {
  const [first, last] = touchedLines(selection);
  const placed: Placed[] = [];
  if (last - first >= mostLines) return placed;
  for (let number = first; number <= last; number += 1) {
    const line = lineIn(farm, selection.file, number);
    if (!line) break;
    if (line.line.statement)
      placed.push(...quantitiesOf(line.line.statement).map((each) => ({ ...each, line })));
  }
  return placed;
}

const touchesQuantity = ({ from }: Selection, line: number, { start, end }: QuantityText): boolean =>
  line === from.line && start <= from.column && from.column <= end;

const action = (title: string, edits: () => readonly LineEdit[]): Action => ({
  ...{ title, kind: "refactor.rewrite", problem: null, isPreferred: false },
  edit: () => inLines(edits()),
});

const atDensity = (least: number, most: number): string => {
  const [low, high] = [least.toFixed(4), most.toFixed(4)];
  return ` at density ${low === high ? low : `${low} to ${high}`} kg/L`;
};

function oneByOne(farm: Farm, here: Placed, all: readonly Placed[]): readonly Action[] {
  const density = () => densityAt(farm, here.line);
  const group = together(here, all);
  return inOtherUnits(here.quantity, here.measured, density).flatMap((found) => {
    const edits = group.map((each) => editsFor(each, found, density));
    if (edits.includes(null)) return [];
    const number = found.uncertainty === null ? found.number : `${found.number} ± ${found.uncertainty}`;
    const unit = textOf(found);
    const how = found.densityKgPerL === null ? "" : atDensity(found.densityKgPerL, found.densityKgPerL);
    const text = unit === "" ? `${number} without a unit` : withUnit(found, unit);
    return [action(`Write ${text}${how}`, () => edits.flatMap((each) => each ?? []))];
  });
}

const withUnit = ({ number, uncertainty }: InOtherUnit, unit: string): string =>
  uncertainty === null ? `${number} ${unit}` : `${number} ${unit} ± ${uncertainty} ${unit}`;

/** In a band or a tank's measures a number takes its unit from another: those of one unit change together. */
function together(here: Placed, all: readonly Placed[]): readonly Placed[] {
  const kind = here.line.line.statement?.kind;
  if (kind !== "hold" && kind !== "tank") return [here];
  return all.filter((each) => each.line === here.line && isAlike(each, here));
}

const keyOf = (measured: Measured): string =>
  measured.of === "plain" ? measured.kind : `${measured.parameter.name} ${measured.manner}`;

const isAlike = (left: MeasuredQuantity, right: MeasuredQuantity): boolean =>
  keyOf(left.measured) === keyOf(right.measured) &&
  textOf(unitOf(left.quantity)) === textOf(unitOf(right.quantity));

/** The edits that write a quantity in another unit; null where it can't be. */
function editsFor(
  { line, quantity, measured }: Placed,
  unit: Pick<InOtherUnit, "unit" | "asCaCO3">,
  density: () => number,
): readonly LineEdit[] | null {
  const found = inUnit(quantity, measured, unit, density);
  if (!found) return null;
  const put = (start: number, end: number, text: string): LineEdit => ({
    ...{ file: line.file, line: line.number, start, end, text },
  });
  const { number, unit: old, borrowedUnit, asCaCO3, uncertainty } = quantity;
  const text = textOf(found);
  const edits = [put(number.start, number.end, found.number)];
  if (!old) edits.push(put(number.end, number.end, ` ${text}`));
  else if (!borrowedUnit) {
    const isOwnCalcite = asCaCO3 !== null && asCaCO3.start >= quantity.start && asCaCO3.end <= quantity.end;
    // Behind a quantity that says both its unit and `as CaCO3` the latter may follow what stands behind `±`.
    if (isOwnCalcite && uncertainty && asCaCO3.start > uncertainty.start) return null;
    const end = isOwnCalcite ? asCaCO3.end : old.end;
    edits.push(text === "" ? put(number.end, end, "") : put(old.start, end, text));
  }
  if (uncertainty && found.uncertainty !== null) {
    edits.push(put(uncertainty.number.start, uncertainty.number.end, found.uncertainty));
    if (uncertainty.unit)
      edits.push(
        text === ""
          ? put(uncertainty.number.end, uncertainty.unit.end, "")
          : put(uncertainty.unit.start, uncertainty.unit.end, found.unit),
      );
  }
  return edits;
}

/** Every quantity of the selection that measures the same in the same unit as the first one. */
function allSelected(
  { farm, selection: { from, to } }: Asked,
  here: Placed | null,
  all: readonly Placed[],
): readonly Action[] {
  if (!here || (from.line === to.line && from.column === to.column)) return [];
  const alike = all.filter((each) => isAlike(each, here));
  if (new Set(alike.map(({ line }) => line.number)).size < 2) return [];
  const units = inOtherUnits(here.quantity, here.measured, () => densityAt(farm, here.line));
  const isDense = units.some(({ densityKgPerL }) => densityKgPerL !== null);
  const densities = isDense ? alike.map(({ line }) => densityAt(farm, line)) : [];
  return units.flatMap((unit) => {
    const edits = alike.map((each, index) => editsFor(each, unit, () => densities[index]!));
    if (edits.includes(null)) return [];
    const how = unit.densityKgPerL === null ? "" : atDensity(Math.min(...densities), Math.max(...densities));
    const what = here.measured.of === "plain" ? "values" : `values of ${here.measured.parameter.name}`;
    const old = textOf(unitOf(here.quantity));
    const next = textOf(unit);
    const title = `Write the ${alike.length} selected ${what}${old === "" ? "" : ` in ${old}`} ${next === "" ? "without a unit" : `in ${next}`}${how}`;
    return [action(title, () => edits.flatMap((each) => each ?? []))];
  });
}
