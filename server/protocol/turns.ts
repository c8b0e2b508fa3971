/** Long answers: worked out in slices, so that other messages are heard meanwhile, a cancel among them. */
import type { CancellationToken } from "vscode-languageserver/node";
import { longestSlice, turn } from "./farm-walk.ts";
import { stopIfCancelled } from "./session.ts";

/** Does work that can be interrupted; stops where the client has lost interest. */
export async function inTurns<T>(steps: Generator<unknown, T>, token: CancellationToken): Promise<T> {
  let began = performance.now();
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    if (performance.now() - began < longestSlice) continue;
    await turn();
    stopIfCancelled(token);
    began = performance.now();
  }
}
