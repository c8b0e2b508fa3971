/** What a dose sheet's address holds: which system of which document it is of. No VS Code in here. */
import type { OfSystem } from "../server/protocol/requests.ts";

export const sheetScheme = "marl-sheet";

/** A language of its own, so that it can look like a sheet and not like code. */
export const sheetLanguage = "marl-sheet";

export interface SheetPlace extends OfSystem {
  readonly name: string;
}

/** The parts of an address; the path is what a tab shows. */
export const addressOf = ({ uri, system, name }: SheetPlace) => ({
  scheme: sheetScheme,
  path: `/Dose sheet of ${name}`,
  query: JSON.stringify({ uri, system, name }),
});

/** The place that an address names; null for an address that is none of these. */
export function placeOf(query: string): SheetPlace | null {
  try {
    const { uri, system, name } = JSON.parse(query) as Partial<Record<keyof SheetPlace, unknown>>;
    return typeof uri === "string" && typeof system === "string" && typeof name === "string"
      ? { uri, system, name }
      : null;
  } catch {
    return null;
  }
}
