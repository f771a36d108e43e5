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
  /** Shortens the piece (stage.piece[PIECE_LENGTH]) to what the rider can take at once (commutation ramps). */
  limitPiece(stage: PowerStage): void;
  /** Works out the end of the piece; true if an own event lies inside, its time then in stage.piece[PIECE_RIDER_EVENT]. */
  attempt(stage: PowerStage): boolean;
  /** Takes over the end of the piece tried last. */
  commit(stage: PowerStage): void;
  /** Shares and classes stand as saved (filter states may differ). */
  matches(saved: readonly number[]): boolean;
  save(): number[];
  restore(saved: readonly number[]): void;
}

/** Sees every committed piece (its start and length are in stage.piece) before the state moves on: figures, traces, readings. */
export interface Observer {
  piece(): void;
}
