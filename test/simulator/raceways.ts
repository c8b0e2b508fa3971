/** The truth of the example farm's raceways: near what its files declare, and not the same. */
import { meqOfDkh, mmolOfCalcium, mmolOfMagnesium } from "./mass-balance.ts";
import { benchKit, calciumPart, carbonatePart, magnesiumPart } from "./stock-room.ts";
import type { Truth } from "./truth.ts";

export const raceways: Truth = {
  system: "raceways",
  firstDay: "2026-09-02",
  days: 90,
  /** Declared: 1640 L. */
  volumeL: 1625,
  start: {
    alkalinityMeqPerL: meqOfDkh(7.9),
    calciumMmolPerL: mmolOfCalcium(418),
    magnesiumMmolPerL: mmolOfMagnesium(1305),
    salinity: 34.7,
  },
  cohorts: [
    // Declared: 0.55 meq/day each, growing 1.2 % a week.
    {
      name: "acropora-plugs",
      amount: 320,
      countedIn: "pieces",
      meqPerDayEach: 0.57,
      growthPerWeek: 0.011,
      magnesiumFraction: 0.004,
    },
    // Declared: 1.4 meq/day each, growing 0.8 % a week.
    {
      name: "stylophora-colonies",
      amount: 90,
      countedIn: "pieces",
      meqPerDayEach: 1.36,
      growthPerWeek: 0.008,
      magnesiumFraction: 0.004,
    },
    // Declared: 150 mmol/m2/day as CaCO3, twice as many equivalents.
    {
      name: "montipora-plates",
      amount: 0.5,
      countedIn: "m2",
      meqPerDayEach: 310,
      growthPerWeek: 0.006,
      magnesiumFraction: 0.005,
    },
    // Declared: 8 mmol/m2/day as CaCO3.
    {
      name: "raceway-crust",
      amount: 1.8,
      countedIn: "m2",
      meqPerDayEach: 15,
      growthPerWeek: 0,
      magnesiumFraction: 0.14,
    },
  ],
  light: { fromHour: 9, toHour: 19, overDark: 2.7 },
  /** Declared: 8 g/day of food with 45 % protein, 41 meq/day by the nitrogen in it. */
  otherLossMeqPerDay: 35,
  evaporation: { litresPerDay: 14.5, dayToDay: 0.08 },
  topOff: null,
  pumps: [
    {
      name: "carbonate-pump",
      solution: carbonatePart,
      startMlPerDay: 350,
      delivers: 1.01,
      holdsL: 6,
      serves: "alkalinity",
    },
    {
      name: "calcium-pump",
      solution: calciumPart,
      startMlPerDay: 340,
      delivers: 0.99,
      holdsL: 6,
      serves: "calcium",
    },
  ],
  exchangeWater: {
    alkalinityMeqPerL: meqOfDkh(7.7),
    calciumMmolPerL: mmolOfCalcium(405),
    magnesiumMmolPerL: mmolOfMagnesium(1260),
    salinity: 33.6,
  },
  unexplained: { alkalinityMeqPerL: 0.004, calciumMmolPerL: 0.01, magnesiumMmolPerL: 0.03 },
  temperatureDegC: 25.4,
  pH: { lowest: 8.02, highest: 8.27 },
  kit: benchKit,
  habits: {
    people: ["jt", "es", "ao"],
    daysMissed: 0.12,
    fullTestOn: 2,
    setOnDays: [9, 20, 31, 41, 52, 62, 72, 79],
    setWhenOffByDkh: 0.35,
    aim: { alkalinityDkh: 8, calciumMgPerL: 425, magnesiumMgPerL: 1320 },
    believedVolumeL: 1640,
    exchange: { on: 4, litres: 160, water: "light-mix" },
    fillOn: 5,
    magnesiumByHand: { solution: magnesiumPart, mostMl: 300 },
  },
  happenings: [
    {
      day: 26,
      time: "07:35",
      what: "disregarded",
      wrongByDkh: 1.9,
      why: "Cuvette not rinsed; repeated with a fresh sample.",
    },
    { day: 45, time: "22:10", what: "stopped", pump: "carbonate-pump" },
    { day: 46, time: "07:20", what: "started", pump: "carbonate-pump" },
    { day: 46, time: "07:25", what: "note", text: "Tubing of carbonate-pump had split; replaced." },
    { day: 86, time: "14:00", what: "stocked", cohort: "acropora-plugs", amount: 60 },
    {
      day: 86,
      time: "14:10",
      what: "note",
      text: "60 plugs cut from the mothers of rack 2, glued to racks 7 and 8.",
    },
  ],
};
