import { fillAffineMode, ROW_LENGTH, type AffineMode } from "../model/affine";
import type { StageParameters } from "../model/parameters";
import { Spectrum } from "./spectrum";

export const RING = 12; // durations kept per mode: a PWM period has at most about ten different ones

/** A mode with its spectrum and the operators built for it; refilled in place when parameters change. */
export class ModeSlot {
  readonly mode: AffineMode = { legA: 0, legB: 0, shaftSign: 0, sourceConducts: true, a: new Float64Array(9), b: new Float64Array(3), rows: new Float64Array(ROW_LENGTH), isCurrentAlgebraic: false, isCurrentOpen: false };
  readonly spectrum = new Spectrum();
  version = -1;
  tangentSpeedRadPerS = 0;
  readonly durations = new Float64Array(RING).fill(-1);
  readonly operators: Float64Array[] = [];
  next = 0;
  /** Rows that the sensing chain derives from this mode, and the fill for which they hold. */
  readonly sense = new Float64Array(28);
  senseStamp = -1;

  /** Works the mode out for the parameters; operators kept before are void. */
  fill(parameters: StageParameters, tangentSpeedRadPerS: number): void {
    this.senseStamp = -1;
    this.tangentSpeedRadPerS = tangentSpeedRadPerS;
    fillAffineMode(this.mode, parameters, tangentSpeedRadPerS);
    this.spectrum.analyse(this.mode);
    this.durations.fill(-1);
    this.next = 0;
  }
}
