/** Adds to findings what would mend them now: rates to set, doses to give, water to exchange, a dose to split. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { factAt } from "../culture/history.ts";
import type { FarmModel } from "../culture/model.ts";
import type { Assessment } from "./assess.ts";
import { exchangesFor } from "./exchange.ts";
import type { DosingFinding } from "./finding.ts";
import { ratesAsSet } from "./fold.ts";
import { givenToday } from "./given-today.ts";
import { limitAt } from "./limits.ts";
import { isLimited, isSetByHand, nameToSet } from "./plan-rates.ts";
import { litresSet } from "./rates.ts";
import type { RateToSet, Remedies } from "./remedy.ts";
import { broughtPerLitre, type Dosed, dosed, isTracked } from "./tracked.ts";

/** What a system is like at the moment asked, on a farm with all its solutions and waters. */
type Here = Pick<Assessment, "system" | "at" | "constants" | "state" | "plan" | "findings"> & {
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

/** All that is set of the plan, where any of it is set to something else: the plan as it is written into a log. */
export function planRemedies(model: FarmModel, assessment: Assessment): Remedies {
  const here: Here = { ...assessment, model };
  const set = dosed.map((parameter) => setting(here, parameter).set).find((rates) => rates.length > 0) ?? [];
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
  { model, constants, state, at, findings }: Here,
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
  if (findings.some((each) => each.code === "water/salinity-is-the-cause" && each.parameter === parameter))
    return [];
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

/** All sources of the plan that are set, where one of them gives this parameter and is set to something else. */
function setting({ plan, state }: Here, parameter: OfWater["parameter"]): Pick<Remedies, "set"> {
  const [phase] = plan?.answer.phases ?? [];
  if (!plan || !phase || !isDosed(parameter)) return { set: [] };
  const sources = plan.sources.flatMap((entry, index) => {
    const { key, source, strength } = entry;
    const litresPerDay = phase.litresPerDay[index];
    const isKnown = plan.answer.sources[index]?.totalLPerDay !== null && litresPerDay !== undefined;
    const name = nameToSet(plan, state, entry);
    // A stopped pump stays stopped, whatever it is set to.
    if (name === null || !isKnown || state.stopped.has(key)) return [];
    const setLPerDay = litresSet(state, key, source);
    const serves = (broughtPerLitre(strength, parameter) ?? 0) > 0;
    const rate: RateToSet = { name, litresPerDay, setLPerDay, isLimited: isLimited(plan, strength) };
    return [{ rate, isOff: serves && litresPerDay !== setLPerDay }];
  });
  return { set: sources.some(({ isOff }) => isOff) ? sources.map(({ rate }) => rate) : [] };
}

/** Doses by hand of solutions with this parameter that are given every day and weren't yet on this one. */
function givenByHand({ plan, state, system, at }: Here, parameter: OfWater["parameter"]): Remedies["gave"] {
  if (!plan || !isDosed(parameter)) return [];
  return plan.sources.flatMap(({ key, source, strength }, index) => {
    const planned = plan.answer.sources[index];
    const { solution } = source;
    // What is set counts as given already.
    const isForToday =
      source.device === "hand" &&
      !isSetByHand(state, key, source) &&
      planned !== undefined &&
      planned.totalLPerDay !== null &&
      planned.dosesPerDay === 1 &&
      planned.everyDays === 1 &&
      planned.litresPerDose > 0;
    const serves = (broughtPerLitre(strength, parameter) ?? 0) > 0;
    if (!isForToday || !serves || givenToday({ system, at }, solution)) return [];
    return [{ solution, litres: planned.litresPerDose, isLimited: isLimited(plan, strength) }];
  });
}

/** What is set now still raises it by more than the limit. */
function isPassedNow({ parameter }: OfDose, { constants, state, at }: Here): boolean {
  if (!isDosed(parameter)) return false;
  const gain = ratesAsSet(state, at, constants)?.gainPerDay[parameter] ?? null;
  const limit = limitAt(constants.facts, parameter, "rise", "pump", at, null);
  return gain !== null && limit !== null && gain > limit.value;
}

/** Minutes that writing a dose down takes at most: what was written longer ago has been given. Common practice, no source. */
const beingWritten = 15;

/** A dose that is being written or is one to come, which no other dose of the days to come follows. */
function canSplit({ split, parameter }: OfDose, { constants, system, at }: Here): boolean {
  const first = split?.parts[0]?.minute;
  const last = split?.parts.at(-1)?.minute;
  if (first === undefined || last === undefined || first < at - beingWritten || !isDosed(parameter))
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
