import type { PowerStage } from "../solver/power-stage";
import type { SensorBank } from "./bank";
import { OUT_A, OUT_B, RAW_A, RAW_B } from "./chain";
import { visitNodes } from "./quadrature";

const SUM = new Float64Array(3);

/**
 * Integrals of the three outputs over the piece tried last (V s), from the poles' own balance: with z' = p (u - z) the
 * integral of z is that of u less (z_end - z)/p, and so on through the filter; a clipped stretch is its limit. Exact,
 * because pieces end where clipping starts or ends.
 */
export function integrateOutputs(bank: SensorBank, stage: PowerStage, h: number, out: Float64Array): void {
  const { chain } = bank;
  let inputA: number;
  let inputB = 0;
  if (bank.commutation.isRamp) {
    bank.ramp.integrate(stage, bank.rows(stage.slot), h);
    inputA = bank.ramp.integral[0]!;
    inputB = bank.ramp.integral[1]!;
  } else {
    SUM.fill(0);
    visitNodes(stage, 0, h, (x, w) => {
      SUM[0]! += w * x[0]!;
      SUM[1]! += w * x[1]!;
      SUM[2]! += w * x[2]!;
    });
    const rows = bank.rows(stage.slot);
    const along = (at: number) => rows[at]! * SUM[0]! + rows[at + 1]! * SUM[1]! + rows[at + 2]! * SUM[2]! + rows[at + 3]! * h;
    inputA = bank.passes[0] ? along(RAW_A) : 0;
    inputB = bank.passes[1] ? along(RAW_B) : 0;
  }
  for (let k = 0; k < 3; k++) {
    if (!bank.isUsed[k]) continue;
    const input = chain.gain * (k === OUT_A ? inputA : k === OUT_B ? inputB : chain.pairSign * (inputA - inputB));
    out[k] = outputIntegral(bank, k, input, h);
  }
}

function outputIntegral(bank: SensorBank, k: number, inputVs: number, h: number): number {
  const { chain, z, y, zEnd, yEnd } = bank;
  const stuckV = bank.stuckAt(k);
  const clip = bank.clip[k]!;
  const limitV = stuckV ?? (clip > 0 ? chain.outputMaxV : chain.outputMinV);
  const isHeld = stuckV !== null || clip !== 0;
  if (isHeld && !bank.holdsPin) return limitV * h;
  const slew = bank.slewRate(k);
  const zIntegral = slew !== 0 ? z[k]! * h + 0.5 * slew * h * h : inputVs - (zEnd[k]! - z[k]!) / chain.poles.amplifierRadPerS;
  if (!chain.hasFilter) return bank.base[k]! * h + zIntegral;
  const lag = (yEnd[k]! - y[k]!) / chain.poles.filterRadPerS;
  return (isHeld ? limitV * h : bank.base[k]! * h + zIntegral) - lag;
}
