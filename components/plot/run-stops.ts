import type { Simulation, View } from "@/lib/engine/results";
import { mergeEvents } from "./event-rows";
import { milestonesOf } from "./milestones";
import type { SensingFacts } from "./sensing-facts";
import type { StepStops } from "./steps";

/** Where steps stop in this run; events outside the visible window are those the run keeps (the first 200 of each kind). */
export function runStops(simulation: Simulation, view: View, facts: SensingFacts): StepStops {
  const times = mergeEvents(simulation.events, view.events).map((event) => event.timeS);
  return {
    events: times.filter((timeS, index) => index === 0 || timeS > times[index - 1]! + facts.instantS),
    milestones: milestonesOf(simulation).map((mark) => mark.timeS),
    samples: facts.samples,
    periodS: facts.periodS,
    instantS: facts.instantS,
    durationS: simulation.durationS,
  };
}
