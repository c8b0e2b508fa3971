/** A value of the water as hovers tell it: how sure it is, and where it stands. */
import type { ParameterName } from "../../../grammar/parameters.ts";
import { bandFigure, valueFigure } from "../../checks/figures.ts";
import type { DisplayUnit, Hold } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { ago, clockOr, type Latest, standing } from "../../report/latest.ts";
import { shortMoment, unitIn } from "./parts.ts";

/** `now`, or why it isn't told as that. */
export const whenText = ({ before, how, missing, below, readAt }: Latest, at: number): string =>
  before !== null
    ? `read ${clockOr(readAt, at)}, ${before}`
    : below || (how === "as read" && missing !== null)
      ? `as read ${ago(readAt, at)}`
      : "now";

/** `stale: last read 61 days ago, 8.0 dKH; test again.` */
export const staleText = (
  parameter: ParameterName,
  { readAt, value, below }: Latest,
  unit: DisplayUnit,
  at: number,
): string =>
  `stale: last read ${ago(readAt, at)}, ${below ? "below " : ""}${valueFigure(parameter, value, unit)}; test again.`;

/** True for a pH that was read on the other scale. */
export const isTurned = ({ scale, reading }: Latest): boolean => scale !== reading.scale;

export function standingText(
  value: { readonly value: number; readonly below?: boolean },
  { parameter, low, high, unit }: Hold,
): string {
  const band = `its hold of ${bandFigure(parameter, low, high, unit)}`;
  const where = standing(value, { low, high });
  return where === null ? `whether that is in ${band} can't be told` : `${where} ${band}`;
}

/** Why a value stands as it was read. */
export function notCarriedLines(
  assessment: Assessment,
  parameter: ParameterName,
  { missing, withoutUptake, how }: Latest,
): string[] {
  const unit = unitIn(assessment, parameter);
  if (missing === "volume")
    return ["It isn't carried forward from there: the volume of the water isn't known."];
  if (missing === "uptake") {
    const since =
      withoutUptake === null
        ? []
        : [
            `With what came in since, and nothing taken, it would be ${valueFigure(parameter, withoutUptake, unit)}.`,
          ];
    return [
      `It isn't carried forward from there: what the corals take of ${parameter} isn't known.`,
      ...since,
    ];
  }
  const isMinor = parameter === "potassium" || parameter === "strontium";
  return how === "carried" && isMinor && (assessment.uptake?.perDay[parameter] ?? null) === null
    ? [`What the corals take of ${parameter} isn't known; it is counted as none.`]
    : [];
}

/** The plan goes by the last number that was read: said where a newer test gainsays it. */
export const reckonedLines = (parameter: ParameterName, { reckoned }: Latest, unit: DisplayUnit): string[] =>
  reckoned
    ? [
        `Reckoned from the number read before (${shortMoment(reckoned.readAt)}) it would be ${valueFigure(parameter, reckoned.value, unit)}, and the plan goes by that: test again.`,
      ]
    : [];
