/** Adds to findings what would mend them now: rates to set, doses to give, water to exchange, a dose to split. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { factAt } from "../culture/history.ts";
import type { FarmModel, Strength } from "../culture/model.ts";
import type { Assessment } from "./assess.ts";
import { exchangesFor } from "./exchange.ts";
import type { DosingFinding } from "./finding.ts";
import { ratesAsSet } from "./fold.ts";
import { limitAt } from "./limits.ts";
import type { Plan } from "./make-plan.ts";
import { litresSet } from "./rates.ts";
import type { PumpRate, Remedies } from "./remedy.ts";
import { broughtPerLitre, type Dosed, dosed, isTracked } from "./tracked.ts";

/** What a system is like at the moment asked, on a farm with all its solutions and waters. */
type Here = Pick<Assessment, "system" | "at" | "constants" | "state" | "plan"> & {
  readonly model: FarmModel;
};

type OfWater = Extract<
  DosingFinding,
  { code: "water/outside-hold" | "water/leaves-hold" | "water/leaves-hold-soon" | "water/beyond-limit" }
>;
type OfPlan = Extract<DosingFinding, { perDay: number | null }>;
type OfDose = Extract<DosingFinding, { split: unknown }>;

const isOfWater = (finding: DosingFinding): finding is OfWater =>
  finding.code === "water/outside-hold" ||
  finding.code === "water/leaves-hold" ||
  finding.code === "water/leaves-hold-soon" ||
  finding.code === "water/beyond-limit";
const isOfDose = (finding: DosingFinding): finding is OfDose => "split" in finding;
const isDosed = (name: string): name is Dosed => (dosed as readonly string[]).includes(name);

/** What was found of a system, with what would mend those findings that something can be done about now. */
export function withRemedies(model: FarmModel, assessment: Assessment): DosingFinding[] {
  const { findings } = assessment;
  const here: Here = { ...assessment, model };
  // Of rates set too high only the newest can be in force.
  const newest = new Map<string, DosingFinding>();
  for (const finding of findings)
    if (isOfDose(finding) && finding.solution === null) newest.set(finding.code, finding);
  return findings.map((finding): DosingFinding => {
    if (finding.code === "plan/no-source") return { ...finding, solutions: solutionsWith(finding, here) };
    if (isOfWater(finding)) return { ...finding, remedies: ofWater(finding, here) };
    if (!isOfDose(finding)) return finding;
    if (newest.get(finding.code) === finding && isPassedNow(finding, here))
      return { ...finding, remedies: { ...nothing(here), ...setting(here, finding.parameter) } };
    return finding.split && !canSplit(finding, here) ? { ...finding, split: null } : finding;
  });
}

/** All pumps of the plan, where any of them is set to something else: the plan as it is written into a log. */
export function planRemedies(model: FarmModel, assessment: Assessment): Remedies {
  const here: Here = { ...assessment, model };
  const set = dosed.map((parameter) => setting(here, parameter).set).find((pumps) => pumps.length > 0) ?? [];
  return { ...nothing(here), set };
}

function ofWater(finding: OfWater, here: Here): Remedies {
  const { parameter } = finding;
  const none = nothing(here);
  if (!isTracked(parameter)) return none;
  const asPlanned = { ...setting(here, parameter), gave: givenByHand(here, parameter) };
  if (!("value" in finding)) return { ...none, ...asPlanned };
  const isPlanned =
    here.plan !== null &&
    [...here.plan.answer.corrections, ...here.plan.answer.cuts].some((part) => part.parameter === parameter);
  if (finding.code === "water/outside-hold" && isPlanned) return { ...none, ...asPlanned };
  return { ...none, exchanges: exchangesAgainst(finding, here) };
}

/** Water to exchange against a value that is too high, or a salinity that is too low. */
function exchangesAgainst(
  finding: Extract<OfWater, { value: number }>,
  { model, constants, state, at }: Here,
): Remedies["exchanges"] {
  const { parameter, value } = finding;
  if (!isTracked(parameter)) return [];
  const edge =
    finding.code === "water/outside-hold"
      ? value > finding.high
        ? finding.high
        : finding.low
      : finding.limit;
  if (value < edge && parameter !== "salinity") return [];
  const hold = factAt(constants.facts.holds.get(parameter), at)?.value;
  const ofHold = hold ? [hold.aim, value > edge ? hold.high : hold.low] : [];
  return exchangesFor({ model, constants, state, parameter, targets: [...ofHold, edge] });
}

/** The farm's solutions that hold what nothing of the system gives, by reference. */
function solutionsWith({ parameter }: OfPlan, { model, at }: Here): string[] {
  if (!isTracked(parameter)) return [];
  return [...model.solutions.values()].flatMap(({ ref, strengths }) => {
    const strength = factAt(strengths, at)?.value;
    return strength && (broughtPerLitre(strength, parameter) ?? 0) > 0 ? [ref] : [];
  });
}

