/** What the log's doses and settings do to the water: `gave`, `topped`, `set`, and pumps stopped and started. */
import { changeFigure, doseFigure, figure, valueFigure } from "../../checks/figures.ts";
import { factAt } from "../../culture/history.ts";
import type { Assumption, Strength } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { assuming } from "../../dosing/assumptions.ts";
import { afterDelivery, waterOf } from "../../dosing/dose-chemistry.ts";
import { ratesAsSet } from "../../dosing/fold.ts";
import { flowsSet, topOffFlow } from "../../dosing/rates.ts";
import { broughtPerLitre, dosed } from "../../dosing/tracked.ts";
import { uptakeAt } from "../../dosing/uptake.ts";
import { volumeAt } from "../../dosing/volume.ts";
import { isStale, type WaterState } from "../../dosing/water-state.ts";
import { alkalineSince, clockOr } from "../../report/latest.ts";
import { type Line, led, papers, signedChange, solutionName, unitIn, volumeFigure } from "./parts.ts";
import { aheadLines, around, eventHere, type Spot, type Tells } from "./spot.ts";

interface Dose {
  readonly solution: string;
  readonly litres: number;
}

/** `gave`, and `topped` with a solution. */
export const gaveTold: Tells = (spot) => {
  const event = eventHere(spot, "gave", "topped");
  const { assessment } = spot;
  const water = event && around(spot, event);
  if (!assessment || !event || !water) return null;
  if (event.kind === "topped" && event.solution === null) {
    return {
      answer: `${volumeFigure(event.litres)} of fresh water: makes up for what evaporated; nothing else changes.`,
      blocks: [aheadLines(spot, event.minute)],
    };
  }
  const doses: readonly Dose[] =
    event.kind === "gave" ? event.doses : [{ solution: event.solution ?? "", litres: event.litres }];
  const { litres } = volumeAt(assessment.constants.facts, event.minute);
  if (litres === null)
    return { answer: "What it did isn't known: the volume of the water isn't.", blocks: [] };
  const chemistry = chemistryLines(assessment, water.before, doses, event.minute);
  const { pH } = water.before;
  const earlier = pH ? alkalineSince({ ...assessment, at: event.minute }, pH.minute, event) : null;
  const startsFrom =
    chemistry.lines.length > 0 && chemistry.assumptions.length > 0 && pH && earlier
      ? [
          `It starts from the pH read ${clockOr(pH.minute, event.minute)}, ${earlier}; what doses of the 24 h before brought is reckoned in.`,
        ]
      : [];
  return {
    answer: led(
      event.minute > spot.at ? "Will do:" : "Did:",
      changesText(assessment, water.before, doses, litres, event.minute),
    ),
    blocks: [
      unknownLines(spot, doses, event.minute),
      [...chemistry.lines, ...startsFrom],
      aheadLines(spot, event.minute),
    ],
    assumptions: chemistry.assumptions,
    sources: chemistry.lines.length > 0 ? [papers.carbonate, papers.nbs] : [],
  };
};

const strengthOf = ({ constants }: Assessment, { solution }: Dose, minute: number): Strength | null =>
  constants.strengthAt(solution, minute);

/** `alkalinity +0.23 dKH to 7.8 dKH`, of all doses together. */
function changesText(
  assessment: Assessment,
  before: WaterState,
  doses: readonly Dose[],
  litres: number,
  minute: number,
): string {
  const changes = dosed.flatMap((name) => {
    const change = doses.reduce((sum, dose) => {
      const strength = strengthOf(assessment, dose, minute);
      return sum + (strength ? (dose.litres * (broughtPerLitre(strength, name) ?? 0)) / litres : 0);
    }, 0);
    if (change === 0) return [];
    const unit = unitIn(assessment, name);
    const carried = before.carried[name];
    const to =
      carried && !isStale(carried, minute) ? ` to ${valueFigure(name, carried.value + change, unit)}` : "";
    return [`${name} ${signedChange(name, change, unit)}${to}`];
  });
  return changes.length > 0 ? `${changes.join(", ")}.` : "nothing that is known.";
}

function unknownLines({ assessment, model }: Spot, doses: readonly Dose[], minute: number): string[] {
  const unknown = doses.filter((dose) => assessment && !strengthOf(assessment, dose, minute));
  return unknown.map(
    ({ solution }) => `The strength of ${solutionName(model, solution)} isn't known, so it is left out.`,
  );
}

