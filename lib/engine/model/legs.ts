import type { LegState } from "../results";

/**
 * Signs of the whole engine (model.md section 1): motor current i is positive from terminal A through the motor to
 * terminal B; the current that leaves leg A is +i, the current that leaves leg B is -i. Leg A comes first everywhere.
 * With shunts at the bottom of the legs the pair is read crossed, B minus A, so that forward is always up (D-18).
 */
export const LEG_HIGH_CHANNEL = 0;
export const LEG_LOW_CHANNEL = 1;
export const LEG_HIGH_DIODE = 2;
export const LEG_LOW_DIODE = 3;
export const LEG_OPEN = 4;
/** Both channels on: only by an injected fault (D-36). */
export const LEG_THROUGH = 5;
export const LEG_STATE_COUNT = 6;

/** The words of model.md's table; shoot-through reads as the high channel, the notice says the rest. */
export const LEG_WORDS: readonly LegState[] = ["high channel", "low channel", "high diode", "low diode", "open", "high channel"];

export const GATE_NONE = 0;
export const GATE_HIGH = 1;
export const GATE_LOW = 2;

export const isHighState = (leg: number) => leg === LEG_HIGH_CHANNEL || leg === LEG_HIGH_DIODE;
export const isLowState = (leg: number) => leg === LEG_LOW_CHANNEL || leg === LEG_LOW_DIODE;
export const isDiodeState = (leg: number) => leg === LEG_HIGH_DIODE || leg === LEG_LOW_DIODE;
