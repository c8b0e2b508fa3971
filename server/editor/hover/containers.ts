/** What the log says of pumps' own containers and of their flow: `filled`, `level`, `calibrated`. */
import { minutesPerDay } from "../../../grammar/dates.ts";
import { doseFigure } from "../../checks/figures.ts";
import { changesOf, factAt } from "../../culture/history.ts";
import type { Source } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { afterMinute } from "../../dosing/at-event.ts";
import { litresSet } from "../../dosing/rates.ts";
import { amount, lasting, percent, shortMoment, volumeFigure } from "./parts.ts";
import { aheadLines, eventHere, logHere, type Tells } from "./spot.ts";

export const containerTold: Tells = (spot) => {
  const event = eventHere(spot, "filled", "level");
  if (!spot.assessment || !event) return null;
  const source = factAt(spot.assessment.constants.facts.sources.get(event.pump), event.minute)?.value;
  // What is set in the same minute counts after it is filled.
  const after = afterMinute(logHere(spot, spot.assessment), event.minute);
  const perDay = source ? litresSet(after, event.pump, source) : 0;
  const lasts = lasting(event.litres, perDay);
  const holds = source?.holdingL ? `, ${percent(event.litres / source.holdingL)} of what it holds` : "";
  return {
    answer: `${event.pump}: ${volumeFigure(event.litres)}${holds}${lasts ? `; lasts ${lasts} at ${doseFigure(perDay)} a day as set` : ""}.`,
    blocks: [lasts ? [] : ["Nothing is set for it at that time."], aheadLines(spot, event.minute)],
  };
};

export const calibratedTold: Tells = (spot) => {
  const event = eventHere(spot, "calibrated");
  if (!spot.assessment || !event) return null;
  const stated = factAt(spot.assessment.constants.facts.sources.get(event.pump), event.minute)?.value
    .flowLPerDay;
  const perMinute = (litresPerDay: number) => amount((1000 * litresPerDay) / 1440, "mL/min");
  const off = stated ? event.flowLPerDay / stated - 1 : null;
  const beside =
    stated && off !== null
      ? `; stated are ${perMinute(stated)}${Math.abs(off) < 0.0005 ? "" : `, so it gives ${percent(Math.abs(off))} ${off > 0 ? "more" : "less"}`}`
      : "";
  return {
    answer: `${event.pump}: ${perMinute(event.flowLPerDay)}${beside}.`,
    blocks: [aheadLines(spot, event.minute)],
  };
};

/** What is left in a pump's container, by what was set since its level was last known; litres. */
function leftIn({ system, constants, state, at }: Assessment, key: string) {
  const isLevel = (event: (typeof system.events)[number]) =>
    (event.kind === "filled" || event.kind === "level") && event.pump === key;
  const past = system.events.filter(({ minute }) => minute <= at);
  const last = past.findLast(isLevel);
  if (last?.kind !== "filled" && last?.kind !== "level") return null;
  const history = constants.facts.sources.get(key) ?? [];
  const edges = changesOf([history]).filter((minute) => minute > last.minute && minute < at);
  let asked: number | undefined;
  let isStopped = false;
  let given = 0;
  let from = last.minute;
  const runTo = (to: number) => {
    for (const end of [...edges.filter((edge) => edge > from && edge < to), to]) {
      const source = factAt(history, from)?.value;
      const set = new Map(asked === undefined ? [] : [[key, asked]]);
      const then = { ...state, set, stopped: new Set(isStopped ? [key] : []) };
      if (end > from && source) given += (litresSet(then, key, source) * (end - from)) / minutesPerDay;
      from = Math.max(from, end);
    }
  };
  for (const event of past) {
    if (event.minute > last.minute) runTo(event.minute);
    if (event.kind === "set") asked = event.rates.find(({ source }) => source === key)?.litresPerDay ?? asked;
    if (event.kind === "stopped" && event.pump === key) isStopped = true;
    if (event.kind === "started" && event.pump === key) isStopped = false;
  }
  runTo(at);
  return { last, litres: Math.max(0, last.litres - given) };
}

/** `Its container was filled to 3.0 L on 25 Nov 09:00; about 1.2 L are left by what was set since, 4 days as set.` */
export function containerLines(assessment: Assessment, key: string, source: Source): string[] {
  const perDay = litresSet(assessment.state, key, source);
  const left = leftIn(assessment, key);
  if (left) {
    const { last, litres } = left;
    const was = `Its container ${last.kind === "filled" ? "was filled to" : "stood at"} ${volumeFigure(last.litres)} on ${shortMoment(last.minute)}`;
    if (litres === 0 && last.litres > 0) return [`${was}; by what was set since it is empty.`];
    const lasts = lasting(litres, perDay);
    return [
      `${was}; about ${volumeFigure(litres)} are left by what was set since${lasts ? `, ${lasts} as set` : ""}.`,
    ];
  }
  if (source.holdingL === null) return [];
  const lasts = lasting(source.holdingL, perDay);
  const full = lasts ? `, ${lasts} as set when full` : "";
  return [`Its container holds ${volumeFigure(source.holdingL)}${full}; how full it is isn't in the log.`];
}

/** `10 mL/min stated, 11 mL/min calibrated on 1 Dec 07:30`. */
export function flowText({ system, at }: Assessment, key: string, statedLPerDay: number): string {
  const last = system.events.findLast(
    (event) => event.kind === "calibrated" && event.pump === key && event.minute <= at,
  );
  const perMinute = (litresPerDay: number) => amount((1000 * litresPerDay) / minutesPerDay, "mL/min");
  return last?.kind === "calibrated"
    ? `${perMinute(statedLPerDay)} as stated (${perMinute(last.flowLPerDay)} calibrated on ${shortMoment(last.minute)})`
    : perMinute(statedLPerDay);
}
