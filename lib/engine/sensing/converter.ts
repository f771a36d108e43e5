import type { ScenarioDocument } from "../../scenario/schema";
import type { Conversion } from "../results";
import type { Machine } from "../solver/machine";
import { PIECE_LENGTH } from "../solver/piece";
import type { Observer } from "../solver/rider";
import type { SensorBank } from "./bank";
import { OUT_A, OUT_B, OUT_COMBINED } from "./chain";
import { integrateOutputs } from "./output-integral";
import { visitNodes } from "./quadrature";

/** Code of a voltage: floor(v/LSB + 1/2), clamped (model.md section 3). `bits` N, `fullScaleV` V_fs. */
export function adcCode(v: number, bits: number, fullScaleV: number, input: "unipolar" | "differential"): number {
  const half = 2 ** (bits - 1);
  if (input === "unipolar") return Math.min(Math.max(Math.floor((v * 2 ** bits) / fullScaleV + 0.5), 0), 2 ** bits - 1);
  return Math.min(Math.max(Math.floor((v * half) / fullScaleV + 0.5), -half), half - 1);
}

/** Volts per code step. */
export function lsbV(bits: number, fullScaleV: number, input: "unipolar" | "differential"): number {
  return (input === "unipolar" ? fullScaleV : 2 * fullScaleV) / 2 ** bits;
}

const NO_OFFSETS: readonly number[] = [];

type Item = { offsetS: number; index: number; isEnd: boolean };
/** A conversion whose aperture is open; `meanA` of the period it began in, once that has ended. */
type Open = { timeS: number; trueA: number; integral: [number, number, number]; meanA?: number };
type Sums = { count: number; codeA: number; codeB: number; code: number };

/**
 * Takes conversions at their instants in every period (D-22, D-37) once `fromPeriod` is reached, with aperture and
 * averaging, and reconstructs the current with nominal values: i = (code LSB - V_zero)/(G R_25).
 */
export class Sampler implements Observer {
  readonly conversions: Conversion[] = [];
  /** Called for each conversion once its period's mean is known. */
  onConversion: ((conversion: Conversion) => void) | null = null;
  private readonly items: Item[];
  private readonly offsets: readonly number[];
  private readonly volts = new Float64Array(3);
  private readonly running = new Float64Array(3);
  private readonly piecewise = new Float64Array(3);
  private readonly opened = new Map<number, Open>();
  private readonly sums: Sums = { count: 0, codeA: 0, codeB: 0, code: 0 };
  private pending: Conversion[] = [];
  private periodIntegralAs = 0;
  private nextItem = 0;
  private readonly wantsIntegral: boolean;

  constructor(private readonly machine: Machine, private readonly bank: SensorBank, readonly fromPeriod: number) {
    const { perPeriod, phase, apertureS } = this.converter;
    const { periodS } = machine;
    this.items = [];
    const offsets: number[] = [];
    for (let j = 0; j < perPeriod; j++) {
      const share = phase + j / perPeriod;
      offsets.push((share - Math.floor(share)) * periodS);
    }
    // conversions are numbered in time order (D-37)
    offsets.sort((a, b) => a - b).forEach((offsetS, index) => {
      this.items.push({ offsetS, index, isEnd: false });
      if (apertureS > 0) this.items.push({ offsetS: (offsetS + apertureS) % periodS, index, isEnd: true });
    });
    this.items.sort((a, b) => a.offsetS - b.offsetS || Number(b.isEnd) - Number(a.isEnd));
    this.offsets = this.items.map((item) => item.offsetS);
    this.wantsIntegral = apertureS > 0;
  }

  private get converter(): ScenarioDocument["sensing"]["converter"] {
    return this.machine.document.sensing.converter;
  }

  /** First period from which conversions must be taken so that averaged blocks reported from `period` on are whole. */
  static leadPeriods(document: ScenarioDocument): number {
    const { average, perPeriod, apertureS } = document.sensing.converter;
    return Math.ceil((average - 1) / perPeriod) + Math.ceil(apertureS * document.pwm.frequencyHz);
  }

  /** Begins a period; returns the offsets at which the machine must stop for the converter. */
  offsetsOfPeriod(period: number): readonly number[] {
    this.endPeriod();
    this.nextItem = 0;
    return period >= this.fromPeriod ? this.offsets : NO_OFFSETS;
  }

  private endPeriod(): void {
    const meanA = this.periodIntegralAs / this.lengthOfPeriod();
    for (const open of this.opened.values()) open.meanA ??= meanA;
    for (const conversion of this.pending) this.emit(conversion, meanA);
    this.pending = [];
    this.periodIntegralAs = 0;
  }