/** pH and Ω right after, one dose after the other, carbon closed. */
function chemistryLines(
  assessment: Assessment,
  before: WaterState,
  doses: readonly Dose[],
  minute: number,
): { readonly lines: readonly (Line | string)[]; readonly assumptions: readonly Assumption[] } {
  const none = { lines: [], assumptions: [] };
  const strengths = doses.map((dose) => strengthOf(assessment, dose, minute));
  if (!strengths.some((each) => each && ((each.alkalinityMeq ?? 0) > 0 || (each.calciumMg ?? 0) > 0)))
    return none;
  if (isStale(before.carried.alkalinity, minute)) {
    return {
      lines: ["pH and Ω after it can't be told: no alkalinity was read in the 7 days before."],
      assumptions: [],
    };
  }
  const assumed = assuming();
  const start = waterOf(before, assessment.constants, assumed);
  const first = strengths.find((each) => each !== null);
  const was = start && first ? afterDelivery(start, first, 0) : null;
  let is = was;
  for (const [index, { litres }] of doses.entries()) {
    const strength = strengths[index];
    is = is && strength ? afterDelivery(is, strength, litres) : is;
  }
  if (!was || !is) return none;
  const from = (of: "pHNbs" | "omegaAragonite", unit: "pH" | "Ω") =>
    `${figure(was.carbonate[of], unit)} → ${figure(is.carbonate[of], unit)}`;
  return {
    lines: [
      led(
        "Right after:",
        `pH ${from("pHNbs", "pH")} (NBS), Ω of aragonite ${from("omegaAragonite", "Ω")}, once mixed in.`,
      ),
    ],
    assumptions: [
      ...assumed.all(),
      { what: "carbon", value: "closed, nothing exchanged with the air yet", basis: "right after the dose" },
    ],
  };
}

/** `set`, `stopped`, `started`: what runs from then on, against what the corals take. */
export const setTold: Tells = (spot) => {
  const event = eventHere(spot, "set", "stopped", "started");
  const { assessment, model } = spot;
  const water = event && around(spot, event);
  if (!assessment || !event || !water) return null;
  const { constants } = assessment;
  const { litres } = volumeAt(constants.facts, event.minute);
  const brings =
    event.kind === "set"
      ? event.rates.map(({ source, litresPerDay }) => {
          const entry = factAt(constants.facts.sources.get(source), event.minute);
          if (!entry) return `${source.startsWith("hand ") ? "By hand" : source}: not in force then.`;
          const { solution, by, device } = entry.value;
          const strength = constants.strengthAt(solution, event.minute);
          const brought =
            litres === null || !strength
              ? "an unknown amount"
              : broughtText(assessment, strength, litresPerDay / litres);
          return `${device === "pump" ? by : "By hand"}: ${doseFigure(litresPerDay)} a day of ${solutionName(model, solution)} bring ${brought}.`;
        })
      : [];
  return {
    answer: led(event.minute > spot.at ? "Will do:" : "From then on:", netText(assessment, water.after)),
    blocks: [
      brings,
      event.kind === "set" ? [] : beforeLines(assessment, water.before),
      aheadLines(spot, event.minute),
    ],
    assumptions: assessment.assumptions.filter(({ what }) => what === "the day's course"),
  };
};

const broughtText = (assessment: Assessment, strength: Strength, litresInLitre: number): string => {
  const parts = dosed.flatMap((name) => {
    const brought = litresInLitre * (broughtPerLitre(strength, name) ?? 0);
    return brought > 0 ? [`${name} ${changeFigure(name, brought, unitIn(assessment, name))}`] : [];
  });
  return parts.length > 0 ? parts.join(", ") : "nothing that is dosed for";
};

const beforeLines = (assessment: Assessment, before: WaterState): string[] => [
  `Before it: ${netText(assessment, before)}`,
];

/** `alkalinity falls 0.62 dKH a day, 1.23 dKH taken`, of what is held. */
function netText(assessment: Assessment, state: WaterState): string {
  const { constants } = assessment;
  const { minute } = state;
  const rates = ratesAsSet(state, minute, constants);
  const { litres } = volumeAt(constants.facts, minute);
  if (!rates || litres === null) return "what it does isn't known: the volume of the water isn't.";
  const uptake = uptakeAt(constants.facts, state, minute, litres, constants.firstEvent);
  const flows = flowsRunning(state, minute, constants);
  const moves = dosed.flatMap((name) => {
    if (!factAt(constants.facts.holds.get(name), minute)) return [];
    const unit = unitIn(assessment, name);
    const gain = rates.gainPerDay[name];
    const taken = uptake.perDay[name];
    const value = state.carried[name]?.value;
    const exchanged = value === undefined ? 0 : rates.exchangePerDay * (rates.incoming[name] - value);
    if (gain === null || taken === null) {
      const brought = flows.reduce((sum, { solution, litresPerDay }) => {
        const strength = constants.strengthAt(solution, minute);
        return sum + (litresPerDay * ((strength && broughtPerLitre(strength, name)) ?? 0)) / litres;
      }, 0);
      const doses = brought > 0 ? `${changeFigure(name, brought, unit)} a day` : "nothing";
      return [`${name}: the doses bring ${doses}, uptake not known`];
    }
    const net = gain + exchanged;
    const way = net >= 0 ? "rises" : "falls";
    const takes = `, ${changeFigure(name, taken / litres, unit)} taken`;
    return [`${name} ${way} ${changeFigure(name, Math.abs(net), unit)} a day${takes}`];
  });
  return moves.length > 0 ? `${moves.join("; ")}.` : "nothing that is held changes.";
}

/** What runs as things are set, the top-off with it. */
function flowsRunning(state: WaterState, minute: number, constants: Assessment["constants"]) {
  const topOff = topOffFlow(constants, minute);
  return [...flowsSet(constants, state, minute), ...(topOff ? [topOff] : [])];
}
