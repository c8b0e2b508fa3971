/** A pH on another scale, in the water of a state. */
import { constantsAt } from "../chemistry/constants-at.ts";
import type { ReadValue } from "../culture/model.ts";
import type { SystemConstants } from "./constants.ts";
import { salinityNow, temperatureNow } from "./dose-chemistry.ts";
import type { WaterState } from "./water-state.ts";

export type Scale = ReadValue["scale"];

/** What has no scale stays as it is. */
export function onScale(
  value: number,
  from: Scale,
  to: Scale,
  state: WaterState,
  constants: SystemConstants,
): number {
  if (!from || !to || from === to) return value;
  const water = constantsAt(salinityNow(state, constants, null), temperatureNow(state, constants, null));
  if (!water.ok) return value;
  return to === "NBS" ? value + water.nbsLessTotal : value - water.nbsLessTotal;
}
