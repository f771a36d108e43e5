/**
 * The engine's public list. Pure TypeScript: the same numbers in the worker, in Node and from the API.
 */
import type { ScenarioDocument } from "../scenario/schema";
import type { Simulation } from "./results";
import { Run, type RunOptions } from "./run";

export type * from "./results";
export { TRACE_NAMES } from "./results";
export { figuresWindow, type Run } from "./run";
export { adcCode, lsbV } from "./sensing/converter";

/** A resumable run of a checked document (see `Run`). */
export function createRun(document: ScenarioDocument, options: RunOptions = {}): Run {
  return new Run(document, options);
}

/**
 * Simulates a checked scenario document from start to end.
 * @param document as `parseScenario` returns it; anything else may give numbers without meaning
 * @param options.at instants in s, 0 to the run's duration, any order: readings after the events of that instant
 * @throws RangeError when an instant lies outside the run
 * Accuracy: state within 1e-6, outputs within 1e-4 of full scale (model.md section 8); deterministic.
 */
export function simulate(document: ScenarioDocument, options: { at?: readonly number[] } = {}): Simulation {
  for (const timeS of options.at ?? []) {
    if (!(timeS >= 0 && timeS <= document.run.durationS)) throw new RangeError(`at: ${timeS} s lies outside the run, 0 to ${document.run.durationS} s`);
  }
  const run = new Run(document, { at: options.at });
  while (!run.advance(4096)) continue;
  return run.finish();
}
