/** What dosing leaves behind: salt that nothing takes up. */
import { minutesPerDay } from "../../grammar/dates.ts";
import { countUpTo } from "../culture/event-order.ts";
import type { System } from "../culture/model.ts";
import { salinityNow } from "./dose-chemistry.ts";
import { ratesAt } from "./fold.ts";
import { type Plan, plannedPhases, type Situation } from "./make-plan.ts";
import { volumeAt } from "./volume.ts";

export interface SaltBalance {
  /** Change of salinity in 30 days of maintenance, exchange counted. */
  readonly salinityGainPerMonth: number;
  /** System water to take out and replace by fresh water, so that salinity stays. */
  readonly freshWaterSwapLPerWeek: number;
}

const daysPerMonth = 30;
const daysPerWeek = 7;

/** Salt gained by maintenance as planned, less what flow-through and the exchanges of the last 30 days carry off. */
export function saltBalance(situation: Situation, system: System, plan: Plan): SaltBalance | null {
  const { constants, state, litres, assumed } = situation;
  // Where what is kept up isn't known, what it leaves behind isn't either.
  if (plan.answer.sources.some(({ totalLPerDay }) => totalLPerDay === null)) return null;
  const last = plannedPhases(situation, plan).at(-1);
  const rates = last && ratesAt(state, state.minute, constants, last.flows);
  if (!rates) return null;
  const salinity = salinityNow(state, constants, assumed);
  const through = rates.exchangePerDay * (rates.incoming.salinity - salinity);
  const gainPerDay =
    (rates.gainPerDay.salinity ?? 0) + through + exchangedPerDay(situation, system, salinity);
  return {
    salinityGainPerMonth: gainPerDay * daysPerMonth,
    freshWaterSwapLPerWeek: salinity > 0 ? Math.max(0, (gainPerDay * daysPerWeek * litres) / salinity) : 0,
  };
}

/** What the logged exchanges of the last 30 days did to salinity, a day. */
function exchangedPerDay({ constants, state }: Situation, system: System, salinity: number): number {
  const since = state.minute - daysPerMonth * minutesPerDay;
  let sum = 0;
  const [first, last] = [since, state.minute].map((minute) => countUpTo(system.events, minute));
  for (const event of system.events.slice(first, last)) {
    if (event.kind !== "renewed") continue;
    const volume = volumeAt(constants.facts, event.minute).litres;
    if (volume === null) continue;
    const incoming = constants.waterAt(event.water, event.minute).values.salinity;
    sum += Math.min(1, event.litres / volume) * (incoming - salinity);
  }
  return sum / daysPerMonth;
}
