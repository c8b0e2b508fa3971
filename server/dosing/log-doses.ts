/** Doses of the log that broke a limit of the system, however old they are. */

import { shownIn } from "../culture/display.ts";
import { factAt } from "../culture/history.ts";
import type { SystemEvent } from "../culture/model.ts";
import type { Place } from "../culture/place.ts";
import type { SystemConstants } from "./constants.ts";
import { afterDelivery, waterOf } from "./dose-chemistry.ts";
import type { DosingFinding } from "./finding.ts";
import type { DoseInLog } from "./fold.ts";
import { give, ratesAsSet } from "./fold.ts";
import { limitAt } from "./limits.ts";
import type { Split } from "./remedy.ts";
import { beyondCapacity } from "./set-capacity.ts";
import { splitInDay, splitOverDays } from "./split-dose.ts";
import { broughtPerLitre, type Dosed, dosed } from "./tracked.ts";
import { volumeAt } from "./volume.ts";
import { isStale, type WaterState } from "./water-state.ts";

/** A dose given at once. */
export interface Given {
  readonly minute: number;
  readonly solution: string;
  readonly litres: number;
  readonly place: Place;
}

/** Ω of aragonite at which a dose is told of; chemistry of each step: Moras et al. 2022, Marion et al. 2009, Ringham et al. 2024. */
const precipitationGrades = { info: 7, warning: 12, error: 30 } as const;
const precipitationPh = 10;

/**
 * Checks an event of a log against the limits that were in force. `earlier`: what was given before it within a day.
 */
export function checkDose(
  system: string,
  constants: SystemConstants,
  { event, before, after }: DoseInLog,
  earlier: readonly Given[],
): DosingFinding[] {
  const findings: DosingFinding[] = [];
  if (event.kind !== "gave" && event.kind !== "topped") {
    if (event.kind === "set") findings.push(...beyondCapacity(system, constants, event));
    findings.push(...checkSet(system, constants, event, after));
    return findings;
  }
  const lastDay = [...earlier];
  let state = before;
  for (const given of givenBy(event)) {
    lastDay.push(given);
    findings.push(...checkGiven(system, constants, state, given, lastDay));
    // The next of a line is judged from there.
    state = give(state, given.solution, given.litres, constants);
  }
  return findings;
}

/** What an event gives at once. */
export function givenBy(event: SystemEvent): Given[] {
  const { minute, place } = event;
  if (event.kind === "gave") return event.doses.map((dose) => ({ minute, ...dose }));
  return event.kind === "topped" && event.solution
    ? [{ minute, solution: event.solution, litres: event.litres, place }]
    : [];
}

/** By how much a dose raises a parameter. */
function raised(state: WaterState, constants: SystemConstants, given: Given, name: Dosed): number {
  const strength = constants.strengthAt(given.solution, given.minute);
  const litres = volumeAt(constants.facts, state.minute).litres;
  return strength && litres ? (given.litres * (broughtPerLitre(strength, name) ?? 0)) / litres : 0;
}

function checkGiven(
  system: string,
  constants: SystemConstants,
  state: WaterState,
  given: Given,
  lastDay: readonly Given[],
): DosingFinding[] {
  const findings: DosingFinding[] = [];
  const { facts } = constants;
  const { minute, place, solution } = given;
  for (const name of dosed) {
    const rise = raised(state, constants, given, name);
    if (rise <= 0) continue;
    const unit = shownIn(facts, name, minute);
    const shared = { place, system, parameter: name, unit, solution, split: null };
    const dose = limitAt(facts, name, "dose", "hand", minute, null);
    if (dose && rise > dose.value * tolerance) {
      findings.push({
        ...shared,
        code: `overdose/${name}-dose`,
        value: rise,
        limit: dose.value,
        limitStated: dose.place !== null,
      });
    }
    const daily = risePerDay(constants, state, lastDay, name);
    const limit = limitAt(facts, name, "rise", "hand", minute, null);
    if (limit && daily !== null && daily > limit.value * tolerance) {
      findings.push({
        ...shared,
        code: `overdose/${name}-rise`,
        value: daily,
        limit: limit.value,
        limitStated: limit.place !== null,
      });
    }
    const carried = state.carried[name];
    const max = limitAt(facts, name, "max", "hand", minute, null);
    if (max && carried && !isStale(carried, minute) && carried.value + rise / tolerance > max.value) {
      const value = carried.value + rise;
      findings.push({
        ...shared,
        code: `overdose/${name}-max`,
        value,
        limit: max.value,
        limitStated: max.place !== null,
      });
    }
  }
  return [
    ...withSplits(findings, constants, state, given, lastDay),
    ...checkPeak(system, constants, state, given),
  ];
}

