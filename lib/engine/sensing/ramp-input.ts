import { bracketedRoot } from "../solver/locate";
import { advance } from "../solver/operator";
import type { PowerStage } from "../solver/power-stage";
import { NODE_COUNT, nodeWeights, polynomialAt, segmentResponse, toMonomials } from "./cascade";
import { CURRENT_SLOPE, CUT_OFF_V, ERROR_A, ERROR_B, OUT_A, OUT_B, rowOf, SENSE_A, SENSE_B, type SensingChain } from "./chain";
import type { Commutation } from "./commutation";

const WEIGHT_RING = 6;

/** Input of the channels on a commutation ramp: values at five nodes of the piece, and the polynomial through them. */
export class RampInput {
  /** Shunt voltages with errors: five nodes of leg A, then of leg B, V. */
  readonly nodes = new Float64Array(2 * NODE_COUNT);
  /** What the last `integrate` found for each channel, V s. */
  readonly integral = new Float64Array(2);
  /** A rectifier cuts off inside the ramp: its response bends with the current, by the square of the change. */
  hasKink = false;
  private readonly node = new Float64Array(3);
  private readonly monomials = new Float64Array(NODE_COUNT);
  private readonly weightDurations = new Float64Array(WEIGHT_RING).fill(-1);
  private readonly weights = Array.from({ length: WEIGHT_RING }, () => new Float64Array(2 * NODE_COUNT));
  private nextWeight = 0;

  constructor(private readonly chain: SensingChain, private readonly commutation: Commutation) {}

  /** Shunt voltages with errors at the five nodes of a ramp piece of length h. */
  fillNodes(stage: PowerStage, sense: Float64Array, h: number): void {
    const { chain, node, nodes } = this;
    const { factors } = this.commutation;
    this.commutation.setFactors(stage);
    const step = stage.operator(h / (NODE_COUNT - 1));
    const l = chain.shuntInductanceH;
    const isStillError = sense[ERROR_A] === 0 && sense[ERROR_A + 1] === 0 && sense[ERROR_A + 2] === 0;
    node[0] = stage.x[0]!;
    node[1] = stage.x[1]!;
    node[2] = stage.x[2]!;
    for (let j = 0; j < NODE_COUNT; j++) {
      if (j > 0) advance(step, node);
      const t = (h * j) / (NODE_COUNT - 1);
      const i = node[0]!;
      const slope = l === 0 ? 0 : rowOf(sense, CURRENT_SLOPE, node);
      const factorA = factors[0]! + factors[1]! * t;
      const own = chain.shuntAOhm * factorA * i + l * (factors[1]! * i + factorA * slope);
      const errorA = isStillError ? sense[ERROR_A + 3]! : rowOf(sense, ERROR_A, node);
      nodes[j] = (factors[4] === 0 ? own : rowOf(sense, SENSE_A, node)) + errorA;
      if (!chain.isLegSite) continue;
      const factorB = factors[2]! + factors[3]! * t;
      const ownB = chain.shuntBOhm * factorB * i + l * (factors[3]! * i + factorB * slope);
      const errorB = isStillError ? sense[ERROR_B + 3]! : rowOf(sense, ERROR_B, node);
      nodes[NODE_COUNT + j] = (factors[5] === 0 ? ownB : rowOf(sense, SENSE_B, node)) + errorB;
    }
  }

  /** Response of both poles to a leg's input over the piece of `lengthS[0]`, behind the rectifier: [one, two] at 2 leg. */
  respond(leg: number, lengthS: Float64Array, response: Float64Array): void {
    const { nodes } = this;
    const h = lengthS[0]!;
    const at = leg * NODE_COUNT;
    response[2 * leg] = 0;
    response[2 * leg + 1] = 0;
    let isAbove = true;
    let isBelow = true;
    for (let j = 0; j < NODE_COUNT; j++) {
      if (nodes[at + j]! < -CUT_OFF_V) isAbove = false;
      else if (nodes[at + j]! > CUT_OFF_V) isBelow = false;
    }
    if (this.chain.isUnipolar && isBelow) return;
    if (!this.chain.isUnipolar || isAbove) {
      const w = this.weightsFor(h);
      let one = 0;
      let two = 0;
      for (let j = 0; j < NODE_COUNT; j++) {
        one += w[j]! * nodes[at + j]!;
        two += w[NODE_COUNT + j]! * nodes[at + j]!;
      }
      response[2 * leg] = one;
      response[2 * leg + 1] = two;
      return;
    }
    this.hasKink = true;
    this.eachPositive(leg, (from, to) => segmentResponse(this.chain.poles, this.monomials, from, to, h, response, 2 * leg));
  }

  /** Calls with each part of the piece, as shares of it, where the shunt voltage is above cut-off. */
  private eachPositive(leg: number, visit: (from: number, to: number) => void): void {
    const at = leg * NODE_COUNT;
    toMonomials(this.nodes, at, this.monomials);
    let from = this.nodes[at]! > 0 ? 0 : -1;
    for (let j = 1; j < NODE_COUNT; j++) {
      const v0 = this.nodes[at + j - 1]!;
      const v1 = this.nodes[at + j]!;
      if (v0 > 0 === v1 > 0) continue;
      const root = bracketedRoot((s, out) => {
        out[0] = polynomialAt(this.monomials, s);
        const c = this.monomials;
        out[1] = ((4 * c[4]! * s + 3 * c[3]!) * s + 2 * c[2]!) * s + c[1]!;
      }, (j - 1) / 4, v0, j / 4, v1);
      if (v1 > 0) from = root;
      else {
        visit(from, root);
        from = -1;
      }
    }
    if (from >= 0) visit(from, 1);
  }

  private weightsFor(h: number): Float64Array {
    for (let k = 0; k < WEIGHT_RING; k++) if (this.weightDurations[k] === h) return this.weights[k]!;
    const k = this.nextWeight;
    this.nextWeight = (k + 1) % WEIGHT_RING;
    this.weightDurations[k] = h;
    nodeWeights(this.chain.poles, h, this.weights[k]!);
    return this.weights[k]!;
  }

  /** Input of output k behind the rectifier, V, times the gain, at a share s of the piece computed last (0 start, 1 end). */
  inputAt(k: number, s: number): number {
    const value = (leg: number) => {
      toMonomials(this.nodes, leg * NODE_COUNT, this.monomials);
      const v = polynomialAt(this.monomials, s);
      return this.chain.isUnipolar ? Math.max(0, v) : v;
    };
    if (k === OUT_A) return this.chain.gain * value(0);
    if (k === OUT_B) return this.chain.gain * value(1);
    return this.chain.gain * this.chain.pairSign * (value(0) - value(1));
  }

  /** Integral over the piece tried last of each channel's input (V s, behind the rectifier, before the gain), in `integral`. */
  integrate(stage: PowerStage, sense: Float64Array, h: number): void {
    this.fillNodes(stage, sense, h);
    for (let leg = 0; leg < (this.chain.isLegSite ? 2 : 1); leg++) {
      let sum = 0;
      const add = (from: number, to: number) => {
        const c = this.monomials;
        for (let k = 0; k < NODE_COUNT; k++) sum += (c[k]! * (to ** (k + 1) - from ** (k + 1))) / (k + 1);
      };
      if (this.chain.isUnipolar) this.eachPositive(leg, add);
      else {
        toMonomials(this.nodes, leg * NODE_COUNT, this.monomials);
        add(0, 1);
      }
      this.integral[leg] = sum * h;
    }
  }
}
