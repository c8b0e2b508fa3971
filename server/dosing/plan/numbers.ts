/** The plan's problem made ready for arithmetic: effects per litre, what each source may give, scales. */
import type { PlanParameter, PlanProblem, PlanSource } from "./problem.ts";

export interface PlanNumbers {
  readonly exchangePerDay: number;
  /** As given, with what isn't a finite number taken out. */
  readonly parameters: readonly PlanParameter[];
  readonly sources: readonly PlanSource[];
  /** effect[p][j]: by how much 1 L a day of source j raises parameter p a day. */
  readonly effect: readonly (readonly number[])[];
  /** raises[p][j]: whether j is of use for raising p. */
  readonly raises: readonly (readonly boolean[])[];
  /** The most of each source a day, L, and what holds it there. Never below what always runs. */
  readonly ceilingL: readonly number[];
  readonly ceilingBy: readonly string[];
  /** A change a day that matters, in each parameter's unit: a seventh of its band. */
  readonly dayScale: readonly number[];
  /** Litres a day of each source that change the parameter it moves most by that parameter's `dayScale`. */
  readonly litreScale: readonly number[];
  /** Indices of sources, the one to prefer first: in order of declaration, but what always runs last. */
  readonly preference: readonly number[];
}

/**
 * Fractions of a source's main effect: under the first it is rounding of a recipe; under the second a trace, which
 * counts in the limits but is no reason to give the source: it would run litres for what another is short of.
 */
const roundingOfRecipe = 1e-9;
const trace = 0.005;

/** Below this fraction of its scale a figure is rounding. */
export const rounding = 1e-9;

const finiteOr = <T>(value: number | null, otherwise: T): number | T =>
  value !== null && Number.isFinite(value) ? value : otherwise;
const positive = (value: number): number => Math.max(0, finiteOr(value, 0));

export function planNumbers(problem: PlanProblem): PlanNumbers {
  const parameters = problem.parameters.map(cleanParameter);
  const sources = problem.sources.map(cleanSource);
  const perVolume = problem.volumeL > 0 && Number.isFinite(problem.volumeL) ? 1 / problem.volumeL : 0;
  const dayScale = parameters.map(
    ({ low, high, aim }) => (high - low > 0 ? high - low : Math.abs(aim) / 10 || 1) / 7,
  );

  const raw = parameters.map(({ name }) => sources.map((source) => (source.strength[name] ?? 0) * perVolume));
  const mainEffect = sources.map((_, j) =>
    parameters.reduce((most, _, p) => Math.max(most, Math.abs(raw[p]![j]!) / dayScale[p]!), 0),
  );
  const share = (p: number, j: number): number =>
    mainEffect[j]! > 0 ? raw[p]![j]! / dayScale[p]! / mainEffect[j]! : 0;
  const effect = raw.map((row, p) =>
    row.map((value, j) => (Math.abs(share(p, j)) > roundingOfRecipe ? value : 0)),
  );
  const ceilings = sources.map(ceiling);
  const always = (j: number): number => (sources[j]!.alwaysLPerDay > 0 ? 1 : 0);
  return {
    exchangePerDay: positive(problem.exchangePerDay),
    parameters,
    sources,
    effect,
    raises: raw.map((row, p) => row.map((_, j) => share(p, j) > trace)),
    ceilingL: ceilings.map(({ litres }, j) => Math.max(litres, sources[j]!.alwaysLPerDay)),
    ceilingBy: ceilings.map(({ by }) => by),
    dayScale,
    litreScale: mainEffect.map((most) => (most > 0 ? 1 / most : 1)),
    preference: sources.map((_, j) => j).sort((a, b) => always(a) - always(b) || a - b),
  };
}

/**
 * Days in which a distance closes at a steady rate while exchange takes its share of what is left:
 * D' = −rate − exchange × D.
 */
export const daysToClose = ({ exchangePerDay: k }: PlanNumbers, distance: number, perDay: number): number =>
  k > 0 ? Math.log1p((k * distance) / perDay) / k : distance / perDay;

/** What is left of a distance after some days of the same. */
export function leftAfter(
  { exchangePerDay: k }: PlanNumbers,
  distance: number,
  perDay: number,
  days: number,
): number {
  if (!(k > 0)) return distance - perDay * days;
  return distance * Math.exp(-k * days) + (perDay * Math.expm1(-k * days)) / k;
}

/** What all sources together bring of a parameter a day. */
export const supplyOf = (numbers: PlanNumbers, p: number, litresPerDay: readonly number[]): number =>
  litresPerDay.reduce((sum, litres, j) => sum + numbers.effect[p]![j]! * litres, 0);

/** Distances to the aim smaller than this are none: half a hundredth of the band, far below what any test shows. */
export const negligible = (numbers: PlanNumbers, p: number): number =>
  Math.max(0.005 * 7 * numbers.dayScale[p]!, rounding * Math.abs(numbers.parameters[p]!.aim));

/** Whether a parameter stands above its greatest value, so that nothing may raise it. */
export const aboveMax = ({ now, max }: Pick<PlanParameter, "now" | "max">): boolean =>
  now !== null && max !== null && now > max + rounding * Math.abs(max);

function ceiling(source: PlanSource): { litres: number; by: string } {
  const doseBy = source.largestDoseBy ?? `${source.key} dose`;
  const tooSmallToRepeat = source.deliveries.kind === "at-most" && source.largestDoseL < source.leastDoseL;
  if (tooSmallToRepeat) return { litres: 0, by: `${source.key} least` };
  const byDoses = source.deliveries.count > 0 ? source.deliveries.count * source.largestDoseL : 0;
  const byHours = source.capacityLPerDay ?? Number.POSITIVE_INFINITY;
  return byHours <= byDoses
    ? { litres: byHours, by: `${source.key} hours` }
    : { litres: byDoses, by: doseBy };
}

function cleanSource(source: PlanSource): PlanSource {
  const strength = Object.entries(source.strength).filter(([, value]) => Number.isFinite(value));
  return {
    ...source,
    strength: Object.fromEntries(strength),
    // Infinity stays: nothing holds the dose down.
    largestDoseL: Math.max(0, source.largestDoseL) || 0,
    leastDoseL: positive(source.leastDoseL),
    capacityLPerDay:
      source.capacityLPerDay === Number.POSITIVE_INFINITY
        ? null
        : source.capacityLPerDay && positive(source.capacityLPerDay),
    deliveries: { ...source.deliveries, count: Math.floor(positive(source.deliveries.count)) },
    alwaysLPerDay: positive(source.alwaysLPerDay),
  };
}

function cleanParameter(parameter: PlanParameter): PlanParameter {
  const { low, high, aim } = parameter;
  const banded = [low, high, aim].every(Number.isFinite);
  const limit = (value: number | null): number | null => {
    const known = finiteOr(value, null);
    return known === null ? null : Math.max(0, known);
  };
  return {
    ...parameter,
    ...(banded ? {} : { low: 0, high: 0, aim: 0 }),
    now: banded ? finiteOr(parameter.now, null) : null,
    needPerDay: finiteOr(parameter.needPerDay, null),
    passivePerDay: finiteOr(parameter.passivePerDay, 0),
    risePerDay: limit(parameter.risePerDay),
    fallPerDay: limit(parameter.fallPerDay),
    max: finiteOr(parameter.max, null),
    min: finiteOr(parameter.min, null),
  };
}
