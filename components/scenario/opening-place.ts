import type { Simulation } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import type { TimeWindow } from "./scenario-state";

const WHOLE_PERIODS = 24;
const BEFORE_PERIODS = 4;
const AFTER_PERIODS = 6;
const MOST_PERIODS = 48;

/**
 * Where the page opens: the whole run if it is short, else from shortly before the command that turns the motor until
 * shortly after its current has passed zero; without a reversal, the last periods. The cursor is on the zero crossing.
 */
export function openingPlace(
  document: ScenarioDocument,
  simulation: Simulation,
): { viewWindow: TimeWindow; cursorS: number; pinS: null } {
  const { durationS } = simulation;
  const periodS = 1 / document.pwm.frequencyHz;
  const turnS = turningTimeS(document);
  const zeroS =
    turnS === null
      ? undefined
      : simulation.events.find((event) => event.kind === "currentZero" && event.timeS > turnS)?.timeS;
  const cursorS = zeroS ?? turnS ?? Math.max(0, durationS - periodS);
  if (durationS <= WHOLE_PERIODS * periodS) return { viewWindow: { fromS: 0, toS: durationS }, cursorS, pinS: null };
  const startS = turnS === null ? durationS - 12 * periodS : turnS - BEFORE_PERIODS * periodS;
  const endS =
    zeroS === undefined || turnS === null ? startS + WHOLE_PERIODS * periodS : zeroS + AFTER_PERIODS * periodS;
  const lengthS = Math.min(endS - startS, MOST_PERIODS * periodS);
  // a slow reversal does not fit with its command: its zero crossing matters more
  const wantedS = zeroS !== undefined && endS - startS > lengthS ? zeroS + AFTER_PERIODS * periodS - lengthS : startS;
  const fromS = Math.max(0, Math.min(wantedS, durationS - lengthS));
  return { viewWindow: { fromS, toS: Math.min(durationS, fromS + lengthS) }, cursorS, pinS: null };
}

/** When the command begins to turn the motor: a step at its point, a ramp at the point before it. */
function turningTimeS(document: ScenarioDocument): number | null {
  let sign = 0;
  let before = 0;
  for (const point of document.command.points) {
    const own = Math.sign(point.duty);
    if (own !== 0 && sign !== 0 && own !== sign) return point.ramp === "linear" ? before : point.timeS;
    if (own !== 0) sign = own;
    before = point.timeS;
  }
  return null;
}