  private emit(conversion: Conversion, meanA: number): void {
    conversion.meanA = meanA;
    this.conversions.push(conversion);
    this.onConversion?.(conversion);
  }

  private lengthOfPeriod(): number {
    return this.machine.offsetS > 0 ? Math.min(this.machine.offsetS, this.machine.periodS) : this.machine.periodS;
  }

  /** The machine stands at an offset of this period. */
  reach(offsetS: number): void {
    while (this.nextItem < this.items.length && this.items[this.nextItem]!.offsetS <= offsetS + 1e-13) {
      const item = this.items[this.nextItem++]!;
      if (this.wantsIntegral) this.reachAperture(item);
      else {
        for (let k = 0; k < 3; k++) this.volts[k] = this.bank.isUsed[k] ? this.bank.outputV(k, this.bank.z, this.bank.y) : 0;
        this.convert(this.machine.timeS, this.machine.stage.x[0]!, this.machine.period * this.converter.perPeriod + item.index);
      }
    }
  }

  private reachAperture(item: Item): void {
    const { perPeriod, apertureS } = this.converter;
    if (!item.isEnd) {
      const open: Open = { timeS: this.machine.timeS, trueA: this.machine.stage.x[0]!, integral: [this.running[0]!, this.running[1]!, this.running[2]!] };
      this.opened.set(this.machine.period * perPeriod + item.index, open);
      return;
    }
    const ago = Math.round((this.machine.timeS - apertureS - (this.machine.period / this.machine.frequencyHz + this.startOffset(item.index))) * this.machine.frequencyHz);
    const key = (this.machine.period + ago) * perPeriod + item.index;
    const open = this.opened.get(key);
    if (!open) return;
    this.opened.delete(key);
    for (let k = 0; k < 3; k++) this.volts[k] = (this.running[k]! - open.integral[k]!) / apertureS;
    this.convert(open.timeS, open.trueA, key, open.meanA);
  }

  private startOffset(index: number): number {
    return this.items.find((item) => item.index === index && !item.isEnd)!.offsetS;
  }

  /** `meanA`: mean current of the conversion's period if that has ended already. */
  private convert(timeS: number, trueA: number, serial: number, meanA?: number): void {
    const { sensing } = this.machine.document;
    const { bits, fullScaleV, input, average } = sensing.converter;
    const { chain, volts } = { chain: this.bank.chain, volts: this.volts };
    const arrangement = sensing.amplifier.arrangement;
    const code = (v: number) => adcCode(v, bits, fullScaleV, input);
    const { sums } = this;
    if (serial % average === 0) sums.count = sums.codeA = sums.codeB = sums.code = 0;
    sums.count++;
    const isMidscale = arrangement === "combinedMidscale" || arrangement === "bipolarMidscale";
    const isDifference = arrangement === "differencePair" && input === "differential";
    if (isMidscale) {
      const v = volts[arrangement === "combinedMidscale" ? OUT_COMBINED : OUT_A]!;
      sums.code += code(input === "differential" ? v - chain.referenceV : v);
    } else if (isDifference) sums.code += code(chain.pairSign * (volts[OUT_A]! - volts[OUT_B]!));
    else {
      const a = code(volts[OUT_A]!);
      const b = chain.isLegSite ? code(volts[OUT_B]!) : 0;
      sums.codeA += a;
      sums.codeB += b;
      sums.code += chain.isLegSite ? chain.pairSign * (a - b) : a;
    }
    if (serial % average !== average - 1 || sums.count !== average) return;
    const zeroV = isMidscale && input === "unipolar" ? sensing.reference!.voltageV : 0;
    const meanCode = sums.code / average;
    const hasLegCodes = !isMidscale && !isDifference;
    const conversion: Conversion = {
      timeS,
      codeA: hasLegCodes ? sums.codeA / average : null,
      codeB: hasLegCodes && chain.isLegSite ? sums.codeB / average : null,
      code: meanCode,
      reconstructedA: (meanCode * lsbV(bits, fullScaleV, input) - zeroV) / (chain.gain * sensing.shunt.resistanceOhm),
      trueA,
      meanA: 0,
    };
    if (meanA === undefined) this.pending.push(conversion);
    else this.emit(conversion, meanA);
  }

  piece(): void {
    if (this.machine.period < this.fromPeriod) return;
    const { stage } = this.machine;
    const h = stage.piece[PIECE_LENGTH]!;
    let sum = 0;
    visitNodes(stage, 0, h, (x, w) => (sum += w * x[0]!));
    this.periodIntegralAs += sum;
    if (!this.wantsIntegral) return;
    integrateOutputs(this.bank, stage, h, this.piecewise);
    for (let k = 0; k < 3; k++) this.running[k]! += this.piecewise[k]!;
  }

  finish(): void {
    this.endPeriod();
  }
}
