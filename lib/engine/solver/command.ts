import type { ScenarioDocument } from "../../scenario/schema";
import { GATE_HIGH, GATE_LOW, GATE_NONE } from "../model/legs";
import { SAME_INSTANT_S } from "../model/parameters";

/** Command of the two legs, two bits each, from a time on. */
export type LegCommand = { offsetS: number; legA: number; legB: number };

type Override = { fromS: number; toS: number; legA: number; legB: number };

const SLIVER_S = 1e-12; // D-06: shorter parts are left out

const OVERRIDE_LEGS = { coast: [GATE_NONE, GATE_NONE], brakeLow: [GATE_LOW, GATE_LOW], brakeHigh: [GATE_HIGH, GATE_HIGH] } as const;

/** The commanded duty as a function of time, right-continuous (D-01). `times` must not go back between calls. */
export class DutyCommand {
  private index = 0;
  constructor(private readonly points: ScenarioDocument["command"]["points"]) {}

  at(timeS: number): number {
    const { points } = this;
    if (this.index > 0 && points[this.index]!.timeS > timeS + SAME_INSTANT_S) this.index = 0;
    while (this.index + 1 < points.length && points[this.index + 1]!.timeS <= timeS + SAME_INSTANT_S) this.index++;
    const here = points[this.index]!;
    const next = points[this.index + 1];
    if (!next || next.ramp === "step") return here.duty;
    const share = (timeS - here.timeS) / (next.timeS - here.timeS);
    return here.duty + (next.duty - here.duty) * Math.min(Math.max(share, 0), 1);
  }
}

/** Memory of the command from period to period: direction at u = 0 (D-03), a running dwell (D-07). */
export type CommandMemory = { direction: number; dwellFromS: number; dwellToS: number };

/**
 * The leg commands of one PWM period, from the held duty, the scheme and the alignment (model.md section 2, D-02 to D-07,
 * D-28). Special intervals and a dwell are laid over it.
 */
export class CommandPattern {
  private readonly isCentre: boolean;
  private readonly overrides: Override[];
  private readonly periodS: number;

  constructor(private readonly document: ScenarioDocument) {
    this.periodS = 1 / document.pwm.frequencyHz;
    this.isCentre = document.pwm.alignment === "centre";
    this.overrides = document.command.special.map(({ fromS, toS, action }) => ({ fromS, toS, legA: OVERRIDE_LEGS[action][0], legB: OVERRIDE_LEGS[action][1] }));
  }

  /** Updates the memory at the start of a period and says whether this period begins a reversal. */
  beginPeriod(memory: CommandMemory, duty: number, startS: number): boolean {
    const sign = Math.sign(duty);
    const isReversal = sign !== 0 && sign !== memory.direction;
    const { kind, dwellS } = this.document.command.reversal;
    if (isReversal) {
      memory.direction = sign;
      if (kind !== "direct" && this.document.pwm.scheme !== "lockedAntiphase" && dwellS > 0) {
        memory.dwellFromS = startS;
        memory.dwellToS = startS + dwellS;
      }
    }
    return isReversal;
  }

  /** Whether any override touches the period; if not, the pattern depends on duty and direction alone. */
  hasOverride(memory: CommandMemory, startS: number, endS: number): boolean {
    if (memory.dwellToS > startS + SAME_INSTANT_S && memory.dwellFromS < endS) return true;
    for (const o of this.overrides) if (o.toS > startS + SAME_INSTANT_S && o.fromS < endS) return true;
    return false;
  }

