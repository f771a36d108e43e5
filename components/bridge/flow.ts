import type { InstantReading, LegState } from "@/lib/engine/results";

/** Which way a leg carries the motor current, and what it carries straight through. */
export type LegFlow = {
  side: "high" | "low" | "open";
  isDiode: boolean;
  /** Current from rail to ground past the motor: only with both switches of the leg on. */
  throughA: number;
};
export type Flow = { motorA: number; A: LegFlow; B: LegFlow };

const SIDE_OF: Record<LegState, LegFlow["side"]> = { "high channel": "high", "high diode": "high", "low channel": "low", "low diode": "low", open: "open" };

/** Currents below this are rounding: no solver result of interest is smaller. */
const NO_CURRENT_A = 1e-9;

/**
 * A leg's part of the flow. Upper and lower rail both carrying towards ground is a through current; what is left of them is the motor's, and
 * tells the side it takes, so that a shorted switch is drawn rightly whatever state is named.
 */
function legFlow(state: LegState, topA: number, bottomA: number): LegFlow {
  const throughA = topA > NO_CURRENT_A && bottomA > NO_CURRENT_A ? Math.min(topA, bottomA) : 0;
  const side = throughA === 0 ? SIDE_OF[state] : topA >= bottomA ? "high" : "low";
  return { side, isDiode: state === "high diode" || state === "low diode", throughA };
}

export const flowOf = (reading: InstantReading): Flow => ({
  motorA: reading.motorCurrentA,
  A: legFlow(reading.state.A, reading.topAA, reading.bottomAA),
  B: legFlow(reading.state.B, reading.topBA, reading.bottomBA),
});

export type Route = "driveForward" | "driveReverse" | "returnForward" | "returnReverse" | "low" | "high" | "none";

/** Where the motor current runs: out of the supply, back into it, round the low side, round the high side, or nowhere. */
export function routeOf(flow: Flow): Route {
  const { A, B, motorA } = flow;
  if (A.side === "open" || B.side === "open") return "none";
  if (A.side === B.side) return A.side;
  if (A.side === "high") return motorA >= 0 ? "driveForward" : "returnReverse";
  return motorA <= 0 ? "driveReverse" : "returnForward";
}
