import { ROW_BOTTOM_A, ROW_BOTTOM_B, ROW_BUS, ROW_GROUND, ROW_RAIL, ROW_TERMINAL_A, rowAt } from "../model/affine";
import { LEG_HIGH_CHANNEL, LEG_LOW_CHANNEL, LEG_THROUGH } from "../model/legs";
import type { StageParameters } from "../model/parameters";
import type { EventLog } from "../solver/event-log";
import type { Machine } from "../solver/machine";
import type { ModeSlot } from "../solver/mode-slot";
import { PIECE_LENGTH, PIECE_START } from "../solver/piece";
import type { Observer } from "../solver/rider";
import type { SensorBank } from "./bank";

/** First time and extreme of something that went past a limit. */
export type Excess = { firstS: number; extreme: number };

/** Watches the whole run for the conditions that become notices; looks at both ends of every piece. */
export class RunMonitor implements Observer {
  commonModeLow: Excess | null = null;
  commonModeHigh: Excess | null = null;
  diodeWouldShare: Excess | null = null;
  busCollapsed: Excess | null = null;
  shootThrough: Excess | null = null;
  bothShuntsS: number | null = null;
  busMaxV = -Infinity;
  currentMaxA = 0;
  clippedS = 0;
  clippedFirstS: number | null = null;
  ranS = 0;
  private isOutside = false;
  private isStill = false;
  private readonly commonRow: number;
  private readonly onMaxOhm: number;
  private readonly diodeMinV: number;
  private lookedAt: ModeSlot | null = null;

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, private readonly log: EventLog) {
    const { highSide, lowSide } = machine.document.bridge;
    this.onMaxOhm = Math.max(highSide.onResistanceOhm, lowSide.onResistanceOhm);
    this.diodeMinV = Math.min(highSide.diodeForwardV, lowSide.diodeForwardV);
    const rowOfSite = { legTop: ROW_RAIL, supply: ROW_BUS, line: ROW_TERMINAL_A, legBottom: ROW_BOTTOM_A, return: ROW_GROUND };
    this.commonRow = rowOfSite[bank.chain.site];
  }

  piece(): void {
    const { stage } = this.machine;
    const startS = stage.piece[PIECE_START]!;
    const h = stage.piece[PIECE_LENGTH]!;
    // within a mode everything is continuous: the start needs a look only where the mode is new
    if (stage.slot !== this.lookedAt) {
      this.lookedAt = stage.slot;
      this.isStill = isStill(stage.slot.mode.rows, ROW_BUS) && isStill(stage.slot.mode.rows, this.commonRow);
      this.look(startS, stage.x, true);
    }
    this.look(startS + h, stage.xEnd, !this.isStill);
    this.ranS += h;
    if (this.bank.isAnyClipped()) {
      this.clippedS += h;
      this.clippedFirstS ??= startS;
    }
  }

  /** Counts time that was leapt over; nothing it watches can have happened in it (see pushGuards). */
  skip(durationS: number): void {
    this.ranS += durationS;
  }

  /** Pushes what must keep its sign for a period to bring no new remark. */
  pushGuards(out: number[]): void {
    const { stage } = this.machine;
    const { rows } = stage.slot.mode;
    const { amplifier } = this.machine.document.sensing;
    for (const x of [stage.x, stage.xEnd]) {
      out.push(this.diodeMinV - Math.abs(x[0]!) * this.onMaxOhm);
      out.push(rowAt(rows, ROW_BUS, x) + stage.parameters.lowDiodeV);
      const commonV = (this.machine.document.sensing.site === "legBottom" ? this.bank.chain.shuntAOhm : 1) * rowAt(rows, this.commonRow, x);
      out.push(commonV - amplifier.commonModeMinV, amplifier.commonModeMaxV - commonV);
    }
  }

  private look(timeS: number, x: Float64Array, withVoltages: boolean): void {
    const { stage } = this.machine;
    const { mode } = stage.slot;
    const size = Math.abs(x[0]!);
    if (size > this.currentMaxA) this.currentMaxA = size;
    if (size * this.onMaxOhm > this.diodeMinV || (!this.bank.chain.isUnipolar && this.bothShuntsS === null)) this.lookChannels(timeS, mode.legA, mode.legB, x[0]!);
    if (!withVoltages) return;
    if (mode.legA === LEG_THROUGH || mode.legB === LEG_THROUGH) this.shootThrough = note(this.shootThrough, timeS, size, 1);
    const busV = rowAt(mode.rows, ROW_BUS, x);
    if (busV > this.busMaxV) this.busMaxV = busV;
    if (busV < -stage.parameters.lowDiodeV) this.busCollapsed = note(this.busCollapsed, timeS, busV, -1);
    this.lookCommonMode(timeS, x, mode.rows);
  }

  private lookChannels(timeS: number, legA: number, legB: number, i: number): void {
    const p = this.machine.stage.parameters;
    if (isOverDiode(p, legA, i) || isOverDiode(p, legB, -i)) this.diodeWouldShare = note(this.diodeWouldShare, timeS, Math.abs(i), 1);
    const { site, isUnipolar } = this.bank.chain;
    if (isUnipolar || this.bothShuntsS !== null || i === 0) return;
    const isPair = site === "legTop" ? legA === LEG_HIGH_CHANNEL && legB === LEG_HIGH_CHANNEL : site === "legBottom" && legA === LEG_LOW_CHANNEL && legB === LEG_LOW_CHANNEL;
    if (isPair) this.bothShuntsS = timeS;
  }

  private lookCommonMode(timeS: number, x: Float64Array, rows: Float64Array): void {
    const { amplifier } = this.machine.document.sensing;
    const { chain } = this.bank;
    let lowV: number;
    let highV: number;
    if (chain.site === "legTop") lowV = highV = rowAt(rows, ROW_RAIL, x);
    else if (chain.site === "supply") lowV = highV = rowAt(rows, ROW_BUS, x);
    else if (chain.site === "line") lowV = highV = rowAt(rows, ROW_TERMINAL_A, x);
    else {
      // bottom and return sites: the shunt's own voltage (D-13)
      const a = chain.shuntAOhm * (chain.site === "legBottom" ? rowAt(rows, ROW_BOTTOM_A, x) : 0);
      const b = chain.shuntBOhm * (chain.site === "legBottom" ? rowAt(rows, ROW_BOTTOM_B, x) : 0);
      const own = chain.site === "return" ? rowAt(rows, ROW_GROUND, x) : 0;
      lowV = Math.min(a, b, own);
      highV = Math.max(a, b, own);
    }
    const isLow = lowV < amplifier.commonModeMinV - 1e-9;
    const isHigh = highV > amplifier.commonModeMaxV + 1e-9;
    if (isLow) this.commonModeLow = note(this.commonModeLow, timeS, lowV, -1);
    if (isHigh) this.commonModeHigh = note(this.commonModeHigh, timeS, highV, 1);
    const isOutside = isLow || isHigh;
    if (isOutside && !this.isOutside) this.log.add(timeS, "commonMode", isLow ? "below the operating range" : "above the operating range");
    this.isOutside = isOutside;
  }
}

/** Whether a row is the same whatever the state. */
const isStill = (rows: Float64Array, at: number) => rows[at] === 0 && rows[at + 1] === 0 && rows[at + 2] === 0;

/** A channel that conducts in its diode's direction with more drop than the diode's: high side for current into the leg, low side out of it. */
function isOverDiode(p: StageParameters, leg: number, outA: number): boolean {
  if (leg === LEG_HIGH_CHANNEL) return -outA * p.highOnOhm > p.highDiodeV;
  return leg === LEG_LOW_CHANNEL && outA * p.lowOnOhm > p.lowDiodeV;
}

function note(before: Excess | null, timeS: number, value: number, sign: number): Excess {
  if (!before) return { firstS: timeS, extreme: value };
  if (sign * value > sign * before.extreme) before.extreme = value;
  return before;
}
