/** A formula with the range of sea water for which its paper gives it: the value, and a finding outside. */

export type Range = readonly [low: number, high: number];

/** Sea water of one salinity and temperature, with what nearly every formula needs of them. */
export type SeaWaterPoint = {
  readonly salinity: number;
  /** °C */
  readonly celsius: number;
  readonly kelvin: number;
  readonly lnKelvin: number;
  readonly rootSalinity: number;
};

/** A formula used where its paper doesn't vouch for it. */
export type OutsideRange = {
  readonly quantity: string;
  readonly variable: "salinity" | "celsius";
  readonly value: number;
  readonly range: Range;
};

export type InSeawater = {
  readonly value: number;
  readonly outsideRange: readonly OutsideRange[];
};

export type SeawaterFormula = {
  (point: SeaWaterPoint): InSeawater;
  readonly quantity: string;
  readonly range: { readonly salinity: Range; readonly celsius: Range };
};

const none: readonly OutsideRange[] = [];

/** Binds a formula to its name and range. The value is never clipped: outside, it is extrapolated and told. */
export function inSeawater(
  domain: { readonly quantity: string; readonly salinity: Range; readonly celsius: Range },
  formula: (point: SeaWaterPoint) => number,
): SeawaterFormula {
  const { quantity, salinity, celsius } = domain;
  const evaluate = (point: SeaWaterPoint): InSeawater => {
    const value = formula(point);
    const wrongSalinity = point.salinity < salinity[0] || point.salinity > salinity[1];
    const wrongTemperature = point.celsius < celsius[0] || point.celsius > celsius[1];
    if (!wrongSalinity && !wrongTemperature) return { value, outsideRange: none };
    const outsideRange: OutsideRange[] = [];
    if (wrongSalinity)
      outsideRange.push({ quantity, variable: "salinity", value: point.salinity, range: salinity });
    if (wrongTemperature)
      outsideRange.push({ quantity, variable: "celsius", value: point.celsius, range: celsius });
    return { value, outsideRange };
  };
  return Object.assign(evaluate, { quantity, range: { salinity, celsius } });
}

/** The point for a salinity and a temperature in °C; both must be numbers, salinity not negative. */
export function seaWaterPoint(salinity: number, celsius: number): SeaWaterPoint {
  const kelvin = celsius + 273.15;
  return { salinity, celsius, kelvin, lnKelvin: Math.log(kelvin), rootSalinity: Math.sqrt(salinity) };
}
