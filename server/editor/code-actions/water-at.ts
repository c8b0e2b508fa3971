/** The density that turns what is for a litre into what is for a kilogram, as it counts for a line. */
import { defaultWater, densityOf, type ReferenceWater } from "../../culture/binder.ts";
import { countUpTo } from "../../culture/event-order.ts";
import type { System, SystemEvent } from "../../culture/model.ts";
import { nearestKnown, type Seen, seenIn } from "../../culture/readings.ts";
import type { Farm } from "../../farm.ts";
import type { LineInFarm } from "../cursor.ts";
import { systemOfLine } from "../things.ts";

/** kg/L, of the water that a line speaks of. */
export function densityAt(farm: Farm, line: LineInFarm): number {
  const system = systemOfLine(farm, line);
  if (!system) return densityOf(saltWaterOf(farm, line));
  return densityOf(line.section?.kind === "log" ? waterThen(system, line) : aimedAt(system));
}

/** A salt water as it is declared; elsewhere the default sea water. */
function saltWaterOf(farm: Farm, { file, section }: LineInFarm): ReferenceWater {
  if (section?.kind !== "saltwater" || !section.name) return defaultWater;
  const seen = farm.bound.names.visible.get(file)?.get(section.name.text);
  const values = farm.bound.model.waters.get(seen?.ref ?? "")?.values;
  return {
    salinity: values?.get("salinity")?.at(-1)?.value ?? defaultWater.salinity,
    temperatureDegC: values?.get("temperature")?.at(-1)?.value ?? defaultWater.temperatureDegC,
  };
}

/** What a band or limit for a kilogram is turned with. */
const aimedAt = ({ facts: { holds } }: System): ReferenceWater => ({
  salinity: holds.get("salinity")?.at(-1)?.value.aim ?? defaultWater.salinity,
  temperatureDegC: holds.get("temperature")?.at(-1)?.value.aim ?? defaultWater.temperatureDegC,
});

/** What a reading is turned with: its own line's salinity and temperature, else those nearest in time. */
function waterThen({ events }: System, { file, number, line }: LineInFarm): ReferenceWater {
  const statement = line.statement;
  const minute = statement && "at" in statement ? statement.at.minute : 0;
  const next = countUpTo(events, minute);
  const known = (parameter: "salinity" | "temperature", byDefault: number): number => {
    const own = ownValue(events, next, minute, { file, line: number }, parameter);
    if (own !== null) return own;
    // The nearest on either side are all that counts, and are near in a log that is kept.
    const around = [seenFrom(events, next - 1, -1, parameter), seenFrom(events, next, 1, parameter)];
    return nearestKnown(around.flat(), minute, byDefault).value;
  };
  return {
    salinity: known("salinity", defaultWater.salinity),
    temperatureDegC: known("temperature", defaultWater.temperatureDegC),
  };
}

function ownValue(
  events: readonly SystemEvent[],
  next: number,
  minute: number,
  place: { readonly file: string; readonly line: number },
  parameter: "salinity" | "temperature",
): number | null {
  for (let index = next - 1; index >= 0 && events[index]!.minute === minute; index -= 1) {
    const event = events[index]!;
    if (event.kind !== "read" || event.place.file !== place.file || event.place.line !== place.line) continue;
    const value = event.values[parameter];
    return value && !value.impossible ? value.value : null;
  }
  return null;
}

/** The first value that counts from here on, in one direction. */
function seenFrom(
  events: readonly SystemEvent[],
  start: number,
  step: 1 | -1,
  parameter: "salinity" | "temperature",
): Seen[] {
  for (let index = start; index >= 0 && index < events.length; index += step) {
    const event = events[index]!;
    const seen = event.kind === "read" ? seenIn([event], parameter) : [];
    if (seen.length > 0) return seen;
  }
  return [];
}
