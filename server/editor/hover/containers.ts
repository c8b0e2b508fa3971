/** What the log says of pumps' own containers and of their flow: `filled`, `level`, `calibrated`. */
import { doseFigure } from "../../checks/figures.ts";
import { factAt } from "../../culture/history.ts";
import { litresSet } from "../../dosing/rates.ts";
import { amount, lasting, percent, volumeFigure } from "./parts.ts";
import { aheadLines, around, eventHere, type Tells } from "./spot.ts";

export const containerTold: Tells = (spot) => {
  const event = eventHere(spot, "filled", "level");
  const water = event && around(spot, event);
  if (!spot.assessment || !event || !water) return null;
  const source = factAt(spot.assessment.constants.facts.sources.get(event.pump), event.minute)?.value;
  const perDay = source ? litresSet(water.after, event.pump, source) : 0;
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
