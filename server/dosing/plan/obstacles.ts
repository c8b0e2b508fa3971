/** What stands in the way of what should be given, in words of the report. */
import type { Correction } from "./correction.ts";
import { type CutPlan, wishedRate } from "./cuts.ts";
import { aboveMax, negligible, type PlanNumbers, rounding, supplyOf } from "./numbers.ts";
import type { PlanObstacle } from "./problem.ts";

export function obstacles(
  numbers: PlanNumbers,
  cuts: CutPlan,
  planned: readonly Correction[],
): PlanObstacle[] {
  const total = totalLitres(cuts, planned);
  return numbers.parameters.flatMap((_, p) => {
    const breaches = passiveBreaches(numbers, p, total);
    const others = numbers.raises[p]!.includes(true)
      ? heldBack(numbers, cuts, planned, p)
      : noSource(numbers, p);
    // A fall that the plan would make good, if something else didn't hold it back, isn't the uptake's doing.
    const { name } = numbers.parameters[p]!;
    const held = others.some(({ kind, by }) => kind === "held-back" && by !== `${name} max`);
    const own = held ? breaches.filter(({ by }) => !/ (fall|min)$/.test(by)) : breaches;
    return merged([...own, ...heldBackCorrection(numbers, p), ...others]);
  });
}

/** The first thing that bound a correction, else one that bound maintenance. */
export function limitedBy(
  numbers: PlanNumbers,
  cuts: CutPlan,
  planned: readonly Correction[],
): string | null {
  const ofCorrections = numbers.parameters.flatMap((_, p) => [
    ...heldBackCorrection(numbers, p).map(({ by }) => by),
    ...planned.flatMap((one) => (one.parameter === p && one.limitedBy !== null ? [one.limitedBy] : [])),
  ]);
  return ofCorrections[0] ?? cuts.during(cuts.wished).shortfalls[0]?.by ?? null;
}

const totalLitres = (cuts: CutPlan, planned: readonly Correction[]): number[] =>
  cuts
    .during(cuts.wished)
    .litres.map((kept, j) => planned.reduce((sum, { litres }) => sum + litres[j]!, kept));

/** How far below its aim (or greatest value) it stands; negative above. 0 where that is unknown or negligible. */
function belowAim(numbers: PlanNumbers, p: number): number {
  const { now, aim, max } = numbers.parameters[p]!;
  if (now === null) return 0;
  const distance = now < aim ? Math.max(0, Math.min(aim, max ?? aim) - now) : aim - now;
  return Math.abs(distance) <= negligible(numbers, p) ? 0 : distance;
}

function noSource(numbers: PlanNumbers, p: number): PlanObstacle[] {
  const { name, needPerDay, heldBack: why, now, aim, low } = numbers.parameters[p]!;
  const toCorrect = why === null && belowAim(numbers, p) > 0 ? wishedRate(aim - now!, low - now!) : 0;
  const perDay = Math.max(0, needPerDay ?? 0) + toCorrect;
  return perDay > rounding * numbers.dayScale[p]!
    ? [{ parameter: name, kind: "no-source", by: "no source", perDay }]
    : [];
}

/** A correction that isn't planned at all because something else comes first. */
function heldBackCorrection(numbers: PlanNumbers, p: number): PlanObstacle[] {
  const parameter = numbers.parameters[p]!;
  const { name, heldBack: why, now, aim, low, high } = parameter;
  if (why === null) return [];
  if (now === null) return [{ parameter: name, kind: "held-back", by: why, perDay: null }];
  const below = belowAim(numbers, p);
  if (below > 0)
    return [{ parameter: name, kind: "held-back", by: why, perDay: wishedRate(aim - now, low - now) }];
  if (below === 0 || aboveMax(parameter)) return [];
  return [{ parameter: name, kind: "held-back", by: why, perDay: wishedRate(now - aim, now - high) }];
}

/** An aim that the greatest value keeps the water from. */
function aimAboveMax(numbers: PlanNumbers, p: number): PlanObstacle[] {
  const { name, now, aim, max } = numbers.parameters[p]!;
  const outOfReach = now !== null && max !== null && now < aim && aim - max > negligible(numbers, p);
  return outOfReach ? [{ parameter: name, kind: "held-back", by: `${name} max`, perDay: null }] : [];
}

function heldBack(
  numbers: PlanNumbers,
  cuts: CutPlan,
  planned: readonly Correction[],
  p: number,
): PlanObstacle[] {
  const { name } = numbers.parameters[p]!;
  const maintained = cuts.during(cuts.wished).shortfalls.filter(({ parameter }) => parameter === p);
  // A correction that is only slowed still arrives: it says itself what slows it.
  const beyond = aimAboveMax(numbers, p);
  const corrected = planned.filter(
    ({ parameter, limitedBy: by, perDay }) => parameter === p && by !== null && perDay === 0,
  );
  return [
    ...beyond,
    ...maintained.map(({ by, perDay }) => ({ parameter: name, kind: "held-back" as const, by, perDay })),
    ...corrected.map(({ limitedBy: by, wishedPerDay, perDay }) => ({
      parameter: name,
      kind: "held-back" as const,
      by: by!,
      perDay: wishedPerDay - perDay,
    })),
  ];
}

/**
 * Limits that break whatever is planned: rises by what comes in anyway, and falls that the plan doesn't make
 * good. A fall that planned doses do make good is no obstacle.
 */
function passiveBreaches(numbers: PlanNumbers, p: number, total: readonly number[]): PlanObstacle[] {
  const { name, now, passivePerDay, risePerDay, fallPerDay, max, min } = numbers.parameters[p]!;
  const always = numbers.sources.map(({ alwaysLPerDay }) => alwaysLPerDay);
  const anyway = passivePerDay + supplyOf(numbers, p, always);
  const inAll = passivePerDay + supplyOf(numbers, p, total);
  const over: [by: string, perDay: number][] = [];
  if (risePerDay !== null) over.push([`${name} rise`, anyway - risePerDay]);
  if (now !== null && max !== null) over.push([`${name} max`, now + anyway - max]);
  if (fallPerDay !== null) over.push([`${name} fall`, -inAll - fallPerDay]);
  if (now !== null && min !== null) over.push([`${name} min`, min - now - inAll]);
  return over
    .filter(([, perDay]) => perDay > rounding * 7 * numbers.dayScale[p]!)
    .map(([by, perDay]) => ({ parameter: name, kind: "passive-breach", by, perDay }));
}

/** One entry for what holds back both maintenance and correction. */
function merged(all: readonly PlanObstacle[]): PlanObstacle[] {
  const byReason = new Map<string, PlanObstacle>();
  for (const one of all) {
    const key = `${one.kind} ${one.by}`;
    const before = byReason.get(key);
    const perDay = before?.perDay == null ? one.perDay : before.perDay + (one.perDay ?? 0);
    byReason.set(key, { ...one, perDay });
  }
  return [...byReason.values()];
}
