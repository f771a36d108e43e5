import { gateDrive } from "./template-parts";
import type { ScenarioDocument } from "./schema";

/** The document that a new scenario starts with when no template is chosen: the gate drive, running forward. */
export const defaultDocument = (): ScenarioDocument => ({ ...gateDrive(), title: "New scenario" });

/** A short run with a reversal in it: what a worker computes once when it loads, so that the first real run is fast (D-59). */
export const WARM_UP_DOCUMENT: ScenarioDocument = (() => {
  const document = gateDrive();
  document.command.points.push({ timeS: 0.001, duty: -0.3, ramp: "step" });
  return { ...document, title: "Warm-up", run: { durationS: 0.004 } };
})();
