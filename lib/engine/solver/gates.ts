import { GATE_HIGH, GATE_LOW, GATE_NONE } from "../model/legs";
import { SAME_INSTANT_S } from "../model/parameters";
import type { LegCommand } from "./command";

/** Gate drive of a leg between periods; times are offsets from the start of the period. */
type LegGate = { command: number; gate: number; leftHighS: number; leftLowS: number; pendingS: number; pendingGate: number };

const freshLeg = (): LegGate => ({ command: GATE_NONE, gate: GATE_NONE, leftHighS: -Infinity, leftLowS: -Infinity, pendingS: Infinity, pendingGate: GATE_NONE });

/** Which switches are on from an offset on; `isDeadTime`: a leg waits for its dead time. */
export type GateEdge = { offsetS: number; gateA: number; gateB: number; isWaitingA: boolean; isWaitingB: boolean };

/**
 * Turns leg commands into gate edges with dead time (D-08): the old switch turns off at once, the new one turns on at
 * max(t, t_left + t_d), t_left being when the command last left the complementary state; an earlier change swallows it.
 */
export class GateDriver {
  private readonly legA = freshLeg();
  private readonly legB = freshLeg();
  private isFirst = true;

  constructor(private readonly deadTimeS: number) {}

  /** Gate edges of one period of length `periodS`; advances the driver to the start of the next. */
  drive(commands: LegCommand[], periodS: number): GateEdge[] {
    const edges: GateEdge[] = [];
    let next = 0;
    for (;;) {
      const commandS = next < commands.length ? commands[next]!.offsetS : Infinity;
      const timeS = Math.min(commandS, this.legA.pendingS, this.legB.pendingS);
      if (!(timeS < periodS - SAME_INSTANT_S)) break;
      while (next < commands.length && commands[next]!.offsetS <= timeS + SAME_INSTANT_S) {
        const c = commands[next++]!;
        this.command(this.legA, c.legA, timeS);
        this.command(this.legB, c.legB, timeS);
      }
      this.release(this.legA, timeS);
      this.release(this.legB, timeS);
      this.isFirst = false;
      edges.push({ offsetS: timeS, gateA: this.legA.gate, gateB: this.legB.gate, isWaitingA: this.legA.pendingS < Infinity, isWaitingB: this.legB.pendingS < Infinity });
    }
    this.shift(this.legA, periodS);
    this.shift(this.legB, periodS);
    return edges;
  }

  /** Whether the memory equals one saved before; no allocation, asked once per period. */
  matches(saved: readonly number[]): boolean {
    const { legA: a, legB: b } = this;
    return isSameLeg(a, saved, 0) && isSameLeg(b, saved, 6) && saved[12] === (this.isFirst ? 1 : 0);
  }

  /** The driver's memory as numbers, for comparing periods and for checkpoints. */
  save(): number[] {
    const { legA: a, legB: b } = this;
    return [a.command, a.gate, a.leftHighS, a.leftLowS, a.pendingS, a.pendingGate, b.command, b.gate, b.leftHighS, b.leftLowS, b.pendingS, b.pendingGate, this.isFirst ? 1 : 0];
  }

  restore(saved: readonly number[]): void {
    restoreLeg(this.legA, saved, 0);
    restoreLeg(this.legB, saved, 6);
    this.isFirst = saved[12] === 1;
  }

  private command(leg: LegGate, command: number, timeS: number): void {
    if (command === leg.command && !this.isFirst) return;
    if (leg.command === GATE_HIGH) leg.leftHighS = timeS;
    if (leg.command === GATE_LOW) leg.leftLowS = timeS;
    leg.command = command;
    leg.gate = GATE_NONE;
    leg.pendingS = Infinity;
    if (command === GATE_NONE) return;
    const leftS = command === GATE_HIGH ? leg.leftLowS : leg.leftHighS;
    leg.pendingGate = command;
    leg.pendingS = Math.max(timeS, leftS + this.deadTimeS);
  }

  private release(leg: LegGate, timeS: number): void {
    if (leg.pendingS > timeS + SAME_INSTANT_S) return;
    leg.gate = leg.pendingGate;
    leg.pendingS = Infinity;
  }

  /** Moves the leg's times to the next period; what can no longer matter is forgotten, so that equal periods compare equal. */
  private shift(leg: LegGate, periodS: number): void {
    const move = (t: number) => (t - periodS + this.deadTimeS > 0 ? t - periodS : -Infinity);
    leg.leftHighS = move(leg.leftHighS);
    leg.leftLowS = move(leg.leftLowS);
    if (leg.pendingS < Infinity) leg.pendingS = Math.max(leg.pendingS - periodS, 0);
  }
}

function isSameLeg(leg: LegGate, saved: readonly number[], at: number): boolean {
  return leg.command === saved[at] && leg.gate === saved[at + 1] && leg.leftHighS === saved[at + 2] && leg.leftLowS === saved[at + 3] && leg.pendingS === saved[at + 4] && leg.pendingGate === saved[at + 5];
}

function restoreLeg(leg: LegGate, saved: readonly number[], at: number): void {
  leg.command = saved[at]!;
  leg.gate = saved[at + 1]!;
  leg.leftHighS = saved[at + 2]!;
  leg.leftLowS = saved[at + 3]!;
  leg.pendingS = saved[at + 4]!;
  leg.pendingGate = saved[at + 5]!;
}
