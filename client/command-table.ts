/** The commands of the extension: their names, what people see, and when they can be used. No VS Code in here. */

export interface CommandRow {
  readonly id: string;
  /** Shown behind the category. */
  readonly title: string;
  readonly icon?: string;
  readonly enablement: string;
}

/** Under which all of them stand. */
export const category = "Marl";

const inMarl = "editorLangId == marl";

/** True once the extension has started its server. */
export const startedContext = "marl.hasStarted";

export const commandTable = [
  {
    id: "marl.recordReading",
    title: "Record a Reading",
    icon: "$(edit)",
    enablement: inMarl,
  },
  {
    id: "marl.writePlan",
    title: "Write Today's Plan into the Log",
    enablement: inMarl,
  },
  {
    id: "marl.showDoseSheet",
    title: "Show the Dose Sheet",
    icon: "$(open-preview)",
    enablement: inMarl,
  },
  { id: "marl.tidyFarm", title: "Tidy the Farm", enablement: inMarl },
  { id: "marl.explainProblem", title: "Explain This Problem", enablement: inMarl },
  { id: "marl.restartServer", title: "Restart the Server", enablement: startedContext },
] as const satisfies readonly CommandRow[];

export type CommandName = (typeof commandTable)[number]["id"];

export const commandNames: readonly CommandName[] = commandTable.map(({ id }) => id);
