/** Plan problems for tests: a plain source and parameter to vary, and random ones. */
import fc from "fast-check";
import type {
  PlanAnswer,
  PlanParameter,
  PlanProblem,
  PlanSource,
} from "../../../server/dosing/plan/problem.ts";

export const meqPerLPerDkh = 20 / 56.077;

/** A pump without any bound that matters. */
export const pump = (
  key: string,
  strength: PlanSource["strength"],
  more: Partial<PlanSource> = {},
): PlanSource => ({
  key,
  strength,
  largestDoseL: 10,
  largestDoseBy: null,
  leastDoseL: 0.001,
  capacityLPerDay: null,
  deliveries: { kind: "at-most", count: 48 },
  alwaysLPerDay: 0,
  ...more,
});

/** Alkalinity at its aim of 3 meq/L, 0.2 meq/L/day taken up, no limits. */
export const alkalinity = (more: Partial<PlanParameter> = {}): PlanParameter => ({
  name: "alkalinity",
  now: 3,
  low: 2.8,
  high: 3.2,
  aim: 3,
  needPerDay: 0.2,
  passivePerDay: -(more.needPerDay ?? 0.2),
  risePerDay: null,
  fallPerDay: null,
  max: null,
  min: null,
  heldBack: null,
  ...more,
});

/** Calcium at its aim of 420 mg/L, 4 mg/L/day taken up, no limits. */
export const calcium = (more: Partial<PlanParameter> = {}): PlanParameter => ({
  ...alkalinity(),
  name: "calcium",
  now: 420,
  low: 400,
  high: 440,
  aim: 420,
  needPerDay: 4,
  passivePerDay: -(more.needPerDay ?? 4),
  ...more,
});

export const magnesium = (more: Partial<PlanParameter> = {}): PlanParameter => ({
  ...alkalinity(),
  name: "magnesium",
  now: 1320,
  low: 1260,
  high: 1380,
  aim: 1320,
  needPerDay: 0,
  passivePerDay: 0,
  ...more,
});

/** What a source brings of a parameter, in its unit a day, by the plain definition of strength. */
export const bringsPerDay = (
  problem: PlanProblem,
  parameter: PlanParameter,
  litresPerDay: readonly number[],
): number =>
  problem.sources.reduce(
    (sum, source, j) => sum + ((source.strength[parameter.name] ?? 0) * litresPerDay[j]!) / problem.volumeL,
    0,
  );

/** The parameter at a moment, walking the phases; the passive change taken as it is given. */
export function valueAt(
  problem: PlanProblem,
  answer: PlanAnswer,
  parameter: PlanParameter,
  days: number,
): number {
  let value = parameter.now!;
  let from = 0;
  for (const { untilDays, litresPerDay } of answer.phases) {
    const until = Math.min(days, untilDays ?? Number.POSITIVE_INFINITY);
    if (until <= from) break;
    value += (parameter.passivePerDay + bringsPerDay(problem, parameter, litresPerDay)) * (until - from);
    from = until;
  }
  return value;
}

const scales = {
  alkalinity: [3, 0.4],
  calcium: [420, 40],
  magnesium: [1320, 120],
  strontium: [8, 2],
} as const;
type Held = keyof typeof scales;
const names = Object.keys(scales) as Held[];

/** Evenly spread, unlike `fc.double`, which is mostly tiny. */
export const real = (min: number, max: number): fc.Arbitrary<number> =>
  fc.integer({ min: 0, max: 1_000_000 }).map((step) => min + ((max - min) * step) / 1_000_000);
const maybe = <T>(value: fc.Arbitrary<T>): fc.Arbitrary<T | null> => fc.option(value, { freq: 2 });

/** `exchange`: whether the water changes otherwise than by uptake alone. */
function parameterOf(name: Held, exchange: boolean): fc.Arbitrary<PlanParameter> {
  const [middle, band] = scales[name];
  return fc
    .record({
      off: fc.oneof(fc.constant(0), real(-1.2, 1.2)),
      known: fc.integer({ min: 0, max: 9 }),
      aim: real(-0.3, 0.3),
      need: fc.oneof(fc.constant(0), real(0, 0.6), real(-0.05, 0.4)),
      needKnown: fc.integer({ min: 0, max: 6 }),
      passive: real(-0.3, 0.5),
      rise: maybe(real(0.02, 0.8)),
      fall: maybe(real(0.02, 0.8)),
      max: maybe(real(0.5, 2)),
      min: maybe(real(-2, -0.5)),
      held: fc.integer({ min: 0, max: 9 }),
    })
    .map((drawn) => {
      const need = drawn.needKnown === 0 ? null : drawn.need * band;
      return {
        name,
        now: drawn.known === 0 ? null : middle + (drawn.aim + drawn.off) * band,
        low: middle - band / 2,
        high: middle + band / 2,
        aim: middle + drawn.aim * band,
        needPerDay: need,
        passivePerDay: exchange ? drawn.passive * band - (need ?? 0) : -(need ?? 0),
        risePerDay: drawn.rise && drawn.rise * band,
        fallPerDay: drawn.fall && drawn.fall * band,
        max: drawn.max && middle + drawn.max * band,
        min: drawn.min && middle + drawn.min * band,
        heldBack: drawn.held === 0 ? "no recent reading" : null,
      };
    });
}

