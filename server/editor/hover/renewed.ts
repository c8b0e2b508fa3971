/** `renewed`: the water after it. */
import { changeFigure, valueFigure } from "../../checks/figures.ts";
import type { Assumption } from "../../culture/model.ts";
import { tracked } from "../../dosing/tracked.ts";
import { volumeAt } from "../../dosing/volume.ts";
import { isStale } from "../../dosing/water-state.ts";
import { papers, percent, unitIn, volumeFigure } from "./parts.ts";
import { aheadLines, around, eventHere, type Tells } from "./spot.ts";

export const renewedTold: Tells = (spot) => {
  const event = eventHere(spot, "renewed");
  const { assessment, model } = spot;
  const water = event && around(spot, event);
  if (!assessment || !event || !water) return null;
  const { constants } = assessment;
  const { litres } = volumeAt(constants.facts, event.minute);
  if (litres === null)
    return { answer: "What it did isn't known: the volume of the water isn't.", blocks: [] };
  const incoming = constants.waterAt(event.water, event.minute);
  const changed = tracked.flatMap((name) => {
    const before = water.before.carried[name];
    const after = water.after.carried[name];
    if (!before || !after || isStale(before, event.minute)) return [];
    const unit = unitIn(assessment, name);
    const change = after.value - before.value;
    const by = `${change >= 0 ? "up" : "down"} ${changeFigure(name, Math.abs(change), unit)}`;
    return [
      {
        name,
        text: `${name} ${valueFigure(name, after.value, unit)}, ${by}; in the new water ${valueFigure(name, incoming.values[name], unit)}`,
      },
    ];
  });
  const names = changed.map(({ name }) => name as string);
  const used = incoming.assumptions.filter(({ parameter }) => names.includes(parameter));
  const name = model.waters.get(event.water)?.name ?? model.systems.get(event.water)?.name ?? "the new water";
  return {
    answer:
      event.litres > litres
        ? `All of the water renewed: ${volumeFigure(event.litres)}, more than the ${volumeFigure(litres)} that there are, with ${name}.`
        : `${percent(event.litres / litres)} of the water renewed: ${volumeFigure(event.litres)} of ${volumeFigure(litres)}, with ${name}.`,
    blocks: [
      changed.length > 0
        ? changed.map(({ text }) => text)
        : ["What was in it isn't known: nothing was read in the 7 days before."],
      aheadLines(spot, event.minute),
    ],
    assumptions: used.map(({ what, value, basis }): Assumption => ({ what, value, basis })),
    sources: used.some(({ basis }) => basis.startsWith("Millero")) ? [papers.composition] : [],
  };
};
