/** The logs of the example farm, as they are committed: path in `examples/` → text. */
import { lagoon } from "./lagoon.ts";
import { raceways } from "./raceways.ts";
import { type Simulation, simulate } from "./simulate.ts";
import type { Truth } from "./truth.ts";
import { writeLog } from "./write-log.ts";

export interface ExampleLog {
  readonly path: string;
  readonly truth: Truth;
  readonly simulation: Simulation;
  readonly text: string;
}

function exampleLog(truth: Truth, seed: number, firstLine: string): ExampleLog {
  const simulation = simulate(truth, seed);
  const text = writeLog(simulation.events, {
    system: truth.system,
    uses: "system.marl",
    remarks: [firstLine, "Invented day by day from a truth known to the tests: npm run examples."],
  });
  return { path: `${truth.system}/log.marl`, truth, simulation, text };
}

/**
 * The seeds are chosen so that the last morning is worth looking at: alkalinity of the raceways a little under its
 * aim and falling, the lagoon at ease. So the very last tests are no fair sample of how far tests err.
 */
export const exampleLogs = (): readonly ExampleLog[] => [
  exampleLog(raceways, 76, "Day book of the raceways."),
  exampleLog(lagoon, 35, "Day book of the lagoon."),
];
