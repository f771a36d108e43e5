import type { AffineMode } from "../model/affine";
import { matrixExponential } from "./expm";

/**
 * Spectral form of one affine mode dx/dt = A x + b, x of length 3: eigenvalues with their projectors (Frobenius
 * covariants), f(A) = sum f(lambda_k) E_k. States with a zero row and no forcing are frozen: they act as constants.
 * Where eigenvalues are too close for the projectors, `isSpectral` is false and callers take the matrix exponential.
 */
export class Spectrum {
  isSpectral = true;
  /** Eigenvalues used: a complex pair is kept once, with `im` > 0 and weight 2. */
  count = 0;
  readonly re = new Float64Array(3);
  readonly im = new Float64Array(3);
  /**
   * Per eigenvalue 12 numbers, 3 rows of 4: E_k in the columns of moving states; in `g` E_k A in the columns of frozen
   * states and E_k b in the last column. Real and imaginary parts, the weight of a pair already in them.
   */
  readonly eRe = new Float64Array(36);
  readonly eIm = new Float64Array(36);
  readonly gRe = new Float64Array(36);
  readonly gIm = new Float64Array(36);
  readonly isFrozen = [false, false, false];
  /** Largest |lambda|, 1/s: how finely an interval must be divided where it is sampled. */
  rateMaxPerS = 0;
  /** Largest angular frequency of an oscillating pair, rad/s; 0 when none oscillates. */
  oscillationPerS = 0;

  private readonly moving = new Int32Array(3);
  private movingCount = 0;

  /** Analyses the mode; to be called again whenever A or b change. */
  analyse(mode: AffineMode): void {
    this.findMoving(mode);
    this.isSpectral = true;
    this.count = 0;
    this.eRe.fill(0);
    this.eIm.fill(0);
    this.gRe.fill(0);
    this.gIm.fill(0);
    const m = this.moving;
    const { a } = mode;
    if (this.movingCount === 1) {
      this.addReal(a[m[0]! * 4]!);
      this.eRe[m[0]! * 4 + m[0]!] = 1;
    } else if (this.movingCount === 2) this.analyseTwo(a, m[0]!, m[1]!);
    else if (this.movingCount === 3) this.analyseThree(a);
    this.rateMaxPerS = 0;
    this.oscillationPerS = 0;
    if (this.isSpectral) {
      for (let k = 0; k < this.count; k++) this.oscillationPerS = Math.max(this.oscillationPerS, this.im[k]!);
      for (let k = 0; k < this.count; k++) this.rateMaxPerS = Math.max(this.rateMaxPerS, Math.hypot(this.re[k]!, this.im[k]!));
      this.fillForcing(mode);
    } else for (let i = 0; i < 9; i += 3) this.rateMaxPerS = Math.max(this.rateMaxPerS, Math.abs(a[i]!) + Math.abs(a[i + 1]!) + Math.abs(a[i + 2]!));
  }

  private findMoving({ a, b }: AffineMode): void {
    this.movingCount = 0;
    for (let i = 0; i < 3; i++) {
      const isFrozen = a[3 * i] === 0 && a[3 * i + 1] === 0 && a[3 * i + 2] === 0 && b[i] === 0;
      this.isFrozen[i] = isFrozen;
      if (!isFrozen) this.moving[this.movingCount++] = i;
    }
  }

  private addReal(lambda: number): void {
    this.re[this.count] = lambda;
    this.im[this.count] = 0;
    this.count++;
  }

  private analyseTwo(a: Float64Array, i: number, j: number): void {
    const p = a[4 * i]!;
    const q = a[3 * i + j]!;
    const r = a[3 * j + i]!;
    const s = a[4 * j]!;
    const half = 0.5 * (p + s);
    const difference = 0.5 * (p - s);
    const discriminant = difference * difference + q * r;
    const scale = Math.abs(p) + Math.abs(s) + Math.sqrt(Math.abs(q * r));
    if (Math.abs(discriminant) <= (CLOSE * scale) ** 2) {
      this.isSpectral = false;
      return;
    }
    const root = Math.sqrt(Math.abs(discriminant));
    const e = this.eRe;
    const d = this.eIm;
    if (discriminant > 0) {
      // the larger root by addition of like signs, the smaller one from the determinant: no cancellation
      const large = half >= 0 ? half + root : half - root;
      const small = large === 0 ? 0 : (p * s - q * r) / large;
      this.addReal(large);
      this.addReal(small);
      const gap = large - small;
      setTwo(e, 0, i, j, (p - small) / gap, q / gap, r / gap, (s - small) / gap);
      setTwo(e, 12, i, j, (large - p) / gap, -q / gap, -r / gap, (large - s) / gap);
      return;
    }
    this.re[0] = half;
    this.im[0] = root;
    this.count = 1;
    setTwo(e, 0, i, j, 1, 0, 0, 1); // weight 2 times E = 1/2 - j (A - half)/(2 root)
    setTwo(d, 0, i, j, -difference / root, -q / root, -r / root, difference / root);
  }

