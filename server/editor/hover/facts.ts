/** Short lines of a system's section: uptake, skeleton, air, light, evaporation, food, top-off, flow-through. */
import { minutesPerDay } from "../../../grammar/dates.ts";
import { changeFigure, figure, rounded } from "../../checks/figures.ts";
import { causticGear } from "../../checks/hazard.ts";
import { calcificationPerMeq } from "../../chemistry/calcification.ts";
import { pco2OfAir } from "../../chemistry/carbon-before.ts";
import { fromAlkalinityAndPco2 } from "../../chemistry/carbonate-system.ts";
import { constantsAt } from "../../chemistry/constants-at.ts";
import { atomicWeight } from "../../chemistry/elements.ts";
import { densityKgPerL } from "../../chemistry/sea-water.ts";
import { outdoorAirPpm } from "../../culture/defaults.ts";
import type { History } from "../../culture/history.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { salinityNow, temperatureNow, waterOf } from "../../dosing/dose-chemistry.ts";
import { ratesAt } from "../../dosing/fold.ts";
import { nitrificationMeqPerDay } from "../../dosing/uptake.ts";
import { isCausticByStrength } from "../../report/sheet-solutions.ts";
import { uptakeSection } from "../../report/sheet-water.ts";
import {
  amount,
  digits,
  entryHere,
  lasting,
  notNow,
  papers,
  percent,
  solutionName,
  type Told,
  unitIn,
  volumeFigure,
} from "./parts.ts";
import { strengthText } from "./solution.ts";
import type { Spot, Tells } from "./spot.ts";

type Kind = "uptake" | "skeleton" | "air" | "light" | "evaporates" | "feeds" | "top-off" | "flows-through";

/** Tells of the entry that the line made, with a word where it doesn't count now. */
const fact =
  <T>(
    historyOf: (assessment: Assessment) => History<T>,
    tell: (value: T, assessment: Assessment, spot: Spot) => Told | null,
  ): Tells =>
  (spot) => {
    const { assessment, place, at } = spot;
    const history = assessment && historyOf(assessment);
    const entry = history && entryHere(history, place, at);
    if (!assessment || !entry) return null;
    const told = tell(entry.value, assessment, spot);
    return told && { ...told, blocks: [notNow(entry, history, at), ...told.blocks] };
  };

const uptakeTold: Tells = ({ assessment }) => {
  if (!assessment) return null;
  const [first = "", ...others] = uptakeSection(assessment).lines;
  return { answer: first, blocks: [others], sources: [papers.calcification] };
};

const skeletonTold = fact(
  ({ constants }) => constants.facts.skeletonMagnesium,
  (fraction) => {
    const { calciumMg, magnesiumMg } = calcificationPerMeq(fraction);
    return {
      answer: `For each meq of alkalinity the skeleton takes ${rounded(calciumMg, 1)} mg of calcium and ${rounded(magnesiumMg, 2)} mg of magnesium.`,
      blocks: [],
      sources: [papers.calcification],
    };
  },
);

/** In balance with the room's air the water would have this pH. */
const airTold = fact(
  ({ constants }) => constants.facts.air,
  (air, { state, constants: system }) => {
    const salinity = salinityNow(state, system, null);
    const temperatureDegC = temperatureNow(state, system, null);
    const constants = constantsAt(salinity, temperatureDegC);
    if (!constants.ok) return null;
    const pCO2Uatm = air.unit === "ppm" ? pco2OfAir(air.value, constants) : air.value;
    const water = waterOf(state, system, null);
    const litre = densityKgPerL(salinity, temperatureDegC);
    const balanced =
      water &&
      fromAlkalinityAndPco2(
        { alkalinityUmolPerKg: (1000 * water.alkalinityMeqPerL) / litre, pCO2Uatm },
        {
          salinity,
          temperatureDegC,
          calciumUmolPerKg: (1000 * water.calciumMgPerL) / atomicWeight.Ca / litre,
        },
        constants,
      );
    const pH = balanced?.ok
      ? `; in balance with it the water has pH ${figure(balanced.pHNbs, "pH")} (NBS)`
      : "";
    return {
      answer: `pCO2 ${figure(pCO2Uatm, "µatm")} over water of ${figure(temperatureDegC, "°C")}${pH}.`,
      blocks: [[`Outdoor air has about ${figure(outdoorAirPpm, "ppm")} (from memory).`]],
      sources: [papers.air, ...(pH ? [papers.carbonate, papers.nbs] : [])],
    };
  },
);

