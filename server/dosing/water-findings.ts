/** What is wrong with the water now, and what soon will be. */

import { minutesPerDay } from "../../grammar/dates.ts";
import { parameterTable } from "../../grammar/parameters.ts";
import { pco2OfAir } from "../chemistry/carbon-before.ts";
import { fromAlkalinityAndPco2 } from "../chemistry/carbonate-system.ts";
import { constantsAt } from "../chemistry/constants-at.ts";
import { outdoorAirPpm } from "../culture/defaults.ts";
import { shownIn } from "../culture/display.ts";
import { factAt } from "../culture/history.ts";
import type { Hold, ReadValue, System } from "../culture/model.ts";
import type { ReadingWithCarbonate } from "./carbonate-of-reading.ts";
import type { SystemConstants } from "./constants.ts";
import { salinityNow, temperatureNow } from "./dose-chemistry.ts";
import type { DosingFinding } from "./finding.ts";
import { limitAt } from "./limits.ts";
import type { Plan } from "./make-plan.ts";
import { onScale } from "./ph-scale.ts";
import { isLimited, nameToSet } from "./plan-rates.ts";
import type { Drift } from "./projection.ts";
import { flowsSet, litresSet, topOffFlow } from "./rates.ts";
import { judgeSalinity } from "./salinity-cause.ts";
import { broughtPerLitre, dosed, isTracked, type Tracked } from "./tracked.ts";
import type { Uptake } from "./uptake.ts";
import { carriedMinutes, isStale, type WaterState } from "./water-state.ts";

export interface WaterSeen {
  readonly system: System;
  readonly at: number;
  readonly constants: SystemConstants;
  readonly state: WaterState;
  readonly readings: readonly ReadingWithCarbonate[];
  readonly staleParameters: readonly Tracked[];
  readonly drifts: readonly Drift[];
  readonly plan: Plan | null;
  readonly uptake: Uptake | null;
  readonly volume: { readonly litres: number | null };
}

export function waterFindings(seen: WaterSeen): DosingFinding[] {
  return [
    ...outsideHold(seen),
    ...beyondLimit(seen),
    ...leavesHold(seen),
    ...salinityCause(seen),
    ...roomAir(seen),
    ...stale(seen),
  ];
}

const holdOf = ({ constants, at }: WaterSeen, name: Hold["parameter"]) =>
  factAt(constants.facts.holds.get(name), at);

/** The value now of what isn't stale: carried for what is dosed, as last read for the rest. */
function valueNow(
  seen: WaterSeen,
  name: Hold["parameter"],
): { readonly value: number; readonly reading: ReadValue } | null {
  const { state, at } = seen;
  if (isTracked(name)) {
    const carried = state.carried[name];
    return carried && !isStale(carried, at) ? carried : null;
  }
  if (name === "pH") {
    const { pH } = state;
    return pH && at - pH.minute <= carriedMinutes ? { value: pH.reading.value, reading: pH.reading } : null;
  }
  return lastRead(seen, name);
}

/** A value that stands on an edge is inside, whatever the last bits of its conversion say. */
const slack = (edge: number): number => Math.abs(edge) * 1e-9;

/** Where to point: at the reading that shows it, else at the hold that the carried value has left. */
function outsideHold(seen: WaterSeen): DosingFinding[] {
  return [...seen.constants.facts.holds.keys()].flatMap((parameter): DosingFinding[] => {
    const hold = holdOf(seen, parameter);
    const now = valueNow(seen, parameter);
    if (!hold || !now) return [];
    const { low, high, scale, unit } = hold.value;
    const on = (value: number) => onScale(value, now.reading.scale, scale, seen.state, seen.constants);
    const value = on(now.value);
    if (value >= low - slack(low) && value <= high + slack(high)) return [];
    const read = on(now.reading.value);
    const place = read < low || read > high ? now.reading.place : hold.place;
    return [
      {
        code: "water/outside-hold",
        place,
        system: seen.system.name,
        parameter,
        unit,
        value,
        read,
        low,
        high,
      },
    ];
  });
}

