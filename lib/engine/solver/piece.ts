/**
 * Entries of PowerStage.piece. Numbers that pass between functions for every piece go through this array: as arguments
 * or results of calls that are not inlined each would be an allocation (measured: 700 bytes an interval, a third of the time).
 */
export const PIECE_START = 0;
export const PIECE_LENGTH = 1;
export const PIECE_STAGE_EVENT = 2;
export const PIECE_RIDER_EVENT = 3;
