import type { Observer } from "./rider";
import { PIECE_LENGTH } from "./piece";
import type { PowerStage } from "./power-stage";
import { stateAfter } from "./spectrum";

/** Three-point Gauss-Legendre on [0, 1]: exact to degree 5, enough for i^2 over a piece of a period. */
const NODES = [0.5 - Math.sqrt(0.15), 0.5, 0.5 + Math.sqrt(0.15)];
const WEIGHTS = [5 / 18, 8 / 18, 5 / 18];

/**
 * One thermal node of the winding (R_th, C_th): updated at each period start from the mean copper loss of the period
 * before with the node's exact exponential; the resistance is constant within a period (D-33).
 */
export class WindingNode implements Observer {
  lossIntegralJ = 0;
  private readonly state = new Float64Array(3);

  constructor(
    private readonly node: { resistanceKPerW: number; capacityJPerK: number; ambientC: number },
    public temperatureC: number,
    private readonly stage: PowerStage,
  ) {}

  piece(): void {
    const { stage, state } = this;
    const h = stage.piece[PIECE_LENGTH]!;
    let sum = 0;
    for (let j = 0; j < 3; j++) {
      stateAfter(stage.slot.mode, stage.slot.spectrum, stage.x, NODES[j]! * h, state);
      sum += WEIGHTS[j]! * state[0]! * state[0]!;
    }
    this.lossIntegralJ += sum * h * stage.parameters.windingOhm;
  }

  /** Ends a period of the given length; true if the temperature moved. */
  endPeriod(periodS: number): boolean {
    const { resistanceKPerW, capacityJPerK, ambientC } = this.node;
    const powerW = this.lossIntegralJ / periodS;
    this.lossIntegralJ = 0;
    const finalC = ambientC + resistanceKPerW * powerW;
    const nextC = finalC + (this.temperatureC - finalC) * Math.exp(-periodS / (resistanceKPerW * capacityJPerK));
    const isMoved = nextC !== this.temperatureC;
    this.temperatureC = nextC;
    return isMoved;
  }

  restore(temperatureC: number, lossIntegralJ: number): void {
    this.temperatureC = temperatureC;
    this.lossIntegralJ = lossIntegralJ;
  }
}