function lastRead({ readings, at }: WaterSeen, parameter: Hold["parameter"]) {
  for (let index = readings.length - 1; index >= 0; index -= 1) {
    const { minute, values, disregarded } = readings[index]!.event;
    if (at - minute > carriedMinutes) return null;
    const reading = values[parameter];
    if (reading && !disregarded && !reading.impossible && !reading.below)
      return { value: reading.value, reading };
  }
  return null;
}

function beyondLimit(seen: WaterSeen): DosingFinding[] {
  return parameterTable.flatMap(({ name: parameter }) =>
    (["max", "min"] as const).flatMap((which): DosingFinding[] => {
      // An old reading above `max` still counts until another says that it has come down.
      const old = which === "max" && isTracked(parameter) ? seen.state.carried[parameter] : null;
      const now = valueNow(seen, parameter) ?? old;
      const limit = now && limitAt(seen.constants.facts, parameter, which, "pump", seen.at, null);
      if (!now || !limit) return [];
      const on = (each: number) => onScale(each, now.reading.scale, limit.scale, seen.state, seen.constants);
      const value = on(now.value);
      const read = on(now.reading.value);
      // Reckoned below `min` from a reading that wasn't is no test: that it has left its hold is told anyway.
      const broken =
        which === "max"
          ? value > limit.value + slack(limit.value)
          : Math.max(value, read) < limit.value - slack(limit.value);
      if (!broken) return [];
      const pHUnit = { spelling: limit.scale === "total" ? "total" : "", perModelUnit: 1 };
      const unit =
        parameter === "pH" ? pHUnit : shownIn(seen.constants.facts, parameter, seen.at, now.reading);
      const { place } = now.reading;
      return [
        {
          code: "water/beyond-limit",
          place,
          system: seen.system.name,
          parameter,
          unit,
          which,
          value,
          read,
          limit: limit.value,
        },
      ];
    }),
  );
}

/** Days ahead within which leaving the band is a warning, and a note. */
const soonDays = 3;
const noteDays = 7;

function leavesHold(seen: WaterSeen): DosingFinding[] {
  return seen.drifts.flatMap((drift): DosingFinding[] => {
    const { parameter, hold, leavesAt } = drift;
    if (
      drift.case !== "as-set" ||
      leavesAt === null ||
      leavesAt <= seen.at ||
      seen.staleParameters.includes(parameter)
    )
      return [];
    const days = (leavesAt - seen.at) / minutesPerDay;
    const place = holdOf(seen, parameter)?.place;
    if (days > noteDays || !place) return [];
    const value = drift.points.find(({ minute }) => minute >= leavesAt)?.value ?? hold.low;
    const edge = value <= hold.low || value < (hold.low + hold.high) / 2 ? hold.low : hold.high;
    return [
      {
        code: days <= soonDays ? "water/leaves-hold-soon" : "water/leaves-hold",
        place,
        system: seen.system.name,
        parameter,
        unit: hold.unit,
        at: leavesAt,
        edge,
        takenPerDay: takenPerDay(seen, parameter),
        dosedPerDay: dosedPerDay(seen, parameter),
        planned: plannedFor(seen, parameter),
      },
    ];
  });
}

function takenPerDay({ uptake, volume }: WaterSeen, parameter: Tracked): number | null {
  const taken = parameter === "salinity" ? null : (uptake?.perDay[parameter] ?? null);
  return taken === null || volume.litres === null ? null : taken / volume.litres;
}

function dosedPerDay({ constants, state, at, volume }: WaterSeen, parameter: Tracked): number {
  const topOff = topOffFlow(constants, at);
  const flows = [...flowsSet(constants, state, at), ...(topOff ? [topOff] : [])];
  const brought = flows.reduce((sum, { solution, litresPerDay }) => {
    const strength = constants.strengthAt(solution, at);
    return sum + litresPerDay * ((strength && broughtPerLitre(strength, parameter)) ?? 0);
  }, 0);
  return volume.litres === null ? 0 : brought / volume.litres;
}

function plannedFor({ plan, state }: WaterSeen, parameter: Tracked) {
  if (!plan || parameter === "salinity") return [];
  return plan.sources.flatMap((entry, index) => {
    const { key, source, strength } = entry;
    const litresPerDay = plan.answer.sources[index]?.totalLPerDay ?? null;
    const serves = (broughtPerLitre(strength, parameter) ?? 0) > 0;
    if (!serves || litresPerDay === null || (litresPerDay === 0 && litresSet(state, key, source) === 0))
      return [];
    const set = nameToSet(plan, state, entry);
    return [{ set, solution: source.solution, litresPerDay, isLimited: isLimited(plan, strength) }];
  });
}

