/** A pump, or a hand: what it gives, what it is set to, what the plan asks of it today, what it can give. */
import { writeClock, writeMoment } from "../../../grammar/dates.ts";
import { doseFigure, plannedFigure } from "../../checks/figures.ts";
import { defaults } from "../../culture/defaults.ts";
import { factAt } from "../../culture/history.ts";
import { type Assumption, type Source, sourceKey } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { givenToday } from "../../dosing/given-today.ts";
import type { PlannedSource } from "../../dosing/plan/problem.ts";
import { isLimited } from "../../dosing/plan-rates.ts";
import { capacityLPerDay, litresSet } from "../../dosing/rates.ts";
import { containerLines, flowText } from "./containers.ts";
import { entryHere, notNow, shortMoment, solutionName, type Told, volumeFigure } from "./parts.ts";
import type { Spot, Tells } from "./spot.ts";

/** By the pump's name, or the line of a hand. */
export const pumpTold: Tells = (spot) => {
  const { assessment, statement, under } = spot;
  if (!assessment) return null;
  const { sources } = assessment.constants.facts;
  const name =
    statement.kind === "pump" ? statement.name.text : under.thing?.kind === "pump" ? under.thing.name : null;
  if (name !== null) return sources.has(name) ? sourceTold(spot, assessment, name) : null;
  if (statement.kind !== "by-hand") return null;
  const seen = spot.farm.bound.names.visible.get(spot.place.file)?.get(statement.solution.text);
  if (seen?.kind !== "solution") return null;
  const key = sourceKey({ device: "hand", by: "hand", solution: seen.ref });
  return sources.has(key) ? sourceTold(spot, assessment, key) : null;
};

function sourceTold({ model, place, at }: Spot, assessment: Assessment, key: string): Told | null {
  const { constants, state, plan } = assessment;
  const history = constants.facts.sources.get(key) ?? [];
  const entry = entryHere(history, place, at);
  if (!entry) return null;
  const source = entry.value;
  const gives = solutionName(model, source.solution);
  const called = source.device === "pump" ? source.by : "By hand";
  const late = notNow(entry, history, at);
  if (late.length > 0) return { answer: `${called}: gives ${gives}.`, blocks: [late] };
  const index = plan?.sources.findIndex((each) => each.key === key) ?? -1;
  const planned = index < 0 ? undefined : plan?.answer.sources[index];
  const strength = plan?.sources[index]?.strength;
  const limited = plan && strength ? isLimited(plan, strength) : false;
  const given = source.device === "hand" ? givenToday(assessment, source.solution) : null;
  const already = given
    ? [`${doseFigure(given.litres)} given today at ${writeMoment(given.minute).slice(11)}.`]
    : [];
  const stopped = state.stopped.has(key) ? ["It stands stopped: start it, or it gives nothing."] : [];
  const assumptions: Assumption[] = [];
  const use = ({ what, text, basis }: { what: string; text: string; basis: string }) =>
    void assumptions.push({ what, value: text, basis });
  if (planned && source.device === "pump" && source.leastL === null) use(defaults.pumpLeast);
  if (planned && !source.hours) use(source.device === "pump" ? defaults.pumpHours : defaults.handHours);
  return {
    answer: `${called}: ${todayText(planned, limited)} of ${gives}${planned ? " today" : ""}.`,
    blocks: [already, [setText(assessment, key, source), ...stopped], capacityLines(assessment, key, source)],
    assumptions,
  };
}

function todayText(planned: PlannedSource | undefined, limited: boolean): string {
  if (!planned) return "nothing is planned";
  const { totalLPerDay, dosesPerDay, litresPerDose, everyDays } = planned;
  if (totalLPerDay === null) return "an unknown volume";
  if (dosesPerDay === 0) return "0 mL";
  const shown = (litres: number) => Number.parseFloat(plannedFigure(litres, limited));
  // A share that was rounded doesn't add up to the whole.
  const isExact = dosesPerDay === 1 || shown(totalLPerDay) === shown(litresPerDose) * dosesPerDay;
  const doses = `${dosesPerDay} ${dosesPerDay === 1 ? "dose" : "doses"} of ${isExact || everyDays > 1 ? "" : "about "}${plannedFigure(litresPerDose, limited)}`;
  return `${plannedFigure(totalLPerDay, limited)} in ${doses}${everyDays > 1 ? ` every ${everyDays} days` : ""}`;
}

/** `Set: 310 mL a day since 24 Nov 09:00.` */
function setText(assessment: Assessment, key: string, source: Source): string {
  const { system, state, at } = assessment;
  const asked = state.set.get(key);
  const always = source.alwaysLPerDay > 0 ? `; ${doseFigure(source.alwaysLPerDay)} a day always run` : "";
  if (asked === undefined) return `Nothing is set in the log${always}.`;
  const last = system.events.findLast(
    (event) => event.kind === "set" && event.minute <= at && event.rates.some((rate) => rate.source === key),
  );
  const since = last ? ` since ${shortMoment(last.minute)}` : "";
  const gives = litresSet(state, key, source);
  const less = Math.abs(gives - asked) > 1e-9 * asked ? `; it gives ${doseFigure(gives)}` : "";
  return `Set: ${doseFigure(asked)} a day${since}${less}${always}.`;
}

function capacityLines(assessment: Assessment, key: string, source: Source): string[] {
  const capacity = capacityLPerDay(source);
  const { hours, flowLPerDay, leastL } = source;
  if (source.device === "hand")
    return [source.times === 1 ? "Given once a day." : `Given ${source.times} times a day.`];
  const within = hours ? ` between ${writeClock(hours.from)} and ${writeClock(hours.to)}` : "";
  const flow = flowLPerDay === null ? [] : [flowText(assessment, key, flowLPerDay)];
  const most = capacity === null ? [] : [`at most ${volumeFigure(capacity)} a day${within}`];
  const least = leastL === null ? [] : [`at least ${doseFigure(leastL)} a dose`];
  const can = [...flow, ...most, ...least];
  return [
    ...(can.length > 0 ? [`Can give: ${can.join(", ")}.`] : []),
    ...containerLines(assessment, key, source),
  ];
}

/** What is asked of a source a day at a minute, by its key. */
export function setAt(assessment: Assessment, key: string): number | null {
  const entry = factAt(assessment.constants.facts.sources.get(key), assessment.at);
  return entry ? litresSet(assessment.state, key, entry.value) : null;
}
