/** True strengths of the example farm's solutions, reckoned from grams, and its test kit. */
import type { Kit, Solution } from "./truth.ts";

/** g/mol, from IUPAC abridged standard atomic weights. */
const molarMass = {
  sodiumCarbonate: 105.988,
  sodiumBicarbonate: 84.006,
  calciumChloride: 110.978,
  calciumChlorideDihydrate: 147.008,
  magnesiumChloride: 95.205,
  magnesiumChlorideHexahydrate: 203.295,
} as const;

const nothing = { alkalinityMeqPerMl: 0, calciumMmolPerMl: 0, magnesiumMmolPerMl: 0 } as const;

/** 1600 g of soda ash, 99.2 % pure, in 20 L: 1600 × 0.992 ÷ 20 g/L. */
const sodaMgPerMl = (1600 * 0.992) / 20;
export const carbonatePart: Solution = {
  ...nothing,
  name: "carbonate-part",
  alkalinityMeqPerMl: (2 * sodaMgPerMl) / molarMass.sodiumCarbonate,
  saltMgPerMl: sodaMgPerMl,
};

/** 2240 g of calcium chloride dihydrate, 98 % pure, in 20 L. */
const chlorideMmolPerMl = (2240 * 0.98) / 20 / molarMass.calciumChlorideDihydrate;
export const calciumPart: Solution = {
  ...nothing,
  name: "calcium-part",
  calciumMmolPerMl: chlorideMmolPerMl,
  saltMgPerMl: chlorideMmolPerMl * molarMass.calciumChloride,
};

/** 1000 g of magnesium chloride hexahydrate, 98.5 % pure, in 5 L. */
const magnesiumMmolPerMl = (1000 * 0.985) / 5 / molarMass.magnesiumChlorideHexahydrate;
export const magnesiumPart: Solution = {
  ...nothing,
  name: "magnesium-part",
  magnesiumMmolPerMl,
  saltMgPerMl: magnesiumMmolPerMl * molarMass.magnesiumChloride,
};

/** What counts as salt of an equivalent of carbonate: the rest of a bicarbonate leaves as CO2, a hydroxide takes CO2 up. */
const carbonateMgPerMeq = 60.008 / 2;

/** 300 g of sodium bicarbonate in 5 L. */
const bicarbonateMmolPerMl = 60 / molarMass.sodiumBicarbonate;
export const bicarbonatePart: Solution = {
  ...nothing,
  name: "bicarbonate-part",
  alkalinityMeqPerMl: bicarbonateMmolPerMl,
  saltMgPerMl: bicarbonateMmolPerMl * (22.99 + carbonateMgPerMeq),
};

/**
 * Saturated at 22 °C. Well-formed solid gives 0.0203 mol/L at 25 °C (Bates, Bower & Smith 1956, J. Res. NBS 56,
 * 305–312), a little more in the cold; this barrel is stirred once a day and stays a little short of it.
 */
const limeMmolPerMl = 0.0202;
export const limewater: Solution = {
  ...nothing,
  name: "limewater",
  alkalinityMeqPerMl: 2 * limeMmolPerMl,
  calciumMmolPerMl: limeMmolPerMl,
  saltMgPerMl: limeMmolPerMl * (40.078 + 2 * carbonateMgPerMeq),
};

export const benchKit: Kit = {
  name: "bench",
  alkalinityDkh: { scatter: 0.1, bias: 0, step: 0.1 },
  calciumMgPerL: { scatter: 8, bias: 0, step: 5 },
  magnesiumMgPerL: { scatter: 25, bias: 0, step: 10 },
  salinity: { scatter: 0.2, bias: 0, step: 0.1 },
  temperatureDegC: { scatter: 0.2, bias: 0, step: 0.1 },
  pH: { scatter: 0.04, bias: 0, step: 0.01 },
};
