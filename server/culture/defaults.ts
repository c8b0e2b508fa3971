/**
 * The one table of defaults: what is taken where the file says nothing. All are common practice without a
 * source, unless one is named. Beside each value stands the text that a technician would write for it.
 */
import { minutesPerDay } from "../../grammar/dates.ts";
import { dKH } from "./display.ts";

export interface Default {
  /** What it stands for in a list of assumptions. */
  readonly what: string;
  readonly value: number;
  /** The value as people write it. */
  readonly text: string;
  readonly basis: string;
}

const practice = "common practice";

const entry = (what: string, value: number, text: string, basis = practice): Default => ({
  what,
  value,
  text,
  basis,
});

/** Limits by parameter and kind, in the model's units. A dose has one for pumps and one for hands. */
export const defaultLimits = {
  "alkalinity rise": entry("alkalinity rise", 0.7 * dKH, "0.7 dKH/day"),
  "alkalinity fall": entry("alkalinity fall", 1.0 * dKH, "1.0 dKH/day"),
  "alkalinity swing": entry("alkalinity swing", 0.5 * dKH, "0.5 dKH"),
  "alkalinity dose by pump": entry("alkalinity dose by pump", 0.2 * dKH, "0.2 dKH"),
  "alkalinity dose by hand": entry("alkalinity dose by hand", 0.5 * dKH, "0.5 dKH"),
  "alkalinity max": entry("alkalinity max", 12 * dKH, "12 dKH"),
  "alkalinity min": entry("alkalinity min", 6 * dKH, "6 dKH"),
  "calcium rise": entry("calcium rise", 25, "25 mg/L/day"),
  "calcium max": entry("calcium max", 500, "500 mg/L"),
  "magnesium rise": entry("magnesium rise", 75, "75 mg/L/day"),
  "magnesium max": entry("magnesium max", 1600, "1600 mg/L"),
  "potassium rise": entry("potassium rise", 15, "15 mg/L/day"),
  "potassium max": entry("potassium max", 480, "480 mg/L"),
  "strontium rise": entry("strontium rise", 1, "1 mg/L/day"),
  "strontium max": entry("strontium max", 14, "14 mg/L"),
  "salinity rise": entry("salinity rise", 0.5, "0.5 a day"),
  "salinity fall": entry("salinity fall", 1, "1.0 a day"),
  "temperature swing": entry("temperature swing", 1.5, "1.5 K"),
  "pH max": entry("pH max", 8.6, "8.6 (NBS)"),
  "pH dose": entry("pH dose", 0.1, "0.1"),
} as const satisfies Record<string, Default>;

export const defaults = {
  salinity: entry("salinity", 35, "35"),
  temperature: entry("temperature", 25, "25 °C"),
  airCarbonDioxide: entry("CO2 of the room's air", 500, "500 ppm"),
  storage: entry("storage temperature", 20, "20 °C"),
  skeletonMagnesium: entry("magnesium in the skeleton", 0.005, "0.5 %", "aragonitic coral, from memory"),
  pumpLeast: entry("smallest dose of a pump", 0.001, "1 mL"),
  handHours: entry("hours of hand doses", 12 * 60, "07:00 to 19:00"),
  pumpHours: entry("hours of a pump", minutesPerDay, "the whole day"),
  pHScale: entry("pH scale", 0, "NBS"),
} as const satisfies Record<string, Default>;

/** CO2 of outdoor air, ppm, for comparison only. Near the global mean of the mid 2020s, from memory. */
export const outdoorAirPpm = 425;
