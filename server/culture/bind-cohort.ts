/** Cohorts: how many corals, and what they take. */
import type { QuantityText, StockCount } from "../../grammar/syntax.ts";
import { readCohortUptake } from "../quantity/concentration.ts";
import {
  amountOf,
  type Line,
  plain,
  positive,
  type ReferenceWater,
  refuseNumber,
  reportSpan,
  shareQuantity,
} from "./binder.ts";
import { alkalinity } from "./convert.ts";
import { enter, into } from "./enter.ts";
import type { FactOf, FactsDraft } from "./facts-draft.ts";
import type { Cohort } from "./model.ts";

export function bindCohort(
  draft: FactsDraft,
  line: Line,
  fact: FactOf<"cohort">,
  water: ReferenceWater,
): void {
  const count = stockCount(line, fact.count);
  const read = amountOf(line, fact.uptake, alkalinity, readCohortUptake(fact.uptake, alkalinity), water);
  const magnesiumFraction = fact.magnesium ? shareQuantity(line, fact.magnesium) : null;
  const growth = fact.grows ? growthPerDay(line, fact.grows) : 0;
  if (count === null || !read || read.amount.sort !== "dissolved" || growth === null) return;
  if (fact.magnesium && magnesiumFraction === null) return;
  if (read.value < 0) return void refuseNumber(line, fact.uptake.number);
  const uptakeOf = read.amount.per === "area" ? "square metre" : fact.each ? "piece" : "all";
  if (!countFits(line, fact, uptakeOf)) return;
  // An area's uptake is per dm² in base units.
  const scale = uptakeOf === "square metre" ? squareDecimetresPerMetre : 1;
  const cohort: Cohort = {
    name: fact.name.text,
    count: fact.count.by === "pieces" ? { by: "pieces", number: count } : { by: "area", squareMetres: count },
    uptakeMeqPerDay: read.value * scale,
    uptakeOf,
    uptakeDeviation: read.deviation === null ? null : read.deviation * scale,
    magnesiumFraction,
    growthPerDay: growth,
  };
  enter(line, into(draft.cohorts, cohort.name), fact, cohort, `cohort ${cohort.name}`);
}

/** A share a day; null after reporting what no living thing does: to lose all, or more than to double, in a week. */
function growthPerDay(line: Line, grows: QuantityText): number | null {
  const perDay = plain(line, grows, "growth");
  if (perDay === null || Math.abs(perDay * daysPerWeek) < 1) return perDay;
  return refuseNumber(line, grows.number);
}

const daysPerWeek = 7;

/** An uptake of a piece needs pieces, one over an area an area. */
function countFits(line: Line, fact: FactOf<"cohort">, uptakeOf: Cohort["uptakeOf"]): boolean {
  const wanted = uptakeOf === "square metre" ? "area" : uptakeOf === "piece" ? "pieces" : fact.count.by;
  if (fact.count.by === wanted) return true;
  const examples = wanted === "pieces" ? ["mmol/m2/day as CaCO3", "meq/m2/day"] : ["meq/day each", "meq/day"];
  const unit = fact.uptake.unit?.text ?? "";
  const expected = wanted === "pieces" ? "an uptake over an area" : "an uptake of a piece or of all";
  reportSpan(line, {
    code: "unit/dimension",
    span: fact.uptake.unit ?? fact.uptake,
    unit,
    expected,
    examples,
  });
  return false;
}

const squareDecimetresPerMetre = 100;

/** Pieces, or square metres. */
export function stockCount(line: Line, count: StockCount): number | null {
  if (count.by === "pieces") {
    const number = Number(count.number.text);
    if (Number.isSafeInteger(number) && number >= 0) return number;
    return refuseNumber(line, count.number);
  }
  const area = positive(line, count.area, "area");
  return area === null ? null : area / squareDecimetresPerMetre;
}
