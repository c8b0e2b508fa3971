/** How a system's state is told in the status bar. No VS Code in here. */
import type { StateAnswer } from "../server/protocol/requests.ts";

const icons = { error: "$(error)", warning: "$(warning)", none: "$(check)" } as const;

const counted = (count: number, word: string): string => `${count} ${word}${count === 1 ? "" : "s"}`;

/** `1 error`, `2 warnings`; errors hide warnings. */
export function stateWords({ worst, errors, warnings }: StateAnswer): string {
  if (worst === "error") return counted(errors, "error");
  return worst === "warning" ? counted(warnings, "warning") : "in order";
}

const clockOf = (moment: string): string => moment.slice("2026-12-01 ".length);

/** `$(warning) raceways: 1 warning, 08:00`. */
export const barText = (state: StateAnswer): string =>
  `${icons[state.worst ?? "none"]} ${state.name}: ${stateWords(state)}, ${clockOf(state.asAt)}`;

/** The same for who hears the screen. */
export const barLabel = (state: StateAnswer): string =>
  `Marl: ${state.name}: ${stateWords(state)}, as at ${state.asAt}`;

/** What the pointer over the item tells: the worst, the doses, and how old all this is. */
export function barTooltip({ message, doses, asAt, lastRead }: StateAnswer): string {
  const read = lastRead === null ? "the water was never read" : `the water was last read at ${lastRead}`;
  const rows = [message, doses, `As at ${asAt}; ${read}.`, "Click for the dose sheet."];
  return rows.filter((row) => row !== null).join("\n\n");
}
