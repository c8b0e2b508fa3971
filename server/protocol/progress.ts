/** Shows how far a walk is, to a client that draws progress: once it has taken a while, and not at every step. */
import type { Connection, WorkDoneProgressServerReporter } from "vscode-languageserver/node";
import type { Progress } from "../farm.ts";
import type { Client } from "./client.ts";

/** Nobody reads of work that takes less, ms. */
const shownAfter = 300;
/** Nor more often than this. */
const toldEvery = 200;

interface Shown {
  readonly began: number;
  told: number;
  reporter: Promise<WorkDoneProgressServerReporter | null> | null;
}

/** By key, the progress of one piece of work; null ends it. */
export function progressFor(
  connection: Connection,
  client: Pick<Client, "progress">,
  failed: (error: unknown) => void,
): (key: string, progress: Progress | null) => void {
  const all = new Map<string, Shown>();
  const withReporter = (shown: Shown, use: (reporter: WorkDoneProgressServerReporter) => void): void => {
    shown.reporter?.then((reporter) => reporter && use(reporter)).catch(failed);
  };
  return (key, progress) => {
    if (!client.progress) return;
    const now = performance.now();
    if (progress === null) {
      const shown = all.get(key);
      all.delete(key);
      if (shown) withReporter(shown, (reporter) => reporter.done());
      return;
    }
    const shown = all.get(key) ?? { began: now, told: now, reporter: null };
    all.set(key, shown);
    const { done, of, system } = progress;
    // Of one system nobody can say how much of it is done.
    const share = of > 1 ? Math.round((100 * done) / of) : undefined;
    if (shown.reporter === null) {
      if (now - shown.began < shownAfter) return;
      shown.reporter = connection.window.createWorkDoneProgress().catch((error: unknown) => {
        failed(error);
        return null;
      });
      withReporter(shown, (reporter) => reporter.begin("Marl", share, system, false));
      shown.told = now;
    } else if (now - shown.told >= toldEvery) {
      shown.told = now;
      withReporter(shown, (reporter) =>
        share === undefined ? reporter.report(system) : reporter.report(share, system),
      );
    }
  };
}
