/** The sheet's first part, what to dose today, and what the doses do. */
import { minutesPerDay, writeMoment } from "../../grammar/dates.ts";
import type { ParameterName } from "../../grammar/parameters.ts";
import { changeFigure, doseFigure, figure, plannedFigure, rounded, valueFigure } from "../checks/figures.ts";
import { aboutWhen, atStart, nameOf, oneOf } from "../checks/words.ts";
import { shownIn } from "../culture/display.ts";
import type { FarmModel, Strength } from "../culture/model.ts";
import type { Assessment } from "../dosing/assess.ts";
import { balanceOf } from "../dosing/balance.ts";
import { givenToday } from "../dosing/given-today.ts";
import type { Plan } from "../dosing/make-plan.ts";
import type { PlannedSource } from "../dosing/plan/problem.ts";
import { isLimited, nameToSet } from "../dosing/plan-rates.ts";
import { topOffFlow } from "../dosing/rates.ts";
import { broughtPerLitre, type Dosed } from "../dosing/tracked.ts";
import { type Section, section } from "./sheet-model.ts";

const unitIn = ({ constants, at }: Assessment, name: ParameterName) => shownIn(constants.facts, name, at);

export function dosesSection(model: FarmModel, assessment: Assessment): Section {
  const title = "Dose today";
  const { plan, volume } = assessment;
  if (!plan) {
    const why =
      volume.litres === null
        ? "its volume isn't known"
        : assessment.constants.facts.holds.size === 0
          ? "nothing is held"
          : "nothing that is held has a source";
    return section(title, { lines: [`Nothing can be planned: ${why}.`] });
  }
  const rows = dosesToday(model, assessment).map((dose) => [
    dose.name,
    dose.by ?? "by hand",
    dose.aDay,
    dose.given ? [dose.givenAs, dose.given].filter((text) => text !== "").join("; ") : dose.givenAs,
    dose.toHold,
    dose.toCorrect,
  ]);
  const columns = [
    { title: "solution", align: "left", whenNarrow: "cut" },
    { title: "by", align: "left", whenNarrow: "cut" },
    { title: "a day", align: "right" },
    { title: "given as", align: "left" },
    { title: "to hold", align: "right" },
    { title: "to correct", align: "left" },
  ] as const;
  return section(title, {
    table: { columns, rows },
    lines: [...topOffLine(model, assessment), ...planLines(assessment, plan)],
    marl: setLines(assessment, plan),
  });
}

export interface DoseToday {
  readonly name: string;
  /** The pump's name; null by hand. */
  readonly by: string | null;
  /** `75 mL`, or `unknown`. */
  readonly aDay: string;
  readonly givenAs: string;
  readonly toHold: string;
  readonly toCorrect: string;
  /** `87 mL given today at 07:30`, of a hand only; null where nothing was. */
  readonly given: string | null;
}

/** What the plan gives today, source by source, and what a hand has given of it already. */
export function dosesToday(model: FarmModel, assessment: Assessment): DoseToday[] {
  const { plan } = assessment;
  return (plan?.sources ?? []).map(({ source, strength }, index) => {
    const planned = plan!.answer.sources[index]!;
    const limited = isLimited(plan!, strength);
    const unknown = raisesTooHigh(plan!, strength) ? plannedFigure(0, false) : "unknown";
    const told = (litres: number | null) => (litres === null ? unknown : plannedFigure(litres, limited));
    const given = source.device === "hand" ? givenToday(assessment, source.solution) : null;
    return {
      name: model.solutions.get(source.solution)?.name ?? nameOf(source.solution),
      by: source.device === "hand" ? null : source.by,
      aDay: told(planned.totalLPerDay),
      givenAs: deliveryText(planned, limited),
      toHold: told(planned.maintenanceLPerDay),
      toCorrect: correctionText(plan!, planned, limited),
      given: given && `${doseFigure(given.litres)} given today at ${clockOf(given.minute)}`,
    };
  });
}

const clockOf = (minute: number): string => writeMoment(minute).slice(11);

