/** The carbonate system of readings: where alkalinity and pH were read within an hour of each other. */
import type { ParameterName } from "../../grammar/parameters.ts";
import { type CarbonateState, fromAlkalinityAndPh, totalFromNbs } from "../chemistry/carbonate-system.ts";
import { constantsAt } from "../chemistry/constants-at.ts";
import { atomicWeight } from "../chemistry/elements.ts";
import { densityKgPerL, seaWaterComposition } from "../chemistry/sea-water.ts";
import { defaults } from "../culture/defaults.ts";
import type { ReadEvent, ReadValue, System } from "../culture/model.ts";
import { nearestKnown, type Seen, seenIn } from "../culture/readings.ts";
import type { Assuming } from "./assumptions.ts";

export interface ReadingWithCarbonate {
  readonly event: ReadEvent;
  /** Null where the entry has no partner, or no sea water is like it. */
  readonly carbonate: { readonly state: CarbonateState; readonly densityKgPerL: number } | null;
}

/** Minutes within which alkalinity and pH count as read of one water. */
const together = 60;

/** All readings up to a minute, in order of time, with their carbonate system in the later of two entries. */
export function readingsUpTo(system: System, at: number, assumed: Assuming): ReadingWithCarbonate[] {
  const reads = system.events.filter(
    (event): event is ReadEvent => event.kind === "read" && event.minute <= at,
  );
  const lookup = {
    salinity: seenIn(reads, "salinity"),
    temperature: seenIn(reads, "temperature"),
    calcium: seenIn(reads, "calcium"),
  };
  return reads.map((event, index) => {
    if (event.disregarded) return { event, carbonate: null };
    const alkalinity = partner(reads, index, "alkalinity");
    const pH = partner(reads, index, "pH");
    const holdsOne = usable(event, "alkalinity") || usable(event, "pH");
    return {
      event,
      carbonate: holdsOne && alkalinity && pH ? solve(event, alkalinity, pH, lookup, assumed) : null,
    };
  });
}

function usable(event: ReadEvent, parameter: ParameterName): ReadValue | null {
  const value = event.values[parameter];
  return value && !event.disregarded && !value.impossible && !value.below ? value : null;
}

/** The value of this entry, else of the nearest one before it within the hour. */
function partner(reads: readonly ReadEvent[], index: number, parameter: ParameterName): ReadValue | null {
  const minute = reads[index]!.minute;
  for (let before = index; before >= 0; before--) {
    const event = reads[before]!;
    if (minute - event.minute > together) return null;
    const value = usable(event, parameter);
    if (value) return value;
  }
  return null;
}

function solve(
  event: ReadEvent,
  alkalinity: ReadValue,
  pH: ReadValue,
  lookup: {
    readonly salinity: readonly Seen[];
    readonly temperature: readonly Seen[];
    readonly calcium: readonly Seen[];
  },
  assumed: Assuming,
): ReadingWithCarbonate["carbonate"] {
  const known = (parameter: "salinity" | "temperature"): number => {
    const own = usable(event, parameter);
    if (own) return own.value;
    const found = nearestKnown(lookup[parameter], event.minute, defaults[parameter].value);
    return found.from === "default" ? assumed.use(defaults[parameter]) : found.value;
  };
  const salinity = known("salinity");
  const temperatureDegC = known("temperature");
  const constants = constantsAt(salinity, temperatureDegC);
  if (!constants.ok) return null;
  const density = densityKgPerL(salinity, temperatureDegC);
  const seaCalcium = seaWaterComposition(salinity).calciumMgPerKg * density;
  const calcium =
    usable(event, "calcium")?.value ?? nearestKnown(lookup.calcium, event.minute, Number.NaN).value;
  if (!Number.isFinite(calcium)) {
    assumed.add({
      what: "calcium, for Ω",
      value: `${seaCalcium.toFixed(0)} mg/L, as in sea water`,
      basis: "Millero et al. 2008",
    });
  }
  if (pH.scale !== "total") assumed.use(defaults.pHScale);
  const state = fromAlkalinityAndPh(
    {
      alkalinityUmolPerKg: (1000 * alkalinity.value) / density,
      pHTotal: pH.scale === "total" ? pH.value : totalFromNbs(pH.value, constants),
    },
    {
      salinity,
      temperatureDegC,
      calciumUmolPerKg:
        (1000 * (Number.isFinite(calcium) ? calcium : seaCalcium)) / atomicWeight.Ca / density,
    },
    constants,
  );
  return state.ok ? { state, densityKgPerL: density } : null;
}
