/**
 * Rounding for people: a number with its unit, at the digits that a technician can use. What these give back is
 * text to read, never to compute with.
 */
import type { ParameterName } from "../../grammar/parameters.ts";
import type { DisplayUnit } from "../culture/model.ts";

/** The number with so many decimals, never `-0`. */
export function rounded(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return "unknown";
  const text = Math.abs(value) < 1e15 ? value.toFixed(decimals) : value.toPrecision(3);
  return /^-[0.]*$/.test(text) ? text.slice(1) : text;
}

/** The same without zeros at its end. */
const trimmed = (text: string): string => (/\.\d*$/.test(text) ? text.replace(/\.?0+$/, "") : text);

const withUnit = (number: string, unit: string): string => (unit === "" ? number : `${number} ${unit}`);

/** Units of plain figures, and the decimals that each is told with. */
const decimalsOfUnit = {
  L: (size) => (size < 9.95 ? 1 : 0),
  mL: (size) => (size === 0 ? 0 : size < 0.0995 ? 3 : size < 0.995 ? 2 : size < 9.95 ? 1 : 0),
  days: () => 1,
  "°C": () => 1,
  salinity: () => 1,
  pH: () => 2,
  Ω: (size) => (size < 9.95 ? 1 : 0),
  "%": () => 0,
  ppm: () => 0,
  µatm: () => 0,
  g: (size) => (size < 9.95 ? 1 : 0),
} as const satisfies Record<string, (size: number) => number>;

export type FigureUnit = keyof typeof decimalsOfUnit;

/** Units that are told before the number, or not at all. */
const bare: ReadonlySet<FigureUnit> = new Set<FigureUnit>(["salinity", "pH", "Ω"]);

/** `48 mL`, `1.5 L`, `6.1 days`, `25.4 °C`; salinity, pH and Ω as the number alone. */
export function figure(value: number, unit: FigureUnit): string {
  const number = rounded(value, decimalsOfUnit[unit](Math.abs(value)));
  return withUnit(number, bare.has(unit) ? "" : unit);
}

/** The same number, rounded towards zero or away from it: never more, or never less, than was worked out. */
export function figureWithin(value: number, unit: FigureUnit, way: "down" | "up"): string {
  const decimals = decimalsOfUnit[unit](Math.abs(value));
  const step = 10 ** decimals;
  // What the last bits of a double add is no more and no less.
  const steps = way === "down" ? Math.floor(value * step + 1e-6) : Math.ceil(value * step - 1e-6);
  return figure(steps / step, unit);
}

/** A dose: in millilitres up to 10 L. */
export const doseFigure = (litres: number): string =>
  Math.abs(litres) < 10 ? figure(litres * 1000, "mL") : figure(litres, "L");

/**
 * What the plan gives, told the same wherever it is told or written: rounded down where a limit holds it, so that
 * nobody is told to pass the limit.
 */
export function plannedFigure(litres: number, isLimited: boolean): string {
  const way = (value: number, unit: "mL" | "L") =>
    isLimited ? figureWithin(value, unit, "down") : figure(value, unit);
  if (Math.abs(litres) < 10) return way(litres * 1000, "mL");
  // A whole litre of some ten would be too coarse to set a pump by.
  return `${rounded(isLimited ? Math.floor(litres * 10 + 1e-6) / 10 : litres, 1)} L`;
}

/** What a good test or probe tells apart, in the parameter's own unit. Common practice, no source. */
const toldApart: Readonly<Record<ParameterName, number>> = {
  alkalinity: 0.02,
  calcium: 1,
  magnesium: 1,
  potassium: 1,
  strontium: 0.1,
  salinity: 0.1,
  temperature: 0.1,
  pH: 0.01,
  nitrate: 0.1,
  phosphate: 0.01,
};

/** Decimals of a value of this parameter in this unit. */
export function decimalsOf(parameter: ParameterName, { perModelUnit }: DisplayUnit): number {
  const decimals = Math.round(-Math.log10(toldApart[parameter] * Math.abs(perModelUnit)));
  return Number.isFinite(decimals) ? Math.min(Math.max(decimals, 0), 6) : 2;
}

/** The unit as people read it. */
export const unitText = ({ spelling }: DisplayUnit): string => spelling.replace("degC", "°C");

/** A value of the water, from the model's unit into the written one: `7.6 dKH`, `421 mg/L`, `34.8`. */
export const valueFigure = (parameter: ParameterName, value: number, unit: DisplayUnit): string =>
  withUnit(rounded(value * unit.perModelUnit, decimalsOf(parameter, unit)), unitText(unit));

const changeDecimals = (parameter: ParameterName, unit: DisplayUnit): number =>
  parameter === "pH" ? 2 : decimalsOf(parameter, unit) + 1;

/** A change, told one digit finer: `0.87 dKH`, `6.2 mg/L`. */
export const changeFigure = (parameter: ParameterName, change: number, unit: DisplayUnit): string =>
  withUnit(changeNumber(change * unit.perModelUnit, changeDecimals(parameter, unit)), unitText(unit));

/** A change that its usual digits would make nothing of is told with its first digit that counts. */
function changeNumber(change: number, decimals: number): string {
  const text = rounded(change, decimals);
  if (Number(text) !== 0 || change === 0 || !Number.isFinite(change)) return text;
  const first = Math.ceil(-Math.log10(Math.abs(change)));
  return first <= finestDecimals ? rounded(change, first) : text;
}

/** The edge of a band or a limit, as a person would have written it: no zeros at its end. */
export const edgeFigure = (parameter: ParameterName, edge: number, unit: DisplayUnit): string =>
  withUnit(edgeNumber(parameter, edge, unit), unitText(unit));

const edgeNumber = (parameter: ParameterName, edge: number, unit: DisplayUnit): string =>
  trimmed(rounded(edge * unit.perModelUnit, changeDecimals(parameter, unit)));

/** `7.6 to 8.4 dKH`. */
export const bandFigure = (parameter: ParameterName, low: number, high: number, unit: DisplayUnit): string =>
  `${edgeNumber(parameter, low, unit)} to ${edgeFigure(parameter, high, unit)}`;

/** A value with digits enough to be seen on its side of every edge: 7.58 beside 7.6, not 7.6. */
export const valueBeside = (
  parameter: ParameterName,
  value: number,
  edges: readonly number[],
  unit: DisplayUnit,
): string => beside(value, edges, unit, decimalsOf(parameter, unit));

/** The same for a change beside its limit. */
export const changeBeside = (
  parameter: ParameterName,
  change: number,
  limit: number,
  unit: DisplayUnit,
): string => beside(change, [limit], unit, changeDecimals(parameter, unit));

const finestDecimals = 3;

function beside(value: number, edges: readonly number[], unit: DisplayUnit, decimals: number): string {
  const number = (digits: number) => rounded(value * unit.perModelUnit, digits);
  const isHidden = (digits: number) =>
    edges.some(
      (edge) =>
        edge !== value &&
        Number(number(digits)) === Number(rounded(edge * unit.perModelUnit, finestDecimals)),
    );
  let digits = decimals;
  while (digits < finestDecimals + 1 && isHidden(digits)) digits += 1;
  return withUnit(number(digits), unitText(unit));
}