/** What is above its greatest value: nothing that raises it is given. */
const tooHigh = ({ problem }: Plan): Dosed[] =>
  problem.parameters.flatMap(({ name, now, max }) =>
    now !== null && max !== null && now > max ? [name as Dosed] : [],
  );
const raisesTooHigh = (plan: Plan, strength: Strength): boolean =>
  tooHigh(plan).some((name) => (broughtPerLitre(strength, name) ?? 0) > 0);

/** What runs in by itself, and the plan works around. */
export function topOffLine(model: FarmModel, { constants, at }: Assessment): string[] {
  const flow = topOffFlow(constants, at);
  if (!flow) return [];
  const name = model.solutions.get(flow.solution)?.name ?? nameOf(flow.solution);
  return [
    `The top-off brings ${figure(flow.litresPerDay, "L")} of ${name} a day by itself; the plan gives the rest.`,
  ];
}

function deliveryText({ dosesPerDay, litresPerDose, everyDays }: PlannedSource, limited: boolean): string {
  if (dosesPerDay === 0) return "";
  const doses = dosesPerDay === 1 ? "1 dose" : `${dosesPerDay} doses`;
  const each = plannedFigure(litresPerDose, limited);
  return `${doses} of ${each}${everyDays > 1 ? ` every ${everyDays} days` : ""}`;
}

function correctionText(
  { answer }: Plan,
  { correctionLPerDay, serves }: PlannedSource,
  limited: boolean,
): string {
  const days = answer.corrections.find(({ parameter }) => parameter === serves)?.days;
  return correctionLPerDay > 0 && days !== undefined
    ? `${plannedFigure(correctionLPerDay, limited)} for ${figure(days, "days")}`
    : "";
}

/** How a parameter comes up to its aim, or down to it. */
export function correctionLines(assessment: Assessment, { answer }: Plan, of: ParameterName): string[] {
  const { at } = assessment;
  const unit = unitIn(assessment, of);
  const corrections = answer.corrections
    .filter(({ parameter }) => parameter === of)
    .map(({ distance, days, limitedBy }) => {
      const until = aboutWhen(at + days * minutesPerDay);
      const slowed = limitedBy ? `, no faster because of ${reason(limitedBy)}` : "";
      return `${atStart(of)} comes up by ${changeFigure(of, distance, unit)} until ${until}${slowed}.`;
    });
  const cuts = answer.cuts
    .filter(({ parameter }) => parameter === of)
    .map(
      ({ perDay, days }) =>
        `${atStart(of)} is above its aim: maintenance runs ${changeFigure(of, perDay, unit)} a day lower until ${aboutWhen(at + days * minutesPerDay)}.`,
    );
  return [...corrections, ...cuts];
}

function planLines(assessment: Assessment, plan: Plan): string[] {
  const { state } = assessment;
  const { answer, problem, sources } = plan;
  const changing = [...answer.corrections, ...answer.cuts].map(({ parameter }) => parameter);
  const changes = [...new Set(changing)].flatMap((name) => correctionLines(assessment, plan, name));
  const unknown = problem.parameters.filter(({ needPerDay }) => needPerDay === null).map(({ name }) => name);
  const unknownLines =
    unknown.length > 0
      ? [
          `What the corals take of ${oneOf(unknown).replace(" or ", " and ")} isn't known, so no maintenance is planned for it.`,
        ]
      : [];
  const stopped = sources.flatMap(({ key, source }) =>
    state.stopped.has(key)
      ? [`${source.by} stands stopped in the log: start it, or what is planned for it stays out.`]
      : [],
  );
  const none = tooHigh(plan).map(
    (name) => `Nothing that raises ${name} is given while it is above its limit.`,
  );
  return [...stopped, ...none, ...changes, ...unknownLines];
}

/** Longer, a line wouldn't fit the sheet. */
const longestLine = 90;

/** What keeps a correction from going faster, in words. */
const reason = (by: string): string =>
  /^(alkalinity|calcium|magnesium|potassium|strontium|pH) (rise|fall|max|min|dose)$/.test(by)
    ? `the limit on ${by}`
    : by;

