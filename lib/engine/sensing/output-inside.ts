import { bracketedRoot } from "../solver/locate";
import { PIECE_LENGTH } from "../solver/piece";
import type { PowerStage } from "../solver/power-stage";
import type { SensorBank } from "./bank";

/** Parts of a piece in which the slope of an output is looked at for extrema. */
const EXTREMUM_SCAN = 8;

const KEPT = new Float64Array(6);

/** Puts the end of the piece aside while instants inside it are probed. */
function keepEnd(bank: SensorBank): void {
  KEPT.set(bank.zEnd);
  KEPT.set(bank.yEnd, 3);
}

function restoreEnd(bank: SensorBank): void {
  bank.zEnd.set(KEPT.subarray(0, 3));
  bank.yEnd.set(KEPT.subarray(3));
}

/** Fills zAt and yAt for tau into the piece that was tried last, leaving its end as it is. */
export function readAt(bank: SensorBank, stage: PowerStage, tauS: number): void {
  if (tauS === 0) {
    bank.zAt.set(bank.z);
    bank.yAt.set(bank.y);
    return;
  }
  keepEnd(bank);
  bank.probe(stage, bank.rows(stage.slot), tauS);
  bank.zAt.set(bank.zEnd);
  bank.yAt.set(bank.yEnd);
  restoreEnd(bank);
}

/** Visits the extrema of output k inside the piece tried last, zAt and yAt filled at each. */
export function visitExtrema(bank: SensorBank, k: number, stage: PowerStage, visit: () => void): void {
  const sense = bank.rows(stage.slot);
  const h = stage.piece[PIECE_LENGTH]!;
  if (bank.commutation.isRamp) bank.ramp.fillNodes(stage, sense, h);
  keepEnd(bank);
  const slopeAt = (tau: number) => {
    bank.probe(stage, sense, tau);
    return bank.holdsPin ? pinFilterSlope(bank, k, true) : bank.events.probedSlope(k, stage, sense, tau);
  };
  let fromS = 0;
  let from = bank.holdsPin ? pinFilterSlope(bank, k, false) : bank.events.outputSlope(k, false, stage, sense);
  for (let n = 1; n <= EXTREMUM_SCAN; n++) {
    const toS = (h * n) / EXTREMUM_SCAN;
    const to = slopeAt(toS);
    if (from * to < 0) {
      const atS = bracketedRoot((tau, out) => {
        out[0] = slopeAt(tau);
        out[1] = 0;
      }, fromS, from, toS, to, 1e-4 * h);
      bank.probe(stage, sense, atS);
      bank.zAt.set(bank.zEnd);
      bank.yAt.set(bank.yEnd);
      visit();
    }
    fromS = toS;
    from = to;
  }
  bank.probe(stage, sense, h);
  restoreEnd(bank);
}

/** Slope of a filter's output that follows the pin. */
function pinFilterSlope(bank: SensorBank, k: number, isEnd: boolean): number {
  const { chain } = bank;
  const stuckV = bank.stuckAt(k);
  const clip = bank.clip[k]!;
  const z = isEnd ? bank.zEnd[k]! : bank.z[k]!;
  const pinV = stuckV ?? (clip > 0 ? chain.outputMaxV : clip < 0 ? chain.outputMinV : bank.base[k]! + z);
  return chain.poles.filterRadPerS * (pinV - (isEnd ? bank.yEnd[k]! : bank.y[k]!));
}
