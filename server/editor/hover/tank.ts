/** Tanks, and what takes up room in them: their volume and their share. */
import { factAt, type History } from "../../culture/history.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { entryHere, notNow, percent, type Told, volumeFigure } from "./parts.ts";
import type { Spot, Tells } from "./spot.ts";
import { volumeText } from "./system.ts";

const inForce = (histories: Iterable<History<number>>, at: number): number =>
  [...histories].reduce((sum, history) => sum + (factAt(history, at)?.value ?? 0), 0);

const named = (
  spot: Spot,
  assessment: Assessment,
  of: "tanks" | "displacements",
  name: string,
): Told | null => {
  const { at } = spot;
  const { facts } = assessment.constants;
  const history = facts[of].get(name) ?? [];
  const entry = entryHere(history, spot.place, at);
  if (!entry) return null;
  const late = notNow(entry, history, at);
  const tanks = inForce(facts.tanks.values(), at);
  const share = late.length === 0 && tanks > 0 ? entry.value / tanks : null;
  const what = of === "tanks" ? volumeFigure(entry.value) : `takes up ${volumeFigure(entry.value)}`;
  const times = of === "tanks" ? timesText(spot, name, entry.value) : "";
  const part = share === null ? "" : `, ${percent(share)} of the tanks' ${volumeFigure(tanks)}`;
  return { answer: `${name}: ${what}${times}${part}.`, blocks: [late, [volumeText(assessment)]] };
};

/** `, 691 L each`, where the line says how many there are. */
function timesText({ statement }: Spot, name: string, litres: number): string {
  if (statement.kind !== "tank" || statement.name.text !== name || !statement.times) return "";
  const times = Number(statement.times.text);
  return times > 1 ? `, ${volumeFigure(litres / times)} each` : "";
}

export const tankTold: Tells = (spot) => {
  const { statement, assessment, under } = spot;
  if (!assessment) return null;
  const name = statement.kind === "tank" ? statement.name.text : under.thing?.name;
  return name === undefined ? null : named(spot, assessment, "tanks", name);
};

export const displacementTold: Tells = (spot) => {
  const { statement, assessment, under } = spot;
  if (!assessment) return null;
  const name = statement.kind === "displace" ? statement.name.text : under.thing?.name;
  return name === undefined ? null : named(spot, assessment, "displacements", name);
};

export const measuredTold: Tells = ({ assessment, place, at }) => {
  if (!assessment) return null;
  const history = assessment.constants.facts.measuredVolume;
  const entry = entryHere(history, place, at);
  if (!entry) return null;
  const { geometricL } = assessment.volume;
  const beside =
    geometricL === null || geometricL <= 0
      ? ""
      : `; the tanks' measures give ${volumeFigure(geometricL)}, ${apart(geometricL, entry.value)}`;
  return { answer: `${volumeFigure(entry.value)} measured${beside}.`, blocks: [notNow(entry, history, at)] };
};

function apart(geometricL: number, measuredL: number): string {
  const share = geometricL / measuredL - 1;
  if (Math.abs(share) < 0.0005) return "the same";
  return `${percent(Math.abs(share))} ${share > 0 ? "more" : "less"}`;
}
