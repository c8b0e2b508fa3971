/** A system: what to dose today, the water now, when it leaves its hold, what is worst. */
import type { ParameterName } from "../../../grammar/parameters.ts";
import { bandFigure, changeFigure, rounded, valueBeside, valueFigure } from "../../checks/figures.ts";
import { severityRank } from "../../checks/problem.ts";
import { atStart } from "../../checks/words.ts";
import { shownIn } from "../../culture/display.ts";
import { factAt } from "../../culture/history.ts";
import type { DisplayUnit, FarmModel } from "../../culture/model.ts";
import type { Place } from "../../culture/place.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { balanceOf } from "../../dosing/balance.ts";
import { type Drift, type DriftCase, driftDays, driftStepHours } from "../../dosing/projection.ts";
import type { Farm } from "../../farm.ts";
import { ago, clockOr, latestOf, standing } from "../../report/latest.ts";
import { dosesSection, dosesToday, topOffLine } from "../../report/sheet-doses.ts";
import { leavingText, rowsInOrder, uptakeSection } from "../../report/sheet-water.ts";
import { lineIn } from "../cursor.ts";
import { holdIn, instrumentAt, latestIn } from "./instrument.ts";
import {
  hourText,
  type Line,
  led,
  papers,
  solutionName,
  type Told,
  unitIn,
  unitOn,
  volumeFigure,
} from "./parts.ts";
import { staleText } from "./value.ts";

export function systemTold(farm: Farm, assessment: Assessment): Told {
  const { model } = farm.bound;
  const { uptake } = assessment;
  const water = rowsInOrder.flatMap((name) => waterLine(farm, assessment, name) ?? []);
  const worst = worstLine(farm, assessment);
  return {
    answer: led("Dose today:", dosesText(model, assessment)),
    blocks: [
      [...holdingLines(model, assessment), ...topOffLine(model, assessment)],
      [...water, ...(water.length === 0 ? ["Nothing is held, and nothing was read yet."] : [])],
      [...uptakeSection(assessment).lines, ...balanceLines(model, assessment)],
      worst ? [worst] : [],
      [volumeText(assessment)],
    ],
    assumptions: assessment.assumptions,
    sources: [
      ...(uptake && uptake.calcificationGPerDay !== null ? [papers.calcification] : []),
      ...(uptake && uptake.otherLossMeqPerDay > 0 ? [papers.nitrification] : []),
      ...(assessment.plan?.peak ? [papers.carbonate] : []),
    ],
  };
}

/** `ash-part 310 mL/day (head-1) · chloride-part 300 mL/day (head-2)`. */
export function dosesText(model: FarmModel, assessment: Assessment): string {
  const { lines } = dosesSection(model, assessment);
  const doses = dosesToday(model, assessment).map(
    ({ name, by, aDay, given }) =>
      `${name} ${aDay === "unknown" ? aDay : `${aDay}/day`} (${by ?? "by hand"}${given ? `; ${given}` : ""})`,
  );
  return doses.length > 0 ? doses.join(" · ") : (lines[0] ?? "nothing");
}

/** The part of today's doses that only keeps up, where another part corrects. */
function holdingLines(model: FarmModel, assessment: Assessment): Line[] {
  const rows = dosesSection(model, assessment).table?.rows ?? [];
  if (rows.every(([, , , , , correcting]) => !correcting)) return [];
  const holding = rows.map(
    ([name, , , , keeping]) => `${name} ${keeping === "unknown" ? keeping : `${keeping}/day`}`,
  );
  return [led("Of that to hold:", `${holding.join(" · ")}; the rest corrects.`)];
}

/** `alkalinity 7.9 dKH, in 7.6 to 8.4, read 2 days ago; as set leaves 3 Dec 14:00, as planned stays`. */
function waterLine(farm: Farm, assessment: Assessment, name: ParameterName): string | null {
  const { constants, at } = assessment;
  const entry = factAt(constants.facts.holds.get(name), at);
  const instrument = entry && instrumentAt(farm, entry.place, name);
  const hold = entry && holdIn(instrument, entry.value);
  const latest = latestIn(instrument, latestOf(assessment, name, hold?.scale));
  if (!hold && !latest) return null;
  if (!latest)
    return `${name} never read${hold ? `; hold ${bandFigure(name, hold.low, hold.high, hold.unit)}` : ""}`;
  const unit = instrument?.unit ?? unitOn(latest.scale, shownIn(constants.facts, name, at, latest.reading));
  if (latest.how === "stale") {
    const band = hold ? `; hold ${bandFigure(name, hold.low, hold.high, hold.unit)}` : "";
    return `${name} ${staleText(name, latest, unit, at).slice(0, -1)}${band}`;
  }
  const where = hold ? standing(latest, hold) : null;
  const bare = { ...unit, spelling: "" };
  const band = hold
    ? `, ${where ?? "can't be told whether in"} ${bandFigure(name, hold.low, hold.high, bare)}`
    : "";
  const value = valueBeside(name, latest.value, hold ? [hold.low, hold.high] : [], unit);
  const read = latest.before
    ? `, read ${clockOr(latest.readAt, at)}, ${latest.before}`
    : `, read ${ago(latest.readAt, at)}`;
  const kept =
    latest.missing === null
      ? ""
      : `, not carried forward: ${latest.missing === "volume" ? "the volume of the water" : "its uptake"} isn't known${latest.withoutUptake === null ? "" : ` (with what came in since, and nothing taken, ${valueFigure(name, latest.withoutUptake, unit)})`}`;
  const leaves = (["as-set", "as-planned"] as const).flatMap((each) =>
    leaving(assessment, name, each, Boolean(instrument)),
  );
  return `${name} ${latest.below ? "below " : ""}${value}${band}${read}${kept}${leaves.length > 0 ? `; ${leaves.join("; ")}` : ""}`;
}