  /** Commands of the period in time order, offsets from its start. */
  commands(duty: number, memory: CommandMemory, startS: number, withOverrides: boolean): LegCommand[] {
    const base = this.basePattern(duty, memory.direction);
    if (!withOverrides) return base;
    const cuts = new Set<number>(base.map((c) => c.offsetS));
    const active: Override[] = [];
    if (memory.dwellToS > startS + SAME_INSTANT_S) {
      const [legA, legB] = this.document.command.reversal.kind === "brakeLow" ? OVERRIDE_LEGS.brakeLow : OVERRIDE_LEGS.coast;
      active.push({ fromS: memory.dwellFromS, toS: memory.dwellToS, legA, legB });
    }
    active.push(...this.overrides); // special wins over a dwell: the last one that holds counts
    for (const o of active) for (const edgeS of [o.fromS - startS, o.toS - startS]) if (edgeS > SAME_INSTANT_S && edgeS < this.periodS) cuts.add(edgeS);
    const commands: LegCommand[] = [];
    for (const offsetS of [...cuts].sort((x, y) => x - y)) {
      let held = base[0]!;
      for (const c of base) if (c.offsetS <= offsetS) held = c;
      const next: LegCommand = { offsetS, legA: held.legA, legB: held.legB };
      for (const o of active) {
        if (o.fromS - startS > offsetS + SAME_INSTANT_S || o.toS - startS <= offsetS + SAME_INSTANT_S) continue;
        next.legA = o.legA;
        next.legB = o.legB;
      }
      commands.push(next);
    }
    return commands;
  }

  private basePattern(duty: number, direction: number): LegCommand[] {
    const { scheme, synchronous, mixedFastShare } = this.document.pwm;
    const isAntiphase = scheme === "lockedAntiphase";
    const share = isAntiphase ? (1 + duty) / 2 : Math.abs(duty);
    const isReverse = !isAntiphase && direction < 0;
    const legs = (a: number, b: number): [number, number] => (isReverse ? [b, a] : [a, b]);
    const drive = legs(GATE_HIGH, GATE_LOW);
    const slowLow = legs(synchronous ? GATE_LOW : GATE_NONE, GATE_LOW);
    const slowHigh = legs(GATE_HIGH, synchronous ? GATE_HIGH : GATE_NONE);
    const fast = synchronous ? legs(GATE_LOW, GATE_HIGH) : ([GATE_NONE, GATE_NONE] as [number, number]);
    const { periodS } = this;
    switch (scheme) {
      case "lowSideRecirculation":
        return this.place(share, drive, [[0, slowLow]]);
      case "highSideRecirculation":
        return this.place(share, drive, [[0, slowHigh]]);
      case "fastDecay":
        return this.place(share, drive, [[0, duty === 0 ? [GATE_NONE, GATE_NONE] : fast]]);
      case "mixedDecay": {
        const fastS = (mixedFastShare ?? 0) * (1 - share) * periodS;
        if (duty === 0 || fastS <= SLIVER_S) return this.place(share, drive, [[0, slowLow]]);
        const offS = (1 - share) * periodS;
        return this.place(share, drive, offS - fastS <= SLIVER_S ? [[0, fast]] : [[0, fast], [fastS, slowLow]]);
      }
      default:
        return this.place(share, drive, [[0, [GATE_LOW, GATE_HIGH]]]);
    }
  }

  /** Lays the on-time (edge: first; centre: in the middle) and the parts of the off-time, slivers left out. */
  private place(share: number, on: [number, number], off: [number, [number, number]][]): LegCommand[] {
    const { periodS, isCentre } = this;
    const at = (offsetS: number, legs: [number, number]): LegCommand => ({ offsetS, legA: legs[0], legB: legs[1] });
    const onS = share * periodS;
    if (onS <= SLIVER_S) return off.map(([delayS, legs]) => at(delayS, legs));
    if (periodS - onS <= SLIVER_S) return [at(0, on)];
    if (!isCentre) return [at(0, on), ...off.map(([delayS, legs]) => at(onS + delayS, legs))];
    const fromS = ((1 - share) * periodS) / 2;
    const toS = ((1 + share) * periodS) / 2;
    const rest = off[0]![1]; // mixedDecay, the one scheme with two parts, is edge-aligned only (D-05)
    if (fromS <= SLIVER_S) return [at(0, on), at(toS, rest)];
    return [at(0, rest), at(fromS, on), at(toS, rest)];
  }
}
