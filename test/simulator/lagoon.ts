/** The truth of the example farm's lagoon: near what its files declare, and not the same. */
import { meqOfDkh, mmolOfCalcium, mmolOfMagnesium } from "./mass-balance.ts";
import { benchKit, bicarbonatePart, limewater, magnesiumPart } from "./stock-room.ts";
import type { Truth } from "./truth.ts";

export const lagoon: Truth = {
  system: "lagoon",
  firstDay: "2026-09-02",
  days: 90,
  /** By the tanks' measures: 1442 L. */
  volumeL: 1425,
  start: {
    alkalinityMeqPerL: meqOfDkh(8.1),
    calciumMmolPerL: mmolOfCalcium(415),
    magnesiumMmolPerL: mmolOfMagnesium(1300),
    salinity: 34.8,
  },
  cohorts: [
    // Declared: 30 mmol/m2/day as CaCO3, growing 0.4 % a week, 15 % magnesium.
    {
      name: "coralline-tiles",
      amount: 4,
      countedIn: "m2",
      meqPerDayEach: 62,
      growthPerWeek: 0.004,
      magnesiumFraction: 0.16,
    },
    // Declared: 0.15 meq/day each, 13 % magnesium.
    {
      name: "leather-mothers",
      amount: 140,
      countedIn: "pieces",
      meqPerDayEach: 0.14,
      growthPerWeek: 0,
      magnesiumFraction: 0.13,
    },
    // Declared: 12 mmol/m2/day as CaCO3, 13 % magnesium.
    {
      name: "star-polyp-mats",
      amount: 1.2,
      countedIn: "m2",
      meqPerDayEach: 22,
      growthPerWeek: 0.003,
      magnesiumFraction: 0.13,
    },
  ],
  light: { fromHour: 10, toHour: 20, overDark: 2.4 },
  /** Declared: 6 g/day of food with 50 % protein, 34 meq/day by the nitrogen in it. */
  otherLossMeqPerDay: 30,
  evaporation: { litresPerDay: 7, dayToDay: 0.06 },
  topOff: limewater,
  pumps: [
    {
      name: "bicarbonate-pump",
      solution: bicarbonatePart,
      startMlPerDay: 50,
      delivers: 1,
      holdsL: 3,
      serves: "alkalinity",
    },
  ],
  exchangeWater: {
    alkalinityMeqPerL: meqOfDkh(8),
    calciumMmolPerL: mmolOfCalcium(415),
    magnesiumMmolPerL: mmolOfMagnesium(1290),
    salinity: 34.8,
  },
  unexplained: { alkalinityMeqPerL: 0.004, calciumMmolPerL: 0.01, magnesiumMmolPerL: 0.03 },
  temperatureDegC: 25,
  pH: { lowest: 8.12, highest: 8.36 },
  kit: benchKit,
  habits: {
    people: ["ao", "jt"],
    daysMissed: 0.25,
    fullTestOn: 2,
    setOnDays: [13, 27, 41, 55, 69, 83],
    setWhenOffByDkh: 0.4,
    aim: { alkalinityDkh: 8.2, calciumMgPerL: 425, magnesiumMgPerL: 1300 },
    believedVolumeL: 1442,
    exchange: { on: 3, litres: 90, water: "new-salt-water" },
    fillOn: 1,
    magnesiumByHand: { solution: magnesiumPart, mostMl: 250 },
  },
  happenings: [
    { day: 33, time: "15:00", what: "removed", cohort: "leather-mothers", amount: 12 },
    {
      day: 33,
      time: "15:05",
      what: "note",
      text: "12 leathers cut; stumps left to heal in the raceway sump.",
    },
    { day: 60, time: "09:30", what: "note", text: "Float valve of the top-off cleaned of lime crust." },
  ],
};
