import { ROW_BRIDGE, ROW_BUS, ROW_SUPPLY, ROW_TOP_A, ROW_TOP_B, ROW_BOTTOM_A, ROW_BOTTOM_B, rowAt } from "../model/affine";
import { LEG_HIGH_CHANNEL, LEG_HIGH_DIODE, LEG_LOW_CHANNEL, LEG_LOW_DIODE, LEG_THROUGH } from "../model/legs";
import type { StageParameters } from "../model/parameters";
import type { Conversion, Figures } from "../results";
import { rowRootOfSlope } from "../solver/locate";
import type { Machine } from "../solver/machine";
import { PIECE_LENGTH, PIECE_START } from "../solver/piece";
import type { Observer } from "../solver/rider";
import type { SensorBank } from "./bank";
import { OUT_A, OUT_B, OUT_COMBINED } from "./chain";
import { visitExtrema } from "./output-inside";
import { integrateOutputs } from "./output-integral";
import { visitNodes } from "./quadrature";

const CURRENT = new Float64Array([1, 0, 0, 0]);

/** Integrals over the window, SI units times seconds. */
class Sums {
  timeS = 0;
  current = 0;
  currentSquare = 0;
  topASquare = 0;
  topBSquare = 0;
  bottomASquare = 0;
  bottomBSquare = 0;
  bridgeSquare = 0;
  supply = 0;
  supplySquare = 0;
  speed = 0;
  inputJ = 0;
  sourceLossJ = 0;
  copperJ = 0;
  lineJ = 0;
  switchesJ = 0;
  shuntsJ = 0;
  /** Energy in the shunts that the site has: legs A and B, or the single one as A. */
  shuntAJ = 0;
  shuntBJ = 0;
  mechanicalJ = 0;
  emfMismatchJ = 0;
  frictionJ = 0;
  storedJ = 0;
  torqueNms = 0;
  clippedS = 0;
  readonly outputs = new Float64Array(3);
}

function switchLossW(p: StageParameters, leg: number, outA: number, topA: number, bottomA: number): number {
  switch (leg) {
    case LEG_HIGH_CHANNEL:
      return p.highOnOhm * outA * outA;
    case LEG_LOW_CHANNEL:
      return p.lowOnOhm * outA * outA;
    case LEG_HIGH_DIODE:
      return p.highDiodeV * Math.abs(outA) + p.highDiodeOhm * outA * outA;
    case LEG_LOW_DIODE:
      return p.lowDiodeV * Math.abs(outA) + p.lowDiodeOhm * outA * outA;
    case LEG_THROUGH:
      return p.highOnOhm * topA * topA + p.lowOnOhm * bottomA * bottomA;
    default:
      return 0;
  }
}