/** `as set falls 0.45 dKH a day, leaves 3 Dec 14:00`: how fast it goes in the first day, and where that leads. */
export function leaving(
  assessment: Assessment,
  name: ParameterName,
  each: DriftCase,
  isOtherwiseWritten = false,
): string[] {
  if (latestOf(assessment, name)?.how !== "carried") return [];
  const drift = assessment.drifts.find(({ parameter, case: which }) => parameter === name && which === each);
  if (!drift || drift.points.length === 0) return [];
  const text = leavingText(assessment, name, each);
  const leads = text === "outside" ? backText(drift) : text === "stays" ? "stays in" : `leaves ${text}`;
  return [
    `${each.replace("-", " ")} ${paceText(drift, isOtherwiseWritten ? ofSalinity : unitIn(assessment, name))}${leads}`,
  ];
}

/** Beside values of an instrument a bare number would pass for one of them. */
const ofSalinity: DisplayUnit = { spelling: "of salinity", perModelUnit: 1 };

/** Hours of the first day, of which the change is told. */
const firstDay = 24 / driftStepHours;

function paceText({ parameter, points }: Drift, unit: DisplayUnit): string {
  const change = (points[firstDay]?.value ?? 0) - (points[0]?.value ?? 0);
  const text = changeFigure(parameter, Math.abs(change), unit);
  return /[1-9]/.test(text) ? `${change > 0 ? "rises" : "falls"} ${text} a day, ` : "";
}

/** When the mean of a day is back in its hold. */
function backText({ points, hold: { low, high } }: Drift): string {
  const index = points.findIndex(({ value }) => value >= low && value <= high);
  const [before, after] = [points[index - 1], points[index]];
  if (!before || !after) return `stays outside for ${driftDays} days`;
  const edge = before.value < low ? low : high;
  const share = (edge - before.value) / (after.value - before.value);
  return `back in its hold on ${hourText(before.minute + share * (after.minute - before.minute))}`;
}

/** Whether what is given is in the proportion that corals take. */
function balanceLines(model: FarmModel, assessment: Assessment): string[] {
  const { plan, uptake } = assessment;
  if (!plan || !uptake || uptake.calcificationGPerDay === null) return [];
  return balanceOf(plan, { ...assessment, uptake }).pairs.map(
    ({ alkaline, calcic, millilitres }) =>
      `In balance: 1 mL of ${solutionName(model, alkaline)} with ${rounded(millilitres, 2)} mL of ${solutionName(model, calcic)}.`,
  );
}

function worstLine(farm: Farm, { system }: Assessment): Line | null {
  const own = farm.problems.filter(
    (problem) => problem.system === system.name && problem.severity !== "hint",
  );
  const [worst, ...others] = [...own].sort(
    (left, right) => severityRank(left.severity) - severityRank(right.severity),
  );
  if (!worst) return null;
  // The first sentence says what is wrong; the rest stands at its place.
  const [what = worst.message] = worst.message.split(/(?<=[.:?]) (?=[A-Z])/);
  const more = others.length > 0 ? ` (and ${others.length} more)` : "";
  return led(`${atSeverity(worst.severity)}:`, `${lineOf(farm, worst.place)}${what}${more}`);
}

/** The line of a log that a problem is of, before what is said of it. */
function lineOf(farm: Farm, { file, line }: Place): string {
  const found = lineIn(farm, file, line)?.line;
  if (!found?.statement || !("at" in found.statement)) return "";
  const { text, comment } = found;
  const words = (comment ? text.slice(0, comment.start) : text).trim();
  return `at "${words.length > longestQuote ? `${words.slice(0, longestQuote)}…` : words}": `;
}

const longestQuote = 90;

const atSeverity = (severity: string): string => atStart(severity as ParameterName);

export function volumeText({ volume }: Assessment): string {
  const { litres, measuredL, geometricL } = volume;
  if (litres === null) return "The volume of its water isn't known.";
  const net = volumeFigure(litres);
  if (measuredL === null) return `${net} of water, by the tanks' measures.`;
  return geometricL === null
    ? `${net} of water, measured.`
    : `${net} of water, measured; ${volumeFigure(geometricL)} by the tanks' measures.`;
}
