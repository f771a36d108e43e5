import type { PowerStage } from "./power-stage";

/**
 * What travels with the power stage without acting back on it: the sensing chain. The machine asks it how far the next
 * piece may reach, lets it try the piece, and commits both together.
 */
export interface Rider {
  /** Start from the stage's initial state, filters settled (D-19). */
  begin(stage: PowerStage): void;
  /** Parameters of the document that change at `timeS` (faults of the sensing chain). */
  changeAt(timeS: number, stage: PowerStage): void;
  /** The stage entered a mode; `currentBeforeA` is the motor current just before. */
  onMode(stage: PowerStage, currentBeforeA: number): void;
  /** Longest piece from here, at most h (commutation ramps). */
  pieceLimit(stage: PowerStage, h: number): number;
  /** Works out the end of a piece of length h; returns the time of the rider's first own event in [0, h), or -1. */
  attempt(stage: PowerStage, operator: Float64Array, h: number, startS: number): number;
  /** Takes over the end of the piece tried last. */
  commit(h: number): void;
  save(): number[];
  restore(saved: readonly number[]): void;
}

/** Sees every committed piece before the state moves on: figures, traces, readings. */
export interface Observer {
  piece(startS: number, h: number): void;
}