function nothing({ system, at }: Here): Remedies {
  const { events } = system;
  // What arrives from another system stands in that one's log.
  const before = events.findLast(({ minute, kind }) => minute <= at && kind !== "stocked");
  const newest = (before ?? events.find(({ kind }) => kind !== "stocked"))?.place ?? null;
  return { at, newest, set: [], gave: [], exchanges: [] };
}

/** All pumps of the plan, where one of them gives this parameter and is set to something else. */
function setting({ plan, state }: Here, parameter: OfWater["parameter"]): Pick<Remedies, "set"> {
  const [phase] = plan?.answer.phases ?? [];
  if (!plan || !phase || !isDosed(parameter)) return { set: [] };
  const pumps = plan.sources.flatMap(({ key, source, strength }, index) => {
    const litresPerDay = phase.litresPerDay[index];
    const isKnown = plan.answer.sources[index]?.totalLPerDay !== null && litresPerDay !== undefined;
    // A stopped pump stays stopped, whatever it is set to.
    if (source.device !== "pump" || !isKnown || state.stopped.has(key)) return [];
    const setLPerDay = litresSet(state, key, source);
    const serves = (broughtPerLitre(strength, parameter) ?? 0) > 0;
    const rate: PumpRate = {
      pump: source.by,
      ...{ litresPerDay, setLPerDay, isLimited: isLimited(plan, strength) },
    };
    return [{ rate, isOff: serves && litresPerDay !== setLPerDay }];
  });
  return { set: pumps.some(({ isOff }) => isOff) ? pumps.map(({ rate }) => rate) : [] };
}

/** A limit held down what is given of a parameter that this solution brings. */
function isLimited({ answer }: Plan, strength: Strength): boolean {
  const held = answer.corrections.filter(({ limitedBy }) => limitedBy !== null);
  // Without a correction it is maintenance that a limit held down, of whatever.
  if (held.length === 0) return answer.limitedBy !== null;
  return held.some(
    ({ parameter }) => isTracked(parameter) && (broughtPerLitre(strength, parameter) ?? 0) > 0,
  );
}

/** Doses by hand of solutions with this parameter that are given every day and weren't yet on this one. */
function givenByHand({ plan, system, at }: Here, parameter: OfWater["parameter"]): Remedies["gave"] {
  if (!plan || !isDosed(parameter)) return [];
  const midnight = Math.floor(at / minutesPerDay) * minutesPerDay;
  const today = new Set<string>();
  for (let index = system.events.length - 1; index >= 0; index -= 1) {
    const event = system.events[index]!;
    if (event.minute < midnight) break;
    if (event.kind === "gave") for (const { solution } of event.doses) today.add(solution);
  }
  return plan.sources.flatMap(({ source, strength }, index) => {
    const planned = plan.answer.sources[index];
    const isForToday =
      source.device === "hand" &&
      planned !== undefined &&
      planned.totalLPerDay !== null &&
      planned.dosesPerDay === 1 &&
      planned.everyDays === 1 &&
      planned.litresPerDose > 0;
    if (!isForToday || today.has(source.solution) || (broughtPerLitre(strength, parameter) ?? 0) <= 0)
      return [];
    return [
      { solution: source.solution, litres: planned.litresPerDose, isLimited: isLimited(plan, strength) },
    ];
  });
}

/** What is set now still raises it by more than the limit. */
function isPassedNow({ parameter }: OfDose, { constants, state, at }: Here): boolean {
  if (!isDosed(parameter)) return false;
  const gain = ratesAsSet(state, at, constants)?.gainPerDay[parameter] ?? null;
  const limit = limitAt(constants.facts, parameter, "rise", "pump", at, null);
  return gain !== null && limit !== null && gain > limit.value;
}

/** A dose of the last 24 hours or of one to come, which no other dose of the days to come follows. */
function canSplit({ split, parameter }: OfDose, { constants, system, at }: Here): boolean {
  const first = split?.parts[0]?.minute;
  const last = split?.parts.at(-1)?.minute;
  if (first === undefined || last === undefined || first < at - minutesPerDay || !isDosed(parameter))
    return false;
  if (split?.over === "day") return true;
  const since = system.events.findLastIndex(({ minute }) => minute <= first) + 1;
  return !system.events.slice(since).some((event) => {
    if (event.minute <= first || event.minute >= last + minutesPerDay) return false;
    const solutions =
      event.kind === "gave"
        ? event.doses.map(({ solution }) => solution)
        : event.kind === "topped"
          ? [event.solution]
          : [];
    return solutions.some((solution) => {
      const strength = solution === null ? null : constants.strengthAt(solution, event.minute);
      return strength !== null && (broughtPerLitre(strength, parameter) ?? 0) > 0;
    });
  });
}