  private analyseThree(a: Float64Array): void {
    if (!cubicRoots(a, this.re, this.im)) {
      this.isSpectral = false;
      return;
    }
    const isPair = this.im[1] !== 0;
    this.count = isPair ? 2 : 3;
    const [x, y, z] = [this.re[0]!, this.re[1]!, this.re[2]!];
    if (!isPair) {
      projector(a, y, z, (x - y) * (x - z), this.eRe, 0);
      projector(a, x, z, (y - x) * (y - z), this.eRe, 12);
      projector(a, x, y, (z - x) * (z - y), this.eRe, 24);
      return;
    }
    // real root x, pair s +- j w: E_x = ((A - s)^2 + w^2)/((x - s)^2 + w^2), and the pair from the rest
    const s = y;
    const w = this.im[1]!;
    const size = (x - s) ** 2 + w * w;
    for (let i = 0; i < 3; i++) {
      for (let j = 0; j < 3; j++) {
        let square = 0;
        for (let k = 0; k < 3; k++) square += (a[3 * i + k]! - (i === k ? s : 0)) * (a[3 * k + j]! - (k === j ? s : 0));
        const one = i === j ? 1 : 0;
        const ex = (square + one * w * w) / size;
        this.eRe[4 * i + j] = ex;
        this.eRe[12 + 4 * i + j] = one - ex;
        // 2 Im E = -((A - s) - (x - s) E_x)/w : from sum lambda_k E_k = A
        this.eIm[12 + 4 * i + j] = -(a[3 * i + j]! - one * s - (x - s) * ex) / w;
      }
    }
  }

  private fillForcing({ a, b }: AffineMode): void {
    for (let k = 0; k < this.count; k++) {
      for (let i = 0; i < 3; i++) {
        for (let j = 0; j < 4; j++) {
          if (j < 3 && !this.isFrozen[j]) continue;
          let sumRe = 0;
          let sumIm = 0;
          for (let l = 0; l < 3; l++) {
            const forcing = j < 3 ? a[3 * l + j]! : b[l]!;
            sumRe += this.eRe[12 * k + 4 * i + l]! * forcing;
            sumIm += this.eIm[12 * k + 4 * i + l]! * forcing;
          }
          this.gRe[12 * k + 4 * i + j] = sumRe;
          this.gIm[12 * k + 4 * i + j] = sumIm;
        }
      }
    }
  }
}

/** Relative distance of eigenvalues below which projectors lose too much: 1e-16/1e-5 leaves 1e-11 of full scale. */
const CLOSE = 1e-5;

function setTwo(e: Float64Array, at: number, i: number, j: number, ii: number, ij: number, ji: number, jj: number): void {
  e[at + 4 * i + i] = ii;
  e[at + 4 * i + j] = ij;
  e[at + 4 * j + i] = ji;
  e[at + 4 * j + j] = jj;
}

/** out = (A - u)(A - v) / size */
function projector(a: Float64Array, u: number, v: number, size: number, out: Float64Array, at: number): void {
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) {
      let sum = 0;
      for (let k = 0; k < 3; k++) sum += (a[3 * i + k]! - (i === k ? u : 0)) * (a[3 * k + j]! - (k === j ? v : 0));
      out[at + 4 * i + j] = sum / size;
    }
  }
}

/**
 * Eigenvalues of a 3 x 3 matrix from its characteristic cubic: one real root by bracketed Newton steps, then the
 * deflated quadratic, each polished. Three real ones, or re[0] real and the pair re[1] +- j im[1].
 * False when two are closer than CLOSE times the largest: then projectors are not to be used.
 */
function cubicRoots(a: Float64Array, re: Float64Array, im: Float64Array): boolean {
  const trace = a[0]! + a[4]! + a[8]!;
  const minors = a[0]! * a[4]! - a[1]! * a[3]! + a[0]! * a[8]! - a[2]! * a[6]! + a[4]! * a[8]! - a[5]! * a[7]!;
  const det =
    a[0]! * (a[4]! * a[8]! - a[5]! * a[7]!) - a[1]! * (a[3]! * a[8]! - a[5]! * a[6]!) + a[2]! * (a[3]! * a[7]! - a[4]! * a[6]!);
  // x^3 - trace x^2 + minors x - det
  const bound = 1 + Math.max(Math.abs(trace), Math.sqrt(Math.abs(minors)), Math.cbrt(Math.abs(det))) * 2;
  const x = realRoot(-trace, minors, -det, bound);
  const c1 = x - trace;
  // quotient x^2 + c1 x + c0; c0 from the side with less cancellation
  const c0 = Math.abs(x) * bound > Math.abs(minors) * 1e-3 && x !== 0 ? det / x : minors + x * c1;
  const half = -0.5 * c1;
  const discriminant = half * half - c0;
  im[0] = 0;
  im[1] = 0;
  im[2] = 0;
  re[0] = x;
  const root = Math.sqrt(Math.abs(discriminant));
  if (discriminant < 0) {
    re[1] = half;
    im[1] = root;
    const scale = Math.max(Math.abs(x), Math.hypot(half, root));
    return root > CLOSE * scale;
  }
  re[1] = half >= 0 ? half + root : half - root;
  re[2] = re[1] === 0 ? 0 : c0 / re[1]!;
  const scale = Math.max(Math.abs(x), Math.abs(re[1]!), Math.abs(re[2]!));
  return isApart(x, re[1]!, scale) && isApart(x, re[2]!, scale) && isApart(re[1]!, re[2]!, scale);
}