/** Accumulates the figures of model.md and D-26 over the window; conversions are added by `addConversion`. */
export class FigureMeter implements Observer {
  readonly sums = new Sums();
  private currentMaxA = -Infinity;
  private currentMinA = Infinity;
  private busMaxV = -Infinity;
  private headroomV = Infinity;
  private errorSumA = 0;
  private errorMaxA = 0;
  private conversionCount = 0;
  private readonly outputs = new Float64Array(3);

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, private readonly fromS: number, private readonly toS: number) {}

  /** Instants at which a piece must end, so that the window is made of whole pieces. */
  edges(): number[] {
    return [this.fromS, this.toS];
  }

  piece(): void {
    const startS = this.machine.stage.piece[PIECE_START]!;
    const h = this.machine.stage.piece[PIECE_LENGTH]!;
    // pieces end at the window's edges: the middle says on which side this one lies
    const middleS = startS + 0.5 * h;
    if (middleS < this.fromS || middleS > this.toS) return;
    const { stage } = this.machine;
    this.noteExtremes(h);
    this.sums.timeS += h;
    visitNodes(stage, 0, h, (x, w) => this.addNode(x, w));
    this.sums.storedJ += this.storedJ(stage.xEnd) - this.storedJ(stage.x);
    integrateOutputs(this.bank, stage, h, this.outputs);
    for (let k = 0; k < 3; k++) if (this.bank.isUsed[k]) this.sums.outputs[k]! += this.outputs[k]!;
    if (this.bank.isAnyClipped()) this.sums.clippedS += h;
  }

  private storedJ(x: Float64Array): number {
    const p = this.machine.stage.parameters;
    const magneticJ = p.isResistive ? 0 : 0.5 * p.inductanceH * x[0]! * x[0]!;
    return magneticJ + 0.5 * p.inertiaKgM2 * x[1]! * x[1]! + (p.hasBusState ? 0.5 * p.busF * x[2]! * x[2]! : 0);
  }

  private addNode(x: Float64Array, w: number): void {
    const s = this.sums;
    const { stage } = this.machine;
    const p = stage.parameters;
    const { mode } = stage.slot;
    const { rows } = mode;
    const i = mode.isCurrentOpen ? 0 : x[0]!;
    const speed = x[1]!;
    const topA = rowAt(rows, ROW_TOP_A, x);
    const topB = rowAt(rows, ROW_TOP_B, x);
    const bottomA = rowAt(rows, ROW_BOTTOM_A, x);
    const bottomB = rowAt(rows, ROW_BOTTOM_B, x);
    const supply = rowAt(rows, ROW_SUPPLY, x);
    const bridge = rowAt(rows, ROW_BRIDGE, x);
    s.current += w * i;
    s.currentSquare += w * i * i;
    s.topASquare += w * topA * topA;
    s.topBSquare += w * topB * topB;
    s.bottomASquare += w * bottomA * bottomA;
    s.bottomBSquare += w * bottomB * bottomB;
    s.bridgeSquare += w * bridge * bridge;
    s.supply += w * supply;
    s.speed += w * speed;
    s.torqueNms += w * p.torqueNmPerA * i;
    s.inputJ += w * p.sourceV * supply;
    s.sourceLossJ += w * p.sourceOhm * supply * supply;
    s.copperJ += w * p.windingOhm * i * i;
    s.lineJ += w * p.lineOhm * i * i;
    s.switchesJ += w * (switchLossW(p, mode.legA, i, topA, bottomA) + switchLossW(p, mode.legB, -i, topB, bottomB));
    s.shuntsJ += w * (p.topAOhm * topA * topA + p.topBOhm * topB * topB + p.bottomAOhm * bottomA * bottomA + p.bottomBOhm * bottomB * bottomB + (p.supplyShuntOhm + p.returnShuntOhm) * bridge * bridge);
    this.addShunts(p, w, i, topA, topB, bottomA, bottomB, bridge);
    s.mechanicalJ += w * p.torqueNmPerA * i * speed;
    s.emfMismatchJ += w * (p.backEmfVPerRadPerS - p.torqueNmPerA) * i * speed;
    if (p.isLocked || mode.shaftSign === 0) return;
    const activeNm = p.activeOpposingNm * mode.shaftSign > 0 ? p.activeOpposingNm : p.activeDrivingNm;
    s.frictionJ += w * speed * (p.viscousNmPerRadPerS * speed + mode.shaftSign * (stage.coulombNm + p.constantNm) + activeNm + p.fanNmPerRadPerS2 * speed * Math.abs(speed));
  }

  private addShunts(p: StageParameters, w: number, i: number, topA: number, topB: number, bottomA: number, bottomB: number, bridge: number): void {
    const s = this.sums;
    switch (this.bank.chain.site) {
      case "legTop":
        s.shuntAJ += w * p.topAOhm * topA * topA;
        s.shuntBJ += w * p.topBOhm * topB * topB;
        break;
      case "legBottom":
        s.shuntAJ += w * p.bottomAOhm * bottomA * bottomA;
        s.shuntBJ += w * p.bottomBOhm * bottomB * bottomB;
        break;
      case "line":
        s.shuntAJ += w * p.lineOhm * i * i;
        break;
      default:
        s.shuntAJ += w * (p.supplyShuntOhm + p.returnShuntOhm) * bridge * bridge;
    }
  }

  private noteExtremes(h: number): void {
    const { stage } = this.machine;
    const { rows } = stage.slot.mode;
    this.noteState(stage.x, rows);
    this.noteState(stage.xEnd, rows);
    for (const row of [CURRENT, rows.subarray(ROW_BUS, ROW_BUS + 4)]) {
      const x = rowRootOfSlope(row, stage.slot.mode, stage.slot.spectrum, stage.x, stage.xEnd, h);
      if (x) this.noteState(x, rows);
    }
    const { bank } = this;
    const isMidscale = bank.isRead[OUT_COMBINED] || this.isSingleMidscale();
    for (let k = 0; k < 3; k++) {
      if (!bank.isRead[k]) continue;
      this.noteHeadroom(bank.outputV(k, bank.z, bank.y), isMidscale);
      this.noteHeadroom(bank.outputV(k, bank.zEnd, bank.yEnd), isMidscale);
      // the scan for extrema is worth its cost only where the piece could bring a smaller headroom
      const least = Math.min(bank.chain.outputMaxV - bank.bounds.boundV(k, 1), isMidscale ? bank.bounds.boundV(k, -1) - bank.chain.outputMinV : Infinity);
      if (least < this.headroomV) visitExtrema(bank, k, stage, () => this.noteHeadroom(bank.outputV(k, bank.zAt, bank.yAt), isMidscale));
    }
  }

  private noteHeadroom(v: number, isMidscale: boolean): void {
    const { chain } = this.bank;
    const above = chain.outputMaxV - v;
    this.headroomV = Math.min(this.headroomV, isMidscale ? Math.min(above, v - chain.outputMinV) : above);
  }

  private isSingleMidscale(): boolean {
    return this.machine.document.sensing.amplifier.arrangement === "bipolarMidscale";
  }

  private noteState(x: Float64Array, rows: Float64Array): void {
    this.currentMaxA = Math.max(this.currentMaxA, x[0]!);
    this.currentMinA = Math.min(this.currentMinA, x[0]!);
    this.busMaxV = Math.max(this.busMaxV, rowAt(rows, ROW_BUS, x));
  }

  addConversion(conversion: Conversion): void {
    if (conversion.timeS < this.fromS - 1e-13 || conversion.timeS >= this.toS - 1e-13) return;
    const error = conversion.reconstructedA - conversion.trueA;
    this.errorSumA += error;
    this.errorMaxA = Math.max(this.errorMaxA, Math.abs(error));
    this.conversionCount++;
  }

  /** RMS current of the shunts, A and B (single shunts: A), for self-heating (D-33). */
  shuntRmsA(): [number, number] {
    const { sums: s } = this;
    const { site } = this.bank.chain;
    const t = s.timeS || 1;
    if (site === "legTop") return [Math.sqrt(s.topASquare / t), Math.sqrt(s.topBSquare / t)];
    if (site === "legBottom") return [Math.sqrt(s.bottomASquare / t), Math.sqrt(s.bottomBSquare / t)];
    const single = Math.sqrt((site === "line" ? s.currentSquare : s.bridgeSquare) / t);
    return [single, single];
  }

  figures(): Figures {
    const { sums: s, bank, machine } = this;
    const t = s.timeS || 1;
    // a run that stopped before its window has nothing to measure; its status says so
    const isMeasured = this.currentMaxA >= this.currentMinA;
    const { chain } = bank;
    const isSingleCombined = this.isSingleMidscale();
    const outA = isSingleCombined ? null : s.outputs[OUT_A]! / t;
    const outB = chain.isLegSite ? s.outputs[OUT_B]! / t : null;
    const load = machine.document.load;
    const bars = load.kind === "motor" ? load.motor.commutation?.barsCount : undefined;
    return {
      motorMeanA: s.current / t,
      motorRmsA: Math.sqrt(s.currentSquare / t),
      motorPeakA: isMeasured ? Math.max(Math.abs(this.currentMaxA), Math.abs(this.currentMinA)) : 0,
      motorRippleA: isMeasured ? this.currentMaxA - this.currentMinA : 0,
      topARmsA: Math.sqrt(s.topASquare / t),
      topBRmsA: Math.sqrt(s.topBSquare / t),
      supplyMeanA: s.supply / t,
      shuntAW: s.shuntAJ / t,
      shuntBW: chain.isLegSite ? s.shuntBJ / t : null,
      copperW: s.copperJ / t,
      switchesW: s.switchesJ / t,
      mechanicalW: s.mechanicalJ / t,
      inputW: s.inputJ / t,
      speedMeanRadPerS: s.speed / t,
      torqueMeanNm: s.torqueNms / t,
      outAMeanV: outA,
      outBMeanV: outB,
      differenceMeanV: outA !== null && outB !== null ? chain.pairSign * (outA - outB) : null,
      combinedMeanV: isSingleCombined ? s.outputs[OUT_A]! / t : chain.hasCombined ? s.outputs[OUT_COMBINED]! / t : null,
      headroomV: Number.isFinite(this.headroomV) ? this.headroomV : null,
      clippedShare: s.clippedS / t,
      reconstructionErrorMeanA: this.conversionCount > 0 ? this.errorSumA / this.conversionCount : null,
      reconstructionErrorMaxA: this.conversionCount > 0 ? this.errorMaxA : null,
      busMaxV: isMeasured ? this.busMaxV : 0,
      energyResidualShare: this.energyResidualShare(),
      // bars x turns per second, twice for an odd count (D-38)
      commutationRippleHz: bars ? (bars * Math.abs(s.speed / t) * (bars % 2 === 1 ? 2 : 1)) / (2 * Math.PI) : null,
    };
  }

  /** Residual of the energy balance over the window by the size of its terms (D-26); null after a forced stop. */
  private energyResidualShare(): number | null {
    if (this.machine.lostEnergy) return null;
    const { sums: s } = this;
    const terms = [s.inputJ, -s.sourceLossJ, -s.switchesJ, -s.shuntsJ, -s.lineJ, -s.copperJ, -s.frictionJ, -s.emfMismatchJ, -s.storedJ];
    const size = terms.reduce((sum, v) => sum + Math.abs(v), 0);
    return size > 0 ? Math.abs(terms.reduce((sum, v) => sum + v, 0)) / size : 0;
  }
}
