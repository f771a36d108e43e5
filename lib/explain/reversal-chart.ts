import { simulate } from "../engine/index";
import type { ScenarioDocument } from "../scenario/schema";
import { templateById } from "../scenario/templates";

/** Motor current after a command, over time and over the duty commanded: rows are duties, ascending. */
export type ReversalChartData = {
  commandS: number;
  /** One segment of the border. */
  periodS: number;
  timeS: number[];
  duty: number[];
  currentA: number[][];
  title: string;
  note: string;
};

const TIMES = 121;
const DUTIES = 62;
const RUN_S = 6e-4;
const COMMAND_S = 1e-4;

let kept: ReversalChartData | null = null;

/** The chart of the sign-in page, computed by the engine once per server: what each duty makes of a running motor's current. */
export function reversalChart(): ReversalChartData {
  if (kept) return kept;
  const base = templateById("reversal")!.document;
  const timeS = Array.from({ length: TIMES }, (_, n) => (RUN_S * n) / (TIMES - 1));
  const duty = Array.from({ length: DUTIES }, (_, n) => -0.92 + (1.54 * n) / (DUTIES - 1));
  const before = base.command.points[0]!.duty;
  const startA = simulate(base, { at: [0] }).at[0]!;
  const currentA = duty.map((after) => {
    const document: ScenarioDocument = {
      ...base,
      command: { ...base.command, special: [], points: [{ timeS: 0, duty: before, ramp: "step" }, { timeS: COMMAND_S, duty: after, ramp: "step" }] },
      initial: { ...base.initial, currentA: startA.motorCurrentA },
      run: { durationS: RUN_S },
    };
    return simulate(document, { at: timeS }).at.map((reading) => reading.motorCurrentA);
  });
  const load = base.load.kind === "motor" ? base.load.motor : null;
  const note = load ? `${base.supply.voltageV} V · ${Math.round(load.inductanceH * 1e6)} µH · ${load.resistanceOhm} Ω · ${base.pwm.frequencyHz / 1000} kHz` : "";
  kept = { commandS: COMMAND_S, periodS: 1 / base.pwm.frequencyHz, timeS, duty, currentA, title: `Reversal of a ${base.supply.voltageV} V drive`, note };
  return kept;
}
