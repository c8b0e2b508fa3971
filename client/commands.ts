/** What each command does. */
import { commands, Disposable, type ExtensionContext } from "vscode";
import type { CommandName } from "./command-table.ts";
import type { DoseSheets } from "./dose-sheet.ts";
import { explainProblem } from "./explain-problem.ts";
import { recordReading } from "./record-reading.ts";
import type { Server } from "./server.ts";
import { tidyFarm } from "./tidy-farm.ts";
import { writePlan } from "./write-plan.ts";

export function offerCommands(context: ExtensionContext, server: Server, sheets: DoseSheets): Disposable {
  const work: Readonly<Record<CommandName, (...given: readonly unknown[]) => Promise<void>>> = {
    "marl.recordReading": (...given) => recordReading(server, context.globalState, given),
    "marl.writePlan": (...given) => writePlan(server, given),
    "marl.showDoseSheet": (...given) => sheets.show(given),
    "marl.tidyFarm": () => tidyFarm(server),
    "marl.explainProblem": (code) => explainProblem(context, code),
    "marl.restartServer": () => server.restart(),
  };
  return Disposable.from(...Object.entries(work).map(([name, run]) => commands.registerCommand(name, run)));
}