/** Litres a day of the order that moves the parameter by a fifth of its band in the given volume. */
function sourceOf(key: string, held: readonly Held[], volumeL: number): fc.Arbitrary<PlanSource> {
  return fc
    .record({
      main: fc.constantFrom(...held),
      side: fc.option(fc.constantFrom(...held), { freq: 2 }),
      sideShare: real(0.02, 1.5),
      bandsPerL: real(0.2, 20),
      largest: fc.oneof({ weight: 8, arbitrary: real(0.005, 1) }, { weight: 1, arbitrary: fc.constant(0) }),
      least: real(0, 0.02),
      capacity: maybe(real(0.01, 3)),
      hand: fc.boolean(),
      count: fc.integer({ min: 1, max: 48 }),
      always: fc.oneof({ weight: 5, arbitrary: fc.constant(0) }, { weight: 1, arbitrary: real(0, 0.2) }),
      set: real(0, 0.5),
    })
    .map((drawn): PlanSource => {
      const strength: Partial<Record<Held, number>> = {};
      if (drawn.side)
        strength[drawn.side] = drawn.bandsPerL * drawn.sideShare * scales[drawn.side][1] * volumeL;
      strength[drawn.main] = drawn.bandsPerL * scales[drawn.main][1] * volumeL;
      return {
        key,
        strength,
        largestDoseL: drawn.largest,
        largestDoseBy: `${key} dose`,
        leastDoseL: drawn.least,
        capacityLPerDay: drawn.hand ? null : drawn.capacity,
        deliveries: { kind: drawn.hand ? "fixed" : "at-most", count: drawn.count },
        alwaysLPerDay: drawn.always / drawn.bandsPerL,
      };
    });
}

export const randomProblem: fc.Arbitrary<PlanProblem & { exchange: boolean }> = fc
  .record({ held: fc.subarray(names, { minLength: 1 }), exchange: fc.boolean(), volumeL: real(50, 20_000) })
  .chain(({ held, exchange, volumeL }) =>
    fc.record({
      volumeL: fc.constant(volumeL),
      exchangePerDay: fc.constant(0),
      exchange: fc.constant(exchange),
      parameters: fc.tuple(...held.map((name) => parameterOf(name, exchange))),
      sources: fc
        .integer({ min: 1, max: 5 })
        .chain((count) =>
          fc.tuple(...Array.from({ length: count }, (_, j) => sourceOf(`head-${j + 1}`, held, volumeL))),
        ),
    }),
  );

/**
 * A farm that has what it takes: every held parameter is known, is used up and has a pump of its own with room;
 * sources of two parts are declared among them in any order. Limits slow it down but forbid nothing.
 */
export const wellEquipped: fc.Arbitrary<PlanProblem> = fc
  .record({ held: fc.subarray(names, { minLength: 2 }), volumeL: real(50, 20_000) })
  .chain(({ held, volumeL }) =>
    fc
      .record({
        drawn: fc.tuple(
          ...held.map(() =>
            fc.record({
              off: real(-1.2, 1.2),
              aim: real(-0.3, 0.3),
              need: real(0.02, 0.6),
              rise: maybe(real(0.05, 1)),
              fall: maybe(real(0.05, 1)),
            }),
          ),
        ),
        strengths: fc.tuple(...held.map(() => real(1, 20))),
        lime: fc.array(
          fc.record({
            main: real(1, 20),
            side: real(0.1, 20),
            pair: fc.shuffledSubarray([...held], { minLength: 2, maxLength: 2 }),
          }),
          { maxLength: 3 },
        ),
        order: fc.array(fc.nat(), { minLength: 8, maxLength: 8 }),
      })
      .map(({ drawn, strengths, lime, order }) => {
        const parameters = held.map((name, p): PlanParameter => {
          const [middle, band] = scales[name];
          const { off, aim, need, rise, fall } = drawn[p]!;
          return {
            name,
            now: middle + (aim + off) * band,
            low: middle - band / 2,
            high: middle + band / 2,
            aim: middle + aim * band,
            needPerDay: need * band,
            passivePerDay: -need * band,
            risePerDay: rise && rise * band,
            fallPerDay: fall && (fall + need) * band,
            max: middle + 3 * band,
            min: middle - 3 * band,
            heldBack: null,
          };
        });
        const wide = { largestDoseL: 10, leastDoseL: 0 };
        const own = held.map((name, p) =>
          pump(`own-${p}`, { [name]: strengths[p]! * scales[name][1] * volumeL }, wide),
        );
        const two = lime.map(({ main, side, pair: [a, b] }, index) =>
          pump(
            `two-${index}`,
            { [a!]: main * scales[a!][1] * volumeL, [b!]: side * scales[b!][1] * volumeL },
            wide,
          ),
        );
        const sources = [...own, ...two]
          .map((source, index) => ({ source, place: order[index]! }))
          .sort((a, b) => a.place - b.place)
          .map(({ source }) => source);
        return { volumeL, exchangePerDay: 0, parameters, sources };
      }),
  );

/** The time limit only cuts short the search for a smaller example of a failure. */
export const runs = {
  numRuns: 2000,
  seed: 20_261_201,
  interruptAfterTimeLimit: 30_000,
  markInterruptAsFailure: true,
};

export const bandOf = ({ low, high }: PlanParameter): number => high - low;
export const alwaysOf = (problem: PlanProblem): number[] =>
  problem.sources.map(({ alwaysLPerDay }) => alwaysLPerDay);
export const mostADay = ({ deliveries, largestDoseL, leastDoseL, capacityLPerDay }: PlanSource): number =>
  deliveries.kind === "at-most" && largestDoseL < leastDoseL
    ? 0
    : Math.min(deliveries.count * largestDoseL, capacityLPerDay ?? Number.POSITIVE_INFINITY);
/** Litres a day of maintenance alone; what only always runs where it is unknown. */
export const keptOf = (problem: PlanProblem, answer: PlanAnswer): number[] =>
  answer.sources.map(({ maintenanceLPerDay }, j) => maintenanceLPerDay ?? problem.sources[j]!.alwaysLPerDay);