/** Two roots are far enough apart for their projectors; `scale`: largest root, whose rounding the small ones carry. */
const isApart = (a: number, b: number, scale: number) => Math.abs(a - b) > CLOSE * Math.max(Math.abs(a), Math.abs(b)) + 1e-11 * scale;

/** The real root of largest magnitude side of x^3 + c2 x^2 + c1 x + c0, by Newton steps kept inside a bracket. */
function realRoot(c2: number, c1: number, c0: number, bound: number): number {
  let lo = -bound;
  let hi = bound;
  let x = 0.5 * (lo + hi);
  for (let n = 0; n < 200; n++) {
    const f = ((x + c2) * x + c1) * x + c0;
    if (f === 0) return x;
    if (f > 0) hi = x;
    else lo = x;
    const slope = (3 * x + 2 * c2) * x + c1;
    let next = slope !== 0 ? x - f / slope : lo;
    if (!(next > lo && next < hi)) next = 0.5 * (lo + hi);
    if (Math.abs(next - x) <= 2e-16 * Math.abs(next)) return next;
    x = next;
  }
  return x;
}

/** exp of the mode over `tauS` applied to x0, for single instants; writes the state to `out`. */
export function stateAfter(mode: AffineMode, spectrum: Spectrum, x0: Float64Array, tauS: number, out: Float64Array): void {
  if (!spectrum.isSpectral) {
    exponentialState(mode, x0, tauS, out);
    return;
  }
  let [s0, s1, s2] = [spectrum.isFrozen[0] ? x0[0]! : 0, spectrum.isFrozen[1] ? x0[1]! : 0, spectrum.isFrozen[2] ? x0[2]! : 0];
  for (let k = 0; k < spectrum.count; k++) {
    const u = spectrum.re[k]! * tauS;
    const e = Math.exp(u);
    const at = 12 * k;
    if (spectrum.im[k] === 0) {
      const d = u === 0 ? tauS : Math.expm1(u) / spectrum.re[k]!;
      s0 += e * dot3(spectrum.eRe, at, x0) + d * dot4(spectrum.gRe, at, x0);
      s1 += e * dot3(spectrum.eRe, at + 4, x0) + d * dot4(spectrum.gRe, at + 4, x0);
      s2 += e * dot3(spectrum.eRe, at + 8, x0) + d * dot4(spectrum.gRe, at + 8, x0);
      continue;
    }
    const v = spectrum.im[k]! * tauS;
    const fr = e * Math.cos(v);
    const fi = e * Math.sin(v);
    const half = Math.sin(0.5 * v);
    const nr = Math.expm1(u) * Math.cos(v) - 2 * half * half;
    const size = spectrum.re[k]! ** 2 + spectrum.im[k]! ** 2;
    const dr = (nr * spectrum.re[k]! + fi * spectrum.im[k]!) / size;
    const di = (fi * spectrum.re[k]! - nr * spectrum.im[k]!) / size;
    s0 += fr * dot3(spectrum.eRe, at, x0) - fi * dot3(spectrum.eIm, at, x0) + dr * dot4(spectrum.gRe, at, x0) - di * dot4(spectrum.gIm, at, x0);
    s1 += fr * dot3(spectrum.eRe, at + 4, x0) - fi * dot3(spectrum.eIm, at + 4, x0) + dr * dot4(spectrum.gRe, at + 4, x0) - di * dot4(spectrum.gIm, at + 4, x0);
    s2 += fr * dot3(spectrum.eRe, at + 8, x0) - fi * dot3(spectrum.eIm, at + 8, x0) + dr * dot4(spectrum.gRe, at + 8, x0) - di * dot4(spectrum.gIm, at + 8, x0);
  }
  out[0] = s0;
  out[1] = s1;
  out[2] = s2;
}

const dot3 = (m: Float64Array, at: number, x: Float64Array) => m[at]! * x[0]! + m[at + 1]! * x[1]! + m[at + 2]! * x[2]!;
const dot4 = (m: Float64Array, at: number, x: Float64Array) => dot3(m, at, x) + m[at + 3]!;

const WORK = new Float64Array(16);
const RESULT = new Float64Array(16);

function exponentialState({ a, b }: AffineMode, x0: Float64Array, tauS: number, out: Float64Array): void {
  WORK.fill(0);
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) WORK[4 * i + j] = a[3 * i + j]! * tauS;
    WORK[4 * i + 3] = b[i]! * tauS;
  }
  matrixExponential(WORK, 4, RESULT);
  const [x, y, z] = [x0[0]!, x0[1]!, x0[2]!];
  for (let i = 0; i < 3; i++) out[i] = RESULT[4 * i]! * x + RESULT[4 * i + 1]! * y + RESULT[4 * i + 2]! * z + RESULT[4 * i + 3]!;
}
