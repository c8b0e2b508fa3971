/** The parts of what is told of a value that was read. */
import type { ParameterName } from "../../../grammar/parameters.ts";
import type { ReadItem } from "../../../grammar/syntax.ts";
import { changeFigure, decimalsOf, edgeFigure, figure, valueFigure } from "../../checks/figures.ts";
import { factAt } from "../../culture/history.ts";
import type { DisplayUnit, Kit, ReadEvent, ReadValue } from "../../culture/model.ts";
import type { Assessment } from "../../dosing/assess.ts";
import { temperatureNow } from "../../dosing/dose-chemistry.ts";
import { onScale } from "../../dosing/ph-scale.ts";
import { judgeSalinity } from "../../dosing/salinity-cause.ts";
import { isTracked, type Tracked } from "../../dosing/tracked.ts";
import { uptakeAt } from "../../dosing/uptake.ts";
import { volumeAt } from "../../dosing/volume.ts";
import { isStale, type WaterState } from "../../dosing/water-state.ts";
import { biasOf, biasText } from "./bias.ts";
import { distanceFigure, shortMoment, unitOn } from "./parts.ts";
import { writtenOf } from "./quantity.ts";
import type { Spot } from "./spot.ts";

/** One of several numbers that were read. */
export interface Read {
  readonly name: ParameterName;
  readonly value: ReadValue;
  readonly unit: DisplayUnit;
}

/** As the technician wrote it. */
export const writtenText = (name: ParameterName, { scale }: ReadValue, { value }: ReadItem): string =>
  `${writtenOf(value)}${name === "pH" && scale !== "total" ? " (NBS)" : ""}`;

/** The same, with the value in the unit that the parameter is told in, where that is another. */
export function readText(
  { constants }: Assessment,
  then: WaterState,
  { name, value, unit }: Read,
  item: ReadItem | null,
): string {
  const below = value.below ? "below " : "";
  if (!item) return below + valueFigure(name, value.value, unit);
  const hold = factAt(constants.facts.holds.get(name), then.minute)?.value;
  const scale = hold?.scale ?? value.scale;
  const turned = valueFigure(
    name,
    onScale(value.value, value.scale, scale, then, constants),
    unitOn(scale, unit),
  );
  const own = item.value.unit?.text ?? "";
  const isOther =
    name === "pH"
      ? scale !== value.scale
      : value.unit.spelling !== unit.spelling || (own !== "" && isOtherInstrument(name, own));
  const onNbs = name === "pH" && scale === "NBS" ? " NBS" : "";
  return `${below}${writtenText(name, value, item)}${isOther ? ` (${turned}${onNbs})` : ""}`;
}

/** Salinity and temperature are told in one unit, whatever they were read in. */
const isOtherInstrument = (name: ParameterName, unit: string): boolean =>
  (name === "salinity" && unit !== "ppt") || (name === "temperature" && unit !== "degC");

/** `expected 7.6 dKH, 0.3 dKH more than was read`: the water carried forward to this moment, just before it was read. */
export function expectedText(
  assessment: Assessment,
  before: WaterState,
  { name, value, unit }: Read,
): string | null {
  const carried = isTracked(name) ? before.carried[name] : null;
  if (!isTracked(name) || !carried || value.impossible) return null;
  const unknown = (why: string) => `what to expect can't be told, since ${why}`;
  if (isStale(carried, before.minute))
    return unknown(`the reading before it (${shortMoment(carried.readAt)}) is more than 7 days older`);
  const why = notReckoned(assessment, before, name);
  if (why) return unknown(why);
  const expected = `expected ${valueFigure(name, carried.value, unit)}`;
  if (value.below) return expected;
  const off = value.value - carried.value;
  // Less than a test tells apart is no difference.
  const isSame = Math.abs(off * unit.perModelUnit) < 0.5 * 10 ** -decimalsOf(name, unit);
  return isSame
    ? `${expected}, as was read`
    : `${expected}, ${distanceFigure(name, off, unit)} ${off > 0 ? "less" : "more"} than was read`;
}

/** Why the water wasn't carried forward to a moment; null where it was. */
function notReckoned({ constants }: Assessment, before: WaterState, name: Tracked): string | null {
  const { facts, firstEvent } = constants;
  const { litres } = volumeAt(facts, before.minute);
  if (litres === null) return "the volume of the water isn't known";
  if (name !== "alkalinity" && name !== "calcium" && name !== "magnesium") return null;
  const taken = uptakeAt(facts, before, before.minute, litres, firstEvent).perDay[name];
  return taken === null ? "its uptake isn't known" : null;
}

/** The value at the salinity aim, where salinity is off its hold. */
export function salinityText(
  { constants }: Assessment,
  after: WaterState,
  { name, value, unit }: Read,
): string | null {
  const { minute } = after;
  const band = factAt(constants.facts.holds.get("salinity"), minute)?.value;
  const salinity = after.carried.salinity;
  if (!band || !salinity || isStale(salinity, minute) || name === "salinity" || !isTracked(name)) return null;
  if (value.below || value.impossible) return null;
  const hold = factAt(constants.facts.holds.get(name), minute)?.value ?? { low: 0, high: Infinity, aim: 0 };
  const judged = judgeSalinity(
    value.value,
    hold,
    salinity.value,
    band,
    temperatureNow(after, constants, null),
  );
  return judged
    ? `at the salinity aim (${edgeFigure("salinity", band.aim, band.unit)}) it would be ${valueFigure(name, judged.scaled, unit)}, since salinity was ${valueFigure("salinity", salinity.value, band.unit)}`
    : null;
}

/** A bias that a check of the kit found. */
export function biasLines(
  { farm, model }: Spot,
  { kit: ref, minute }: ReadEvent,
  { name, unit }: Read,
): string[] {
  const kit = ref === null ? undefined : model.kits.get(ref);
  const bias = kit && biasOf(farm, kit, minute).find(({ parameter }) => parameter === name);
  return kit && bias ? [biasText(kit.name, bias, unit)] : [];
}

export function kitLines(spot: Spot, event: ReadEvent, read: Read): string[] {
  const { name, unit } = read;
  const kit: Kit | undefined = event.kit === null ? undefined : spot.model.kits.get(event.kit);
  if (!kit) return [];
  const checked = biasLines(spot, event, read);
  const deviation = factAt(kit.deviations.get(name), event.minute)?.value;
  if (!deviation) return checked;
  const size = deviation.relative
    ? `${figure(100 * deviation.value, "%")}`
    : changeFigure(name, deviation.value, unit);
  return [`Tests with ${kit.name} scatter by ${size} (one standard deviation).`, ...checked];
}