const lightTold = fact(
  ({ constants }) => constants.facts.light,
  ({ from, to }) => {
    const minutes = (((to - from) % minutesPerDay) + minutesPerDay) % minutesPerDay;
    return {
      answer: `${digits(minutes / 60, 3)} h of light, ${digits((minutesPerDay - minutes) / 60, 3)} h of dark.`,
      blocks: [],
    };
  },
);

const evaporatesTold = fact(
  ({ constants }) => constants.facts.evaporatesLPerDay,
  (litresPerDay, { volume, state, constants }) => {
    if (volume.litres === null)
      return { answer: "The volume of the water isn't known, so its share can't be told.", blocks: [] };
    const salinity = salinityNow(state, constants, null);
    const left = volume.litres - litresPerDay;
    const rise =
      left > 0
        ? `Not made up, salinity would rise by ${changeFigure("salinity", (salinity * volume.litres) / left - salinity, { spelling: "", perModelUnit: 1 })} in a day.`
        : "More than there is.";
    return { answer: `${percent(litresPerDay / volume.litres)} of the water a day.`, blocks: [[rise]] };
  },
);

const feedsTold = fact(
  ({ constants }) => constants.facts.proteinGPerDay,
  (proteinGPerDay, assessment) => {
    const { litres } = assessment.volume;
    const meqPerDay = nitrificationMeqPerDay(proteinGPerDay);
    const inWater =
      litres === null
        ? ""
        : `, ${changeFigure("alkalinity", meqPerDay / litres, unitIn(assessment, "alkalinity"))} of the water`;
    return {
      answer: `${amount(proteinGPerDay, "g")} of protein a day; turning its nitrogen to nitrate takes ${amount(meqPerDay, "meq")} of alkalinity a day${inWater}.`,
      blocks: [],
      assumptions: [{ what: "nitrogen in protein", value: "16 %", basis: "common practice" }],
      sources: [papers.nitrification],
    };
  },
);

const topOffTold = fact(
  ({ constants }) => constants.facts.topOff,
  ({ solution, litres }, { constants, at, assumptions }, { model }) => {
    const evaporates = constants.facts.evaporatesLPerDay.findLast(
      ({ from, until }) => from <= at && at < until,
    )?.value;
    const lasts = evaporates === undefined ? null : lasting(litres, evaporates);
    const strength = solution === null ? null : constants.strengthAt(solution, at);
    const brings = solution === null ? "fresh water" : solutionName(model, solution);
    return {
      answer: `${volumeFigure(litres)} of ${brings}${lasts ? `: ${lasts} at ${volumeFigure(evaporates ?? 0)} a day` : ""}.`,
      blocks: [
        evaporates === undefined ? ["How long it lasts isn't known: add an evaporates line."] : [],
        strength ? [`1 mL brings ${strengthText(strength)}.`] : [],
        strength && isCausticByStrength(strength) ? [`Caustic. ${causticGear}.`] : [],
      ],
      assumptions: solution === null ? [] : assumptions.filter(({ what }) => what === "evaporation"),
    };
  },
);

const flowsThroughTold = fact(
  ({ constants }) => constants.facts.flowsThrough,
  ({ litresPerDay }, { volume, state, constants, at }) => {
    if (volume.litres === null)
      return { answer: "The volume of the water isn't known, so its share can't be told.", blocks: [] };
    const rates = ratesAt(state, at, constants, []);
    const into =
      rates && rates.exchangePerDay > 0
        ? [`The water comes in at salinity ${figure(rates.incoming.salinity, "salinity")}.`]
        : [];
    return {
      answer: `${percent(litresPerDay / volume.litres)} of the water a day; all of it once in ${lasting(volume.litres, litresPerDay) ?? "no time"}.`,
      blocks: [into],
    };
  },
);

export const factsTold: Readonly<Record<Kind, Tells>> = {
  uptake: uptakeTold,
  skeleton: skeletonTold,
  air: airTold,
  light: lightTold,
  evaporates: evaporatesTold,
  feeds: feedsTold,
  "top-off": topOffTold,
  "flows-through": flowsThroughTold,
};
