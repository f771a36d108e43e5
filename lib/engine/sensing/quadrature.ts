import type { PowerStage } from "../solver/power-stage";
import { stateAfter } from "../solver/spectrum";

/** Eight-point Gauss-Legendre on [-1, 1]. Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, table 25.4. */
const NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363];
const WEIGHTS = [0.362683783378362, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763];

const STATE = new Float64Array(3);

/**
 * Visits quadrature nodes of the state over [fromS, toS] of the present piece: `visit(x, weightS)`, weights in seconds.
 * Parts start at 2/|lambda| and double, as the fast modes die away: error below 1e-11 of the integrand's size.
 */
export function visitNodes(stage: PowerStage, fromS: number, toS: number, visit: (x: Float64Array, weightS: number) => void): void {
  const { mode, spectrum } = stage.slot;
  let startS = fromS;
  let lengthS = 2 / spectrum.rateMaxPerS;
  while (startS < toS) {
    // the last part takes a rest that would be short
    const endS = startS + 1.5 * lengthS >= toS ? toS : startS + lengthS;
    const half = 0.5 * (endS - startS);
    const middle = startS + half;
    for (let j = 0; j < 4; j++) {
      for (let side = -1; side <= 1; side += 2) {
        stateAfter(mode, spectrum, stage.x, middle + side * NODES[j]! * half, STATE);
        visit(STATE, WEIGHTS[j]! * half);
      }
    }
    lengthS = startS - fromS > lengthS ? 2 * lengthS : lengthS;
    startS = endS;
  }
}