function salinityCause(seen: WaterSeen): DosingFinding[] {
  const salinityHold = holdOf(seen, "salinity")?.value;
  const salinity = valueNow(seen, "salinity");
  if (!salinityHold || !salinity) return [];
  return dosed.flatMap((parameter): DosingFinding[] => {
    const hold = holdOf(seen, parameter);
    const now = valueNow(seen, parameter);
    if (!hold || !now) return [];
    const temperature = temperatureNow(seen.state, seen.constants, null);
    const judgement = judgeSalinity(now.value, hold.value, salinity.value, salinityHold, temperature);
    if (!judgement || !(judgement.isTheCause || judgement.hidesIt)) return [];
    return [
      {
        code: "water/salinity-is-the-cause",
        place: now.reading.place,
        system: seen.system.name,
        parameter,
        unit: hold.value.unit,
        value: now.value,
        scaled: judgement.scaled,
        salinity: salinity.value,
        salinityAim: salinityHold.aim,
        hidden: judgement.hidesIt,
      },
    ];
  });
}

/** More CO2 in the water than balance with outdoor air explains, by this factor, is called high. */
const highCarbonDioxide = 1.15;

/**
 * A pH under its band with much CO2 in the water is a matter of ventilation, where the room's air is stated:
 * which pH this alkalinity would have in balance with the room's air and with outdoor air.
 */
function roomAir(seen: WaterSeen): DosingFinding[] {
  const air = factAt(seen.constants.facts.air, seen.at)?.value;
  const hold = holdOf(seen, "pH")?.value;
  const latest = seen.readings.findLast(({ carbonate }) => carbonate !== null);
  if (!air || !hold || !latest?.carbonate || seen.at - latest.event.minute > carriedMinutes) return [];
  const { state } = latest.carbonate;
  const salinity = salinityNow(seen.state, seen.constants, null);
  const temperature = temperatureNow(seen.state, seen.constants, null);
  const constants = constantsAt(salinity, temperature);
  if (!constants.ok) return [];
  const pHOf = ({ pHNbs, pHTotal }: { pHNbs: number; pHTotal: number }) =>
    hold.scale === "total" ? pHTotal : pHNbs;
  const roomUatm = air.unit === "ppm" ? pco2OfAir(air.value, constants) : air.value;
  const outdoorUatm = pco2OfAir(outdoorAirPpm, constants);
  if (pHOf(state) >= hold.low || state.pCO2Uatm < outdoorUatm * highCarbonDioxide) return [];
  const balanced = (pCO2Uatm: number) =>
    fromAlkalinityAndPco2(
      { alkalinityUmolPerKg: state.alkalinityUmolPerKg, pCO2Uatm },
      { salinity, temperatureDegC: temperature, calciumUmolPerKg: 0 },
      constants,
    );
  const room = balanced(roomUatm);
  const outdoor = balanced(outdoorUatm);
  if (!room.ok || !outdoor.ok) return [];
  const place = latest.event.values.pH?.place ?? latest.event.place;
  const roomPpm = air.unit === "ppm" ? air.value : air.value / constants.dryAirShare;
  return [
    {
      code: "water/room-air",
      place,
      system: seen.system.name,
      pH: pHOf(state),
      pCO2Uatm: state.pCO2Uatm,
      roomPpm,
      pHWithRoom: pHOf(room),
      pHWithOutdoor: pHOf(outdoor),
    },
  ];
}

/** A system that is only being written down, without any log yet, isn't asked for tests. */
function stale(seen: WaterSeen): DosingFinding[] {
  const hasLog = seen.system.events.some(({ minute }) => minute <= seen.at);
  if (seen.staleParameters.length === 0 || !hasLog) return [];
  const parameters = seen.staleParameters.map((name) => ({
    name,
    readAt: seen.state.carried[name]?.readAt ?? null,
  }));
  return [{ code: "water/stale", place: seen.system.place, system: seen.system.name, parameters }];
}