/** The `set` lines that put the plan into the log: now, and when a correction or cut ends. */
function setLines({ at, state }: Assessment, plan: Plan): string[] {
  const { answer, sources } = plan;
  const names = sources.map((entry, index) =>
    answer.sources[index]?.totalLPerDay === null ? null : nameToSet(plan, state, entry),
  );
  const rates = (litres: readonly number[]) =>
    sources.map(
      ({ strength }, index) => `${plannedFigure(litres[index] ?? 0, isLimited(plan, strength))}/day`,
    );
  let before: readonly string[] = [];
  return answer.phases.flatMap(({ litresPerDay }, phase) => {
    const days = phase === 0 ? 0 : (answer.phases[phase - 1]?.untilDays ?? 0);
    const now = rates(litresPerDay);
    const items = names.flatMap((name, index) =>
      name !== null && now[index] !== before[index] ? [`${name} ${now[index]}`] : [],
    );
    before = now;
    return setLine(Math.round(at + days * minutesPerDay), items);
  });
}

/** One line, or one a pump where it would be too long. */
function setLine(minute: number, items: readonly string[]): string[] {
  const line = (some: readonly string[]) => `${writeMoment(minute).replace("T", " ")} set ${some.join(", ")}`;
  if (items.length === 0) return [];
  return line(items).length <= longestLine ? [line(items)] : items.map((item) => line([item]));
}

/** What the doses do to the water, and what they leave behind. */
export function effectsSection(model: FarmModel, assessment: Assessment): Section | null {
  const { plan, salt, uptake, afterPlan } = assessment;
  if (!plan) return null;
  const lines: string[] = [];
  const { peak, answer } = plan;
  if (peak) {
    lines.push(
      `Right after the largest dose: pH ${figure(peak.pHTotal, "pH")} on the total scale (${figure(peak.pHNbs, "pH")} NBS), Ω of aragonite ${figure(peak.omegaAragonite, "Ω")} in the mixed water; far higher where it runs in, so dose slowly into strong flow.`,
    );
  }
  if (afterPlan && answer.correctionDays > 0) {
    const held = plan.problem.parameters.flatMap(({ name }) => {
      const value = name in afterPlan ? afterPlan[name as keyof typeof afterPlan] : undefined;
      return value === undefined ? [] : [`${name} ${valueFigure(name, value, unitIn(assessment, name))}`];
    });
    if (held.length > 0)
      lines.push(`In ${figure(answer.correctionDays, "days")}, when corrections end: ${held.join(", ")}.`);
  }
  if (salt) {
    const change = rounded(Math.abs(salt.salinityGainPerMonth), 2);
    const gain =
      salt.salinityGainPerMonth < 0
        ? `With this dosing and exchange, salinity falls by ${change} a month.`
        : `Dosing leaves salt behind: salinity rises by ${change} a month.`;
    const swap =
      salt.freshWaterSwapLPerWeek > 0.05
        ? ` Taking out ${figure(salt.freshWaterSwapLPerWeek, "L")} a week and filling with fresh water holds it.`
        : "";
    lines.push(gain + swap);
  }
  if (uptake && uptake.calcificationGPerDay !== null) {
    const { given, taken, pairs } = balanceOf(plan, { ...assessment, uptake });
    if (given) {
      lines.push(
        `For each meq of alkalinity ${rounded(given.calciumMgPerMeq, 1)} mg of calcium and ${rounded(given.magnesiumMgPerMeq, 2)} mg of magnesium are given; the skeleton takes ${rounded(taken.calciumMgPerMeq, 1)} and ${rounded(taken.magnesiumMgPerMeq, 2)}.`,
      );
    }
    const name = (ref: string) => model.solutions.get(ref)?.name ?? nameOf(ref);
    for (const { alkaline, calcic, millilitres } of pairs) {
      lines.push(`1 mL of ${name(alkaline)} goes with ${rounded(millilitres, 2)} mL of ${name(calcic)}.`);
    }
  }
  return lines.length > 0 ? section("What the doses do", { lines }) : null;
}