/** Adds to what is wrong with a dose the parts that it could be given in. */
function withSplits(
  findings: readonly DosingFinding[],
  constants: SystemConstants,
  state: WaterState,
  given: Given,
  lastDay: readonly Given[],
): DosingFinding[] {
  // A line of its own can be split; what tops up the water can't.
  if (findings.length === 0 || given.place.span === null) return [...findings];
  const others = (name: Dosed) =>
    lastDay.reduce((sum, other) => sum + (other === given ? 0 : raised(state, constants, other, name)), 0);
  const dose = { ...given, others };
  const isOfOneDose = findings.every(({ code }) => code.endsWith("-dose"));
  const inDay = isOfOneDose ? splitInDay(constants, state, dose) : null;
  const split: Split | null = inDay ?? splitOverDays(constants, state, dose);
  return findings.map((finding) => ("split" in finding ? { ...finding, split } : finding));
}

/** A limit counts as broken from here on: a dose planned to the limit and rounded to a millilitre breaks none. */
const tolerance = 1.005;

/**
 * The change of the day's mean that the doses of the last day make together. Where uptake isn't known, null for
 * alkalinity, of which corals may take as much in a day; of the rest they take so little beside the limit on a
 * rise that the doses alone tell.
 */
function risePerDay(
  constants: SystemConstants,
  state: WaterState,
  lastDay: readonly Given[],
  name: Dosed,
): number | null {
  const rates = ratesAsSet(state, state.minute, constants);
  const gain = rates?.gainPerDay[name];
  const litres = volumeAt(constants.facts, state.minute).litres;
  if (!rates || gain === undefined || litres === null || (gain === null && name === "alkalinity"))
    return null;
  return (gain ?? 0) + lastDay.reduce((sum, given) => sum + raised(state, constants, given, name), 0);
}

/** pH and Ω right after the dose, carbon closed. */
function checkPeak(
  system: string,
  constants: SystemConstants,
  state: WaterState,
  given: Given,
): DosingFinding[] {
  const strength = constants.strengthAt(given.solution, given.minute);
  const stale = isStale(state.carried.alkalinity, state.minute);
  if (!strength || stale || ((strength.alkalinityMeq ?? 0) === 0 && (strength.calciumMg ?? 0) === 0))
    return [];
  const water = waterOf(state, constants, null);
  const before = water && afterDelivery(water, strength, 0);
  const after = water && afterDelivery(water, strength, given.litres);
  if (!before || !after) return [];
  const findings: DosingFinding[] = [];
  const { place } = given;
  const { facts } = constants;
  for (const of of ["max", "dose"] as const) {
    const limit = limitAt(facts, "pH", of, "hand", given.minute, null);
    if (!limit) continue;
    const [pHBefore, pHAfter] =
      limit.scale === "total"
        ? [before.carbonate.pHTotal, after.carbonate.pHTotal]
        : [before.carbonate.pHNbs, after.carbonate.pHNbs];
    const broken =
      of === "max"
        ? pHAfter > limit.value && pHAfter > pHBefore
        : pHAfter - pHBefore > limit.value * tolerance;
    if (broken)
      findings.push({
        code: "overdose/ph",
        place,
        system,
        before: pHBefore,
        after: pHAfter,
        limit: limit.value,
        of,
      });
  }
  const { omegaAragonite: omega, pHNbs: pH } = after.carbonate;
  const { info, warning, error } = precipitationGrades;
  // Water that stands so high by itself is no work of the dose.
  const raisedIt = omega > before.carbonate.omegaAragonite;
  const grade =
    omega >= error || pH >= precipitationPh
      ? "error"
      : omega >= warning
        ? "warning"
        : omega >= info
          ? "info"
          : null;
  if (grade && raisedIt) findings.push({ code: "overdose/precipitation", place, system, omega, pH, grade });
  return findings;
}

/** What is set from here on raises the day's mean more than the system allows. */
function checkSet(
  system: string,
  constants: SystemConstants,
  event: Extract<SystemEvent, { kind: "set" | "stopped" | "started" }>,
  state: WaterState,
): DosingFinding[] {
  const turnedOn = event.kind === "set" ? event.rates : [{ source: event.pump, place: event.place }];
  const rates = ratesAsSet(state, state.minute, constants);
  if (!rates) return [];
  const findings: DosingFinding[] = [];
  for (const name of dosed) {
    const gain = rates.gainPerDay[name];
    const limit = limitAt(constants.facts, name, "rise", "pump", event.minute, null);
    if (gain === null || !limit || gain <= limit.value * tolerance) continue;
    const serving = turnedOn.find(({ source }) => {
      const entry = factAt(constants.facts.sources.get(source), event.minute);
      const strength = entry && constants.strengthAt(entry.value.solution, event.minute);
      return strength && (broughtPerLitre(strength, name) ?? 0) > 0;
    });
    if (!serving) continue;
    const unit = shownIn(constants.facts, name, event.minute);
    findings.push({
      code: `overdose/${name}-rise`,
      place: serving.place,
      system,
      parameter: name,
      unit,
      solution: null,
      split: null,
      value: gain,
      limit: limit.value,
      limitStated: limit.place !== null,
    });
  }
  return findings;
}
